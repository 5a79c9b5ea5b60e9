"""barnwright scan: grids, lines of JSON, tables, pictures."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

import barnwright
from barnwright.cli import main

WORDS = ["--over", "beams.sqrt_s=10:20:3", "--over", "parameters.alpha=0.0073,0.0078"]


def test_table_has_a_row_a_point(request_file: str, capsys: pytest.CaptureFixture[str]) -> None:
    """The keys' values, the total and the status stand in a row for every point of the grid, the first key slowest."""
    assert main(["scan", request_file, *WORDS]) == 0
    rows = [line.split() for line in capsys.readouterr().out.splitlines() if line.endswith("converged")]
    assert [row[:2] for row in rows] == [[a, b] for a in ("10", "15", "20") for b in ("0.0073", "0.0078")]


def test_lines_of_json_hold_point_and_prediction(request_file: str, capsys: pytest.CaptureFixture[str]) -> None:
    """Each line has the values of the keys and the prediction that was asked for alone."""
    assert main(["scan", request_file, *WORDS, "--json"]) == 0
    lines = [json.loads(line) for line in capsys.readouterr().out.splitlines()]
    assert [line["point"]["beams.sqrt_s"] for line in lines] == [10.0, 10.0, 15.0, 15.0, 20.0, 20.0]
    alone = barnwright.predict(request_file, beams={"sqrt_s": 15.0}, parameters={"alpha": 0.0078})
    found = barnwright.Prediction.from_json(json.dumps(lines[3]["prediction"]))
    assert found.request == alone.request
    assert found.total.value == pytest.approx(alone.total.value, rel=1e-13)


def test_output_and_picture(request_file: str, tmp_path: Path) -> None:
    """--output holds the lines that --json prints; the picture is of the totals."""
    output, plot = tmp_path / "scan.jsonl", tmp_path / "curve.pdf"
    assert main(["scan", request_file, *WORDS, "--output", str(output), "--plot", str(plot)]) == 0
    assert len(output.read_text().splitlines()) == 6
    assert plot.read_bytes().startswith(b"%PDF")


@pytest.mark.parametrize(
    ("words", "text"),
    [
        (["--over", "beams.sqrt_s"], "over[0]: got 'beams.sqrt_s', expected KEY=VALUES"),
        (["--over", "beams.sqrts=1,2"], "beams.sqrts"),
        (["--over", "unit=1,2"], "over.unit: got 'unit'"),
        (["--over", 'parameters.alpha="a","b"', "--plot", "curve.png"], "expected numbers, since a picture is wanted"),
    ],
)
def test_wrong_axes(request_file: str, capsys: pytest.CaptureFixture[str], words: list[str], text: str) -> None:
    """A key that cannot be scanned is named, with exit code 2."""
    assert main(["scan", request_file, *words]) == 2
    shown = capsys.readouterr().err
    assert text in shown
    assert "Traceback" not in shown
