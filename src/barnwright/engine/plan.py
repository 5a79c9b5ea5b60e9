"""The plan: what a request has become once all its names and physics are resolved; pure data that can be pickled.

Rules of this file
------------------
- A plan holds points × variations. A prediction is a scan of one point. Points that differ only in beam energies
  share a group, whose settings hold arrays of energies; every other change makes a group of its own.
- The digest covers everything that shapes the numbers and nothing that only says when to stop: not `relative`,
  `absolute`, `max_evaluations`, `max_seconds`, `rounds`.
- No functions: a process is named by its identity, a formula by its text.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any

from barnwright.documents import Request
from barnwright.engine.setting import Layout, Setting
from barnwright.integrate.block import Round, Strand
from barnwright.integrate.estimate import Rule
from barnwright.integrate.ledger import Frozen
from barnwright.reaction import Reaction

NODES_A_BLOCK = 100_000


@dataclass(frozen=True, slots=True)
class ProcessSource:
    """Where a process's functions come from.

    ``digest`` is the SHA-256 over the source and data files of the plugin, or of the formula's text; ``formula``
    holds the formula as plain values where the request brought one.
    """

    name: str
    distribution: str
    version: str
    digest: str
    formula: Mapping[str, Any] | None = None


@dataclass(frozen=True, slots=True)
class Note:
    """Something that the person who asked should know: a code for programs, a text for people."""

    code: str
    text: str


@dataclass(frozen=True, slots=True)
class ValidRange:
    """The range of √s in GeV in which a process is valid, and why."""

    low: float
    high: float
    text: str


@dataclass(frozen=True, slots=True)
class Group:
    """Points that share everything but the beam energies.

    Attributes
    ----------
    points : tuple of int
        Their numbers in the scan.
    settings : tuple of Setting
        The request as it stands first, then its variations.
    """

    points: tuple[int, ...]
    settings: tuple[Setting, ...]
    request: Request
    columns: Mapping[str, tuple[Any, ...]] = field(default_factory=dict)
    notes: tuple[Note, ...] = ()
    mass_sources: Mapping[int, str] = field(default_factory=dict)


@dataclass(frozen=True)
class Plan:
    """Everything that workers and assembly need; see the rules above."""

    digest: str
    source: ProcessSource
    reaction: Reaction
    layout: Layout
    groups: tuple[Group, ...]
    shape: tuple[int, ...]
    provided: Mapping[str, Any]
    provided_sources: Mapping[str, str]
    valid: ValidRange | None = None

    @property
    def points(self) -> int:
        """How many points the scan has."""
        return sum(len(group.points) for group in self.groups)

    @cached_property
    def starts(self) -> tuple[int, ...]:
        """The first point of every group, in the order in which blocks count them."""
        starts = [0]
        for group in self.groups:
            starts.append(starts[-1] + len(group.points))
        return tuple(starts)

    def sources(self, group: Group) -> dict[str, str]:
        """Where parameters, constants and (by ``masses.`` and the particle) masses come from."""
        asked = dict.fromkeys(group.request.parameters, "request")
        masses = {f"masses.{self.reaction.name_of(code)}": text for code, text in group.mass_sources.items()}
        return {**self.provided_sources, **asked, **masses}

    def masses_by_name(self, setting: Setting) -> dict[str, float]:
        """The mass in GeV of every particle of the reaction."""
        names = (*self.reaction.incoming, *self.reaction.outgoing)
        return dict(zip(names, setting.masses, strict=True))

    @property
    def plugin_version(self) -> dict[str, str]:
        """The plugin's distribution and version; empty for a formula."""
        return {self.source.distribution: self.source.version} if self.source.distribution else {}

    def group_of(self, points: tuple[int, int]) -> tuple[Group, int, int]:
        """The group of a block's points, and their range within it; blocks never cross groups."""
        for group, start, stop in zip(self.groups, self.starts, self.starts[1:], strict=False):
            if start <= points[0] and points[1] <= stop:
                return group, points[0] - start, points[1] - start
        raise IndexError(f"points {points} lie in no group of {self.points} points")

    def ranges(self) -> Iterator[tuple[int, int]]:
        """Ranges of points of about `NODES_A_BLOCK` nodes each."""
        nodes = 5 * (self.layout.components + 8)
        step = max(1, NODES_A_BLOCK // nodes)
        for start, stop in zip(self.starts, self.starts[1:], strict=False):
            for first in range(start, stop, step):
                yield first, min(first + step, stop)

    @property
    def name(self) -> str:
        """What messages call it, as ``qed/compton``."""
        return self.source.name

    @property
    def rule(self) -> Rule:
        """How sums become values and errors: closed forms and quadrature both state bounds."""
        return "exact" if all(s.rule == "closed_form" for g in self.groups for s in g.settings) else "embedded"

    @property
    def training(self) -> None:
        """Nothing to train."""
        return None

    @property
    def ladder(self) -> None:
        """One round answers."""
        return None

    def round(self, frozen: Frozen, number: int) -> Round:
        """The one round of closed forms and quadrature: a block for each range of points."""
        del frozen
        return Round(self.digest, number, tuple(Strand(points) for points in self.ranges()))

    def stage(self) -> Stage:
        """The plan with its frozen arrays: none for closed forms and quadrature."""
        return Stage(self.digest, self)


@dataclass(frozen=True, slots=True)
class Stage:
    """A plan and the arrays that training froze; sent once to every worker, named by its digest."""

    digest: str
    plan: Plan
