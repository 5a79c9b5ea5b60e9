"""The plan: what a request has become once all its names and physics are resolved; pure data that can be pickled.

Rules of this file
------------------
- A plan holds points × variations. A prediction is a scan of one point. Points that differ only in beam energies
  share a group, whose settings hold arrays of energies; every other change makes a group of its own.
- The digest covers everything that shapes the numbers and nothing that only says when to stop: not `relative`,
  `absolute`, `max_evaluations`, `max_seconds`, `rounds`.
- A sum of processes has a member and a stratum for each; their contents and bounds add up.
- No functions: a process is named by its identity, a formula by its text.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any

from barnwright.documents import Request
from barnwright.engine.setting import Layout, Setting
from barnwright.engine.turning import split
from barnwright.integrate.block import Round, Strand
from barnwright.integrate.estimate import Rule
from barnwright.integrate.ledger import Frozen
from barnwright.reaction import Reaction

NODES_A_BLOCK = 100_000
NODES_AROUND = 200
"""How many times as many where something depends on the azimuth."""


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
class Member:
    """One of the processes that a request sums; most requests have one.

    ``layout`` has as many components in every member, ``provided`` is what a prediction repeats of the process,
    ``parameters`` are the names of all its parameters, read or not.
    """

    source: ProcessSource
    reaction: Reaction
    layout: Layout
    provided: Mapping[str, Any]
    provided_sources: Mapping[str, str]
    valid: ValidRange | None = None
    parameters: tuple[str, ...] = ()

    def masses_by_name(self, setting: Setting) -> dict[str, float]:
        """The mass in GeV of every particle of the reaction."""
        names = (*self.reaction.incoming, *self.reaction.outgoing)
        return dict(zip(names, setting.masses, strict=False))

    @property
    def plugin_version(self) -> dict[str, str]:
        """The plugin's distribution and version; empty for a formula."""
        return {self.source.distribution: self.source.version} if self.source.distribution else {}


@dataclass(frozen=True, slots=True)
class Share:
    """What one member makes of a group: the request as it stands first, then its variations."""

    settings: tuple[Setting, ...]
    notes: tuple[Note, ...] = ()
    mass_sources: Mapping[int, str] = field(default_factory=dict)

    @property
    def entries(self) -> int:
        """How many entries it has on the variation axis."""
        return sum(len(setting.parts) for setting in self.settings)


@dataclass(frozen=True, slots=True)
class Group:
    """Points that share everything but the beam energies.

    Attributes
    ----------
    points : tuple of int
        Their numbers in the scan.
    request : Request
    shares : tuple of Share
        One for each member of the plan.
    """

    points: tuple[int, ...]
    request: Request
    shares: tuple[Share, ...]
    columns: Mapping[str, tuple[Any, ...]] = field(default_factory=dict)


@dataclass(frozen=True)
class Plan:
    """Everything that workers and assembly need; see the rules above."""

    digest: str
    members: tuple[Member, ...]
    groups: tuple[Group, ...]
    shape: tuple[int, ...]

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

    @property
    def request(self) -> Request:
        """The request at the first point."""
        return self.groups[0].request

    @property
    def components(self) -> int:
        """How many components each entry of the variation axis has."""
        return self.members[0].layout.components

    @property
    def entries(self) -> int:
        """How many entries the variation axis has."""
        return self.groups[0].shares[0].entries

    def sources(self, group: Group, member: int) -> dict[str, str]:
        """Where parameters, constants and (by ``masses.`` and the particle) masses come from."""
        own, share = self.members[member], group.shares[member]
        read = dict(share.settings[0].parameters)
        given = {
            name: text for name, text in own.provided_sources.items() if name in read or name not in own.parameters
        }
        asked = {name: "request" for name in group.request.parameters if name in read}
        names = {code: own.reaction.name_of(code) for code in share.mass_sources}
        masses = {f"masses.{names[code]}": text for code, text in share.mass_sources.items()}
        return {**given, **asked, **masses}

    def group_of(self, points: tuple[int, int]) -> tuple[Group, int, int]:
        """The group of a block's points, and their range within it; blocks never cross groups."""
        for group, start, stop in zip(self.groups, self.starts, self.starts[1:], strict=False):
            if start <= points[0] and points[1] <= stop:
                return group, points[0] - start, points[1] - start
        raise IndexError(f"points {points} lie in no group of {self.points} points")

    def ranges(self) -> Iterator[tuple[int, int]]:
        """Ranges of points of about `NODES_A_BLOCK` nodes each."""
        nodes = 5 * (self.components + 8)
        for group, start, stop in zip(self.groups, self.starts, self.starts[1:], strict=False):
            around = NODES_AROUND if self._turns(group) else 1
            step = max(1, NODES_A_BLOCK // (nodes * around))
            for first in range(start, stop, step):
                yield first, min(first + step, stop)

    def _turns(self, group: Group) -> bool:
        """Whether a question of a group depends on the azimuth."""
        return any(
            split(setting, member.layout, bool(setting.beams.crossing_angle)) is not None
            for member, share in zip(self.members, group.shares, strict=True)
            for setting in share.settings
        )

    @property
    def name(self) -> str:
        """What messages call it, as ``qed/compton``."""
        return " + ".join(member.source.name for member in self.members)

    @property
    def distribution(self) -> str:
        """The plugins whose code it runs."""
        return ", ".join(dict.fromkeys(member.source.distribution for member in self.members))

    @cached_property
    def rule(self) -> Rule:
        """How sums become values and errors: closed forms and quadrature both state bounds."""
        settings = (setting for group in self.groups for share in group.shares for setting in share.settings)
        return "exact" if all(setting.rule == "closed_form" for setting in settings) else "embedded"

    @property
    def training(self) -> None:
        """Nothing to train."""
        return None

    @property
    def ladder(self) -> None:
        """One round answers."""
        return None

    def round(self, frozen: Frozen, number: int) -> Round:
        """The one round of closed forms and quadrature: a block for each range of points of each member."""
        del frozen
        strands = (Strand(points, stratum) for stratum in range(len(self.members)) for points in self.ranges())
        return Round(self.digest, number, tuple(strands))

    def stage(self) -> Stage:
        """The plan with its frozen arrays: none for closed forms and quadrature."""
        return Stage(self.digest, self)


@dataclass(frozen=True, slots=True)
class Stage:
    """A plan and the arrays that training froze; sent once to every worker, named by its digest."""

    digest: str
    plan: Plan
