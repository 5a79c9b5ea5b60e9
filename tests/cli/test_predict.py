"""barnwright predict: tables, documents, files, exit codes; the calculation itself is stood in for."""

from __future__ import annotations

import json
import os
import signal
from collections.abc import Callable
from pathlib import Path

import pytest

from barnwright import CalculationError, PluginError, Prediction, RequestError, ServerError, Violation
from barnwright.cli import main

Install = Callable[..., None]


def test_table_for_people(request_file: str, answering: Install, capsys: pytest.CaptureFixture[str]) -> None:
    """The table has the total in text form, status, notes, and every bin; what may differ between runs is left out."""
    answering()
    assert main(["predict", request_file]) == 0
    shown = capsys.readouterr().out
    for text in ("84.32(7) pb", "converged", "quadrature", "sqrt_s lies above the range of validity (above_range)"):
        assert text in shown
    assert "[-1, 0)" in shown
    assert "[0, 1]" in shown
    assert "42.00(30)" in shown
    assert "overflow" in shown
    assert "underflow" not in shown
    assert "2026" not in shown


def test_json_is_the_document(request_file: str, answering: Install, capsys: pytest.CaptureFixture[str]) -> None:
    """--json prints the prediction document in one line, and nothing else."""
    answering()
    assert main(["predict", request_file, "--json"]) == 0
    shown = capsys.readouterr()
    assert Prediction.from_json(shown.out).total.value == 84.321
    assert shown.out.count("\n") == 1
    assert shown.err == ""


def test_override_reaches_the_request(
    request_file: str, answering: Install, capsys: pytest.CaptureFixture[str]
) -> None:
    """Overrides are merged in the order they are given."""
    answering()
    words = ["predict", request_file, "--json", "--override", "beams.sqrt_s=20", "--override", "cuts[0].max=0.5"]
    assert main(words) == 0
    asked = json.loads(capsys.readouterr().out)["request"]
    assert (asked["beams"]["sqrt_s"], asked["cuts"][0]["max"]) == (20.0, 0.5)


def test_output_and_plot(request_file: str, answering: Install, tmp_path: Path) -> None:
    """--output holds the document that --json prints, --plot a picture of the kind its name says."""
    answering()
    output, plot = tmp_path / "out.json", tmp_path / "angle.svg"
    assert main(["predict", request_file, "--output", str(output), "--plot", str(plot)]) == 0
    assert Prediction.from_json(output.read_text()).status == "converged"
    assert plot.read_bytes().startswith(b"<?xml")


def test_picture_needs_a_histogram(answering: Install, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """A picture of a request without histograms is refused before any work."""
    answering(error=AssertionError("calculated"))
    file = tmp_path / "total.json"
    file.write_text('{"process": "qed/muon-pair", "beams": {"kind": "collider", "sqrt_s": 10.0}}')
    assert main(["predict", str(file), "--plot", str(tmp_path / "a.png")]) == 2
    assert capsys.readouterr().err == (
        "histograms: got nothing, expected at least one histogram, since a picture is wanted\n"
    )


@pytest.mark.parametrize(("status", "code"), [("evaluation_limit", 1), ("time_limit", 1), ("suspect", 1)])
def test_accuracy_not_reached_is_exit_code_1(request_file: str, answering: Install, status: str, code: int) -> None:
    """A result that did not converge is printed, and the exit code says so."""
    answering(status=status)
    assert main(["predict", request_file]) == code


TWO = [Violation("unit", "'pp'", "an area", "pb"), Violation("seed", "-1", "a whole number")]


@pytest.mark.parametrize(
    ("error", "code", "text"),
    [
        (
            RequestError(TWO),
            2,
            "unit: got 'pp', expected an area; nearest: pb\nseed: got -1, expected a whole number\n",
        ),
        (PluginError("barnwright-qed", "qed/x", "broken"), 3, "plugin barnwright-qed, process qed/x: broken\n"),
        (CalculationError("no round was complete"), 3, "no round was complete\n"),
        (ServerError("the server is away", "UNAVAILABLE"), 3, "the server is away\n"),
        (KeyboardInterrupt(), 130, "interrupted\n"),
        (KeyboardInterrupt("interrupted while qed/x was checked"), 130, "interrupted while qed/x was checked\n"),
        (ZeroDivisionError("division by zero"), 3, "a fault in barnwright: ZeroDivisionError: division by zero"),
    ],
)
def test_errors_are_lines_and_exit_codes(
    request_file: str,
    answering: Install,
    capsys: pytest.CaptureFixture[str],
    error: BaseException,
    code: int,
    text: str,
) -> None:
    """Every kind of error has its exit code and its text on standard error, never a traceback."""
    answering(error=error)
    assert main(["predict", request_file]) == code
    shown = capsys.readouterr()
    assert shown.err.startswith(text)
    assert "Traceback" not in shown.err
    assert shown.out == ""


def test_failed_prediction_leaves_the_old_output(request_file: str, answering: Install, tmp_path: Path) -> None:
    """A file of an earlier prediction is not touched by one that fails."""
    output = tmp_path / "out.json"
    output.write_text("old")
    answering(error=CalculationError("no"))
    assert main(["predict", request_file, "--output", str(output)]) == 3
    assert output.read_text() == "old"


def test_interrupt_that_a_calculation_survives_is_told(
    request_file: str, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    """Where a calculation ends in its own way after Ctrl-C, its text is printed and the exit code is still 130."""

    def predict(_: object) -> None:
        try:
            os.kill(os.getpid(), signal.SIGINT)
        except KeyboardInterrupt:
            raise CalculationError("cancelled before the first round") from None

    monkeypatch.setattr("barnwright.api.predict", predict)
    assert main(["predict", request_file]) == 130
    assert capsys.readouterr().err == "cancelled before the first round\n"
    assert signal.getsignal(signal.SIGINT) is signal.default_int_handler


@pytest.mark.parametrize(
    ("words", "text"),
    [
        (["predict"], "Missing argument"),
        (["predict", "a.toml", "--overide", "x=1"], "No such option"),
        (["prdict"], "No such command"),
        ([], "Usage: barnwright"),
    ],
)
def test_wrong_words_are_exit_code_2(words: list[str], text: str, capsys: pytest.CaptureFixture[str]) -> None:
    """A command line that cannot be read ends with 2 and says what is wrong."""
    assert main(words) == 2
    shown = capsys.readouterr()
    assert text in shown.err + shown.out


def test_all_findings_of_a_wrong_request(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """Each finding is one line on standard error."""
    file = tmp_path / "wrong.toml"
    file.write_text('process = "qed/muon-pair"\nsed = 2\n[beams]\nkind = "collider"\nsqrt_s = -1.0\n')
    assert main(["predict", str(file)]) == 2
    lines = capsys.readouterr().err.splitlines()
    assert [line.partition(":")[0] for line in lines] == ["beams.sqrt_s", "sed"]
