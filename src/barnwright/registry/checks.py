"""What is checked when a process is loaded: signatures, shapes on three points, finite numbers, positive ones.

Rules of this file
------------------
- A law is tried with its massless legs massless; where the process has contributions, as a whole and each keyword
  alone. An interference may be negative.
- Reactions other than 2 → 2 have their signatures checked only, since there is no phase space for them here; a total
  cross section needs none and is tried for any two beams.
"""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.masses import Inputs, resolve_inputs
from barnwright.process import (
    AngularCrossSection,
    ClosedForm,
    Law,
    Parameters,
    Parts,
    Process,
    TotalCrossSection,
    is_interference,
)

from .check_points import COSINES, CheckPoints, Masses
from .functions import name_of, signature_finding
from .trials import ALL, Trial, listed, offending

Array = NDArray[np.float64]


def findings_of(process: Process) -> list[str]:
    """Everything that is wrong with a process's laws and closed forms; an empty list when nothing is."""
    findings = Findings()
    inputs = resolve_inputs(process, dict(process.example), {}, findings)
    if findings or inputs is None:
        return [str(violation) for violation in findings.violations]
    found: list[str] = []
    for field, laws in (("laws", process.laws), ("closed_forms", process.closed_forms)):
        for index, law in enumerate(laws):
            title = f"{field}[{index}] ({name_of(law)})"
            found += [f"{title}: {text}" for text in _law_findings(process, law, inputs)]
    return found


def masses_for(process: Process, inputs: Inputs, *laws: Law | ClosedForm) -> Masses:
    """Masses in GeV of beam a, beam b, leg 1, leg 2, with the laws' massless legs massless; 0 for legs of an ``X``."""
    masses = dict(inputs.masses)
    for law in laws:
        for leg in law.massless:
            masses.update(dict.fromkeys(process.codes_of(leg), 0.0))
    if process.legs.inclusive:
        return masses[-1], masses[-2], 0.0, 0.0
    return masses[-1], masses[-2], masses[1], masses[2]


def is_two_to_two(process: Process) -> bool:
    """Whether there is phase space here to try the process on."""
    return len(process.legs.incoming) == 2 and len(process.legs.outgoing) == 2


def part_sets(process: Process) -> tuple[tuple[Parts | None, bool], ...]:
    """What a law is asked for, and whether that may be negative: the whole, then each keyword alone; or just None."""
    if not process.contributions:
        return ((None, process.signed),)
    keywords = tuple(process.contributions.values())
    alone = ((frozenset({key}), process.signed or is_interference(key)) for key in keywords)
    return ((frozenset(keywords), process.signed), *alone)


def _law_findings(process: Process, law: Law | ClosedForm, inputs: Inputs) -> list[str]:
    if wrong := signature_finding(law, bool(process.contributions)):
        return [wrong]
    if not (is_two_to_two(process) or (isinstance(law, TotalCrossSection) and process.legs.inclusive)):
        return []
    parameters = process.parameters_of(inputs.parameters)
    try:
        points = CheckPoints.of(process, masses_for(process, inputs, law))
        trial = trial_of(law, points, parameters)
    except (Exception, SystemExit) as error:
        return [f"raised {type(error).__name__}: {error}"]
    found: list[str] = []
    for number, (parts, may_be_negative) in enumerate(part_sets(process)):
        where = f"with parts = {{{', '.join(sorted(parts))}}}: " if parts is not None else ""
        found += [where + text for text in trial.findings(parts, may_be_negative, alone=number == 0)]
    return found


def trial_of(law: Law | ClosedForm, points: CheckPoints, parameters: Parameters) -> Trial:
    """How a law or a closed form is tried at these points."""
    if isinstance(law, ClosedForm):
        return _of_form(law, points, parameters)
    nodes = 1 if isinstance(law, TotalCrossSection) else COSINES.size

    def ask(some: slice, parts: Parts | None) -> Any:
        return answer_of(law, points, some, parameters, parts)

    def positive(values: Array, may_be_negative: bool) -> list[str]:
        what = "|M|²" if nodes > 1 and not isinstance(law, AngularCrossSection) else "a cross section"
        wrong = (values < 0) & (not may_be_negative)
        return offending(values, wrong, points, f"{what} of at least 0 (or signed=True)")

    return Trial(points, nodes, ask, positive)


def answer_of(law: Law, points: CheckPoints, some: slice, parameters: Parameters, parts: Parts | None) -> Any:
    """What a law says at some of the points: at the check angles, or the total."""
    if isinstance(law, TotalCrossSection):
        return law.total(points.point(some), parameters, parts)
    if isinstance(law, AngularCrossSection):
        return law.density(points.point(some), COSINES, parameters, parts)
    return law.squared(points.event(some), parameters, parts)


def _of_form(form: ClosedForm, points: CheckPoints, parameters: Parameters) -> Trial:
    observable = form.axis(points.process.legs)
    x = np.sort(np.broadcast_to(observable.values(points.event(ALL)), (3, COSINES.size)), axis=1)

    def ask(some: slice, parts: Parts | None) -> Any:
        return form.heights(x[some], points.point(some), parameters, parts)

    def rising(values: Array, may_be_negative: bool) -> list[str]:
        falls = np.diff(values, axis=1) < 0
        if may_be_negative or not falls.any():
            return []
        row = int(np.argmax(falls.any(axis=1)))
        got = f"{listed(values[row])} at {listed(x[row])}, sqrt_s = {points.sqrt_s[row]:.6g} GeV"
        return [f"expected values that rise with {form.observable}, got {got}"]

    return Trial(points, COSINES.size, ask, rising)
