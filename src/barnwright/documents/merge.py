"""Merging an override into a request, key by key.

Variations, scans and ``--override`` all mean the same by it: tables are merged key by key; cuts, histograms, derived
quantities and variations by their names (a new name is added at the end, an empty list leaves none); everything else
is replaced. A key may be a path, ``beams.sqrt_s``, ``cuts.acceptance.max`` or ``cuts[0].max``; a part with dots in
it stands in quotes.
"""

from __future__ import annotations

import re
from collections.abc import Mapping, Sequence
from typing import Any

from barnwright.errors import RequestError, Violation, nearest, show

#: The lists whose entries are known by name.
NAMED = ("cuts", "histograms", "variations", "derived")

MOST_PARTS = 20
_PART = re.compile(r"""\s*(?:"([^"]*)"|'([^']*)'|\[(\d+)\]|([^.\["'\s]+))\s*(\.(?=.)|(?=\[)|$)""")


def split_key(key: str) -> tuple[str | int, ...]:
    """The parts of a path.

    ``'masses."mu-"'`` gives ``("masses", "mu-")``, ``cuts[0].max`` gives ``("cuts", 0, "max")``.

    Raises:
        RequestError: when the text is no path.
    """
    parts: list[str | int] = []
    position = 0
    while position < len(key) or not parts:
        match = _PART.match(key, position)
        if match is None or len(parts) >= MOST_PARTS:
            expected = "a path such as beams.sqrt_s or cuts[0].max; a part with dots in it stands in quotes"
            raise RequestError([Violation(key, show(key), expected, position=position)])
        word = next(part for part in match.group(1, 2, 3, 4) if part is not None)
        parts.append(int(word) if match.group(3) is not None else word)
        position = match.end()
    return tuple(parts)


def merge(request: Mapping[str, Any], override: Mapping[str, Any]) -> dict[str, Any]:
    """A new request dictionary with the override merged in; neither argument is changed.

    Raises:
        RequestError: when a path of the override leads nowhere (an entry of that number or name does not exist).
    """
    merged = dict(request)
    for key, value in override.items():
        merged = _assign(merged, split_key(key), value, "")
    return merged


def _assign(table: Mapping[str, Any], path: Sequence[str | int], value: Any, where: str) -> dict[str, Any]:
    head, rest = str(path[0]), path[1:]
    field = f"{where}.{head}" if where else head
    merged, old = dict(table), table.get(head)
    if not rest:
        merged[head] = _combine(head, old, value)
    elif isinstance(old, Sequence) and not isinstance(old, str):
        merged[head] = _assign_entry(head, list(old), rest, value, field)
    elif isinstance(rest[0], int):
        raise RequestError([Violation(f"{field}[{rest[0]}]", show(value), f"an entry that exists; {field} is no list")])
    else:
        merged[head] = _assign(old if isinstance(old, Mapping) else {}, rest, value, field)
    return merged


def _assign_entry(head: str, entries: list[Any], path: Sequence[str | int], value: Any, where: str) -> list[Any]:
    """The list with one entry, given by its number or name, changed."""
    key, rest = path[0], path[1:]
    names = [_name(head, entry, index) for index, entry in enumerate(entries)]
    index = key if isinstance(key, int) else names.index(key) if key in names else len(entries)
    if index >= len(entries):
        field = f"{where}[{key}]" if isinstance(key, int) else f"{where}.{key}"
        known = [name for name in names if isinstance(name, str)]
        expected = f"an entry that exists ({', '.join(known) or f'there are {len(entries)}'})"
        raise RequestError([Violation(field, show(value), expected, nearest(str(key), known))])
    entry = entries[index]
    if not rest:
        entries[index] = _combine("", entry, value)
    else:
        entries[index] = _assign(entry if isinstance(entry, Mapping) else {}, rest, value, f"{where}[{index}]")
    return entries


def _combine(head: str, old: Any, new: Any) -> Any:
    if isinstance(old, Mapping) and isinstance(new, Mapping):
        merged = dict(old)
        for key, value in new.items():
            merged[key] = _combine(key, merged.get(key), value)
        return merged
    if head in NAMED and _is_list(old) and _is_list(new) and new:
        return _combine_named(head, list(old), list(new))
    return new


def _is_list(value: Any) -> bool:
    return isinstance(value, (list, tuple))


def _combine_named(head: str, old: list[Any], new: list[Any]) -> list[Any]:
    names = [_name(head, entry, index) for index, entry in enumerate(old)]
    for entry in new:
        name = entry.get("name") if isinstance(entry, Mapping) else None
        if name is not None and name in names:
            index = names.index(name)
            old[index] = _combine("", old[index], entry)
        else:
            old.append(entry)
    return old


def _name(head: str, entry: Any, index: int) -> Any:
    """The name of an entry; a cut without one goes by its place."""
    name = entry.get("name") if isinstance(entry, Mapping) else None
    return f"cut-{index + 1}" if name is None and head == "cuts" else name
