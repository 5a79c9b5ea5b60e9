"""Sums of momenta in a batch of events, each worked out once and shared by all channels.

Every quantity has one way to be made, whoever asks first: the bits do not depend on the order of the channels.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics.invariants import four_product
from barnwright.phase_space.boost import Vector
from barnwright.phase_space.mother import Mother, Split

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
        self._momenta, self._masses = momenta, masses
        self._vectors: dict[Legs, Vector] = {}
        self._squares: dict[Legs, Array] = {}
        self._roots: dict[Legs, Array] = {}
        self._products: dict[tuple[Legs, Legs], Array] = {}
        self._mothers: dict[Legs, Mother] = {}
        self._splits: dict[tuple[Legs, Legs], Split] = {}

    def vector(self, legs: Legs) -> Vector:
        """(E, px, py, pz) of legs together."""
        found = self._vectors.get(legs)
        if found is None:
            found = self._vectors[legs] = self._vector(legs)
        return found

    def square(self, legs: Legs) -> Array:
        """m² in GeV², from four-products of disjoint parts, which do not cancel."""
        found = self._squares.get(legs)
        if found is None:
            found = self._squares[legs] = self._square(legs)
        return found

    def mass(self, legs: Legs) -> Array:
        """m in GeV."""
        found = self._roots.get(legs)
        if found is None:
            found = self._roots[legs] = self._mass(legs)
        return found

    def product(self, first: Legs, second: Legs) -> Array:
        """The four-product in GeV² of two disjoint systems."""
        pair = (first, second) if first < second else (second, first)
        found = self._products.get(pair)
        if found is None:
            found = self._products[pair] = self._product(*pair)
        return found

    def rise(self, legs: Legs) -> Array:
        """m² − (Σ of masses)² in GeV², without cancellation for two legs."""
        if len(legs) == 2:
            one, other = legs[:1], legs[1:]
            return 2.0 * (self.product(one, other) - self.mass(one) * self.mass(other))
        return self.square(legs) - sum(self._masses[leg - 1] for leg in legs) ** 2

    def gap(self, mother: Legs, legs: Legs, other: Legs) -> Array:
        """M² − m² in GeV² of a mother and one of her parts, from the other one, without cancellation."""
        if len(mother) == len(self._masses):
            return 2.0 * self.energy * self.vector(other)[0] - self.square(other)
        return self.square(other) + 2.0 * self.product(legs, other)

    def mother(self, legs: Legs) -> Mother:
        """The system as one that splits."""
        found = self._mothers.get(legs)
        if found is None:
            found = self._mothers[legs] = self._mother(legs)
        return found

    def split(self, mother: Legs, first: Legs, second: Legs) -> Split:
        """How a mother splits."""
        found = self._splits.get((first, second))
        if found is None:
            found = self._splits[first, second] = self._split(mother, first, second)
        return found

    def _vector(self, legs: Legs) -> Vector:
        if len(legs) == 1:
            energy, px, py, pz = self._momenta[legs[0] - 1]
            return energy, px, py, pz
        one, rest = self.vector(legs[:1]), self.vector(legs[1:])
        return one[0] + rest[0], one[1] + rest[1], one[2] + rest[2], one[3] + rest[3]

    def _square(self, legs: Legs) -> Array:
        if len(legs) == 1:
            return np.asarray(self._masses[legs[0] - 1] ** 2)
        one, rest = legs[:1], legs[1:]
        return self.square(one) + self.square(rest) + 2.0 * self.product(one, rest)

    def _mass(self, legs: Legs) -> Array:
        return np.asarray(self._masses[legs[0] - 1]) if len(legs) == 1 else np.sqrt(self.square(legs))

    def _product(self, first: Legs, second: Legs) -> Array:
        return four_product(self.vector(first), self.vector(second), (self.square(first), self.square(second)))

    def _mother(self, legs: Legs) -> Mother:
        if len(legs) == len(self._masses):
            return Mother.whole(self.energy)
        return Mother.moving(self.vector(legs), self.mass(legs), self.square(legs))

    def _split(self, mother: Legs, first: Legs, second: Legs) -> Split:
        """p* from the momentum of either part of the whole, elsewhere from √((p·q)² − m²m'²)/M."""
        masses, squares = (self.mass(first), self.mass(second)), (self.square(first), self.square(second))
        if len(mother) == len(self._masses):
            _, px, py, pz = self.vector(first)
            momentum = np.sqrt(px * px + py * py + pz * pz)
        else:
            product, least = self.product(first, second), masses[0] * masses[1]
            momentum = np.sqrt(np.maximum((product - least) * (product + least), 0.0)) / self.mass(mother)
        return Split.of(masses, squares, momentum)
