"""From documents to messages."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any, TypeVar

from google.protobuf.message import Message

from barnwright.wire.numbers import pack
from barnwright.wire.shapes import ABSENT, ENTRIES, FieldShape, Form, Shape, shape_of

M = TypeVar("M", bound=Message)


def encode(document: Mapping[str, Any], kind: type[M]) -> M:
    """The message of this kind that holds a document of plain values; None and what is left out are not set.

    Where the difference matters, the message names the keys that are None.

    Raises:
        ValueError: when the document has a key that the message lacks, or a value that it cannot carry; the text
            names the path.
    """
    return kind(**_table(document, shape_of(kind.DESCRIPTOR), ""))


def _table(document: Mapping[str, Any], shape: Shape, path: str) -> dict[str, Any]:
    fields: dict[str, Any] = {}
    if shape.nulls and (nulls := [name for name, value in document.items() if value is None]):
        fields[ABSENT] = nulls
    for name, value in document.items():
        if value is None:
            continue
        field = shape.fields.get(name)
        where = f"{path}.{name}" if path else name
        if field is None:
            raise ValueError(f"{where}: the message has no such field")
        fields[name] = _field(value, field, where)
    return fields


def _field(value: Any, field: FieldShape, path: str) -> Any:
    shape = field.shape
    if field.mapped:
        if shape is None:
            return value
        return {key: shape.make(**_message(entry, shape, f"{path}.{key}")) for key, entry in value.items()}
    if shape is None:
        return int(value) if field.whole and isinstance(value, str) else value
    if field.single:
        return _message(value, shape, path)
    return [_message(entry, shape, f"{path}[{index}]") for index, entry in enumerate(value)]


def _message(value: Any, shape: Shape, path: str) -> dict[str, Any]:
    if shape.form is Form.TABLE:
        return _table(value, shape, path)
    if shape.form is Form.NUMBERS:
        return pack(value)
    if shape.form is Form.ENTRIES:
        return {ENTRIES: _field(value, shape.fields[ENTRIES], path)}
    kind = type(value) if type(value) in shape.kinds else float
    if not isinstance(value, (bool, int, float, str)) or (kind is float and isinstance(value, (bool, str))):
        raise ValueError(f"{path}: the message cannot carry {value!r}")
    return {shape.kinds[kind]: value}
