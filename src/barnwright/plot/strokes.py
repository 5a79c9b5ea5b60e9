"""The two ways to draw over a horizontal axis: steps of a histogram, and lines through the points of a scan."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Protocol

import numpy as np

from barnwright.plot.looks import Look
from barnwright.plot.scales import Array, axis_scale, centres

#: More bins than this and an error bar in every one of them hides the line: the band alone is drawn.
BARS = 60
#: More points than this and a marker at every one of them hides the line.
MARKERS = 40


class Stroke(Protocol):
    """Draws numbers, one a bin or one a point, into axes of matplotlib; NaN is left out."""

    def prepare(self, axes: Any) -> None:
        """Set scale and limits of the horizontal axis."""

    def line(self, axes: Any, values: Array, look: Look, label: str) -> Any:
        """The values; what was drawn, for a legend."""

    def band(self, axes: Any, low: Array, high: Array, look: Look, label: str = "") -> Any:
        """What lies between two arrays; what was drawn, for a legend."""

    def bars(self, axes: Any, values: Array, errors: Array, look: Look) -> None:
        """A bar of the error at every value, where they are not too many."""


@dataclass(frozen=True, slots=True)
class Steps:
    """Over the bins of a histogram with these edges."""

    edges: Array

    def prepare(self, axes: Any) -> None:
        """Set scale and limits of the horizontal axis."""
        axes.set_xscale(axis_scale(self.edges))
        axes.set_xlim(self.edges[0], self.edges[-1])

    def line(self, axes: Any, values: Array, look: Look, label: str) -> Any:
        """One step a bin, open at both ends."""
        return axes.stairs(values, self.edges, baseline=None, label=label, **look.line)

    def band(self, axes: Any, low: Array, high: Array, look: Look, label: str = "") -> Any:
        """What lies between two arrays in each bin."""
        return axes.stairs(high, self.edges, baseline=low, fill=True, label=label, **_fill(look))

    def bars(self, axes: Any, values: Array, errors: Array, look: Look) -> None:
        """A bar of the error in the middle of each bin."""
        if len(values) <= BARS and np.isfinite(errors).any():
            look_of_bars = {"color": look.colour, "elinewidth": 1.0, "capsize": 2}
            axes.errorbar(centres(self.edges), values, yerr=errors, fmt="none", **look_of_bars)


@dataclass(frozen=True, slots=True)
class Points:
    """Through the points of a scan, which increase."""

    places: Array

    def prepare(self, axes: Any) -> None:
        """Set scale and limits of the horizontal axis; markers keep away from its ends."""
        axes.set_xscale(axis_scale(self.places))
        if len(self.places) > MARKERS:
            axes.set_xlim(self.places[0], self.places[-1])

    def line(self, axes: Any, values: Array, look: Look, label: str) -> Any:
        """Points that are joined by a line."""
        marker = "o" if len(self.places) <= MARKERS else ""
        return axes.plot(self.places, values, marker=marker, markersize=3, label=label, **look.line)[0]

    def band(self, axes: Any, low: Array, high: Array, look: Look, label: str = "") -> Any:
        """What lies between two lines."""
        return axes.fill_between(self.places, low, high, label=label, **_fill(look))

    def bars(self, axes: Any, values: Array, errors: Array, look: Look) -> None:
        """A bar of the error at each point; a line of many points has its band alone."""
        if len(self.places) <= MARKERS and np.isfinite(errors).any():
            look_of_bars = {"color": look.colour, "elinewidth": 1.0, "capsize": 2}
            axes.errorbar(self.places, values, yerr=errors, fmt="none", **look_of_bars)


def _fill(look: Look) -> dict[str, Any]:
    if look.hatch is not None:
        return {"facecolor": "#66666626", "edgecolor": look.colour, "hatch": look.hatch, "linewidth": 0}
    return {"color": look.colour, "alpha": 0.25, "linewidth": 0}
