"""Notes on what went wrong at a point: numbers that were not finite or negative, panels that did not settle."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from barnwright.documents import Note as NoteDocument
from barnwright.integrate.settled import Settled

if TYPE_CHECKING:
    from barnwright.engine.assemble import Answers


def faults(answers: Answers, point: int) -> tuple[NoteDocument, ...]:
    """Notes on points that were not finite or negative, and on panels that did not settle."""
    _, non_finite, negative, unresolved, undefined = (int(count) for count in answers.counts[point])
    alone = len(answers.counts) == 1 and answers.settled.worst
    where = f"; the first of them: {_momenta(answers.settled)}" if alone else ""
    found = []
    if non_finite:
        text = f"the law was not finite at {non_finite} points{where}"
        found.append(NoteDocument.build(code="non_finite", text=text))
    if negative:
        text = f"the law was negative at {negative} points{where}"
        found.append(NoteDocument.build(code="negative", text=text))
    if not np.isfinite(answers.value[point]).all() and not non_finite:
        text = "the result is too large for floating-point numbers in this unit"
        found.append(NoteDocument.build(code="overflow", text=text))
    if undefined:
        text = "an observable is not a number for some events, and where that begins is no edge of the quadrature"
        found.append(NoteDocument.build(code="undefined_observable", text=text))
    if answers.status_of(point) == "evaluation_limit":
        text = (
            "the error is larger than what was asked for, and all that floating-point numbers give here: a cut or an "
            "asymmetry within rounding of an extremum of its observable (move it away), a line that is narrower than "
            "the rounding of √s, or less than 1e-15 asked for"
        )
        found.append(NoteDocument.build(code="accuracy_not_reached", text=text))
    if unresolved:
        text = (
            f"{unresolved} panels of the polar angle did not settle: the law diverges, or has more structure "
            "than quadrature resolves; a cut that keeps away from cos_theta = 1 and -1 in the cm may close it"
        )
        found.append(NoteDocument.build(code="not_settled", text=text))
    return tuple(found)


def _momenta(settled: Settled) -> str:
    point = settled.worst[0]
    legs = "; ".join("(" + ", ".join(f"{c:.6g}" for c in leg) + ")" for leg in point.momenta)
    return f"{point.value:g} at momenta (E, px, py, pz) {legs} GeV in the cm"
