"""resolve: a request, checked against its process, becomes a plan."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import Any, NamedTuple, Protocol

from barnwright.beams import BeamSettings
from barnwright.documents import Request
from barnwright.engine.plan import Group, Note, Plan, ProcessSource, ValidRange
from barnwright.engine.resolve.beams import BeamContext, resolve_beams
from barnwright.engine.resolve.digest import plan_digest
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.formula import formula_process, formula_source
from barnwright.engine.resolve.kinematics import check_kinematics
from barnwright.engine.resolve.masses import Inputs, resolve_inputs
from barnwright.engine.resolve.method import resolve_method, resolve_peaks
from barnwright.engine.resolve.notes import notes_of
from barnwright.engine.resolve.questions import resolve_cuts, resolve_layout
from barnwright.engine.resolve.scan import Part, parts_of, scan_shape
from barnwright.engine.resolve.scope import check_scope
from barnwright.engine.setting import Layout, Setting
from barnwright.errors import RequestError, Violation, show
from barnwright.process import Process, facts_of
from barnwright.reaction import Reaction
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
    process, source = _process(request, lookup)
    parts = parts_of(request, over or {})
    findings = Findings()
    check_scope(request, process, findings)
    layout = resolve_layout(request, process.legs, findings)
    groups = [_group(part, process, layout, findings) for part in parts]
    findings.refuse()
    complete = tuple(g for g in groups if g is not None)
    shape = scan_shape(over) if over else ()
    digest = plan_digest(source, process.legs, layout, complete)
    return Plan(
        digest,
        source,
        process.legs,
        layout,
        complete,
        shape,
        provided_of(process),
        sources_of(process),
        range_of(process),
    )


def provided_of(process: Process) -> dict[str, Any]:
    """What a prediction repeats of its process."""
    constants = {"hbar_c_squared": HBARC2}
    return {"order": process.order, "scheme": None, "constants": constants}


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


def _process(request: Request, lookup: Lookup) -> tuple[Process, ProcessSource]:
    if request.formula is not None:
        source = formula_source(request.formula)
        assert source.formula is not None
        return formula_process(dict(source.formula)), source
    if request.processes is not None:
        if len(request.processes) > 1:
            expected = "one process; sums of several are asked for one by one in this version"
            raise RequestError([Violation("processes", show(list(request.processes)), expected, request.processes[0])])
        name = request.processes[0]
    else:
        assert request.process is not None
        name = request.process
    loaded = lookup(name)
    identity = loaded.identity
    return loaded.process, ProcessSource(identity.name, identity.distribution, identity.version, identity.digest)


def _group(part: Part, process: Process, layout: Layout, findings: Findings) -> Group | None:
    """The settings of a group: the request as it stands, then each variation of it."""
    base = _Base(process, layout, findings, part)
    nominal, inputs = _setting("", part.request, base, "")
    settings = [nominal]
    for index, variation in enumerate(part.request.variations):
        try:
            varied = part.request.varied(variation)
        except RequestError as error:
            findings.violations.extend(_below(f"variations[{index}]", v) for v in error.violations)
            continue
        settings.append(_setting(variation.name, varied, base, f"variations[{index}].")[0])
    if any(s is None for s in settings) or inputs is None:
        return None
    whole = tuple(s for s in settings if s is not None)
    check_kinematics(process.legs, layout, whole, findings)
    notes: tuple[Note, ...] = notes_of(process, whole[0].cuts)
    return Group(part.points, whole, part.request, part.columns, notes, dict(inputs.sources))


class _Base(NamedTuple):
    process: Process
    layout: Layout
    findings: Findings
    part: Part


def _setting(name: str, request: Request, base: _Base, where: str) -> tuple[Setting | None, Inputs | None]:
    """One entry of the variation axis; findings carry the path ``where`` of the variation before them."""
    findings = Findings()
    reaction = base.process.legs
    inputs = resolve_inputs(base.process, request.parameters, request.masses, findings)
    cuts = resolve_cuts(request, reaction, findings)
    beams: BeamSettings | None = None
    method = None
    if inputs is not None:
        context = _context(reaction, inputs, findings, base.part)
        beams = resolve_beams(request.beams, base.part.energies, context)
        method = resolve_method(base.process, request, inputs, findings)
    known = {str(v) for v in base.findings.violations}
    new = (v for v in findings.violations if str(v) not in known)
    base.findings.violations.extend(_below(where, v) for v in new)
    if findings or inputs is None or beams is None or method is None:
        return None, inputs
    masses = (inputs.masses[-1], inputs.masses[-2], inputs.masses[1], inputs.masses[2])
    parameters = tuple(inputs.parameters.items())
    peaks = resolve_peaks(base.process, inputs)
    return Setting(name, beams, masses, parameters, cuts, method.rule, method.closed_form, method.law, peaks), inputs


def _context(reaction: Reaction, inputs: Inputs, findings: Findings, part: Part) -> BeamContext:
    return BeamContext(reaction, (inputs.masses[-1], inputs.masses[-2]), findings, len(part.points))


def _below(where: str, violation: Violation) -> Violation:
    """The same violation with the path of a variation before its field."""
    prefix = where if where.endswith(".") or not where else f"{where}."
    return Violation(
        prefix + violation.field, violation.value, violation.expected, violation.nearest, violation.position
    )
