"""The ends of every map: kinematics, and the simple cuts.

Rules of this file
------------------
- A window is what kinematics and cuts leave for one number when the earlier ones are known. Where it is empty, the
  point belongs to no accepted event and has an infinite density (no weight).
- In a splitting M → C D the energy of C is that of M without that of D: bounds on both are bounds on E_D. In the whole,
  which rests, E_D and m_C² are the same thing; in a moving mother E_D lies within γ(E* ± β p*), so a bound on E_D
  bounds E*, that is m_C², and then the angle.
- Cuts on directions are used where the whole splits and the leg is one of the two parts.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.incoming import Incoming, beam_in, nearest
from barnwright.phase_space.limits import OPEN
from barnwright.phase_space.mother import Mother, Split
from barnwright.phase_space.parts import Part, Splitting

Array = NDArray[np.float64]
Ends = tuple[Array, Array]

SMALL = 1e-300
EVERYWHERE: Ends = (np.zeros(()), np.full((), 2.0))


class Window(NamedTuple):
    """The ends of an invariant m², GeV²; whether cuts made them; and the kinetic energy that kinematics leaves, GeV."""

    low: Array
    high: Array
    cut: bool
    kinetic: Array


def of_invariant(parts: tuple[Part, Part], other: Array | None, mother: Mother, incoming: Incoming | None) -> Window:
    """The window of the first of two parts; ``other`` is the mass of the second in GeV where it is known."""
    part, rest = parts
    other_mass = np.sqrt(np.asarray(rest.square[0])) if other is None else other
    kinetic = mother.mass - other_mass - part.mass
    low, high = np.asarray(part.square[0]), np.square(part.mass + np.maximum(kinetic, 0.0))
    if part.emission is not None:
        low = np.maximum(low, _least_square(*part.emission, other_mass, mother))
    cut = part.square[0] > part.mass**2 or part.square[1] < np.inf
    if part.square[1] < np.inf:
        high = np.minimum(high, part.square[1])
    bounds = _energies_of(rest, part, mother, incoming)
    if bounds is None:
        return Window(low, high, cut, kinetic)
    if other is not None:
        least, most = _from_energy(bounds, other, mother)
    elif mother.axes is None:
        least = mother.square + rest.square[0] - 2.0 * mother.mass * bounds[1]
        most = np.square(np.maximum(mother.mass - bounds[0], 0.0))
    else:
        return Window(low, high, cut, kinetic)
    low = np.minimum(np.maximum(low, least), high)
    return Window(low, np.maximum(np.minimum(high, most), low), True, kinetic)


def _least_square(least: float, mass: float, other: Array, mother: Mother) -> Array:
    """The least m² in GeV² of a leg of this mass and a massless one that must have an energy of at least ``least``.

    With the massless leg at that energy, everything else of the mother has a fixed mass q; the leg then flies along the
    massless one in the rest frame of what it shares with the part of mass ``other``.
    """
    grow = 1.0 if mother.axes is None else (mother.vector[0] + mother.axes.momentum) / mother.mass
    taken = mother.mass * least / grow
    rest = np.maximum(mother.square - 2.0 * taken, SMALL)
    q = np.sqrt(rest)
    energy = np.maximum((rest + mass * mass - other * other) / (2.0 * q), mass)
    total = energy + np.sqrt((energy - mass) * (energy + mass))
    return np.asarray(mass * mass * (1.0 + 2.0 * taken / (q * total)))


def _energies_of(part: Part, other: Part, mother: Mother, incoming: Incoming | None) -> Ends | None:
    """Bounds on a part's energy in the centre of mass, from cuts on both; None where there is no cut."""
    if not any(one.energy != OPEN or (one.transfers and mother.axes is None) for one in (part, other)):
        return None
    least, others = (_least_energy(one, mother, incoming) for one in (part, other))
    energy = mother.vector[0]
    return np.maximum(least, energy - other.energy[1]), np.minimum(part.energy[1], energy - others)


