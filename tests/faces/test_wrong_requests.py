"""Every wrong request gets the same complete answer in Python, on the command line and over gRPC."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from faces.wrong_requests import CASES, Case

import barnwright
from barnwright.cli import main

pytestmark = pytest.mark.timeout(30)
by_case = pytest.mark.parametrize("case", CASES, ids=lambda case: case.name)


def python_lines(case: Case) -> list[str]:
    """The lines that Python gives."""
    expected = barnwright.UnknownProcessError if case.kind == "unknown" else barnwright.RequestError
    with pytest.raises(expected, match=r".") as caught:
        barnwright.predict(case.request)
    return [str(violation) for violation in caught.value.violations]


def test_there_are_enough_of_them() -> None:
    """The table has at least sixty wrong requests, each with a name of its own."""
    assert len(CASES) >= 60
    assert len({case.name for case in CASES}) == len(CASES)


@by_case
def test_python(case: Case) -> None:
    """All findings and no others, each naming field, value, expectation and what is nearest."""
    lines = python_lines(case)
    assert sorted(line.split(": got ")[0] for line in lines) == sorted(field for field, _ in case.lines)
    for line, (_, fragments) in zip(sorted(lines), sorted(case.lines), strict=True):
        assert ", expected " in line
        assert len(line) < 1000
        for fragment in fragments:
            assert fragment in line


@by_case
def test_command_line(case: Case, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """Exit code 2, the same lines on the standard error, nothing on the standard output, no traceback."""
    file = tmp_path / "request.json"
    file.write_text(json.dumps(case.request).replace("Infinity", "1e999"))
    code = main(["predict", str(file)])
    output = capsys.readouterr()
    assert code == 2
    assert output.out == ""
    assert "Traceback" not in output.err
    for line in python_lines(case):
        assert line in output.err
