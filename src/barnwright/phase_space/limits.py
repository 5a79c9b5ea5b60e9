"""What simple cuts say in the centre of mass: they enter the limits of maps, so that no point is thrown away."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from math import hypot

Bounds = tuple[float, float]
OPEN: Bounds = (float("-inf"), float("inf"))


@dataclass(frozen=True, slots=True)
class Limits:
    """Bounds that all accepted events satisfy, in the centre of mass, +z along beam a; infinite where a side is open.

    A bound that an event may break although the cuts accept it would lose a piece of the cross section: whoever makes
    limits from cuts in another frame has to widen them until they hold.

    Attributes
    ----------
    energy : leg number -> (least, largest) energy, GeV
    cosine : leg number -> (least, largest) cosine of the polar angle
    pt : leg number -> least transverse momentum, GeV
    mass : leg numbers in rising order, two or more -> (least, largest) invariant mass, GeV
    transfer : (beam code, leg number) -> (least, largest) (p_beam − p_leg)², GeV²
    angle : two leg numbers in rising order -> least angle between them, rad; used as a scale only
    """

    energy: Mapping[int, Bounds] = field(default_factory=dict)
    cosine: Mapping[int, Bounds] = field(default_factory=dict)
    pt: Mapping[int, float] = field(default_factory=dict)
    mass: Mapping[tuple[int, ...], Bounds] = field(default_factory=dict)
    transfer: Mapping[tuple[int, int], Bounds] = field(default_factory=dict)
    angle: Mapping[tuple[int, int], float] = field(default_factory=dict)

    def least_energy(self, leg: int, mass: float) -> float:
        """The least energy in GeV of a leg of this mass (GeV), from its bounds on energy and pt."""
        across = self.pt.get(leg, 0.0)
        return max(mass, self.energy.get(leg, OPEN)[0], hypot(mass, across))

    def on(self, leg: int) -> int:
        """How directly a leg is bounded: 2 by its direction, 1 by its energy, 0 not at all."""
        if leg in self.cosine or leg in self.pt or any(leg == of for _, of in self.transfer):
            return 2
        return 1 if leg in self.energy else 0
