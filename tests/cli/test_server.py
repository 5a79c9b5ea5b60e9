"""The same commands answered by a server; and `serve` itself as a program."""

from __future__ import annotations

import re
import signal
import subprocess
import sys
from collections.abc import Iterator

import pytest

from barnwright import Prediction
from barnwright.cli import main


@pytest.fixture(scope="module")
def server() -> Iterator[str]:
    """The address of a server that `barnwright serve` started on a free port."""
    words = [sys.executable, "-m", "barnwright", "serve", "--address", "127.0.0.1:0", "--workers", "1"]
    with subprocess.Popen(words, stdout=subprocess.PIPE, text=True) as process:
        assert process.stdout is not None
        said = re.search(r"127\.0\.0\.1:\d+", process.stdout.readline())
        assert said is not None
        yield said.group()
        process.send_signal(signal.SIGTERM)
        assert process.wait(timeout=30) == 0


def test_prediction_has_the_bits_of_the_local_one(
    server: str, request_file: str, capsys: pytest.CaptureFixture[str]
) -> None:
    """`predict --server` prints the document that `predict` prints, `run` apart."""
    assert main(["predict", request_file, "--json"]) == 0
    here = Prediction.from_json(capsys.readouterr().out)
    assert main(["predict", request_file, "--json", "--server", server]) == 0
    assert Prediction.from_json(capsys.readouterr().out).same_bits(here)


@pytest.mark.parametrize(
    "words",
    [
        ["scan", "FILE", "--over", "beams.sqrt_s=10:20:3"],
        ["processes"],
        ["describe", "qed/compton"],
        ["describe", "qed/compto"],
        ["predict", "FILE", "--override", "beams.sqrt_s=-1", "--override", "parameters.alfa=1"],
    ],
)
def test_commands_say_the_same(
    words: list[str], server: str, request_file: str, capsys: pytest.CaptureFixture[str]
) -> None:
    """Tables, errors and exit codes are those of the local command."""
    words = [request_file if word == "FILE" else word for word in words]
    here = (main(words), *capsys.readouterr())
    there = (main([*words, "--server", server]), *capsys.readouterr())
    assert there == here


def test_absent_server_is_exit_code_3(capsys: pytest.CaptureFixture[str]) -> None:
    """A server that is away is machinery, said in one line."""
    assert main(["processes", "--server", "127.0.0.1:1"]) == 3
    assert len(capsys.readouterr().err.splitlines()) == 1


def test_wrong_address_is_exit_code_2(capsys: pytest.CaptureFixture[str]) -> None:
    """What is no address, and one that others can reach without --insecure, is refused."""
    assert main(["serve", "--address", "nowhere"]) == 2
    assert main(["serve", "--address", "0.0.0.0:50551"]) == 2
    assert "Traceback" not in capsys.readouterr().err
