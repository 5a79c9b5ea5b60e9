"""From contents to histograms: densities, solid angles and units."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.documents import Histogram
from barnwright.engine.setting import HistogramPlan, polar_kind

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class HistogramForm:
    """Everything about a histogram but its numbers; made once for all points of a scan."""

    plan: HistogramPlan
    edges: Array | tuple[Array, ...]
    volumes: Array
    solid_angles: Array | None
    unit: str
    observables: tuple[str, ...]
    axis_units: tuple[str, ...]

    def histogram(self, value: Array, error: Array) -> Histogram:
        """The histogram of some components: bins in row-major order, underflow, overflow; in the unit of the total."""
        bins = slice(0, value.size - 2)
        return Histogram.build(
            name=self.plan.name,
            observables=self.observables,
            axis_units=self.axis_units,
            per=self.plan.per,
            edges=self.edges,
            values=value[bins].reshape(self.plan.shape) / self.volumes,
            errors=error[bins].reshape(self.plan.shape) / self.volumes,
            unit=self.unit,
            error_kind="numerical_bound",
            underflow=_known(value[-2]),
            overflow=_known(value[-1]),
            underflow_error=_known(error[-2]),
            overflow_error=_known(error[-1]),
            solid_angles=self.solid_angles,
        )


def histogram_form(plan: HistogramPlan, unit: str) -> HistogramForm:
    """The form of a histogram whose total has the unit ``unit``."""
    axes = tuple(np.array(e) for e in plan.edges)
    for axis in axes:
        axis.flags.writeable = False
    angles = _solid_angles(plan, axes[0]) if plan.per == "solid_angle" else None
    widths = [np.diff(axis) for axis in axes]
    volumes = widths[0] if len(widths) == 1 else np.multiply.outer(widths[0], widths[1])
    if plan.per != "value":
        volumes = np.ones(plan.shape) if angles is None else angles
    return HistogramForm(
        plan,
        axes[0] if len(axes) == 1 else axes,
        volumes,
        angles,
        _unit(plan, unit),
        tuple(o.text for o in plan.observables),
        tuple(o.unit for o in plan.observables),
    )


def _solid_angles(plan: HistogramPlan, edges: Array) -> Array:
    """2π |Δcos θ| of every bin, in sr; for bins of the angle by 2 sin(mean) sin(half width)."""
    kind = polar_kind(plan.observables[0])
    if kind == "cosine":
        return 2 * np.pi * np.diff(edges)
    if kind == "deg":
        edges = edges * (np.pi / 180)
    mean, half = 0.5 * (edges[1:] + edges[:-1]), 0.5 * np.diff(edges)
    return 4 * np.pi * np.sin(mean) * np.sin(half)


def _unit(plan: HistogramPlan, unit: str) -> str:
    """``pb``, ``pb/GeV``, ``pb/sr``, ``pb/(GeV rad)``."""
    if plan.per == "bin":
        return unit
    if plan.per == "solid_angle":
        return f"{unit}/sr"
    below = [o.unit for o in plan.observables if o.unit]
    if len(below) == 2:
        return f"{unit}/{below[0]}^2" if below[0] == below[1] in ("GeV", "rad") else f"{unit}/({' '.join(below)})"
    return f"{unit}/{below[0]}" if below else unit


def _known(number: float) -> float | None:
    return float(number) if np.isfinite(number) else None
