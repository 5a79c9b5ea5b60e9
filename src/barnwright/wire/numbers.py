"""Nested lists of numbers, None where one is not known, as flat packed lists."""

from __future__ import annotations

from collections.abc import Sequence
from math import prod
from typing import Any

from barnwright.errors import RequestError, Violation, show


def pack(numbers: Sequence[Any]) -> dict[str, Any]:
    """The fields of a ``Numbers`` message: shape (only where there are several dimensions), values, known."""
    shape: list[int] = []
    flat: Sequence[Any] = numbers
    while len(flat) and isinstance(flat[0], (list, tuple)):
        shape.append(len(flat) // prod(shape))
        flat = [entry for row in flat for entry in row]
    packed: dict[str, Any] = {"values": flat}
    if shape:
        packed["shape"] = [*shape, len(flat) // prod(shape)]
    if None in flat:
        packed["values"] = [0.0 if entry is None else entry for entry in flat]
        packed["known"] = [entry is not None for entry in flat]
    return packed


def unpack(message: Any, path: str) -> list[Any]:
    """The nested list of a ``Numbers`` message.

    Raises RequestError when its lengths do not agree.
    """
    values, known, shape = list(message.values), message.known, list(message.shape)
    if known:
        _check(path, "known", len(known), len(values))
        values = [value if is_known else None for value, is_known in zip(values, known, strict=True)]
    if shape:
        _check(path, "shape", prod(shape) if min(shape) >= 0 else -1, len(values))
    for length in reversed(shape[1:]):
        values = [values[start : start + length] for start in range(0, len(values), length)] if length else []
    return values


def _check(path: str, name: str, got: int, wanted: int) -> None:
    if got != wanted:
        field = f"{path}.{name}" if path else name
        raise RequestError([Violation(field, show(got), f"as many entries as values has, {wanted}")])
