"""Linear, logarithmic or logarithmic on both sides of 0, chosen from the numbers themselves."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Literal

import numpy as np
import numpy.typing as npt

Array = npt.NDArray[np.float64]

#: Values whose largest and smallest differ by more than this are read off a logarithmic axis more easily.
WIDE = 50.0
#: Of values with both signs this share may be too small to be told from 0: around a change of sign they always are.
NEAR_ZERO = 0.1
#: A symmetric axis is linear below this share of the largest value at least: rounding is no physics.
DEEPEST = 1e-6
#: What is smaller than this share of the largest value is rounding around 0, and shapes no axis.
ROUNDING = 1e-9


@dataclass(frozen=True, slots=True)
class Scale:
    """The kind of an axis of values; a "symlog" axis is linear from −threshold to threshold."""

    kind: Literal["linear", "log", "symlog"]
    threshold: float = 0.0

    def set_on(self, axes: Any) -> None:
        """Give the vertical axis this scale."""
        if self.kind == "symlog":
            axes.set_yscale("symlog", linthresh=self.threshold, linscale=0.5)
            axes.axhspan(-self.threshold, self.threshold, color="#f2f2f2", linewidth=0, zorder=0.1)
            place = {"xy": (0.99, 0.0), "xycoords": ("axes fraction", "data"), "ha": "right", "va": "bottom"}
            axes.annotate("linear", **place, fontsize="x-small", color="#888888", zorder=0.2)
        else:
            axes.set_yscale(self.kind)


def axis_scale(edges: Array) -> str:
    """Give "log" for positive edges or points that grow by ratios rather than by steps, else "linear"."""
    finite = edges[np.isfinite(edges)]
    if len(finite) < 3 or finite.min() <= 0 or finite.max() < 10 * finite.min():
        return "linear"
    steps, ratios = np.diff(finite), np.diff(np.log(finite))
    return "log" if _unevenness(ratios) < _unevenness(steps) else "linear"


def value_scale(*values: Array) -> Scale:
    """The scale on which all values that are not 0 can be read off.

    Logarithmic where they are positive and span more than WIDE. Where some are negative none may get lost: linear, or,
    where most of them span more than WIDE in size, logarithmic on both sides of 0.
    """
    everything = np.concatenate([np.ravel(array) for array in values]) if values else np.zeros(0)
    seen = everything[np.isfinite(everything) & (everything != 0)]
    if len(seen) < 2:
        return Scale("linear")
    if seen.min() > 0:
        return Scale("log" if seen.max() / WIDE > seen.min() else "linear")
    sizes = np.abs(seen)
    sizes = sizes[sizes > ROUNDING * sizes.max()]
    small, large = float(np.quantile(sizes, NEAR_ZERO)), float(sizes.max())
    if large / WIDE <= small:
        return Scale("linear")
    return Scale("symlog", 10.0 ** np.floor(np.log10(max(small, DEEPEST * large))))


def centres(edges: Array) -> Array:
    """The middle of every bin as the eye sees it on the axis of these edges."""
    if axis_scale(edges) == "log":
        return np.asarray(np.sqrt(edges[:-1]) * np.sqrt(edges[1:]))
    return np.asarray(0.5 * edges[:-1] + 0.5 * edges[1:])


def borders(places: Array) -> Array:
    """The borders of the cells of increasing points on a map, half-way between them as the eye sees it."""
    if len(places) < 2:
        half = 0.5 * max(float(np.abs(places[0])), 1.0)
        return np.array([places[0] - half, places[0] + half])
    seen = np.log(places) if axis_scale(places) == "log" else places
    middle = 0.5 * (seen[:-1] + seen[1:])
    ends = np.concatenate([[2 * seen[0] - middle[0]], middle, [2 * seen[-1] - middle[-1]]])
    return np.asarray(np.exp(ends) if axis_scale(places) == "log" else ends)


def _unevenness(steps: Array) -> float:
    mean = float(np.mean(np.abs(steps)))
    return float(np.std(steps)) / mean if mean > 0 else float("inf")
