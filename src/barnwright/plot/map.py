"""A map: values over two axes as colours."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from barnwright.plot.chart import MAIN, ROUNDING
from barnwright.plot.looks import COLOUR_MAP, SIGNED_MAP
from barnwright.plot.scales import Array, axis_scale, value_scale


@dataclass(frozen=True, slots=True)
class Map:
    """Values of shape (first axis, second axis) between edges of both axes; ``labels`` are of axes and colours.

    Cells whose value is not known stay white, and so do empty ones, unless the values are ``derived`` or some are
    negative: then 0 is a value like others.
    """

    title: str
    labels: tuple[str, str, str]
    edges: tuple[Array, Array]
    values: Array
    derived: bool = False

    @property
    def heights(self) -> tuple[float, ...]:
        """The height of its one panel in inches."""
        return (MAIN,)

    def draw(self, figure: Any, panels: Sequence[Any]) -> None:
        """Draw into the first of some axes of matplotlib, with a bar of colours beside it."""
        axes, (first, second) = panels[0], self.edges
        axes.set_xscale(axis_scale(first))
        axes.set_yscale(axis_scale(second))
        values = np.ma.masked_invalid(self.values)
        signed = bool((values < (-ROUNDING if self.derived else 0)).any())
        shown = values if signed or self.derived else np.ma.masked_equal(values, 0.0)
        colours = SIGNED_MAP if signed else COLOUR_MAP
        norm = _signed(shown) if signed else _positive(shown)
        mesh = axes.pcolormesh(first, second, shown.T, cmap=colours, norm=norm, rasterized=True)
        axes.set_title(self.title)
        axes.set_xlabel(self.labels[0])
        axes.set_ylabel(self.labels[1])
        axes.tick_params(which="both", direction="out", top=False, right=False)
        figure.colorbar(mesh, ax=axes, label=self.labels[2])


def _positive(shown: Any) -> Any:
    from matplotlib.colors import LogNorm, Normalize

    span = (shown.min(), shown.max()) if shown.count() else (0.0, 1.0)
    if span[1] - span[0] < ROUNDING * abs(span[1]) or span[1] == 0:
        return Normalize(0.0, 2 * span[1] or 1.0)
    return LogNorm(*span) if value_scale(shown.filled(np.nan)).kind == "log" else Normalize(*span)


def _signed(shown: Any) -> Any:
    """Both signs have equal shares of the colours, so that white is 0."""
    from matplotlib.colors import CenteredNorm, SymLogNorm

    size = float(np.abs(shown).max())
    scale = value_scale(shown.filled(np.nan))
    if scale.kind == "symlog":
        return SymLogNorm(scale.threshold, vmin=-size, vmax=size)
    return CenteredNorm(halfrange=size)
