"""Results have a method ``plot``, and no row before the last knows the room that draws.

The package says who draws (`drawn_by`): its own file runs before that of any room, so every result finds the drawer,
also one that was unpickled in a fresh process. Nothing is loaded until a picture is asked for.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import TYPE_CHECKING, Any, Protocol

from barnwright.errors import BarnwrightError

if TYPE_CHECKING:
    from os import PathLike

    from matplotlib.figure import Figure


class Draw(Protocol):
    """Draws a prediction or a scan, and writes the picture where a path is given."""

    def __call__(self, result: Any, path: str | PathLike[str] | None, /) -> Figure:
        """The matplotlib figure."""


_loaders: list[Callable[[], Draw]] = []


def drawn_by(load: Callable[[], Draw]) -> None:
    """Say who draws; ``load`` is called when the first picture is asked for. The last word counts."""
    _loaders[:] = [load]


def picture(result: Any, path: str | PathLike[str] | None = None) -> Figure:
    """The figure of a result; written to a file where a path is given.

    Raises:
        BarnwrightError: when nobody draws; and what the drawer raises.
    """
    if not _loaders:
        raise BarnwrightError("nobody draws pictures here: the package barnwright has not said who does")
    return _loaders[0]()(result, path)
