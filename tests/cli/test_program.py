"""The program as a process: pipes that close, standard input, the version."""

from __future__ import annotations

import os
import subprocess
import sys

BARNWRIGHT = [sys.executable, "-m", "barnwright"]


def test_version_and_help_start_quickly_and_pull_in_nothing_heavy() -> None:
    """--version answers without numpy; the module runs as a program."""
    code = "import sys; from barnwright.cli import main; main(['--version']); print('numpy' in sys.modules)"
    run = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, timeout=60, check=True)
    assert run.stdout == "barnwright 0.1.0\nFalse\n"


def test_reader_that_goes_away_is_exit_code_141() -> None:
    """A pipe that closes early ends the program quietly."""
    reader, writer = os.pipe()
    os.close(reader)
    words = [*BARNWRIGHT, "processes", "--json"]
    try:
        run = subprocess.run(words, stdout=writer, stderr=subprocess.PIPE, timeout=60, check=False)
    finally:
        os.close(writer)
    assert (run.returncode, run.stderr) == (141, b"")


def test_standard_input_that_is_no_request() -> None:
    """What is piped in is told from a request, on one line, with exit code 2."""
    run = subprocess.run(
        [*BARNWRIGHT, "predict", "-"], input="beams = [", capture_output=True, text=True, timeout=60, check=False
    )
    assert run.returncode == 2
    assert run.stderr.startswith("request: got 'beams = [', expected TOML text; ")
    assert len(run.stderr.splitlines()) == 1
