"""What the person who asked should know about the inputs."""

from __future__ import annotations

from collections.abc import Iterator

from barnwright.engine.plan import Note
from barnwright.engine.setting import Layout
from barnwright.observables import Cut, Observable
from barnwright.process import Process

SLACK = 1e-9
"""Edges at the ends of a range may be rounded."""


def notes_of(process: Process, cuts: tuple[Cut, ...], layout: Layout) -> tuple[Note, ...]:
    """Notes that hold at every point: what the reaction does not conserve, and numbers that can do nothing."""
    conservation = (Note("conservation", text) for text in process.legs.conservation_notes())
    return (*conservation, *_idle_limits(cuts), *_idle_edges(layout))


def _idle_limits(cuts: tuple[Cut, ...]) -> Iterator[Note]:
    """Limits beyond the range of the observable: degrees in the place of radians, most of the time."""
    for cut in cuts:
        for side, limit in (("min", cut.min), ("max", cut.max)):
            if limit is not None and not cut.observable.range[0] <= limit <= cut.observable.range[1]:
                yield _outside(f"{side} = {limit:g} of cut {cut.name}", cut.observable)


def _idle_edges(layout: Layout) -> Iterator[Note]:
    """The same of the bins of a histogram and of the value of an asymmetry."""
    for histogram in layout.histograms:
        for observable, edges in zip(histogram.observables, histogram.edges, strict=True):
            for which, edge in (("first", edges[0]), ("last", edges[-1])):
                if _is_outside(edge, observable):
                    yield _outside(f"the {which} edge, {edge:g}, of histogram {histogram.name}", observable)
    for asymmetry in layout.asymmetries:
        if _is_outside(asymmetry.at, asymmetry.observable):
            yield _outside(f"at = {asymmetry.at:g} of {asymmetry.name}", asymmetry.observable)


def _is_outside(number: float, observable: Observable) -> bool:
    low, high = observable.range
    slack = SLACK * (high - low) if high - low < float("inf") else 0.0
    return not low - slack <= number <= high + slack


def _outside(what: str, observable: Observable) -> Note:
    low, high = observable.range
    span = f"{low:.6g} to {high:.6g}" + (f" {observable.unit}" if observable.unit else "")
    advice = f"; degrees are {observable.text} / deg" if observable.unit == "rad" else ""
    return Note("limit_out_of_range", f"{what} lies outside {span}, the range of {observable.text}{advice}")
