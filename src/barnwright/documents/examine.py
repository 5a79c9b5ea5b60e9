"""All findings of a wrong request, at once.

Pydantic looks at how fields fit together only where each field by itself is good. So that one mistake does not hide
another, what was found wrong is taken out (or, where it is needed, replaced by something harmless), the rest is
looked at again, and findings that may only follow from what was taken out are dropped.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Any

from pydantic import BaseModel, ValidationError

from barnwright.documents.base import MAX_NAME
from barnwright.documents.checks import Path
from barnwright.documents.findings import Located, located, shortened, written
from barnwright.documents.remainder import Remainder
from barnwright.errors import RequestError, Violation

_ROUNDS = 12
_DEEPEST = 20
_TAG = "kind"

_BEAMS: dict[str, dict[str, Any]] = {
    "collider": {"kind": "collider", "sqrt_s": 1.0},
    "fixed_target": {"kind": "fixed_target", "energy": 1.0},
    "decay": {"kind": "decay"},
}
_ENTRIES: dict[str, dict[str, Any]] = {
    "cuts": {"observable": "x", "max": 1.0},
    "histograms": {"observables": ["x"], "bins": [{"count": 1, "low": 0.0, "high": 1.0}]},
    "derived": {"kind": "asymmetry", "observable": "x", "at": 0.0},
    "variations": {},
}


def plain(value: Any, depth: int = 0) -> Any:
    """The same values as Python's own: documents as tables, numpy's numbers and arrays as numbers and lists.

    What is nested deeper than any document stays as it is; it is refused where it stands.
    """
    if depth > _DEEPEST:
        return value
    if isinstance(value, BaseModel):
        return plain(value.model_dump(exclude_unset=True), depth)
    if isinstance(value, Mapping):
        return {key: plain(entry, depth + 1) for key, entry in value.items()}
    if isinstance(value, (list, tuple)):
        return [plain(entry, depth + 1) for entry in value]
    return value.tolist() if type(value).__module__ == "numpy" and hasattr(value, "tolist") else value


def examine(
    values: Any, error: ValidationError, model: type[BaseModel], validate: Callable[[Any], Any]
) -> RequestError:
    """The error with every violation of ``values``, which are used up; ``error`` is the first that was found."""
    kept: dict[Path, Violation] = {}
    taken: set[Path] = set()
    for _ in range(_ROUNDS):
        found = located(error, model)
        for entry in found:
            if not _follows(entry, taken):
                kept.setdefault(entry.path, entry.violation)
        done = [_take_out(values, entry, taken) for entry in found] if isinstance(values, dict) else []
        if not any(done):
            break
        try:
            whole = validate(values)
        except ValidationError as further:
            error = further
        else:
            return _refusal(kept, Remainder(whole, frozenset(written(path) for path in taken)))
    return _refusal(kept, None)


def _refusal(kept: Mapping[Path, Violation], remainder: Remainder | None) -> RequestError:
    error = RequestError(shortened(list(kept.values())))
    error.remainder = remainder
    return error


def _follows(entry: Located, taken: set[Path]) -> bool:
    """Whether the finding may only be a consequence of what was taken out."""
    looked_at = (entry.path, *entry.of)
    return any(path == known[: len(path)] or known == path[: len(known)] for path in looked_at for known in taken)


def _take_out(values: dict[str, Any], entry: Located, taken: set[Path]) -> bool:
    """Take the value of a finding out, or make its whole section harmless; False when neither can be done."""
    section = entry.path[:2] if len(entry.path) > 1 and isinstance(entry.path[1], int) else entry.path[:1]
    key = _key(entry.path, len(section))
    if entry.missing and _fill(values, entry.path, section):
        taken.add(entry.path)
        return True
    if not entry.missing and not entry.of and key not in taken and _delete(values, key):
        taken.update((entry.path, key))
        return True
    return _soothe(values, section, taken)


def _key(path: Path, least: int) -> Path:
    """The nearest key above a value: it can be taken out without moving its neighbours."""
    while len(path) > least and isinstance(path[-1], int):
        path = path[:-1]
    return path


def _fill(values: dict[str, Any], path: Path, section: Path) -> bool:
    """Give an entry of a list the one field that it lacks, where that says nothing about its other fields."""
    if len(section) != 2 or len(path) != 3 or path[2] == _TAG:
        return False
    harmless = {**_ENTRIES.get(str(path[0]), {}), "name": f"#{path[1]}"}
    entry = _at(values, section)
    if path[2] not in harmless or not isinstance(entry, dict) or path[2] in entry:
        return False
    entry[path[2]] = harmless[str(path[2])]
    return True


def _at(values: Any, path: Path) -> Any:
    """What stands at the path; None where something above it was taken out already, or replaced."""
    for part in path:
        try:
            values = values[part]
        except (KeyError, IndexError, TypeError):
            return None
    return values


def _delete(values: dict[str, Any], path: Path) -> bool:
    holder = _at(values, path[:-1])
    if not isinstance(holder, dict) or path[-1] not in holder:
        return False
    del holder[path[-1]]
    return True


def _soothe(values: dict[str, Any], section: Path, taken: set[Path]) -> bool:
    """Replace the section by something harmless that keeps the kind of beams, or the name of an entry."""
    head = str(section[0])
    holder = values.get(head)
    if head == "beams":
        kind = holder.get("kind") if isinstance(holder, Mapping) else None
        harmless = _BEAMS[kind if isinstance(kind, str) and kind in _BEAMS else "collider"]
        values[head] = _harmless(holder, harmless, "kind", section, taken)
    elif len(section) == 2 and head in _ENTRIES and isinstance(holder, list):
        index = int(section[1])
        harmless = {**_ENTRIES[head], "name": _name(holder[index]) or f"#{index}"}
        holder[index] = _harmless(holder[index], harmless, "name", section, taken)
    else:
        taken.add(section)
        return _delete(values, section)
    return True


def _name(entry: Any) -> str | None:
    name = entry.get("name") if isinstance(entry, Mapping) else None
    return name if isinstance(name, str) and 0 < len(name) <= MAX_NAME and name.isprintable() else None


def _harmless(old: Any, new: dict[str, Any], kept: str, section: Path, taken: set[Path]) -> dict[str, Any]:
    """The harmless table; taken out are all keys, but not the kept one where it is as it was."""
    keys = {*new, *old} if isinstance(old, Mapping) else {*new}
    if not isinstance(old, Mapping):
        taken.add(section)
    elif old.get(kept) == new[kept]:
        keys.discard(kept)
    taken.update((*section, key) for key in keys)
    return new
