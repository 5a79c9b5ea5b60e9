"""The picture of any result, and the file that it is written to."""

from __future__ import annotations

from os import PathLike, fspath
from pathlib import Path
from typing import TYPE_CHECKING

from barnwright.documents import Prediction, Scanned
from barnwright.plot.backend import check_picture, encode
from barnwright.plot.prediction import draw
from barnwright.plot.scan import draw_scan

if TYPE_CHECKING:
    from matplotlib.figure import Figure


def picture(result: Prediction | Scanned, path: str | PathLike[str] | None = None, /) -> Figure:
    """The matplotlib figure of a prediction or a scan; written to ``path`` (png, pdf or svg) if one is given.

    Raises RequestError for a path that names no picture and for results that cannot be drawn, BarnwrightError when
    matplotlib (extra ``plot``) is missing, OSError when the file cannot be written.
    """
    if path is not None:
        check_picture(fspath(path), "path")
    figure = draw(result) if isinstance(result, Prediction) else draw_scan(result.over, result.curves, result[0])
    if path is not None:
        Path(path).write_bytes(encode(figure, Path(path).suffix))
    return figure
