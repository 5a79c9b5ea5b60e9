"""Standard streams that the shell has closed are no fault of the request."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

EXAMPLE = Path(__file__).parents[2] / "examples" / "b_factory.toml"


@pytest.mark.parametrize(
    ("words", "closed", "code"),
    [(f"predict {EXAMPLE}", ">&-", 0), ("predict -", "<&-", 2), ("predict nowhere.toml", "2>&-", 2)],
)
def test_closed_streams(words: str, closed: str, code: int) -> None:
    """The exit code is that of the work, whichever stream is closed, and nothing is a fault in barnwright."""
    command = f"{sys.executable} -m barnwright {words} {closed}"
    done = subprocess.run(["bash", "-c", command], capture_output=True, text=True, check=False)
    assert done.returncode == code
    assert "a fault in barnwright" not in done.stderr
