"""What no law here can answer yet, or ever: said by name before anything is calculated."""

from __future__ import annotations

from collections.abc import Iterator

from barnwright.documents import Request
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.parts import check_contributions
from barnwright.errors import nearest
from barnwright.process import Process
from barnwright.units import AREA_UNITS

LONGEST_OBSERVABLES = 100_000


def check_scope(request: Request, process: Process, findings: Findings) -> None:
    """Final states, units, contributions and accuracy that do not fit the process."""
    reaction = process.legs
    length = sum(len(text) for text in _observables(request))
    if length > LONGEST_OBSERVABLES:
        expected = f"at most {LONGEST_OBSERVABLES} characters in the observables of one request"
        findings.add("cuts" if request.cuts else "histograms", f"{length} characters", expected)
        findings.refuse()
    if len(reaction.incoming) != 2 or not (reaction.inclusive or len(reaction.outgoing) == 2):
        expected = "a reaction of two particles into two, or into X"
        findings.add("formula.reaction" if request.formula else "process", reaction.text, expected)
        findings.refuse()
    if request.unit not in AREA_UNITS and request.beams.kind != "decay":
        expected = f"a unit of area: {', '.join(AREA_UNITS)}"
        findings.add("unit", request.unit, expected, nearest(request.unit, AREA_UNITS))
    check_contributions(request, process, findings)
    if request.accuracy.method == "monte_carlo":
        expected = "closed_form or quadrature, the methods for two-body final states"
        findings.add("accuracy.method", "monte_carlo", expected, "quadrature")


def _observables(request: Request) -> Iterator[str]:
    yield from (cut.observable for cut in request.cuts)
    yield from (text for histogram in request.histograms for text in histogram.observables)
    for variation in request.variations:
        yield from (cut.observable for cut in variation.cuts if cut.observable is not None)
