"""What one member of a plan makes of its numbers: totals, histograms, asymmetries, contributions, variations, notes.

Everything that the points of a group share is made once; a point of a scan costs a few arrays.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from functools import cached_property
from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import collide
from barnwright.documents import ByName, Part, Total
from barnwright.documents import Note as NoteDocument
from barnwright.engine.derived import point_asymmetries
from barnwright.engine.histograms import HistogramForm, histogram_form
from barnwright.engine.numbers import Numbers
from barnwright.engine.plan import Member, Note, Share
from barnwright.engine.setting import Setting
from barnwright.kinematics import Collision

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Form:
    """One member of a plan in a group of points; ``unit`` is that of the totals."""

    member: Member
    share: Share
    unit: str

    @property
    def nominal(self) -> Setting:
        """The request as it stands."""
        return self.share.settings[0]

    @property
    def parameters(self) -> dict[str, Any]:
        """Resolved parameters of the request as it stands."""
        return dict(self.nominal.parameters)

    @property
    def masses(self) -> dict[str, float]:
        """The mass in GeV of every particle."""
        return self.member.masses_by_name(self.nominal)

    @cached_property
    def histograms(self) -> tuple[HistogramForm, ...]:
        """The histograms without their numbers."""
        return tuple(histogram_form(h, self.unit) for h in self.member.layout.histograms)

    @cached_property
    def collision(self) -> Collision:
        """The collisions of all points of the group."""
        return collide(self.nominal.beams, self.nominal.masses[:2])

    def results(self, numbers: Numbers, point: int, entry: int) -> dict[str, Any]:
        """Total, histograms and asymmetries of one entry of the variation axis."""
        value, error = numbers.value[point, entry], numbers.error[point, entry]
        return {
            **self._plain(value, error),
            "derived": ByName(point_asymmetries(self.member.layout, value, error)),
        }

    def _plain(self, value: Array, error: Array) -> dict[str, Any]:
        """Total and histograms."""
        slices = (self.member.layout.histogram_slice(k) for k in range(len(self.histograms)))
        histograms = [
            form.histogram(value[part], error[part]) for form, part in zip(self.histograms, slices, strict=True)
        ]
        return {"total": _total(float(value[0]), float(error[0]), self.unit), "histograms": ByName(histograms)}

    def contributions(self, numbers: Numbers, point: int) -> Iterator[Part]:
        """Every contribution that is reported; what may be negative has no asymmetries."""
        signed = {note.text.split()[1]: note for note in self.share.notes if note.code == "signed"}
        for entry, (name, _) in enumerate(self.nominal.parts[1:], 1):
            if name in signed:
                plain = self._plain(numbers.value[point, entry], numbers.error[point, entry])
                yield Part.build(name=name, notes=(_document(signed[name]),), **plain)
            else:
                yield Part.build(name=name, **self.results(numbers, point, entry))

    def variations(self, numbers: Numbers, point: int) -> Iterator[Part]:
        """Every variation."""
        for entry, setting in enumerate(self.share.settings[1:], len(self.nominal.parts)):
            yield Part.build(
                name=setting.name,
                parameters=dict(setting.parameters),
                masses=self.member.masses_by_name(setting),
                **self.results(numbers, point, entry),
            )

    def notes(self, named: bool) -> Iterator[NoteDocument]:
        """Notes that hold at every point, with the name of the process where there are several."""
        for note in self.share.notes:
            if note.code != "signed":
                yield _document(Note(note.code, f"{self.member.source.name}: {note.text}") if named else note)

    def notes_of_point(self, numbers: Numbers, point: int, place: int) -> Iterator[NoteDocument]:
        """Notes about the energy of one point, and about a total that is 0."""
        member, setting = self.member, self.nominal
        collision = self.collision.take(slice(place, place + 1))
        threshold, valid = sum(setting.masses[2:]), member.valid
        if valid is not None and not valid.low <= collision.sqrt_s[0, 0] <= valid.high:
            span = f"{valid.low:g} to {valid.high:g} GeV"
            text = f"√s lies outside {span}, where {member.source.name} is valid: {valid.text}"
            yield NoteDocument.build(code="outside_validity", text=text)
        if not collision.above(threshold)[0, 0] > 0:
            text = f"√s is not above {threshold:.10g} GeV, the threshold of the final state, so σ = 0"
            yield NoteDocument.build(code="below_threshold", text=text)
        elif numbers.value[point, 0, 0] == 0.0:
            names = ", ".join(cut.name for cut in setting.cuts)
            code = "cuts_exclude_everything" if names else "law_is_zero"
            text = f"no event can pass the cuts ({names})" if names else "the law was 0 at every point that was asked"
            yield NoteDocument.build(code=code, text=f"{text}, so σ = 0")
        else:
            yield from self._empty_histograms(numbers.value[point, 0])

    def _empty_histograms(self, value: Array) -> Iterator[NoteDocument]:
        """A note for each histogram all of which lies outside of its bins: another unit, most of the time."""
        for index, plan in enumerate(self.member.layout.histograms):
            content = value[self.member.layout.histogram_slice(index)]
            if not content[:-2].any():
                side = "below" if content[-2] else "above"
                text = f"all events lie {side} the bins of histogram {plan.name}"
                yield NoteDocument.build(code="empty_histogram", text=text)


def _document(note: Note) -> NoteDocument:
    return NoteDocument.build(code=note.code, text=note.text)


def _total(value: float, error: float, unit: str) -> Total:
    if not (np.isfinite(value) and np.isfinite(error)):
        return Total.build(value=None, error=None, unit=unit, error_kind="numerical_bound")
    return Total.build(value=value, error=error, unit=unit, error_kind="numerical_bound")
