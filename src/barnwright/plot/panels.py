"""What is drawn into one pair of axes: a histogram, a map of two observables, a curve of a scan."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from barnwright.plot.backend import COLOUR_MAP, COLOURS, DASHES
from barnwright.plot.scales import Array, axis_scale, centres, value_scale

#: More bins than this and an error bar in every one of them hides the line: the band alone is drawn.
BARS = 60


@dataclass(frozen=True, slots=True)
class Series:
    """One line of a panel: values and errors of one shape; NaN where a value or an error is not known."""

    label: str
    values: Array
    errors: Array


def draw_bins(axes: Any, edges: Array, series: Sequence[Series]) -> None:
    """Steps of one-dimensional histograms over common edges, a band and bars of their errors."""
    axes.set_xscale(axis_scale(edges))
    axes.set_yscale(value_scale(*(one.values for one in series)))
    for number, one in enumerate(series):
        look = {"color": COLOURS[number % len(COLOURS)]}
        dash = DASHES[number % len(DASHES)]
        axes.stairs(one.values, edges, baseline=None, linestyle=dash, linewidth=1.4, label=one.label, **look)
        low, high = _band(one)
        axes.stairs(high, edges, baseline=low, fill=True, alpha=0.25, linewidth=0, **look)
        if len(one.values) <= BARS:
            axes.errorbar(centres(edges), one.values, yerr=one.errors, fmt="none", elinewidth=1.0, capsize=2, **look)
    axes.set_xlim(edges[0], edges[-1])
    _start_at_zero(axes, series)
    _legend(axes, series)


def draw_map(figure: Any, axes: Any, sides: tuple[Array, Array], values: Array, label: str) -> None:
    """Values of shape (first axis, second axis) as colours; empty and unknown cells stay white.

    ``sides`` are the edges of a histogram's bins, or the points of a scan, one for each value.
    """
    from matplotlib.colors import LogNorm, Normalize

    shown = np.ma.masked_equal(np.ma.masked_invalid(values), 0.0)
    span = (shown.min(), shown.max()) if shown.count() else (0.0, 1.0)
    norm = LogNorm(*span) if value_scale(values) == "log" else Normalize(*span)
    axes.set_xscale(axis_scale(sides[0]))
    axes.set_yscale(axis_scale(sides[1]))
    mesh = axes.pcolormesh(*sides, shown.T, cmap=COLOUR_MAP, norm=norm, shading="auto", rasterized=True)
    figure.colorbar(mesh, ax=axes, label=label)


def draw_curve(axes: Any, places: Array, series: Sequence[Series]) -> None:
    """Values against the variable of a scan: points joined by a line, a band of their errors."""
    axes.set_xscale(axis_scale(places))
    axes.set_yscale(value_scale(*(one.values for one in series)))
    marker = "o" if len(places) <= BARS else ""
    for number, one in enumerate(series):
        look = {"color": COLOURS[number % len(COLOURS)]}
        line = axes.plot(places, one.values, marker=marker, markersize=3, linewidth=1.4, label=one.label, **look)[0]
        line.set_linestyle(DASHES[number % len(DASHES)])
        low, high = _band(one)
        axes.fill_between(places, low, high, alpha=0.25, linewidth=0, **look)
    if len(places) > 1:
        axes.set_xlim(np.nanmin(places), np.nanmax(places))
    _start_at_zero(axes, series)
    _legend(axes, series)


def _band(one: Series) -> tuple[Array, Array]:
    half = np.where(np.isfinite(one.errors), one.errors, 0.0)
    return one.values - half, one.values + half


def _start_at_zero(axes: Any, series: Sequence[Series]) -> None:
    """A linear axis of positive values begins at 0, so that heights can be compared."""
    lowest = min((np.nanmin(one.values, initial=np.inf) for one in series), default=0.0)
    if axes.get_yscale() == "linear" and lowest >= 0:
        axes.set_ylim(bottom=0.0)


def _legend(axes: Any, series: Sequence[Series]) -> None:
    if len(series) > 1:
        axes.legend(frameon=False)
