"""The command line: one file a command, and everything a person sees made in one place."""

from __future__ import annotations

import os
import sys
from collections.abc import Sequence
from pathlib import Path

__all__ = ["main"]


def main(argv: Sequence[str] | None = None) -> int:
    """Run the command line on these words (default: those of the process) and return the exit code.

    0 done; 1 accuracy not reached or suspect; 2 the request or the command is wrong; 3 machinery; 4 a check failed;
    130 interrupted; 141 the reader of our output went away. Errors are lines on standard error, never a traceback.
    """
    for name in ("stdout", "stderr"):
        if getattr(sys, name) is None:  # closed by the shell
            setattr(sys, name, Path(os.devnull).open("w", encoding="utf-8"))  # noqa: SIM115
    from barnwright.cli.app import app

    try:
        app(args=None if argv is None else list(argv), prog_name="barnwright")
    except SystemExit as end:
        return end.code if isinstance(end.code, int) else 0
    return 0
