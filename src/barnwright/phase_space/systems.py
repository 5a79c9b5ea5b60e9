"""Sums of momenta in a batch of events, each worked out once and shared by all channels."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics.invariants import four_product
from barnwright.phase_space.boost import Vector
from barnwright.phase_space.mother import Mother

Array = NDArray[np.float64]
Legs = tuple[int, ...]


class Systems:
    """The systems of legs of a batch.

    Parameters
    ----------
    momenta : array (leg, 4, event), GeV, in the centre of mass
    masses : of the legs, GeV
    energy : array, GeV
        √s.
    """

    def __init__(self, momenta: Array, masses: tuple[float, ...], energy: Array) -> None:
        self.energy = energy
        self._vectors: dict[Legs, Vector] = {}
        self._squares: dict[Legs, Array] = {}
        self._mothers: dict[Legs, Mother] = {}
        self._products: dict[tuple[Legs, Legs], Array] = {}
        for number, mass in enumerate(masses, 1):
            self._vectors[number,] = tuple(momenta[number - 1])
            self._squares[number,] = np.asarray(mass * mass)
        everything = tuple(range(1, len(masses) + 1))
        self._mothers[everything] = Mother.whole(energy)
        self._everything = everything

    def vector(self, legs: Legs) -> Vector:
        """(E, px, py, pz) of legs together."""
        found = self._vectors.get(legs)
        if found is None:
            one, rest = self.vector(legs[:1]), self.vector(legs[1:])
            found = self._vectors[legs] = (one[0] + rest[0], one[1] + rest[1], one[2] + rest[2], one[3] + rest[3])
        return found

    def square(self, legs: Legs) -> Array:
        """m² in GeV², from four-products of disjoint parts, which do not cancel."""
        found = self._squares.get(legs)
        if found is None:
            one, rest = legs[:1], legs[1:]
            found = self.square(one) + self.square(rest) + 2.0 * self.product(one, rest)
            self._squares[legs] = found
        return found

    def rise(self, legs: Legs) -> Array:
        """m² − (Σ of masses)² in GeV², without cancellation for two legs."""
        if len(legs) == 2:
            one, other = legs[:1], legs[1:]
            return 2.0 * (self.product(one, other) - self.mass(one) * self.mass(other))
        return self.square(legs) - sum(float(self.mass((leg,))) for leg in legs) ** 2

    def mass(self, legs: Legs) -> Array:
        """m in GeV."""
        return np.sqrt(self.square(legs))

    def mother(self, legs: Legs) -> Mother:
        """The system as one that splits."""
        found = self._mothers.get(legs)
        if found is None:
            found = self._mothers[legs] = Mother.moving(self.vector(legs), self.mass(legs), self.square(legs))
        return found

    def product(self, first: Legs, second: Legs) -> Array:
        """The four-product in GeV² of two disjoint systems."""
        found = self._products.get((first, second))
        if found is None:
            squares = self.square(first), self.square(second)
            found = four_product(self.vector(first), self.vector(second), squares)
            self._products[first, second] = self._products[second, first] = found
        return found
