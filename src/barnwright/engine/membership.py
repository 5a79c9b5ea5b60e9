"""Which components each panel belongs to: a panel lies wholly inside one bin and wholly passes or fails each cut."""

from __future__ import annotations

from collections.abc import Callable, Iterator

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.setting import AsymmetryPlan, HistogramPlan, Layout
from barnwright.integrate.polar_axis import Integers
from barnwright.observables import Cut, Observable

Array = NDArray[np.float64]
Valuation = Callable[[Observable], Array]
"""An observable's values in the middle of every panel, (row or 1, panel); entries first where it has a quantifier."""

OUTSIDE = -1


def passes(cuts: tuple[Cut, ...], values: Valuation) -> NDArray[np.bool_]:
    """Whether panels pass all cuts; shape (row or 1, panel), or a scalar True without cuts."""
    result = np.ones((1, 1), dtype=bool)
    for cut in cuts:
        result = result & cut.accepts(values(cut.observable))
    return result


def memberships(layout: Layout, values: Valuation, passed: NDArray[np.bool_]) -> Iterator[Integers]:
    """For the total and every histogram entry and asymmetry: the component of each panel, or OUTSIDE where cut away."""
    yield np.where(passed, 0, OUTSIDE)
    for index, histogram in enumerate(layout.histograms):
        start = layout.histogram_slice(index).start
        for bins in histogram_bins(histogram, values):
            yield np.where(passed, start + bins, OUTSIDE)
    for index, asymmetry in enumerate(layout.asymmetries):
        start = layout.asymmetry_start(index)
        for above in _above(asymmetry, values):
            yield np.where(passed, start + above, OUTSIDE)
    for index, binned in enumerate(layout.binned):
        start, last = layout.binned_start(index), binned.components // 2
        sides, places = list(_above(binned.asymmetry, values)), list(histogram_bins(binned.histogram, values))
        for entry in range(max(len(sides), len(places))):
            place, above = places[entry % len(places)], sides[entry % len(sides)]
            yield np.where(passed & (place < last), start + 2 * place + above, OUTSIDE)


def _above(asymmetry: AsymmetryPlan, values: Valuation) -> Iterator[NDArray[np.bool_]]:
    """Whether panels lie above an asymmetry's value, one array an entry."""
    found = values(asymmetry.observable)
    for entry in found if asymmetry.observable.quantifier else (found,):
        yield np.asarray(entry >= asymmetry.at)


def histogram_bins(histogram: HistogramPlan, values: Valuation) -> Iterator[Integers]:
    """The bin of each panel, one array an entry; the number of bins stands for underflow, one more for overflow."""
    axes = []
    for observable, edges in zip(histogram.observables, histogram.edges, strict=True):
        found = values(observable)
        entries = list(found) if observable.quantifier else [found]
        axes.append([bin_numbers(np.array(edges), entry) for entry in entries])
    count = max(len(entries) for entries in axes)
    for entry in range(count):
        yield _combined(histogram.shape, [entries[entry % len(entries)] for entries in axes])


def bin_numbers(edges: Array, values: Array) -> Integers:
    """−1 below the first edge, the bin's number, and the number of bins above; half open, the last edge closed."""
    last = edges.size - 1
    found = np.searchsorted(edges, values, side="right") - 1
    return np.where(values == edges[-1], last - 1, found)


def _combined(shape: tuple[int, ...], axes: list[Integers]) -> Integers:
    """One number for all axes: row-major bin, or underflow (low on any axis), or overflow (high on any only)."""
    total = int(np.prod(shape))
    low = np.logical_or.reduce(np.broadcast_arrays(*[a < 0 for a in axes]))
    high = np.logical_or.reduce(np.broadcast_arrays(*[a >= n for a, n in zip(axes, shape, strict=True)]))
    flat: Integers = np.zeros((1, 1), dtype=np.intp)
    for numbers, n in zip(axes, shape, strict=True):
        flat = flat * n + np.clip(numbers, 0, n - 1)
    return np.where(low, total, np.where(high, total + 1, flat))
