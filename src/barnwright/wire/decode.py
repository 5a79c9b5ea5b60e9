"""From messages to documents."""

from __future__ import annotations

from typing import Any, TypeVar

from google.protobuf.message import DecodeError, Message

from barnwright.errors import RequestError, Violation, show
from barnwright.wire.numbers import unpack
from barnwright.wire.shapes import ABSENT, ENTRIES, VALUE, FieldShape, Form, Shape, shape_of
from barnwright.wire.unknown import refuse_unknown

M = TypeVar("M", bound=Message)


def parse(data: bytes, kind: type[M]) -> M:
    """The message of this kind that the bytes hold.

    Raises:
        RequestError: when they hold none, or one with fields that are not known here.
    """
    message = kind()
    try:
        message.ParseFromString(data)
    except DecodeError:
        expected = f"a message {kind.DESCRIPTOR.full_name}"
        raise RequestError([Violation("message", f"{len(data)} bytes", expected)]) from None
    refuse_unknown(message)
    return message


def decode(message: Message) -> dict[str, Any]:
    """The document that a message holds, as plain values.

    In messages of the request, what is not set (and what is empty) is left out, for the document to fill in. In all
    others what is not set is None, and an empty list or table is there.

    Raises:
        RequestError: when an array's lengths do not agree, a value has none of its kinds, or is null and set.
    """
    return _table(message, shape_of(message.DESCRIPTOR), "")


def _table(message: Any, shape: Shape, path: str) -> dict[str, Any]:
    if shape.sparse:
        said = {
            set_field.name: _field(value, shape.fields[set_field.name], _join(path, set_field.name))
            for set_field, value in message.ListFields()
        }
        return _with_nulls(said, path) if shape.nulls else said
    return {
        name: None
        if field.single and not message.HasField(name)
        else _field(getattr(message, name), field, _join(path, name))
        for name, field in shape.fields.items()
    }


def _with_nulls(said: dict[str, Any], path: str) -> dict[str, Any]:
    """The table with the keys that its message names as null."""
    nulls = said.pop(ABSENT, ())
    if twice := [name for name in nulls if name in said]:
        raise RequestError([Violation(_join(path, ABSENT), show(twice[0]), "the name of a field that is not set")])
    return {**said, **dict.fromkeys(nulls)}


def _field(value: Any, field: FieldShape, path: str) -> Any:
    shape = field.shape
    if field.mapped:
        if shape is None:
            return dict(value)
        return {key: _message(entry, shape, f"{path}.{key}") for key, entry in value.items()}
    if field.single:
        return value if shape is None else _message(value, shape, path)
    if shape is None:
        return list(value)
    return [_message(entry, shape, f"{path}[{index}]") for index, entry in enumerate(value)]


def _message(message: Any, shape: Shape, path: str) -> Any:
    if shape.form is Form.TABLE:
        return _table(message, shape, path)
    if shape.form is Form.NUMBERS:
        return unpack(message, path)
    if shape.form is Form.ENTRIES:
        return _field(getattr(message, ENTRIES), shape.fields[ENTRIES], path)
    chosen = message.WhichOneof(VALUE)
    if chosen is None:
        expected = f"a value: one of {', '.join(shape.kinds.values())}"
        raise RequestError([Violation(path, "nothing", expected)])
    return getattr(message, chosen)


def _join(path: str, name: str) -> str:
    return f"{path}.{name}" if path else name
