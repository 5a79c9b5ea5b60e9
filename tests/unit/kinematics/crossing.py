"""Beams that cross at an angle by textbook formulas in 60 digits: explicit four-vectors and Lorentz transformations."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from mpmath import mp, mpf

Vector = list[mpf]
"""(E, px, py, pz)."""


def square(p: Sequence[mpf]) -> mpf:
    """p²."""
    return p[0] ** 2 - p[1] ** 2 - p[2] ** 2 - p[3] ** 2


def boosted(p: Sequence[mpf], system: Sequence[mpf], sign: int) -> Vector:
    """p in the rest frame of a system (sign −1), or out of it (+1); Jackson, eq. (11.98), from memory."""
    mass = mp.sqrt(square(system))
    along = sum(system[k] * p[k] for k in (1, 2, 3))
    energy = (system[0] * p[0] + sign * along) / mass
    factor = sign * (p[0] + energy) / (system[0] + mass)
    return [energy, *(p[k] + factor * system[k] for k in (1, 2, 3))]


@dataclass(frozen=True)
class Crossing:
    """Kinetic energies and masses of beam a and b in GeV, the full angle, which beam goes towards +z (+1: a)."""

    kinetic: tuple[float, float]
    masses: tuple[float, float]
    angle: float
    orientation: int = 1

    def beam(self, code: int) -> Vector:
        """The lab momentum of a beam."""
        kinetic, mass = mpf(self.kinetic[-1 - code]), mpf(self.masses[-1 - code])
        momentum, half = mp.sqrt(kinetic * (kinetic + 2 * mass)), mpf(self.angle) / 2
        sign = self.orientation if code == -1 else -self.orientation
        return [kinetic + mass, momentum * mp.sin(half), mpf(0), sign * momentum * mp.cos(half)]

    @property
    def system(self) -> Vector:
        """The sum of the beams' momenta."""
        return [x + y for x, y in zip(self.beam(-1), self.beam(-2), strict=True)]

    def outgoing(
        self, code: int, masses: tuple[float, float], one_minus: float, azimuth: float
    ) -> tuple[Vector, Vector]:
        """An outgoing leg in the cm and in the lab; the polar angle is that of leg 1 to beam a."""
        system = self.system
        s = square(system)
        sign = 1 if code == 1 else -1
        mass = mpf(masses[code - 1])
        total, difference = mpf(masses[0]) + mpf(masses[1]), mpf(masses[0]) - mpf(masses[1])
        q = sign * mp.sqrt((s - total**2) * (s - difference**2) / s) / 2
        cosine = 1 - mpf(one_minus)
        sine = mp.sqrt(1 - cosine**2)
        x, y, z = q * sine * mp.cos(azimuth), q * sine * mp.sin(azimuth), q * cosine * self.orientation
        energy = mp.sqrt(q**2 + mass**2)
        ahead = boosted(self.beam(-1 if self.orientation == 1 else -2), system, -1)
        size = mp.sqrt(ahead[1] ** 2 + ahead[3] ** 2)
        along_x, along_z = ahead[1] / size, ahead[3] / size
        turned = [energy, x * along_z + z * along_x, y, z * along_z - x * along_x]
        return [energy, x, y, z], boosted(turned, system, 1)
