"""Three collisions and four angles at which a law is tried: above threshold, where it is valid, away from poles."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.event import Event, Point
from barnwright.kinematics import Collision, TwoBody
from barnwright.process import Process

Array = NDArray[np.float64]
Masses = tuple[float, float, float, float]

COSINES = np.array([[-0.9, -0.3, 0.2, 0.7]])
COSINES.flags.writeable = False  # a law that writes into it must not touch what others are tried at
_SHARES = np.array([0.1, 0.5, 0.9])


@dataclass(frozen=True, slots=True)
class CheckPoints:
    """A 2 → 2 process at three energies; masses in GeV of beam a, beam b, leg 1, leg 2, sqrt_s in GeV of shape (3,)."""

    process: Process
    masses: Masses
    sqrt_s: Array

    @classmethod
    def of(cls, process: Process, masses: Masses) -> CheckPoints:
        """Energies between 1.1 and 100 times the threshold (without masses: from 1 GeV), within the range of validity.

        Raises
        ------
        ValueError
            When the range of validity ends below the threshold.
        """
        threshold = max(masses[0] + masses[1], masses[2] + masses[3])
        low, high = 1.1 * threshold or 1.0, np.inf
        if process.valid is not None and process.valid.sqrt_s is not None:
            low, high = max(low, process.valid.sqrt_s[0]), process.valid.sqrt_s[1]
        high = min(high, 100 * low)
        if high <= low:
            low = threshold + 0.1 * (high - threshold)
        if high <= threshold:
            raise ValueError(
                f"valid.sqrt_s: got an upper end of {high:g}, expected more than the threshold, {threshold:g} GeV"
            )
        return cls(process, masses, np.asarray(low * (high / low) ** _SHARES))

    def event(self, points: slice, cosines: Array = COSINES) -> Event:
        """The events of some of the points at cosines of the polar angle of shape (1, node) in the cm."""
        two_body = TwoBody(self.collision(points), self.masses, 1 - cosines, 1 + cosines)
        return Event(self.process.legs, two_body)

    def point(self, points: slice) -> Point:
        """What a closed form sees of some of the points."""
        return Point.of(self.process.legs, self.collision(points), self.masses)

    def collision(self, points: slice) -> Collision:
        """The collisions of some of the points in their centre of mass, beam a along +z."""
        sqrt_s = self.sqrt_s[points, None]
        return Collision(sqrt_s, np.zeros_like(sqrt_s), np.ones_like(sqrt_s))
