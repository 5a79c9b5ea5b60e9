"""What the person who asked should know about the inputs."""

from __future__ import annotations

from collections.abc import Iterator

from barnwright.engine.plan import Note
from barnwright.observables import Cut
from barnwright.process import Process


def notes_of(process: Process, cuts: tuple[Cut, ...]) -> tuple[Note, ...]:
    """Notes that hold at every point: what the reaction does not conserve, and limits that can do nothing."""
    conservation = (Note("conservation", text) for text in process.legs.conservation_notes())
    return (*conservation, *(note for cut in cuts for note in _idle_limits(cut)))


def _idle_limits(cut: Cut) -> Iterator[Note]:
    """Limits beyond the range of the observable: degrees in the place of radians, most of the time."""
    low, high = cut.observable.range
    span = f"{low:.6g} to {high:.6g}" + (f" {cut.observable.unit}" if cut.observable.unit else "")
    advice = f"; degrees are {cut.observable.text} / deg" if cut.observable.unit == "rad" else ""
    for side, limit in (("min", cut.min), ("max", cut.max)):
        if limit is not None and not low <= limit <= high:
            text = (
                f"{side} = {limit:g} of cut {cut.name} lies outside {span}, the range of {cut.observable.text}{advice}"
            )
            yield Note("limit_out_of_range", text)
