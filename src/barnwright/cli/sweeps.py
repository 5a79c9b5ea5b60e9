"""Scans: the points of a grid with their predictions, as lines of JSON, as a table, as a picture."""

from __future__ import annotations

import json
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import product
from typing import TYPE_CHECKING, Any, Protocol

from rich.table import Table
from rich.text import Text

from barnwright.cli.console import show_table, write_line
from barnwright.cli.face import watched
from barnwright.cli.options import Wish
from barnwright.cli.tables import titled
from barnwright.cli.writing import write_whole
from barnwright.documents import Curves
from barnwright.plot import draw_scan, encode

if TYPE_CHECKING:
    from barnwright.documents.prediction import Prediction


class Sweep(Protocol):
    """What a scan gives: a prediction for every point, made when asked for."""

    def __getitem__(self, index: int, /) -> Prediction:
        """The prediction of a point, the first key slowest."""


@dataclass(frozen=True, slots=True)
class ScanPoint:
    """One point of the grid: the values of the keys that were varied, and what came out."""

    values: Mapping[str, Any]
    prediction: Prediction

    def line(self) -> str:
        """The point as one line of JSON; the prediction is the document itself, to the bit."""
        return f'{{"point":{json.dumps(dict(self.values))},"prediction":{self.prediction.model_dump_json()}}}'


def points_of(sweep: Sweep, over: Mapping[str, Sequence[Any]]) -> list[ScanPoint]:
    """Every point with its prediction, in the order of the grid, the first key slowest."""
    grid = [dict(zip(over, place, strict=True)) for place in product(*over.values())]
    return [ScanPoint(values, sweep[index]) for index, values in watched(list(enumerate(grid)), "making predictions")]


def deliver_points(points: Sequence[ScanPoint], over: Mapping[str, Sequence[Any]], wish: Wish) -> None:
    """Write the lines and the picture that were asked for, then print the lines or the table."""
    lines = [point.line() for point in points] if wish.output is not None or wish.as_json else []
    if wish.output is not None:
        write_whole(wish.output, "".join(f"{line}\n" for line in lines).encode())
    if wish.plot is not None:
        write_whole(wish.plot, _picture(points, over, wish.plot.suffix))
    if wish.as_json:
        for line in lines:
            write_line(line)
    else:
        show_table(scan_table(points))


def scan_table(points: Sequence[ScanPoint]) -> Table:
    """One row a point: the keys' values, the total, the derived quantities, the status."""
    first = points[0]
    derived = [entry.name for entry in first.prediction.derived]
    table = titled(first.prediction.title, (*first.values, "total", *derived, "status"))
    for point in points:
        table.add_row(*map(Text, _row(point, derived)))
    return table


def _row(point: ScanPoint, derived: Sequence[str]) -> Iterator[str]:
    for value in point.values.values():
        yield f"{value:.10g}" if isinstance(value, float) else str(value)
    yield str(point.prediction.total)
    for name in derived:
        yield str(point.prediction.derived[name]).removeprefix(f"{name} = ")
    yield point.prediction.status


def _picture(points: Sequence[ScanPoint], over: Mapping[str, Sequence[Any]], form: str) -> bytes:
    predictions = [point.prediction for point in points]
    curves = Curves.of(predictions, tuple(len(values) for values in over.values()))
    return encode(draw_scan(over, curves, predictions[0]), form)
