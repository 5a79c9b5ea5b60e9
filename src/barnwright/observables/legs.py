"""Legs and frames of a text, by their codes in a reaction; all findings are collected, none raised."""

from __future__ import annotations

from typing import Literal, cast

from barnwright.grammar import MOST_FINDINGS, Finding, FrameName, LegName, Selection
from barnwright.kinematics import CM, LAB, Frame
from barnwright.observables.rows import Row
from barnwright.observables.tree import Each, Leading, Leg
from barnwright.particles import UnknownParticleError, find
from barnwright.reaction import LegError, Reaction


class Legs:
    """Resolves the legs of one text.

    Attributes
    ----------
    findings : list of Finding
    quantifier : "each", "any" or None
    each : Each or None
        The identical particles that the quantifier runs over.
    gathered : list of Each, or None
        What ``min(…)`` or ``max(…)`` runs over, while its argument is read; None outside.
    """

    def __init__(self, reaction: Reaction, numbered: bool) -> None:
        self.reaction = reaction
        self.numbered = numbered
        self.findings: list[Finding] = []
        self.quantifier: Literal["each", "any"] | None = None
        self.each: Each | None = None
        self.gathered: list[Each] | None = None

    def find(self, position: int, expected: str, nearest: str | None = None) -> None:
        """One finding."""
        self.findings.append(Finding(position, expected, nearest))

    def leg(self, argument: LegName | Selection) -> Leg | None:
        """What an argument stands for, or None and findings."""
        if len(self.findings) >= MOST_FINDINGS:
            return None
        if isinstance(argument, LegName):
            return self._bare(argument)
        group = self._identical(argument.leg)
        if not group:
            if self._code(argument.leg) is not None:
                expected = f"{argument.kind}(…) of identical particles; {argument.leg.name} is not one of several"
                self.find(argument.position, expected, argument.leg.name)
            return None
        return self._leading(argument, group) if argument.kind == "leading" else self._quantified(argument, group)

    def frame(self, frame: FrameName | None, row: Row) -> Frame | Literal[False] | None:
        """The frame, None where the row has none, False where it is wrong."""
        if row.frame is None:
            return None
        if frame is None:
            return LAB if row.frame == "lab" else CM
        if frame.kind != "rest":
            return LAB if frame.kind == "lab" else CM
        codes = self.system(frame.legs)
        if codes is None:
            return False
        if len(codes) == 1 and find(self.reaction.name_of(codes[0])).mass == 0:
            expected = f"particles that can be at rest; {frame.legs[0].name} has no mass"
            self.find(frame.legs[0].position, expected)
            return False
        return Frame("rest", codes)

    def system(self, legs: tuple[LegName, ...]) -> tuple[int, ...] | None:
        """The codes of outgoing particles that are taken together, sorted; or None and findings."""
        before = len(self.findings)
        codes: set[int] = set()
        for leg in legs:
            code = self._member(leg)
            if code is None:
                continue
            if code < 0:
                self.find(leg.position, f"an outgoing particle, not {leg.name}")
            elif code in codes:
                self.find(leg.position, f"different particles; {leg.name} is there already")
            codes.add(code)
        return tuple(sorted(codes)) if len(self.findings) == before else None

    def _member(self, leg: LegName) -> int | None:
        group = self._identical(leg)
        if group:
            self.find(leg.position, f"a particle that comes out once; there are {len(group)} {leg.name}")
            return None
        return self._code(leg)

    def _bare(self, leg: LegName) -> Leg | None:
        group = self._identical(leg)
        if not group:
            return self._code(leg)
        if self.gathered is not None:
            self.gathered.append(Each(group))
            return Each(group)
        name = self.reaction.name_of(group[0])
        advice = f"leading({name}), each({name}), any({name}), min(…) or max(…)"
        self.find(leg.position, f"{advice}: there are {len(group)} {name}")
        return None

    def _code(self, leg: LegName) -> int | None:
        try:
            return self.reaction.leg(leg.key)
        except LegError as error:
            self.find(leg.position, error.expected, error.nearest)
            return None

    def _identical(self, leg: LegName) -> tuple[int, ...]:
        """The codes of several identical particles, asked for by name or by the number of one of them."""
        groups = self.reaction.identical_groups
        if not groups or (self.numbered and isinstance(leg.key, int)):
            return ()
        name = self._canonical(leg.name)
        return next((g for g in groups if leg.key in g or self.reaction.name_of(g[0]) == name), ())

    def _canonical(self, name: str) -> str:
        try:
            return name if name in self.reaction.outgoing else find(name).name
        except UnknownParticleError:
            return name

    def _leading(self, argument: Selection, group: tuple[int, ...]) -> Leading | None:
        if argument.rank > len(group):
            self.find(argument.position, f"a rank of at most {len(group)}")
            return None
        if argument.by == "pt" and len(self.reaction.outgoing) == 2:
            expected = "an order that decides: two bodies share their pt exactly; each(…), any(…), min(…) or max(…)"
            self.find(argument.position, expected)
            return None
        return Leading(group, cast("Literal['energy', 'pt']", argument.by), argument.rank)

    def _quantified(self, argument: Selection, group: tuple[int, ...]) -> Each | None:
        kind = cast("Literal['each', 'any']", argument.kind)
        if self.quantifier not in (None, kind) or self.each not in (None, Each(group)):
            self.find(argument.position, "one each(…) or any(…) over the same particles")
            return None
        self.quantifier, self.each = kind, Each(group)
        return self.each
