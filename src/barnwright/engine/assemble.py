"""From closed sums to predictions: units, densities, derived quantities, notes.

Everything that the points of a group share is made once; a point of a scan costs a few arrays.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import Any, Literal

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import collide
from barnwright.documents import ByName, Diagnostics, Histogram, Part, Prediction, Request, Run, Total
from barnwright.documents import Note as NoteDocument
from barnwright.engine.derived import between_variations, point_asymmetries
from barnwright.engine.histograms import HistogramForm, histogram_form
from barnwright.engine.plan import Group, Plan
from barnwright.integrate.panel_integrals import COUNTED, NON_FINITE
from barnwright.integrate.settled import Settled
from barnwright.units import from_natural

Array = NDArray[np.float64]
Status = Literal["converged", "evaluation_limit", "time_limit", "cancelled", "suspect"]


@dataclass(frozen=True, slots=True)
class Origin:
    """Versions by name and the fingerprint of the environment, as the caller found them."""

    versions: Mapping[str, str]
    environment: str


@dataclass(frozen=True)
class Answers:
    """The numbers of all points of a plan; a prediction is made of one when it is asked for.

    Attributes
    ----------
    value, error : arrays, shape (point, variation, component), in the request's unit
        In the order of the scan.
    counts : array, shape (point, 4)
        What `COUNTED` names, of all variations of a point together.
    """

    plan: Plan
    value: Array
    error: Array
    counts: Array
    settled: Settled
    verdict: Status
    origin: Origin
    run: Run

    @property
    def status(self) -> Status:
        """The status of all points together: the worst of theirs."""
        found = {self.status_of(point) for point in range(len(self.value))}
        return next((status for status in ("suspect", "evaluation_limit") if status in found), self.verdict)

    def status_of(self, point: int) -> Status:
        """The status of one point: a fault at another point is not its own."""
        if self.counts[point, NON_FINITE:].any() or not np.isfinite(self.value[point]).all():
            return "suspect"
        status = "converged" if self.verdict == "suspect" else self.verdict
        return "evaluation_limit" if status == "converged" and not self.is_accurate(point) else status

    def is_accurate(self, point: int) -> bool:
        """Whether the error of a point's total is as small as the request asks."""
        accuracy = self.plan.groups[self._places[point][0]].request.accuracy
        value, error = abs(float(self.value[point, 0, 0])), float(self.error[point, 0, 0])
        return error <= max((accuracy.relative or 0.0) * value, accuracy.absolute or 0.0)

    def prediction(self, point: int) -> Prediction:
        """The prediction at one point of the scan."""
        group, place = self._places[point]
        return self._shared[group].prediction(self, point, place)

    @cached_property
    def _places(self) -> dict[int, tuple[int, int]]:
        groups = enumerate(self.plan.groups)
        return {point: (number, place) for number, group in groups for place, point in enumerate(group.points)}

    @cached_property
    def _shared(self) -> tuple[_Shared, ...]:
        return tuple(_Shared(self.plan, group, self.origin) for group in self.plan.groups)


def assemble(plan: Plan, settled: Settled, status: Status, origin: Origin, run: Run) -> Answers:
    """The answers of a plan from its closed round.

    Parameters
    ----------
    settled : Settled
        Sums in GeV⁻², shape (moment, point, variation, component), points in the order of the groups.
    """
    sums = settled.of(0, 0)
    components = plan.layout.components
    order = np.argsort(np.concatenate([np.array(group.points, dtype=np.intp) for group in plan.groups]))
    factor = from_natural(plan.groups[0].request.unit)
    with np.errstate(over="ignore", invalid="ignore"):
        value, error = (sums.added[k, ..., :components][order] * factor for k in (0, 1))
    counts = sums.added[0, ..., components:][order].sum(axis=1)
    return Answers(plan, value, error, counts, settled, status, origin, run)


