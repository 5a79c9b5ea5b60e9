"""The observables of a request: cuts, histograms and asymmetries, compiled for the reaction."""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator
from functools import lru_cache
from typing import Literal

from barnwright.documents import AsymmetryRequest, Bins, HistogramRequest, Request
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.setting import AsymmetryPlan, BinnedAsymmetry, HistogramPlan, Layout, polar_kind
from barnwright.observables import Cut, Observable, ObservableError, compile_observable, edges_of
from barnwright.reaction import Reaction

MOST_COMPONENTS = 100_000


def resolve_cuts(request: Request, reaction: Reaction, findings: Findings) -> tuple[Cut, ...]:
    """The cuts, in the order of the request; a wrong one is left out and found."""
    cuts = []
    for index, asked in enumerate(request.cuts):
        observable = _observable(asked.observable, reaction, f"cuts[{index}].observable", findings)
        if observable is not None:
            cuts.append(Cut(asked.name, observable, asked.min, asked.max, asked.outside))
    return tuple(cuts)


def resolve_layout(request: Request, reaction: Reaction, findings: Findings) -> Layout:
    """Histograms and asymmetries; a wrong one is left out and found."""
    histograms = [_histogram(asked, index, reaction, findings) for index, asked in enumerate(request.histograms)]
    asymmetries = []
    for index, asked in enumerate(request.derived):
        if isinstance(asked, AsymmetryRequest) and asked.observable is not None and asked.at is not None:
            observable = _observable(asked.observable, reaction, f"derived[{index}].observable", findings)
            if observable is not None:
                asymmetries.append(AsymmetryPlan(asked.name, observable, asked.at))
    known = tuple(h for h in histograms if h is not None)
    layout = Layout(known, tuple(asymmetries), tuple(_binned(known, asymmetries)))
    if layout.components > MOST_COMPONENTS:
        findings.add("histograms", f"{layout.components} components", f"at most {MOST_COMPONENTS} in one request")
    return layout


def _binned(histograms: Iterable[HistogramPlan], asymmetries: Iterable[AsymmetryPlan]) -> Iterator[BinnedAsymmetry]:
    """Every asymmetry in the bins of every histogram of other observables; in bins of its own it is 1 or −1."""
    for asymmetry in asymmetries:
        for histogram in histograms:
            if asymmetry.observable not in histogram.observables:
                yield BinnedAsymmetry(asymmetry, histogram)


def asked_observables(cuts: tuple[Cut, ...], layout: Layout) -> Iterator[tuple[str, Observable]]:
    """Every observable of a request with its field."""
    for k, cut in enumerate(cuts):
        yield f"cuts[{k}].observable", cut.observable
    for k, histogram in enumerate(layout.histograms):
        for n, observable in enumerate(histogram.observables):
            yield f"histograms[{k}].observables[{n}]", observable
    for asymmetry in layout.asymmetries:
        yield f"derived.{asymmetry.name}.observable", asymmetry.observable


def _histogram(asked: HistogramRequest, index: int, reaction: Reaction, findings: Findings) -> HistogramPlan | None:
    where = f"histograms[{index}]"
    observables = [
        _observable(text, reaction, f"{where}.observables[{k}]", findings) for k, text in enumerate(asked.observables)
    ]
    found = tuple(o for o in observables if o is not None)
    if len(found) < len(observables):
        return None
    entries = {o.entries for o in found if o.quantifier == "each"}
    if any(o.quantifier == "any" for o in found):
        findings.add(f"{where}.observables", asked.observables, "no any(...): it belongs into a cut", "each(...)")
    if len(entries) > 1:
        findings.add(f"{where}.observables", asked.observables, "each(...) over the same particles on both axes")
    edges = _all_edges(asked, where, findings)
    if edges is None:
        return None
    if asked.per == "solid_angle":
        _check_solid_angle(found[0], edges[0], where, findings)
    return HistogramPlan(asked.name, found, edges, asked.per)


def _all_edges(asked: HistogramRequest, where: str, findings: Findings) -> tuple[tuple[float, ...], ...] | None:
    """The edges of every axis, or None and findings."""
    edges = []
    for index, bins in enumerate(asked.bins):
        try:
            edges.append(bin_edges(bins))
        except ValueError:
            expected = f"fewer bins: floats between {bins.low!r} and {bins.high!r} cannot tell so many apart"
            findings.add(f"{where}.bins[{index}].count", bins.count, expected)
    return tuple(edges) if len(edges) == len(asked.bins) else None


def bin_edges(bins: Bins) -> tuple[float, ...]:
    """The edges of one axis.

    Raises
    ------
    ValueError
        When the range is too narrow, or too wide, for so many bins.
    """
    if bins.edges is not None:
        return bins.edges
    assert bins.count is not None
    assert bins.low is not None
    assert bins.high is not None
    return _even_edges(bins.count, bins.low, bins.high, bins.spacing)


@lru_cache(maxsize=256)
def _even_edges(count: int, low: float, high: float, spacing: Literal["linear", "log"]) -> tuple[float, ...]:
    return tuple(edges_of(count, low, high, spacing).tolist())


def _check_solid_angle(observable: Observable, edges: tuple[float, ...], where: str, findings: Findings) -> None:
    kind = polar_kind(observable)
    if kind is None:
        expected = "'value' or 'bin'; a solid angle needs cos_theta(x), theta(x) or theta(x) / deg of one particle"
        findings.add(f"{where}.per", "solid_angle", expected)
        return
    low, high = {"cosine": (-1.0, 1.0), "rad": (0.0, math.pi), "deg": (0.0, 180.0)}[kind]
    if edges[0] < low or edges[-1] > high * (1 + 1e-15):
        expected = f"edges from {low:g} to {high:.16g}, where the solid angle is defined"
        findings.add(f"{where}.bins[0]", f"{edges[0]:g} to {edges[-1]:g}", expected)


def _observable(text: str, reaction: Reaction, where: str, findings: Findings) -> Observable | None:
    try:
        return compile_observable(text, reaction)
    except ObservableError as error:
        if reaction.inclusive:
            expected = "sqrt_s, or arithmetic with it: nothing is known of the final state X"
            findings.add(where, text, expected, "sqrt_s")
        else:
            findings.violations.extend(error.violations(where))
        return None
