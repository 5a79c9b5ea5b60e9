"""From closed sums to predictions: units, densities, derived quantities, notes.

Everything that the points of a group share is made once; a point of a scan costs a few arrays.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from functools import cached_property
from typing import Any, Literal

import numpy as np
from numpy.typing import NDArray

from barnwright.documents import ByName, Diagnostics, Part, Prediction, Request, Run
from barnwright.documents import Note as NoteDocument
from barnwright.engine.derived import derived_quantities, undefined_ratios
from barnwright.engine.faults import faults
from barnwright.engine.form import Form
from barnwright.engine.numbers import Numbers
from barnwright.engine.plan import Group, Plan
from barnwright.engine.resolve.scan import beam_field
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
    numbers : Numbers
        In the request's unit, of all members together.
    by_member : tuple of Numbers
    """

    plan: Plan
    numbers: Numbers
    by_member: tuple[Numbers, ...]
    settled: Settled
    verdict: Status
    origin: Origin
    run: Run

    @property
    def value(self) -> Array:
        """Contents in the request's unit, shape (point, variation, component), in the order of the scan."""
        return self.numbers.value

    @property
    def error(self) -> Array:
        """Their error bounds."""
        return self.numbers.error

    @property
    def counts(self) -> Array:
        """What `COUNTS` names, of all entries of the variation axis of a point together; shape (point, 5)."""
        return self.numbers.counts

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
        Sums in GeV⁻², shape (moment, point, variation, component), points in the order of the groups; a stratum for
        each member.
    """
    components = plan.components
    order = np.argsort(np.concatenate([np.array(group.points, dtype=np.intp) for group in plan.groups]))
    factor = from_natural(plan.request.unit)
    numbers = []
    for member in range(len(plan.members)):
        added = settled.of(member, 0).added
        with np.errstate(over="ignore", invalid="ignore"):
            value, error = (added[k, ..., :components][order] * factor for k in (0, 1))
        numbers.append(Numbers(value, error, added[0, ..., components:][order].sum(axis=1)))
    return Answers(plan, Numbers.summed(numbers), tuple(numbers), settled, status, origin, run)


class _Shared:
    """What all points of a group have in common."""

    def __init__(self, plan: Plan, group: Group, origin: Origin) -> None:
        self.plan, self.group = plan, group
        self.unit = group.request.unit
        self.members = tuple(
            Form(member, share, self.unit) for member, share in zip(plan.members, group.shares, strict=True)
        )
        self.notes = tuple(dict.fromkeys(note for form in self.members for note in form.notes(len(plan.members) > 1)))
        self.fields: dict[str, Any] = {
            "method": _common_method(self.members),
            **_provided(plan),
            "parameters": _agreed(form.parameters for form in self.members),
            "masses": _agreed(form.masses for form in self.members),
            "sources": _agreed(plan.sources(group, number) for number in range(len(plan.members))),
            "versions": {**origin.versions, **{k: v for m in plan.members for k, v in m.plugin_version.items()}},
            "source_digests": {member.source.name: member.source.digest for member in plan.members},
            "environment": origin.environment,
        }

    def prediction(self, answers: Answers, point: int, place: int) -> Prediction:
        """The prediction of one point."""
        numbers, first = answers.numbers, self.members[0]
        whole = first.results(numbers, point, 0)
        variations = ByName(first.variations(numbers, point))
        request = self._request(place)
        derived = derived_quantities(request.derived, whole, variations)
        return Prediction.build(
            request=request,
            status=answers.status_of(point),
            diagnostics=_diagnostics(answers, point),
            notes=(
                *self.notes,
                *self._notes_of_point(answers, point, place),
                *faults(answers, point),
                *undefined_ratios(request, derived, variations, whole["total"]),
            ),
            contributions=ByName(first.contributions(numbers, point)),
            processes=ByName(self._processes(answers, point)),
            variations=variations,
            run=answers.run,
            **{**whole, "derived": derived},
            **self.fields,
        )

    def _processes(self, answers: Answers, point: int) -> list[Part]:
        """Each member of a sum by itself; nothing where there is one."""
        if len(self.members) == 1:
            return []
        return [
            Part.build(
                name=form.member.source.name,
                parameters=form.parameters,
                masses=form.masses,
                **form.results(own, point, 0),
            )
            for form, own in zip(self.members, answers.by_member, strict=True)
        ]

    def _request(self, place: int) -> Request:
        """The group's request with this point's beam energies."""
        request = self.group.request
        changes: dict[str, Any] = {}
        for key, column in self.group.columns.items():
            field, _, name = (beam_field(key) or "").partition(".")
            if not field:
                continue
            if name:
                table = changes.get(field, getattr(request.beams, field))
                changes[field] = {**table, name: float(column[place])}
            else:
                changes[field] = float(column[place])
        if not changes:
            return request
        return request.model_copy(update={"beams": request.beams.model_copy(update=changes)})

    def _notes_of_point(self, answers: Answers, point: int, place: int) -> tuple[NoteDocument, ...]:
        """Notes on each member's own numbers, with its name where there are several."""
        found = []
        for form, own in zip(self.members, answers.by_member, strict=True):
            named = f"{form.member.source.name}: " if len(self.members) > 1 else ""
            notes = form.notes_of_point(own, point, place)
            found += [NoteDocument.build(code=note.code, text=f"{named}{note.text}") for note in notes]
        return tuple(found)


def _common_method(members: Iterable[Form]) -> str:
    return "closed_form" if {form.nominal.rule for form in members} == {"closed_form"} else "quadrature"


def _provided(plan: Plan) -> dict[str, Any]:
    """What a prediction repeats of its processes."""
    orders = dict.fromkeys(member.provided["order"] for member in plan.members)
    schemes = dict.fromkeys(dict(share.settings[0].parameters).get("scheme") for share in plan.groups[0].shares)
    scheme = next(iter(schemes)) if len(schemes) == 1 else None
    return {"order": ", ".join(orders), "scheme": scheme, "constants": plan.members[0].provided["constants"]}


def _agreed(tables: Iterable[Mapping[str, Any]]) -> dict[str, Any]:
    """All entries of some tables but those in which they differ."""
    found: dict[str, Any] = {}
    differ: set[str] = set()
    for table in tables:
        differ.update(name for name, value in table.items() if name in found and found[name] != value)
        found.update(table)
    return {name: value for name, value in found.items() if name not in differ}


def _diagnostics(answers: Answers, point: int) -> Diagnostics:
    counted = {name: int(count) for name, count in zip(COUNTED, answers.counts[point], strict=False)}
    return Diagnostics.build(rounds=answers.settled.number + 1, **counted)
