"""The figure that pictures are drawn on. Importing this file imports matplotlib."""

from __future__ import annotations

from matplotlib.figure import Figure

from barnwright.plot.backend import encode


class Canvas(Figure):
    """A figure of matplotlib that a notebook shows by itself, also where matplotlib's own mode for it is off."""

    def _repr_png_(self) -> bytes:
        """The picture, for notebooks."""
        return encode(self, "png")
