"""resolve: a request, checked against its process, becomes a plan."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import Any, Protocol

from barnwright.documents import Request
from barnwright.engine.plan import Group, Member, Plan, ProcessSource, Share, ValidRange
from barnwright.engine.resolve.digest import plan_digest
from barnwright.engine.resolve.filled import filled
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.formula import formula_process, formula_source
from barnwright.engine.resolve.questions import resolve_layout
from barnwright.engine.resolve.scan import Part, parts_of, scan_shape
from barnwright.engine.resolve.scope import check_scope
from barnwright.engine.resolve.share import resolve_share
from barnwright.engine.resolve.sums import alike, check_agreement, narrowed, united, with_notes
from barnwright.process import Process, facts_of
from barnwright.units import HBARC2


class Identity(Protocol):
    """Where a process comes from."""

    @property
    def name(self) -> str:
        """The process."""

    @property
    def distribution(self) -> str:
        """The installed distribution."""

    @property
    def version(self) -> str:
        """Its version."""

    @property
    def digest(self) -> str:
        """SHA-256 of its files."""


class Loaded(Protocol):
    """A process and its identity, as the registry hands them out."""

    @property
    def process(self) -> Process:
        """The process itself."""

    @property
    def identity(self) -> Identity:
        """Where it comes from."""


Lookup = Callable[[str], Loaded]


def resolve(request: Request, lookup: Lookup, over: Mapping[str, Sequence[Any]] | None = None) -> Plan:
    """The plan of a request, or of a scan of it.

    Parameters
    ----------
    request : Request
    lookup : function of a process name
    over : lists of values by key of the request, optional
        A grid of points; the first key varies slowest.

    Raises
    ------
    RequestError
        With every finding.
    UnknownProcessError, PluginError
        From ``lookup``.
    """
    offers = _offers(request, lookup)
    parts = parts_of(request, over or {})
    findings = Findings()
    found = [_member(*offers[0], parts, findings)] if len(offers) == 1 else _summed(offers, parts, findings)
    findings.refuse()
    complete = [entry for entry in found if entry is not None]
    members = tuple(member for member, _ in complete)
    groups = tuple(
        Group(part.points, filled(part.request, offers), tuple(shares[index] for _, shares in complete), part.columns)
        for index, part in enumerate(parts)
    )
    return Plan(plan_digest(members, groups), members, groups, scan_shape(over) if over else ())


Offer = tuple[Process, ProcessSource]
Resolved = tuple[Member, tuple[Share, ...]]


def _offers(request: Request, lookup: Lookup) -> list[Offer]:
    """The processes that are asked for, with their sources."""
    if request.formula is not None:
        source = formula_source(request.formula)
        assert source.formula is not None
        return [(formula_process(dict(source.formula)), source)]
    names = request.processes if request.processes is not None else (request.process,)
    offers = []
    for loaded in (lookup(str(name)) for name in names):
        identity = loaded.identity
        source = ProcessSource(identity.name, identity.distribution, identity.version, identity.digest)
        offers.append((loaded.process, source))
    return offers


def _summed(offers: Sequence[Offer], parts: Sequence[Part], findings: Findings) -> list[Resolved | None]:
    """The members of a sum, each of which sees of the request what it knows."""
    check_agreement(parts[0].request, [process for process, _ in offers], findings)
    found: list[Resolved | None] = []
    own = []
    for process, source in offers:
        theirs = Findings()
        narrow = [part._replace(request=narrowed(part.request, process)) for part in parts]
        found.append(_member(process, source, narrow, theirs))
        own.append((source.name, theirs))
    united(own, findings)
    complete = [entry for entry in found if entry is not None]
    return with_notes(alike(complete), [process for process, _ in offers]) if len(complete) == len(found) else found


def _member(process: Process, source: ProcessSource, parts: Sequence[Part], findings: Findings) -> Resolved | None:
    """One process with what it makes of every group; None, and findings, where something is wrong."""
    check_scope(parts[0].request, process, findings)
    layout = resolve_layout(parts[0].request, process.legs, findings)
    shares = [resolve_share(part, process, layout, findings) for part in parts]
    complete = tuple(share for share in shares if share is not None)
    if findings or len(complete) < len(shares):
        return None
    provided, sources, valid = provided_of(process), sources_of(process), range_of(process)
    return Member(
        source, process.legs, layout, provided, sources, valid, tuple(process.parameters.model_fields)
    ), complete


def provided_of(process: Process) -> dict[str, Any]:
    """What a prediction repeats of its process."""
    return {"order": process.order, "constants": {"hbar_c_squared": HBARC2}}


def range_of(process: Process) -> ValidRange | None:
    """Where the process is valid, if it says so."""
    valid = process.valid
    if valid is None or valid.sqrt_s is None:
        return None
    return ValidRange(*valid.sqrt_s, valid.text)


def sources_of(process: Process) -> dict[str, str]:
    """The sources of parameters' defaults, and of the constants."""
    return {
        **{fact.name: fact.source for fact in facts_of(process.parameters)},
        "hbar_c_squared": "exact in the SI, through scipy.constants",
    }
