"""Where an answer goes: files first, whole or not at all, then standard output."""

from __future__ import annotations

from collections.abc import Iterable
from typing import TYPE_CHECKING

from barnwright.cli.console import show_table, write_line
from barnwright.cli.options import Wish
from barnwright.cli.outcome import ExitCode
from barnwright.cli.tables import prediction_view
from barnwright.cli.writing import write_whole
from barnwright.plot import draw, encode

if TYPE_CHECKING:
    from barnwright.documents.prediction import Prediction


def exit_code(statuses: Iterable[str]) -> ExitCode:
    """0 when everything converged, else 1: the accuracy was not reached, or something is suspect."""
    return ExitCode.DONE if all(status == "converged" for status in statuses) else ExitCode.NOT_REACHED


def deliver_prediction(prediction: Prediction, wish: Wish) -> None:
    """Write the document and the picture that were asked for, then print the document or the table."""
    document = prediction.model_dump_json() if wish.output is not None or wish.as_json else ""
    if wish.output is not None:
        write_whole(wish.output, f"{document}\n".encode())
    if wish.plot is not None:
        write_whole(wish.plot, encode(draw(prediction), wish.plot.suffix))
    if wish.as_json:
        write_line(document)
    else:
        show_table(prediction_view(prediction))
