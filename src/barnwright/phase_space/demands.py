"""What declared peaks ask of a tree: systems of legs with a map, legs that leave along a beam, soft legs.

`docs/channels.md` tells the rules.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import product
from typing import Literal

from barnwright.errors import show
from barnwright.peaks import Peak
from barnwright.phase_space.limits import Limits
from barnwright.phase_space.maps.resonance import line
from barnwright.phase_space.parts import InvariantMap
from barnwright.reaction import BEAMS, Reaction

Legs = tuple[int, ...]


@dataclass(frozen=True, slots=True)
class Demand:
    """One wish.

    Attributes
    ----------
    kind : "system" (legs together, with a map), "beam" (legs leave along a beam) or "soft" (a leg of little energy)
    legs : leg numbers, rising
    map : InvariantMap or None
        Of a system.
    beam : int
        0 or 1, of a "beam".
    mass, power : floats, GeV and 1
        Of what is exchanged between the beam and the legs.
    radiation : bool
        Whether the beam only radiates the leg, so that both beams may.
    """

    kind: Literal["system", "beam", "soft"]
    legs: Legs
    map: InvariantMap | None = None
    beam: int = 0
    mass: float = 0.0
    power: float = 1.0
    radiation: bool = False


@dataclass(frozen=True, slots=True)
class Scene:
    """The reaction, the masses in GeV of its incoming and outgoing legs, the limits, and the form of widths."""

    reaction: Reaction
    incoming: tuple[float, ...]
    outgoing: tuple[float, ...]
    limits: Limits
    running: bool


def demands_of(peaks: Sequence[Peak], scene: Scene) -> tuple[Demand, ...]:
    """The demands of all peaks, each for every choice among identical particles; in declared order, none twice.

    Raises
    ------
    LookupError
        For a leg that the reaction lacks; it names the candidates.
    ValueError
        For a resonance without a width, or a peak whose legs do not fit its shape.
    """
    choices = [(peak, *choice) for peak in peaks for choice in _legs_of(peak, scene)]
    found = [demand for choice in choices for demand in _of(*choice, scene)]
    everything = len(scene.outgoing)
    return tuple(dict.fromkeys(d for d in found if d.kind != "system" or len(d.legs) < everything))


def _legs_of(peak: Peak, scene: Scene) -> list[tuple[Legs, Legs]]:
    """Outgoing legs as written, and beams (0 or 1), for every choice among identical particles."""
    reaction = scene.reaction
    if peak.of in ("t", "u"):
        return [((1 if peak.of == "t" else 2,), (0,))] if len(scene.incoming) == 2 else []
    words = peak.of.split()
    beams = tuple(-1 - BEAMS[word] for word in words if word in BEAMS)
    choices = [_candidates(word, reaction) for word in words if word not in BEAMS]
    picked = {tuple(sorted(legs)): legs for legs in reversed(list(product(*choices))) if len(set(legs)) == len(legs)}
    return [(legs, beams) for legs in reversed(picked.values())]


def _candidates(word: str, reaction: Reaction) -> Legs:
    same = tuple(i for i, name in enumerate(reaction.outgoing, 1) if name == word)
    return same or (reaction.leg(int(word) if word.isdigit() else word),)


def _of(peak: Peak, legs: Legs, beams: Legs, scene: Scene) -> tuple[Demand, ...]:
    own = tuple(sorted(legs))
    if peak.shape == "soft":
        return tuple(Demand("soft", (leg,)) for leg in own)
    if beams and peak.shape != "resonance":
        return tuple(_transfer(peak, own, beam, scene) for beam in beams)
    if len(own) < 2 or beams:
        raise ValueError(f"a {peak.shape} needs two outgoing legs or more, or a leg and a beam, not {show(peak.of)}")
    return (Demand("system", own, _map(peak, legs, scene)),)


def _transfer(peak: Peak, legs: Legs, beam: int, scene: Scene) -> Demand:
    if peak.shape == "collinear":
        return Demand("beam", legs, beam=beam, mass=scene.incoming[beam], radiation=True)
    power = peak.power if peak.shape == "power" else 1.0
    return Demand("beam", legs, beam=beam, mass=_number(peak.at, scene), power=power)


def _map(peak: Peak, legs: Legs, scene: Scene) -> InvariantMap:
    """The map of a system."""
    mass = _number(peak.at, scene)
    if peak.shape == "resonance":
        width = _number(peak.width, scene)
        if not (mass > 0 and width > 0):
            given = f"{mass!r} and {width!r}"
            raise ValueError(f"the resonance of {show(peak.of)} needs a mass and a width above 0, not {given}")
        return InvariantMap("resonance", *line(mass, width, scene.running))
    if peak.shape == "collinear":
        light = min(legs, key=lambda leg: scene.outgoing[leg - 1])
        first, second = sorted(legs)[:2]
        angle = scene.limits.angle.get((first, second), 0.0)
        return InvariantMap("collinear", scene.limits.least_energy(light, scene.outgoing[light - 1]), angle)
    power = peak.power if peak.shape == "power" else 1.0
    return InvariantMap("logarithm", mass * mass) if power == 1.0 else InvariantMap("power", mass * mass, power)


def _number(given: str | float | None, scene: Scene) -> float:
    """A mass or width in GeV; a word is a leg, whose mass is meant."""
    if not isinstance(given, str):
        return float(given or 0.0)
    if given in scene.reaction.incoming:
        return scene.incoming[scene.reaction.incoming.index(given)]
    if given in BEAMS:
        return scene.incoming[-1 - BEAMS[given]]
    return scene.outgoing[_candidates(given, scene.reaction)[0] - 1]
