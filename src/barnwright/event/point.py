"""The point: what closed forms see of a collision."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.event.event import LegKey
from barnwright.kinematics import Collision
from barnwright.reaction import Reaction

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Point:
    """The energies and masses of a collision; arrays have the shape (point, 1).

    Attributes
    ----------
    s, sqrt_s : arrays, GeV² and GeV
    momentum, final_momentum : arrays, GeV
        In the cm, of the incoming and of the two outgoing particles (0 where the final state is X).
    """

    reaction: Reaction
    s: Array
    sqrt_s: Array
    momentum: Array
    final_momentum: Array
    masses: tuple[float, ...]

    @classmethod
    def of(cls, reaction: Reaction, collision: Collision, masses: tuple[float, ...]) -> Point:
        """The point of a 2 → 2 or 2 → X collision; masses in GeV of beam a, beam b, and leg 1, leg 2 or nothing."""
        before = collision.momentum(masses[0], masses[1])
        after = collision.momentum(masses[2], masses[3]) if len(masses) > 2 else np.zeros_like(before)
        return cls(reaction, collision.s, collision.sqrt_s, before, after, masses)

    def mass(self, leg: LegKey) -> float:
        """The resolved mass of a leg in GeV.

        Raises
        ------
        LookupError
            For a leg that the reaction lacks.
        """
        return self.masses[{-1: 0, -2: 1, 1: 2, 2: 3}[self.reaction.leg(leg)]]
