"""Findings that need more than one field: how a model states them and how they leave a validator.

A validator of one model collects its ``Finding`` objects and hands them to ``refuse``; ``findings.py`` turns them,
like everything else that pydantic reports, into violations with full field paths.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from typing import Any

from pydantic_core import PydanticCustomError

Path = tuple[str | int, ...]


class Shown(str):
    """A text that goes into a message as it is, without quotes: a count, or ``nothing``."""

    __slots__ = ()


#: Stands for a value that the document does not give.
NOTHING = Shown("nothing")


@dataclass(frozen=True, slots=True)
class Finding:
    """One finding of a model about its own fields.

    ``field`` is the path below the model, ``of`` says which fields were looked at (names, or paths of more than one
    part): where one of these is already known to be wrong, the finding is left out, since it may only follow from it.
    """

    field: Path
    value: Any
    expected: str
    nearest: str | None = None
    of: tuple[str | Path, ...] = ()


def refuse(findings: Sequence[Finding]) -> None:
    """Raise the error that carries the findings out of a pydantic validator; nothing when there are none."""
    if findings:
        raise PydanticCustomError("findings", "fields that do not fit together", {"findings": tuple(findings)})


def exactly_one(given: Iterable[str], choices: Sequence[str], *, at_most: bool = False) -> list[Finding]:
    """Finding when not exactly one of the named fields is given (or, with ``at_most``, more than one)."""
    names = [name for name in choices if name in set(given)]
    if len(names) == 1 or (at_most and not names):
        return []
    listed = f"{', '.join(choices[:-1])} and {choices[-1]}"
    if names:
        expected = f"{'at most' if at_most else 'exactly'} one of {listed}"
        return [Finding((names[-1],), Shown(f"{' and '.join(names)} together"), expected, of=tuple(choices))]
    return [Finding((choices[0],), NOTHING, f"exactly one of {listed}", of=tuple(choices))]


def repeated(names: Sequence[str], path: Path, last: str | None = "name") -> list[Finding]:
    """One finding for every name that an earlier entry of the list already has."""
    if len(set(names)) == len(names):
        return []
    found, seen = [], dict[str, int]()
    tail = () if last is None else (last,)
    for index, name in enumerate(names):
        if name in seen:
            where, before = (*path, index, *tail), (*path, seen[name], *tail)
            expected = f"a name that {path[-1]}[{seen[name]}] does not have already"
            found.append(Finding(where, name, expected, of=(where, before)))
        seen.setdefault(name, index)
    return found
