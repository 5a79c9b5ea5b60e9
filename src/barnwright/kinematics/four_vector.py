"""Four-vectors in light-cone components.

E + pz and E − pz are kept apart: a boost along z multiplies one and divides the other, so a particle close to the beam,
or one much lighter than its energy, keeps all its digits. GeV; metric (+, −, −, −).
"""

from __future__ import annotations

from functools import cached_property
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


class Exact(NamedTuple):
    """What is known of a four-vector by a road without rounding or cancellation; None: only by its components.

    A kinetic energy from the recoil of a target at rest; energy and momentum of two bodies in the cm, which do not
    depend on the angle; px and py of the second of them, opposite to those of the first.
    """

    kinetic: Array | None = None
    energy: Array | None = None
    momentum: Array | None = None
    px: Array | None = None
    py: Array | None = None


NOTHING_EXACT = Exact()


class FourVector:
    """A batch of four-momenta; all arrays broadcast against one another.

    Parameters
    ----------
    plus, minus : arrays, GeV
        E + pz and E − pz.
    pt, phi : arrays, GeV and rad
        Transverse momentum and azimuth, phi in (−π, π]; phi None where ``exact`` knows px and py.
    mass : float or array, GeV
    exact : Exact
    """

    def __init__(
        self, plus: Array, minus: Array, pt: Array, phi: Array | None, mass: float | Array, exact: Exact = NOTHING_EXACT
    ) -> None:
        self.plus, self.minus, self.pt, self.mass = plus, minus, pt, mass
        self._phi, self._exact = phi, exact

    @classmethod
    def from_components(cls, energy: Array, px: Array, py: Array, pz: Array, mass: float | Array) -> FourVector:
        """From (E, px, py, pz) in GeV; ``mass`` in GeV is taken as given."""
        pt = np.hypot(px, py)
        larger = energy + np.abs(pz)
        smaller = (np.square(mass) + pt * pt) / np.where(larger > 0, larger, 1.0)
        forward = pz >= 0
        return cls(np.where(forward, larger, smaller), np.where(forward, smaller, larger), pt, np.arctan2(py, px), mass)

    @cached_property
    def phi(self) -> Array:
        """Azimuth in rad, in (−π, π]."""
        return np.arctan2(self.py, self.px) if self._phi is None else self._phi

    @cached_property
    def energy(self) -> Array:
        """Energy in GeV."""
        if self._exact.energy is not None:
            return self._exact.energy
        return 0.5 * (self.plus + self.minus)

    @cached_property
    def pz(self) -> Array:
        """Momentum along z in GeV."""
        return 0.5 * (self.plus - self.minus)

    @cached_property
    def px(self) -> Array:
        """Momentum along x in GeV."""
        return self.pt * np.cos(self.phi) if self._exact.px is None else self._exact.px

    @cached_property
    def py(self) -> Array:
        """Momentum along y in GeV."""
        return self.pt * np.sin(self.phi) if self._exact.py is None else self._exact.py

    @cached_property
    def momentum(self) -> Array:
        """|p| in GeV."""
        if self._exact.momentum is not None:
            return self._exact.momentum
        kinetic = self._exact.kinetic
        if kinetic is not None:
            return np.sqrt(kinetic * (kinetic + 2 * self.mass))
        return np.sqrt(self.pt * self.pt + self.pz * self.pz)

    @cached_property
    def kinetic_energy(self) -> Array:
        """E − m in GeV, from |p|²/(E + m)."""
        if self._exact.kinetic is not None:
            return self._exact.kinetic
        total = self.energy + self.mass
        return np.square(self.momentum) / np.where(total > 0, total, 1.0)

    @cached_property
    def theta(self) -> Array:
        """Polar angle in rad, 0 to π."""
        return np.arctan2(self.pt, self.pz)

    @cached_property
    def cos_theta(self) -> Array:
        """Cosine of the polar angle; 1 for a particle at rest."""
        momentum = np.sqrt(self.pt * self.pt + self.pz * self.pz)
        return np.where(momentum > 0, self.pz / np.where(momentum > 0, momentum, 1.0), 1.0)

    @cached_property
    def rapidity(self) -> Array:
        """½ ln((E + pz)/(E − pz)); ±∞ for a massless particle along the beam."""
        with np.errstate(divide="ignore"):
            return 0.5 * (np.log(self.plus) - np.log(self.minus))

    @cached_property
    def pseudorapidity(self) -> Array:
        """−ln tan(θ/2); ±∞ along the beam."""
        with np.errstate(divide="ignore", invalid="ignore"):
            return np.where(self.pt > 0, np.arcsinh(self.pz / self.pt), np.copysign(np.inf, self.pz))

    def components(self) -> Array:
        """(E, px, py, pz) in GeV, shape (4, …)."""
        return np.stack(np.broadcast_arrays(self.energy, self.px, self.py, self.pz))

    def __add__(self, other: FourVector) -> FourVector:
        plus, minus = self.plus + other.plus, self.minus + other.minus
        px, py = self.px + other.px, self.py + other.py
        pt = np.hypot(px, py)
        mass = np.sqrt(np.maximum(plus * minus - pt * pt, 0.0))
        return FourVector(plus, minus, pt, np.arctan2(py, px), mass)


def boost_to_rest(vector: FourVector, system: FourVector) -> FourVector:
    """``vector`` in the rest frame of ``system``: the pure boost, axes kept (GeV).

    Both are given in the same frame. The mass of ``vector`` is kept. Jackson, Classical Electrodynamics, 3rd ed.,
    eq. (11.98), from memory, with (γ − 1)/β² written as γ²/(γ + 1).
    """
    energy, *momentum = system.components()
    mass = system.mass
    own = vector.components()
    along = sum(p * q for p, q in zip(momentum, own[1:], strict=True))
    new_energy = (energy * own[0] - along) / mass
    factor = (own[0] + new_energy) / (energy + mass)
    moved = [q - p * factor for p, q in zip(momentum, own[1:], strict=True)]
    px, py, pz = moved
    return FourVector.from_components(new_energy, px, py, pz, vector.mass)
