"""What can go wrong, and how it is told: one finding is a `Violation`, and it is rendered here only.

Python, the command line and the server print the same lines. Every error of this file survives pickling, because
errors travel back from worker processes.
"""

from __future__ import annotations

from dataclasses import dataclass
from difflib import get_close_matches
from reprlib import Repr
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Iterable

_LONGEST = 80
_LONGEST_WORD = 200


@dataclass(frozen=True, slots=True)
class Violation:
    """One thing that is wrong with what somebody asked.

    Parameters
    ----------
    field
        Where: ``"beams.sqrt_s"``, ``"cuts[0].min"``.
    value
        The offending value as a person reads it, made by `show`.
    expected
        What would be right, with its unit: ``"a number greater than 0 (GeV)"``.
    nearest
        The nearest valid choice, ready to print; None when nothing is near.
    position
        The column in a text value, counted from 0; None when the value is no text. Printed counted from 1.
    """

    field: str
    value: str
    expected: str
    nearest: str | None = None
    position: int | None = None

    def __str__(self) -> str:
        column = "" if self.position is None else f" (at column {self.position + 1})"
        near = "" if self.nearest is None else f"; nearest: {self.nearest}"
        field = self.field if len(self.field) <= _LONGEST_WORD else f"{self.field[: _LONGEST_WORD - 1]}…"
        return f"{field}: got {self.value}{column}, expected {self.expected}{near}"


class BarnwrightError(Exception):
    """The root: everything that barnwright raises on purpose."""


class RequestError(BarnwrightError):
    """The request is wrong; `violations` holds every finding, not the first only.

    Parameters
    ----------
    violations
        The findings, in the order in which they are printed, one line each.

    Attributes
    ----------
    remainder
        What is left of a document when everything wrong is taken out, for checks that come later; None where nothing
        usable is left. It does not travel.
    """

    def __init__(self, violations: Iterable[Violation]) -> None:
        self.violations: tuple[Violation, ...] = tuple(violations)
        self.remainder: object | None = None
        super().__init__(self.violations)

    def __str__(self) -> str:
        return "\n".join(str(violation) for violation in self.violations)


class UnknownProcessError(RequestError):
    """The request names a process that no installed plugin offers."""


class PluginError(BarnwrightError):
    """A plugin cannot be loaded, or one of its laws broke its promise.

    Parameters
    ----------
    plugin
        The installed distribution, or ``""`` for an object or a formula that belongs to none.
    process
        The process, or ``""`` when the fault belongs to the plugin as a whole.
    cause
        What happened and what was expected, with the offending values.
    """

    def __init__(self, plugin: str, process: str, cause: str) -> None:
        self.plugin = plugin
        self.process = process
        self.cause = cause
        super().__init__(plugin, process, cause)

    def __str__(self) -> str:
        culprits = (("plugin", self.plugin), ("process", self.process))
        named = ", ".join(f"{kind} {name}" for kind, name in culprits if name)
        return f"{named}: {self.cause}" if named else self.cause


class CalculationError(BarnwrightError):
    """The request is right, but no answer came of it: tallies that contradict, no time for a first round, a stop."""


class ServerError(BarnwrightError):
    """The machinery failed, not the request: a server that is away, a worker that was lost.

    Parameters
    ----------
    message
        What happened and what to do about it.
    code
        The name of the status (``"UNAVAILABLE"``), or None.
    retry_after
        Seconds after which another attempt is worth while, or None.
    """

    def __init__(self, message: str, code: str | None = None, retry_after: float | None = None) -> None:
        self.message = message
        self.code = code
        self.retry_after = retry_after
        super().__init__(message, code, retry_after)

    def __str__(self) -> str:
        return self.message


class _Shortened(Repr):
    """A repr whose cost does not grow with the value: long lists, deep nests and huge numbers are cut."""

    def __init__(self) -> None:
        super().__init__()
        self.fillvalue = "…"
        self.maxlevel, self.maxlist, self.maxtuple, self.maxdict, self.maxset = 4, 12, 12, 12, 12
        self.maxstring = self.maxother = self.maxlong = _LONGEST

    def repr_int(self, x: int, level: int) -> str:
        """Digits of an int; hexadecimal beyond 200 bits, where decimal digits take quadratic time."""
        return super().repr_int(x, level) if x.bit_length() <= 200 else f"{hex(x >> (x.bit_length() - 64))}…"


_shortened = _Shortened()


def show(value: object) -> str:
    """The value as a person reads it in a message: like `repr`, on one line, at most 80 characters.

    A numpy number is shown as the number it is.
    """
    plain = value.item() if hasattr(value, "item") and getattr(value, "ndim", None) == 0 else value
    text = repr(plain[: _LONGEST + 1]) if isinstance(plain, str) else " ".join(_shortened.repr(plain).split())
    return text if len(text) <= _LONGEST else f"{text[: _LONGEST - 1]}…"


def nearest(word: str, choices: Iterable[str]) -> str | None:
    """The choice that reads most like the word, whatever its case; None when none is near.

    Parameters
    ----------
    word
        What somebody wrote.
    choices
        The valid ones.
    """
    if len(word) > _LONGEST_WORD:
        return None
    folded = {choice.casefold(): choice for choice in choices}
    close = get_close_matches(word.casefold(), folded, n=1)
    return folded[close[0]] if close else None