def _least_energy(part: Part, mother: Mother, incoming: Incoming | None) -> Array:
    """A part's own least energy; a least |t| of a leg of the whole is one."""
    least = np.asarray(part.energy[0])
    if mother.axes is None and incoming is not None:
        for code, _, top in part.transfers:
            if top < np.inf:
                least = np.maximum(least, _energy_of_transfer(part.mass, top, incoming, -1 - code))
    return least


def _energy_of_transfer(mass: float, top: float, incoming: Incoming, number: int) -> Array:
    """The energy in GeV that a leg needs for a transfer as low as ``top`` (GeV²), backwards: E E_b + p k = h."""
    beam, k, energy = incoming.masses[number], incoming.momentum, incoming.energies[number]
    h = 0.5 * (beam * beam + mass * mass - top)
    inner = np.sqrt(np.maximum(h * h - (beam * mass) ** 2, 0.0))
    needed = (h * h + k * k * mass * mass) / np.maximum(energy * h + k * inner, SMALL)
    return np.where(h > energy * mass, needed, mass)


def _from_energy(bounds: Ends, leg: Array, mother: Mother) -> Ends:
    """The ends of the other part's m² that let a part of mass ``leg`` have an energy within bounds."""
    least, most = bounds
    if mother.axes is not None:
        gamma, boost = mother.vector[0] / mother.mass, mother.axes.momentum / mother.mass
        below, above = (np.sqrt(np.maximum(e * e - leg * leg, 0.0)) for e in (least, most))
        least = np.where(least > gamma * leg, gamma * least - boost * below, leg)
        most = gamma * most + boost * above
    constant = mother.square + leg * leg
    return constant - 2.0 * mother.mass * most, constant - 2.0 * mother.mass * least


def of_angle(splitting: Splitting, split: Split, mother: Mother, incoming: Incoming | None) -> tuple[Ends, bool]:
    """The ends of 1 − cos of the first part to the mother's flight (to +z at rest), and whether cuts made them."""
    if mother.axes is not None:
        return _within_energies(splitting, split, mother, incoming)
    low, high, cut = *EVERYWHERE, False
    for number, part in enumerate((splitting.first, splitting.second)):
        for least, most in _directions(part, number, split, mother, incoming):
            ends = (least, most) if number == 0 else (2.0 - most, 2.0 - least)
            low, high, cut = np.maximum(low, ends[0]), np.minimum(high, ends[1]), True
    low = np.minimum(low, 2.0)
    return (low, np.maximum(high, low)), cut


def _directions(
    part: Part, number: int, split: Split, mother: Mother, incoming: Incoming | None
) -> list[tuple[Array | float, Array | float]]:
    """The ends of 1 − cos of a part to +z, one pair for each cut on its direction."""
    found: list[tuple[Array | float, Array | float]] = []
    if part.cosine != OPEN:
        found.append((1.0 - part.cosine[1], 1.0 - part.cosine[0]))
    if part.pt > 0:
        sine = np.minimum(part.pt / np.maximum(split.momentum, SMALL), 1.0)
        near = sine * sine / (1.0 + np.sqrt(1.0 - sine * sine))
        found.append((near, 2.0 - near))
    if incoming is not None:
        for code, least, most in part.transfers:
            beam = beam_in(mother, incoming, -1 - code)
            close = nearest(beam, split.energies[number], split.momentum, split.squares[number])
            slope = np.maximum(2.0 * beam.momentum * split.momentum, SMALL)
            near, far = (-most - close) / slope, (-least - close) / slope
            found.append((near, far) if code == -1 else (2.0 - far, 2.0 - near))
    return found


def _within_energies(
    splitting: Splitting, split: Split, mother: Mother, incoming: Incoming | None
) -> tuple[Ends, bool]:
    """From bounds on energies: E = γ(E* + β p* cos)."""
    bounds = _energies_of(splitting.first, splitting.second, mother, incoming)
    if bounds is None or mother.axes is None or splitting.angle.axis != "flight":
        return EVERYWHERE, False
    middle = mother.vector[0] / mother.mass * split.energies[0]
    reach = np.maximum(mother.axes.momentum / mother.mass * split.momentum, SMALL)
    low, high = (1.0 - (energy - middle) / reach for energy in reversed(bounds))
    low = np.clip(low, 0.0, 2.0)
    return (low, np.clip(high, low, 2.0)), True
