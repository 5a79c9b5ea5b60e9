"""Momenta for the tests, named, with every digit of their light-cone components; and events of two bodies."""

from __future__ import annotations

import numpy as np
from numpy.typing import ArrayLike

from barnwright.amplitudes.arrays import Array, Complex
from barnwright.event import Event
from barnwright.kinematics import Collision, FourVector, TwoBody
from barnwright.reaction import parse_reaction

ELECTRON, MUON, W_MASS, Z_MASS = 0.51099895069e-3, 0.1056583755, 80.377, 91.1876
"""GeV."""


def heading(momentum: ArrayLike, sine: ArrayLike, cosine: ArrayLike, phi: ArrayLike, mass: float) -> FourVector:
    """A momentum by |p| in GeV, sine and cosine of half its polar angle, its azimuth and its mass."""
    p, s, c, azimuth = np.broadcast_arrays(*map(np.asarray, (momentum, sine, cosine, phi)))
    small = mass * mass / (np.hypot(p, mass) + p)
    return FourVector(small + 2 * p * c * c, small + 2 * p * s * s, 2 * p * s * c, azimuth, mass)


def everywhere(momentum: float, mass: float) -> FourVector:
    """Twenty directions of one |p|."""
    random = np.random.default_rng(20)
    half = random.uniform(0, np.pi / 2, 20)
    return heading(momentum, np.sin(half), np.cos(half), random.uniform(-np.pi, np.pi, 20), mass)


def along_the_axis(momentum: float, mass: float) -> FourVector:
    """Exactly along ±z, and within 1e-9 of it."""
    sine = np.array([0.0, 1.0, 1e-9, 1.0])
    return heading(momentum, sine, np.array([1.0, 0.0, 1.0, 1e-9]), np.array([0.0, 0.4, 0.4, -2.0]), mass)


def at_rest(mass: float) -> FourVector:
    """A particle at rest, with the signs of zero that a rotation may leave behind."""
    zero = np.array([0.0, -0.0])
    return FourVector.from_components(np.full(2, mass), zero, zero, zero, mass)


MASSIVE = {
    "ordinary": everywhere(1.3, 0.9),
    "slow": everywhere(1e-10, 0.9),
    "light": everywhere(1.0, 1e-12),
    "axis": along_the_axis(1.3, 0.9),
    "light on the axis": along_the_axis(1.0, 1e-12),
    "rest": at_rest(0.9),
}
MASSLESS = {"massless": everywhere(1.3, 0.0), "massless on the axis": along_the_axis(1.3, 0.0)}
ALL = MASSIVE | MASSLESS


def outer(first: Complex | Array, second: Complex | Array) -> Complex:
    """The product of two wave functions as matrices, (4, 4, …)."""
    return np.asarray(first[:, None] * second[None])


def times(matrix: Complex | Array, wave: Complex | Array) -> Complex:
    """A matrix, the same for all events or one for each, on a wave function."""
    return np.asarray(np.einsum("ij...,j...->i...", matrix, wave))


def two_bodies(
    text: str,
    sqrt_s: ArrayLike,
    masses: tuple[float, float, float, float],
    cosines: ArrayLike,
    azimuth: Array | float = 0.0,
) -> Event:
    """Events of a reaction, beam a along +z in the centre of mass: shape (point, node)."""
    energies = np.asarray(sqrt_s, dtype=float).reshape(-1, 1)
    c = np.atleast_2d(np.asarray(cosines, dtype=float))
    found = Collision(energies, np.zeros_like(energies), np.ones_like(energies))
    return Event(parse_reaction(text), TwoBody(found, masses, 1 - c, 1 + c, azimuth))


def random_events(text: str, masses: tuple[float, float, float, float], lowest: float = 1.001) -> Event:
    """Two hundred energies from just above threshold to a thousand times more, each at one random angle."""
    random = np.random.default_rng(3)
    threshold = max(masses[0] + masses[1], masses[2] + masses[3])
    energies = threshold * (1 + (lowest - 1) * 10 ** random.uniform(0, 6, 200))
    cosines, azimuth = random.uniform(-1, 1, (200, 1)), random.uniform(-np.pi, np.pi, (200, 1))
    return two_bodies(text, energies, masses, cosines, azimuth)
