"""What a process makes of one group of points: the settings of the request as it stands and of its variations."""

from __future__ import annotations

from typing import NamedTuple

from barnwright.beams import BeamSettings
from barnwright.documents import Request
from barnwright.engine.plan import Note, Share
from barnwright.engine.resolve.beams import BeamContext, resolve_beams
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.kinematics import check_kinematics
from barnwright.engine.resolve.masses import Inputs, resolve_inputs
from barnwright.engine.resolve.method import Demand, resolve_method, resolve_peaks
from barnwright.engine.resolve.notes import notes_of
from barnwright.engine.resolve.parts import resolve_parts, signed_notes
from barnwright.engine.resolve.questions import asked_observables, resolve_cuts
from barnwright.engine.resolve.scan import Part
from barnwright.engine.resolve.singular import check_singular
from barnwright.engine.setting import Layout, Setting
from barnwright.errors import RequestError, Violation
from barnwright.observables import Cut, Observable
from barnwright.observables.tree import leaves
from barnwright.process import Process


class _Base(NamedTuple):
    process: Process
    layout: Layout
    findings: Findings
    part: Part


def resolve_share(part: Part, process: Process, layout: Layout, findings: Findings) -> Share | None:
    """The settings of a group: the request as it stands, then each variation of it; None where one is wrong."""
    base = _Base(process, layout, findings, part)
    nominal, inputs = _setting(Varied("", part.request, "", frozenset()), base)
    settings = [nominal]
    for index, variation in enumerate(part.request.variations):
        try:
            varied = part.request.varied(variation)
        except RequestError as error:
            findings.violations.extend(_below(f"variations[{index}]", v) for v in error.violations)
            continue
        inherited = frozenset(part.request.parameters) - frozenset(variation.parameters)
        settings.append(_setting(Varied(variation.name, varied, f"variations[{index}].", inherited), base)[0])
    if any(s is None for s in settings) or inputs is None:
        return None
    whole = tuple(s for s in settings if s is not None)
    if not process.legs.inclusive:
        check_kinematics(process.legs, layout, whole, findings)
    notes: tuple[Note, ...] = (*notes_of(process, whole[0].cuts, layout), *signed_notes(whole[0].parts))
    return Share(whole, notes, dict(inputs.sources))


class Varied(NamedTuple):
    """The request as it stands, or with a variation: its name, where it stands, the parameters that it did not set."""

    name: str
    request: Request
    where: str
    inherited: frozenset[str]


def _setting(varied: Varied, base: _Base) -> tuple[Setting | None, Inputs | None]:
    """The request as it stands, or varied; findings carry the path of the variation before them."""
    findings, request = Findings(), varied.request
    inputs = resolve_inputs(base.process, request.parameters, request.masses, findings, varied.inherited)
    cuts = resolve_cuts(request, base.process.legs, findings)
    own = base._replace(findings=findings)
    setting = None if inputs is None else _with_inputs(varied.name, request, cuts, inputs, own)
    known = {str(v) for v in base.findings.violations}
    new = (v for v in findings.violations if str(v) not in known)
    base.findings.violations.extend(_below(varied.where, v) for v in new)
    return (None if findings else setting), inputs


def _with_inputs(name: str, request: Request, cuts: tuple[Cut, ...], inputs: Inputs, base: _Base) -> Setting | None:
    process, findings = base.process, base.findings
    context = BeamContext(process.legs, (inputs.masses[-1], inputs.masses[-2]), findings, len(base.part.points))
    beams: BeamSettings | None = resolve_beams(request.beams, base.part.energies, context)
    method = resolve_method(process, _demand(request, cuts, base.layout), inputs, findings)
    if findings or beams is None or method is None:
        return None
    parts = resolve_parts(request, process)
    setting = Setting(
        name=name,
        beams=beams,
        masses=tuple(inputs.masses[code] for code in (-1, -2, 1, 2) if code in inputs.masses),
        parameters=tuple(inputs.parameters.items()),
        cuts=cuts,
        rule=method.rule,
        closed_form=method.closed_form,
        law=method.law,
        peaks=resolve_peaks(process, inputs),
        parts=parts[:1] if name else parts,
    )
    check_singular(process, setting, findings)
    return setting


def _demand(request: Request, cuts: tuple[Cut, ...], layout: Layout) -> Demand:
    """What a law must be able to do for this request."""
    polarised = {f"beams.polarisation.{n}": p for n, p in getattr(request.beams, "polarisation", {}).items() if p != 0}
    final_state = {where: o.text for where, o in asked_observables(cuts, layout) if not _of_energy_alone(o)}
    return Demand(request.accuracy.method, polarised, final_state)


def _of_energy_alone(observable: Observable) -> bool:
    """Whether the observable says nothing about the final state."""
    return all(leaf.function == "sqrt_s" for tree in observable.trees for leaf in leaves(tree))


def _below(where: str, violation: Violation) -> Violation:
    """The same violation with the path of a variation before its field."""
    prefix = where if where.endswith(".") or not where else f"{where}."
    return Violation(
        prefix + violation.field, violation.value, violation.expected, violation.nearest, violation.position
    )
