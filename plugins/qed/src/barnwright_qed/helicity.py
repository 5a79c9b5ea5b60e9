"""What the helicity amplitudes of this plugin share: their rows, half angles, and parity.

Rules of this file
------------------
- Quantum electrodynamics conserves parity: all helicities reversed, an amplitude changes by a phase at most. So the
  tables of amplitudes hold one row of every pair, and a row's phase is left free.
- A table's functions see one object with what the process worked out; only rows that are wanted are evaluated.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Any, NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Event
from barnwright_qed.coupling import Coupling

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]
Combination = tuple[int, int, int, int]
Table = Mapping[Combination, Callable[[Any], Array]]


class HalfAngle(NamedTuple):
    """cos² and sin² of half the angle between beam a and leg 1 in the cm, and the product of the two, sin θ/2."""

    cos_squared: Array
    sin_squared: Array
    product: Array

    @property
    def cosine(self) -> Array:
        """cos θ."""
        return self.cos_squared - self.sin_squared


def half_angle(event: Event) -> HalfAngle:
    """The half angle, every digit kept at both poles; leg 1 must move."""
    leg = event.cm_vector(1)
    cosine = leg.pz / leg.momentum * np.sign(event.cm_vector("beam_a").pz)
    sine = leg.pt / leg.momentum
    large = (1 + np.abs(cosine)) / 2
    small = np.square(sine) / (4 * large)
    forward = cosine > 0
    return HalfAngle(np.where(forward, large, small), np.where(forward, small, large), sine / 2)


def elastic_half_angle(event: Event) -> HalfAngle:
    """The half angle where all four masses are equal: sin² = t/(t + u), cos² = u/(t + u)."""
    total = event.transfer("beam_a", "beam_b")
    cos_squared, sin_squared = event.u / total, event.t / total
    return HalfAngle(cos_squared, sin_squared, np.sqrt(cos_squared * sin_squared))


def rows(
    event: Event, parameters: Coupling, helicities: tuple[Combination, ...], table: Table, quantities: Any
) -> Complex:
    """e² times the wanted rows of a table, shape (helicity, 1, *event.shape)."""
    found = np.zeros((len(helicities), 1, *event.shape), dtype=complex)
    known: dict[Combination, Array] = {}
    for row, combination in enumerate(helicities):
        key = combination if combination in table else mirrored(combination)
        if key not in known:
            known[key] = 4 * np.pi * parameters.alpha * table[key](quantities)
        found[row, 0] = known[key]
    return found


def mirrored(combination: Combination) -> Combination:
    """All helicities reversed."""
    a, b, one, two = combination
    return -a, -b, -one, -two


def both_parities(table: Table) -> tuple[Combination, ...]:
    """The combinations that do not vanish: those of a table, and their mirror images."""
    return (*table, *map(mirrored, table))
