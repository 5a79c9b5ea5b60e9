"""The pure data of a channel: systems of legs, the splittings of one into two, and which map serves each number."""

from __future__ import annotations

from dataclasses import dataclass
from math import inf
from typing import Literal

from barnwright.phase_space.limits import OPEN, Bounds

InvariantShape = Literal["volume", "flat", "power", "logarithm", "resonance", "soft", "collinear"]
AngleShape = Literal["uniform", "transfer", "two_sided", "soft"]
Axis = Literal["flight", "a", "b"]


@dataclass(frozen=True, slots=True)
class InvariantMap:
    """The map of a system's m².

    Attributes
    ----------
    shape : one of the maps of an invariant
    first, second : floats
        resonance: centre and half width, GeV² (`maps.resonance.line`). power: the pole (GeV²) and ν. logarithm: the
        pole. collinear: least energy (GeV) and least angle (rad) of the massless leg. Otherwise unused.
    """

    shape: InvariantShape = "volume"
    first: float = 0.0
    second: float = 1.0


@dataclass(frozen=True, slots=True)
class AngleMap:
    """The map of the polar angle of the first part in the rest frame of its mother.

    Attributes
    ----------
    shape : "uniform", "transfer", "two_sided" (transfers from both beams) or "soft" (1/E in the centre of mass)
    axis : "flight" (the mother's, +z where it rests), or "a" or "b", the beam whose transfer peaks
    masses : two floats, GeV
        Of what is exchanged; the second for beam b where both beams have a peak.
    power : float
        ν of a transfer.
    """

    shape: AngleShape = "uniform"
    axis: Axis = "flight"
    masses: tuple[float, float] = (0.0, 0.0)
    power: float = 1.0


@dataclass(frozen=True, slots=True)
class Part:
    """One of the two systems that a mother splits into: a leg, or legs that split further.

    Attributes
    ----------
    legs : leg numbers, rising
    mass : float, GeV
        The sum of their masses.
    square : Bounds, GeV²
        m² as cuts bound it; the lower end is at least ``mass²``.
    energy : Bounds, GeV
        In the centre of mass, as cuts bound it.
    cosine, pt, transfers
        Of a single leg, in the centre of mass: bounds on its direction; a transfer is (beam, least, largest), GeV².
    emission : (least energy, mass) or None, GeV
        Of two legs, one of them massless with a bound on its energy: that bound, and the mass of the other.
    map : InvariantMap or None
        None for a single leg.
    """

    legs: tuple[int, ...]
    mass: float
    square: Bounds
    energy: Bounds = OPEN
    cosine: Bounds = OPEN
    pt: float = 0.0
    transfers: tuple[tuple[int, float, float], ...] = ()
    emission: tuple[float, float] | None = None
    map: InvariantMap | None = None

    @property
    def single(self) -> bool:
        """Whether it is one leg."""
        return len(self.legs) == 1

    @property
    def limited(self) -> bool:
        """Whether cuts bound it."""
        bounds = (self.square, self.energy, self.cosine)
        return bounds != ((self.mass**2, inf), OPEN, OPEN) or self.pt > 0 or bool(self.transfers)


@dataclass(frozen=True, slots=True)
class Splitting:
    """A mother into two parts; the invariant of ``first`` is drawn before that of ``second``."""

    mother: tuple[int, ...]
    first: Part
    second: Part
    angle: AngleMap = AngleMap()
