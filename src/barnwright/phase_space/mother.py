"""Systems of legs in an event: one about to split, and the kinematics of its splitting."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.boost import Axes, Vector, axes_of

Array = NDArray[np.float64]
Pair = tuple[Array, Array]

ZERO: Array = np.zeros(())


class Mother(NamedTuple):
    """What is about to split.

    Attributes
    ----------
    vector : (E, px, py, pz), GeV, in the centre of mass
    mass, square : arrays, GeV and GeV²
    axes : Axes or None
        Its flight; None for the whole, which rests.
    rise : array or None, GeV²
        m² − (Σ of the legs' masses)², where the map made that.
    """

    vector: Vector
    mass: Array
    square: Array
    axes: Axes | None
    rise: Array | None = None

    @classmethod
    def whole(cls, energy: Array) -> Mother:
        """All legs together: √s at rest, GeV."""
        return cls((energy, ZERO, ZERO, ZERO), energy, energy * energy, None)

    @classmethod
    def moving(cls, vector: Vector, mass: Array, square: Array, rise: Array | None = None) -> Mother:
        """A system with this momentum and mass."""
        return cls(vector, mass, square, axes_of(*vector[1:]), rise)


class Split(NamedTuple):
    """A splitting in the mother's rest frame; pairs are of the first and the second part.

    Attributes
    ----------
    masses, squares : GeV and GeV²
    momentum : GeV
        p* of either part.
    energies, small : GeV
        E* and E* − p*.
    """

    masses: Pair
    squares: Pair
    momentum: Array
    energies: Pair
    small: Pair

    @classmethod
    def of(cls, masses: Pair, squares: Pair, momentum: Array) -> Split:
        """From the masses and p*; a leg without mass costs nothing."""
        found = [_energies(mass, square, momentum) for mass, square in zip(masses, squares, strict=True)]
        (first, first_small), (second, second_small) = found
        return cls(masses, squares, momentum, (first, second), (first_small, second_small))


def _energies(mass: Array, square: Array, momentum: Array) -> Pair:
    """E* and E* − p* from m²/(E* + p*), GeV."""
    if mass.ndim == 0 and mass == 0.0:
        return momentum, ZERO
    energy = np.sqrt(momentum * momentum + square)
    return energy, square / (energy + momentum)


def momentum_from_masses(mass: Array, first: Array, second: Array) -> Array:
    """p* in GeV: Källén's function in its four factors, precise close to the threshold."""
    if second.ndim == 0 and second == 0.0:
        return np.asarray(np.maximum(mass - first, 0.0) * (0.5 * (mass + first)) / mass)
    total, difference = first + second, first - second
    product = (mass - total) * (mass + total) * (mass - difference) * (mass + difference)
    return np.asarray(np.sqrt(np.maximum(product, 0.0)) / (2.0 * mass))


def momentum_from_rise(mass: Array, rise: Array, first: Array, second: Array) -> Array:
    """p* in GeV of two legs, from m² − (m₁ + m₂)²: √(rise (rise + 4 m₁ m₂))/2m."""
    return np.asarray(np.sqrt(rise * (rise + 4.0 * first * second)) / (2.0 * mass))


def momentum_from_gap(mass: Array, gap: Array, leg: Array, other: Array) -> Array:
    """p* in GeV from the gap M² − m² to the other part's m²: √((gap − m_l²)² − 4 m_l² m²)/2M, for a soft leg."""
    product = (gap - leg * (leg + 2.0 * other)) * (gap - leg * (leg - 2.0 * other))
    return np.asarray(np.sqrt(np.maximum(product, 0.0)) / (2.0 * mass))
