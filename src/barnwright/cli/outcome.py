"""Exit codes, and the one place where an exception becomes a line on standard error.

    0    done
    1    the accuracy was not reached, or the result is suspect
    2    the request, or the command itself, is wrong
    3    machinery: server away, plugin broken, a file that cannot be written, a fault of our own
    4    a check failed
    130  interrupted (128 + SIGINT, as a shell reports it)
    141  whoever read our output went away (128 + SIGPIPE)

A traceback is never shown; BARNWRIGHT_TRACEBACK=1 in the environment lets one through, for a report of a fault.
"""

from __future__ import annotations

import os
import signal
import sys
from collections.abc import Callable
from enum import IntEnum
from types import FrameType

import typer


class ExitCode(IntEnum):
    """What a command tells the shell."""

    DONE = 0
    NOT_REACHED = 1
    WRONG_REQUEST = 2
    MACHINERY = 3
    CHECK_FAILED = 4
    INTERRUPTED = 130
    READER_WENT_AWAY = 141


def run(action: Callable[[], ExitCode]) -> None:
    """Run one command's action and end with its exit code; errors are printed, one line per violation."""
    interrupts = Interrupts()
    try:
        with interrupts:
            code = action()
            sys.stdout.flush()
    except typer.Exit:
        raise
    except KeyboardInterrupt as interrupt:
        code = _say(str(interrupt) or "interrupted", ExitCode.INTERRUPTED)
    except BrokenPipeError:
        code = _forget_standard_output()
    except Exception as error:
        if os.environ.get("BARNWRIGHT_TRACEBACK"):
            raise
        code = explain(error)
    raise typer.Exit(int(ExitCode.INTERRUPTED if interrupts.happened else code))


class Interrupts:
    """Remembers that Ctrl-C was pressed, also where a calculation then ends in its own way with what it had."""

    def __init__(self) -> None:
        self.happened = False

    def __enter__(self) -> None:
        self._before = signal.getsignal(signal.SIGINT)
        if self._before is signal.default_int_handler:
            signal.signal(signal.SIGINT, self._note)

    def __exit__(self, *_: object) -> None:
        if self._before is signal.default_int_handler:
            signal.signal(signal.SIGINT, self._before)

    def _note(self, number: int, frame: FrameType | None) -> None:
        self.happened = True
        signal.default_int_handler(number, frame)


def explain(error: Exception) -> ExitCode:
    """Print an error for people on standard error and give its exit code."""
    from barnwright.errors import BarnwrightError, RequestError

    if isinstance(error, RequestError):
        return _say(str(error), ExitCode.WRONG_REQUEST)
    if isinstance(error, BarnwrightError):
        return _say(str(error), ExitCode.MACHINERY)
    if isinstance(error, OSError):
        return _say(f"{error.filename or 'input/output'}: {error.strerror or error}", ExitCode.MACHINERY)
    text = f"a fault in barnwright: {type(error).__name__}: {error} (BARNWRIGHT_TRACEBACK=1 shows where)"
    return _say(text, ExitCode.MACHINERY)


def _say(text: str, code: ExitCode) -> ExitCode:
    sys.stderr.write(f"{text}\n")
    return code


def _forget_standard_output() -> ExitCode:
    """Point standard output at nothing, so that the interpreter's last flush cannot fail too."""
    nowhere = os.open(os.devnull, os.O_WRONLY)
    os.dup2(nowhere, sys.stdout.fileno())
    os.close(nowhere)
    return ExitCode.READER_WENT_AWAY
