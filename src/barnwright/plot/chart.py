"""A chart: lines and bands over one horizontal axis, and lower panels that share it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from barnwright.plot.looks import NOMINAL, REST, Look
from barnwright.plot.scales import Array, value_scale
from barnwright.plot.strokes import Stroke

#: The share of a panel's height that a row of its legend takes, and what is free around all rows.
ROW, AROUND = 0.068, 0.04
#: How many characters a row of a legend may have, how many small ones, and how many of them the sample of a line takes.
CHARACTERS, SMALL_CHARACTERS, HANDLE = 64, 76, 8
#: No legend pushes the lines into less than this share of a panel.
LEAST = 0.5
#: Heights in inches of a main panel and of a lower one.
MAIN, LOWER = 3.6, 1.15
#: Ratios and asymmetries that differ by less are one and the same but for rounding.
ROUNDING = 1e-9


@dataclass(frozen=True, slots=True)
class Series:
    """One line of a panel: values and errors of one shape; NaN where a value or an error is not known."""

    label: str
    values: Array
    errors: Array
    look: Look = NOMINAL
    bars: bool = True


@dataclass(frozen=True, slots=True)
class Band:
    """What lies between two arrays."""

    label: str
    low: Array
    high: Array
    look: Look


@dataclass(frozen=True, slots=True)
class Panel:
    """Lines and bands with one vertical axis; ``reference`` is where a thin line lies, such as 1 for ratios.

    ``from_zero``: a linear axis of positive values begins at 0, so that heights can be compared.
    """

    label: str
    lines: tuple[Series, ...]
    bands: tuple[Band, ...] = ()
    reference: float = 0.0
    from_zero: bool = False
    legend: bool = False
    height: float = LOWER


@dataclass(frozen=True, slots=True)
class Chart:
    """A main panel, and lower ones that share its horizontal axis."""

    title: str
    label: str
    stroke: Stroke
    main: Panel
    lower: tuple[Panel, ...] = ()

    @property
    def heights(self) -> tuple[float, ...]:
        """The heights of the panels in inches."""
        return (self.main.height, *(panel.height for panel in self.lower))

    def draw(self, _figure: Any, panels: Sequence[Any]) -> None:
        """Draw into axes of matplotlib, one a panel."""
        for axes, panel in zip(panels, (self.main, *self.lower), strict=True):
            self.stroke.prepare(axes)
            draw_panel(axes, panel, self.stroke)
            axes.tick_params(labelbottom=axes is panels[-1], which="both")
        panels[0].set_title(self.title)
        panels[-1].set_xlabel(self.label)


def draw_panel(axes: Any, panel: Panel, stroke: Stroke) -> None:
    """Lines with bands and bars of their errors, the first line on top; a legend where there is something to tell."""
    bands = [array for band in panel.bands for array in (band.low, band.high)]
    scale = value_scale(*(line.values for line in panel.lines), *bands)
    scale.set_on(axes)
    axes.use_sticky_edges = False
    drawn = [(band.label, stroke.band(axes, band.low, band.high, band.look, band.label)) for band in panel.bands]
    drawn += [(line.label, _draw_line(axes, line, stroke)) for line in reversed(panel.lines)]
    axes.set_ylabel(panel.label)
    axes.margins(y=0.05 if panel.from_zero else 0.12)
    _limits(axes, panel, [*(line.values for line in panel.lines), *bands])
    if panel.legend:
        _legend(axes, [entry for entry in reversed(drawn) if entry[0]])


def _draw_line(axes: Any, line: Series, stroke: Stroke) -> Any:
    half = np.where(np.isfinite(line.errors), line.errors, 0.0)
    if half.any() and line.look is not REST:
        stroke.band(axes, line.values - half, line.values + half, Look(line.look.colour))
        if line.bars:
            stroke.bars(axes, line.values, line.errors, line.look)
    return stroke.line(axes, line.values, line.look, line.label)


def _limits(axes: Any, panel: Panel, arrays: Sequence[Array]) -> None:
    """The ends of the vertical axis, and a thin line at the reference where that lies between them."""
    lowest = min((float(np.nanmin(array, initial=np.inf)) for array in arrays), default=0.0)
    highest = max(float(axes.dataLim.y1), 0.0)
    linear = axes.get_yscale() == "linear"
    if panel.from_zero and linear and lowest >= 0:
        axes.set_ylim(0.0, 1.05 * highest or 1.0)
        return
    low, high = axes.get_ylim()
    if not panel.from_zero and linear and high - low < ROUNDING:
        middle = 0.5 * (low + high)
        axes.set_ylim(middle - 0.1, middle + 0.1)
    if low < panel.reference < high:
        axes.axhline(panel.reference, color="#888888", linewidth=0.6, zorder=0.5)


def _legend(axes: Any, entries: Sequence[tuple[str, Any]]) -> None:
    """A legend in rows at the top, above the lines; in smaller letters where there are many."""
    labels, artists = zip(*entries, strict=True)
    columns, size = _columns(labels, CHARACTERS), "medium"
    if len(labels) > 3 * columns:
        columns, size = _columns(labels, SMALL_CHARACTERS), "small"
    rows = -(-len(labels) // columns)
    _make_room(axes, min(ROW * rows + AROUND, LEAST))
    axes.legend(artists, labels, loc="upper left", ncols=columns, frameon=False, fontsize=size)


def _columns(labels: Sequence[str], width: int) -> int:
    """How many labels fit beside each other into so many characters."""
    if sum(map(len, labels)) + HANDLE * len(labels) <= width:
        return len(labels)
    return max(1, min(len(labels), width // (max(map(len, labels)) + HANDLE)))


def _make_room(axes: Any, share: float) -> None:
    """Move the upper end of the vertical axis so that this share of its length becomes free."""
    ends = np.array(axes.get_ylim())
    transform = axes.yaxis.get_transform()
    low, high = transform.transform(ends)
    top = transform.inverted().transform(np.array([low + (high - low) / (1 - share)]))
    axes.set_ylim(ends[0], float(top[0]))
