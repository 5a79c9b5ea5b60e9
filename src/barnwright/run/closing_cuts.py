"""The cuts that close what a process declares as singular, as a request may use them."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from barnwright.process import Process
from barnwright.reaction import Reaction

LARGEST_COSINE = 0.9
SOFTEST = 0.01
"""2E/√s of a particle that must not become soft."""
NEAREST = 0.1
"""Angle in rad between particles that must not become collinear."""


@dataclass(frozen=True, slots=True)
class ClosingCut:
    """A cut with one limit, and the singular regions that it closes."""

    regions: tuple[str, ...]
    observable: str
    side: str
    limit: float

    def __str__(self) -> str:
        """``t: cos_theta(e-, frame=cm) with max = 0.9``."""
        return f"{', '.join(self.regions)}: {self.observable} with {self.side} = {self.limit:g}"


def closing_cuts(process: Process) -> tuple[ClosingCut, ...]:
    """One cut for t and u together, one for each soft or collinear region."""
    return tuple(_cuts(process))


def polar_angle(legs: Reaction) -> str:
    """The cosine of the polar angle in the cm of the first outgoing particle; of each where there are several."""
    return f"cos_theta({_outgoing(legs, legs.outgoing[0])}, frame=cm)"


def _cuts(process: Process) -> Iterator[ClosingCut]:
    legs = process.legs
    poles = tuple(region for region in ("t", "u") if region in process.singular)
    if poles == ("t",) and legs.outgoing.count(legs.outgoing[0]) == 1:
        yield ClosingCut(poles, polar_angle(legs), "max", LARGEST_COSINE)
    elif poles == ("u",) and legs.outgoing.count(legs.outgoing[0]) == 1:
        yield ClosingCut(poles, polar_angle(legs), "min", -LARGEST_COSINE)
    elif poles:
        yield ClosingCut(poles, f"abs({polar_angle(legs)})", "max", LARGEST_COSINE)
    for region in process.singular:
        kind, _, rest = region.partition("(")
        names = [_leg(process, name.strip()) for name in rest.rstrip(")").split(",")]
        if kind == "soft":
            yield ClosingCut((region,), f"energy_fraction({names[0]})", "min", SOFTEST)
        elif kind == "collinear":
            yield ClosingCut((region,), f"angle({', '.join(names)}, frame=cm)", "min", NEAREST)


def _leg(process: Process, name: str) -> str:
    """A leg of a declaration in the language of observables: a particle that comes out, or a beam."""
    legs = process.legs
    if name in legs.outgoing:
        return _outgoing(legs, name)
    code = int(name) if name.isdecimal() else next(iter(process.codes_of(name)), 0) if name else 0
    return {-1: "beam_a", -2: "beam_b"}.get(code) or (_outgoing(legs, legs.name_of(code)) if code else "")


def _outgoing(legs: Reaction, name: str) -> str:
    return f"each({name})" if legs.outgoing.count(name) > 1 else name