class _Shared:
    """What all points of a group have in common."""

    def __init__(self, plan: Plan, group: Group, origin: Origin) -> None:
        self.plan, self.group = plan, group
        self.unit = group.request.unit
        self.forms: list[HistogramForm] = [histogram_form(h, self.unit) for h in plan.layout.histograms]
        self.notes = tuple(NoteDocument.build(code=n.code, text=n.text) for n in group.notes)
        nominal = group.settings[0]
        self.collision = collide(nominal.beams, nominal.masses[:2])
        self.fields: dict[str, Any] = {
            "method": nominal.rule,
            **plan.provided,
            "parameters": dict(nominal.parameters),
            "masses": plan.masses_by_name(nominal),
            "sources": plan.sources(group),
            "versions": {**origin.versions, **plan.plugin_version},
            "source_digests": {plan.source.name: plan.source.digest},
            "environment": origin.environment,
        }

    def _diagnostics(self, answers: Answers, point: int) -> Diagnostics:
        counted = {name: int(count) for name, count in zip(COUNTED, answers.counts[point], strict=False)}
        return Diagnostics.build(rounds=answers.settled.number + 1, **counted)

    def prediction(self, answers: Answers, point: int, place: int) -> Prediction:
        """The prediction of one point."""
        value, error = answers.value[point], answers.error[point]
        parts = [self._results(value[v], error[v]) for v in range(value.shape[0])]
        notes = self.notes + self._notes_of_point(value, place) + _faults(answers, point)
        named = [
            Part.build(
                name=setting.name,
                parameters=dict(setting.parameters),
                masses=self.plan.masses_by_name(setting),
                **part,
            )
            for setting, part in zip(self.group.settings[1:], parts[1:], strict=True)
        ]
        request = self._request(place)
        derived = between_variations(request.derived, ByName(named), parts[0]["derived"])
        return Prediction.build(
            request=request,
            status=answers.status_of(point),
            diagnostics=self._diagnostics(answers, point),
            notes=notes,
            variations=ByName(named),
            run=answers.run,
            **{**parts[0], "derived": derived},
            **self.fields,
        )

    def _request(self, place: int) -> Request:
        """The group's request with this point's beam energies."""
        request = self.group.request
        changes: dict[str, Any] = {}
        for key, column in self.group.columns.items():
            field, _, name = key.removeprefix("beams.").partition(".")
            if not key.startswith("beams."):
                continue
            if name:
                table = changes.get(field, getattr(request.beams, field))
                changes[field] = {**table, name: float(column[place])}
            else:
                changes[field] = float(column[place])
        if not changes:
            return request
        return request.model_copy(update={"beams": request.beams.model_copy(update=changes)})

    def _results(self, value: Array, error: Array) -> dict[str, Any]:
        """Total, histograms and asymmetries of one variation."""
        layout = self.plan.layout
        histograms: Sequence[Histogram] = [
            form.histogram(value[part], error[part])
            for form, part in ((f, layout.histogram_slice(k)) for k, f in enumerate(self.forms))
        ]
        return {
            "total": _total(float(value[0]), float(error[0]), self.unit),
            "histograms": ByName(histograms),
            "derived": ByName(point_asymmetries(layout, value, error)),
        }

    def _notes_of_point(self, value: Array, place: int) -> tuple[NoteDocument, ...]:
        setting = self.group.settings[0]
        collision = self.collision.take(slice(place, place + 1))
        threshold = sum(setting.masses[2:])
        found = []
        if self.plan.valid is not None and not self.plan.valid.low <= collision.sqrt_s[0, 0] <= self.plan.valid.high:
            low, high, why = self.plan.valid.low, self.plan.valid.high, self.plan.valid.text
            text = f"√s lies outside {low:g} to {high:g} GeV, where {self.plan.name} is valid: {why}"
            found.append(NoteDocument.build(code="outside_validity", text=text))
        if not collision.above(threshold)[0, 0] > 0:
            text = f"√s is not above {threshold:.10g} GeV, the threshold of the final state, so σ = 0"
            found.append(NoteDocument.build(code="below_threshold", text=text))
        elif value[0, 0] == 0.0:
            names = ", ".join(cut.name for cut in setting.cuts)
            code = "cuts_exclude_everything" if names else "law_is_zero"
            text = f"no event can pass the cuts ({names})" if names else "the law was 0 at every point that was asked"
            found.append(NoteDocument.build(code=code, text=f"{text}, so σ = 0"))
        return tuple(found)


def _total(value: float, error: float, unit: str) -> Total:
    if not (np.isfinite(value) and np.isfinite(error)):
        return Total.build(value=None, error=None, unit=unit, error_kind="numerical_bound")
    return Total.build(value=value, error=error, unit=unit, error_kind="numerical_bound")


def _faults(answers: Answers, point: int) -> tuple[NoteDocument, ...]:
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
            "the error is larger than what was asked for: a cut or an asymmetry lies within rounding of an extremum "
            "of its observable, where √ε is all that can be had; move it away"
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
