"""Figures of blocks: charts and maps, at most two side by side."""

from __future__ import annotations

from collections.abc import Sequence
from typing import TYPE_CHECKING, Any, Protocol

from barnwright.plot.backend import matplotlib, style

if TYPE_CHECKING:
    from matplotlib.figure import Figure

#: Height in inches of what is around a block: its title, its label.
AROUND = 0.8
#: Width in inches of a block that stands alone, and of two side by side.
ALONE, BESIDE = 6.4, 11.6


class Block(Protocol):
    """Something that is drawn into one panel or into several that lie below each other."""

    @property
    def heights(self) -> tuple[float, ...]:
        """The heights of its panels in inches, the main one first."""

    def draw(self, figure: Any, panels: Sequence[Any]) -> None:
        """Draw into axes of matplotlib, one a panel, the main one first."""


def compose(title: str, blocks: Sequence[Block]) -> Figure:
    """A figure with at least one block. Raises BarnwrightError when matplotlib is missing."""
    matplotlib()
    from matplotlib.layout_engine import ConstrainedLayoutEngine

    from barnwright.plot.canvas import Canvas

    columns = 1 if len(blocks) == 1 else 2
    rows = [blocks[first : first + columns] for first in range(0, len(blocks), columns)]
    heights = [AROUND + max(sum(block.heights) for block in row) for row in rows]
    with style():
        size = (ALONE if columns == 1 else BESIDE, sum(heights) + 0.2)
        figure = Canvas(figsize=size, layout=ConstrainedLayoutEngine(h_pad=0.03, hspace=0.05))
        figure.suptitle(title, fontsize=11)
        grid = figure.add_gridspec(len(rows), columns, height_ratios=heights)
        for number, row in enumerate(rows):
            for column, block in enumerate(row):
                part = figure.add_subfigure(grid[number, column])
                panels = _panels(part, block.heights)
                block.draw(part, panels)
                part.align_ylabels(panels)
    return figure


def _panels(figure: Any, heights: Sequence[float]) -> list[Any]:
    """Axes below each other with one horizontal axis."""
    count = len(heights)
    parts = figure.add_gridspec(count, 1, height_ratios=heights, hspace=0.0)
    first = figure.add_subplot(parts[0])
    return [first, *(figure.add_subplot(parts[number], sharex=first) for number in range(1, count))]
