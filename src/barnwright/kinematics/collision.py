"""The energy of a collision, kept so precisely that thresholds and soft photons lose no digits.

Rules of this file
------------------
- GeV, hbar = c = 1.
- √s is carried as an unevaluated sum ``sqrt_s + correction``. A photon of 1 eV on an electron has √s − m = 1 eV, two
  parts in a million of √s: a single float would leave ten digits of it. `above` subtracts a mass first and adds the
  correction last.
- Momenta come from the factored Källén function. The difference of squares of the textbook loses every digit near a
  threshold and for masses far below the energy.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics.crossed_beams import CrossedBeams

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Collision:
    """What the beams hand to the phase space; every array has the shape (point, 1).

    Attributes
    ----------
    sqrt_s, correction : arrays, GeV
        √s = sqrt_s + correction.
    stretch : array
        exp(Y) with Y the rapidity of the centre of mass in the lab, along +z; 1 where the beams cross at an angle.
    orientation : int
        +1 when beam a moves along +z in the centre of mass, −1 when beam b does.
    target : int or None
        The leg code (−1 or −2) of the incoming particle at rest in the lab.
    lab_is_cm : bool
        Whether the lab is the cm by the way the beams were given, at every point.
    crossed : CrossedBeams or None
        Where the beams cross at an angle: what leads from the centre of mass to the lab.
    """

    sqrt_s: Array
    correction: Array
    stretch: Array
    orientation: int = 1
    target: int | None = None
    lab_is_cm: bool = False
    crossed: CrossedBeams | None = None
    _momenta: dict[tuple[float, float], Array] = field(default_factory=dict, init=False, repr=False, compare=False)

    @property
    def s(self) -> Array:
        """s in GeV²."""
        return self.sqrt_s * self.sqrt_s + 2 * self.sqrt_s * self.correction

    def above(self, mass: float) -> Array:
        """√s − mass in GeV, without the cancellation of a single float."""
        return (self.sqrt_s - mass) + self.correction

    def momentum(self, first: float, second: float) -> Array:
        """The cm momentum in GeV of two bodies with these masses; 0 below their threshold.

        Källén's λ in its four factors: p = √[(W−m₁−m₂)(W+m₁+m₂)(W−|m₁−m₂|)(W+|m₁−m₂|)] / 2W.
        """
        known = self._momenta.get((first, second))
        if known is None:
            known = self._momenta[first, second] = self._momentum(first + second, abs(first - second))
        return known

    def _momentum(self, total: float, difference: float) -> Array:
        excess = np.maximum(self.above(total), 0.0)
        product = excess * (self.sqrt_s + total) * self.above(difference) * (self.sqrt_s + difference)
        return np.asarray(np.sqrt(np.maximum(product, 0.0)) / (2 * self.sqrt_s))

    def take(self, points: Any) -> Collision:
        """The collision of the chosen points (an index array, or a slice)."""
        return self.mapped(lambda array: array[points])

    def mapped(self, change: Callable[[Array], Array]) -> Collision:
        """The same collision with every array put through a function."""
        arrays = (change(self.sqrt_s), change(self.correction), change(self.stretch))
        crossed = None if self.crossed is None else self.crossed.mapped(change)
        return Collision(*arrays, self.orientation, self.target, self.lab_is_cm, crossed)

    def facing_a(self) -> Collision:
        """The same collision seen with +z along beam a."""
        if self.orientation == 1:
            return self
        crossed = None if self.crossed is None else self.crossed.turned()
        return Collision(self.sqrt_s, self.correction, 1.0 / self.stretch, 1, self.target, self.lab_is_cm, crossed)
