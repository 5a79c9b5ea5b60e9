"""Fields that we do not know."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from google.protobuf.message import Message
from google.protobuf.unknown_fields import UnknownFieldSet

from barnwright.errors import RequestError, Violation
from barnwright.wire.shapes import FieldShape, shape_of


def refuse_unknown(message: Message) -> None:
    """Look for fields that this version does not know, in the message and in all messages in it.

    Raises:
        RequestError: one violation for every message that has some.
    """
    if found := list(_unknown(message, "")):
        raise RequestError(found)


def _unknown(message: Message, path: str) -> Iterator[Violation]:
    fields_here = UnknownFieldSet(message)
    if len(fields_here):
        numbers = {fields_here[index].field_number for index in range(len(fields_here))}
        listed = ", ".join(map(str, sorted(numbers)[:10]))
        expected = f"only fields of {message.DESCRIPTOR.full_name} that this server knows"
        yield Violation(path or "message", f"field number {listed}", expected)
    fields = shape_of(message.DESCRIPTOR).fields
    for descriptor, value in message.ListFields():
        field = fields[descriptor.name]
        if field.shape is not None:
            for part, inner in _inner(value, field):
                yield from _unknown(inner, f"{path}.{field.name}{part}" if path else f"{field.name}{part}")


def _inner(value: Any, field: FieldShape) -> Iterator[tuple[str, Message]]:
    if field.mapped:
        yield from ((f".{key}", entry) for key, entry in value.items())
    elif field.single:
        yield "", value
    else:
        yield from ((f"[{index}]", entry) for index, entry in enumerate(value))
