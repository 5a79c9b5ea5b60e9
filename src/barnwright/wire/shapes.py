"""What the messages are, read off their descriptors once."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from enum import Enum, auto
from functools import lru_cache
from typing import Any

from google.protobuf.descriptor import Descriptor, FieldDescriptor
from google.protobuf.message import Message
from google.protobuf.message_factory import GetMessageClass

REQUEST_FILE = "barnwright/wire/v1/request.proto"
NUMBERS = "barnwright.wire.v1.Numbers"
VALUE = "value"
ENTRIES = "entries"
ABSENT = "absent"

_WHOLE = (
    FieldDescriptor.CPPTYPE_INT32,
    FieldDescriptor.CPPTYPE_INT64,
    FieldDescriptor.CPPTYPE_UINT32,
    FieldDescriptor.CPPTYPE_UINT64,
)


class Form(Enum):
    """What a message stands for."""

    TABLE = auto()  # its fields, by name
    VALUE = auto()  # the one value of its oneof
    ENTRIES = auto()  # the list or table of its one field
    NUMBERS = auto()  # a nested list of numbers, some unknown


@dataclass(frozen=True, slots=True)
class FieldShape:
    """One field: a single value, a list or a map of values; ``shape`` is that of a value that is a message."""

    name: str
    single: bool
    mapped: bool
    whole: bool
    shape: Shape | None


@dataclass(frozen=True, slots=True)
class Shape:
    """One kind of message.

    ``kinds`` are, for a value, the fields of its oneof by the Python type that each carries. ``sparse`` messages belong
    to the request: what they do not hold was not said, and is left to the defaults of the document. ``nulls``: a field
    of the message names the keys that are there and null.
    """

    form: Form
    make: Callable[..., Message]
    fields: dict[str, FieldShape]
    kinds: dict[type, str]
    sparse: bool
    nulls: bool


@lru_cache(maxsize=256)
def shape_of(descriptor: Descriptor) -> Shape:
    """The shape of a message, and of all messages in it."""
    return Shape(
        form=_form(descriptor),
        make=GetMessageClass(descriptor),
        fields={field.name: _field(field) for field in descriptor.fields},
        kinds={_python_type(field): field.name for field in descriptor.fields if field.containing_oneof is not None},
        sparse=descriptor.file.name == REQUEST_FILE,
        nulls=ABSENT in descriptor.fields_by_name,
    )


def _form(descriptor: Descriptor) -> Form:
    if descriptor.full_name == NUMBERS:
        return Form.NUMBERS
    if [oneof.name for oneof in descriptor.oneofs] == [VALUE]:
        return Form.VALUE
    return Form.ENTRIES if [field.name for field in descriptor.fields] == [ENTRIES] else Form.TABLE


def _field(field: FieldDescriptor) -> FieldShape:
    inner: Any = field.message_type
    mapped = inner is not None and inner.GetOptions().map_entry
    if mapped:
        inner = inner.fields_by_name["value"].message_type
    return FieldShape(
        name=field.name,
        single=field.has_presence,
        mapped=mapped,
        whole=field.cpp_type in _WHOLE,
        shape=None if inner is None else shape_of(inner),
    )


def _python_type(field: FieldDescriptor) -> type:
    if field.cpp_type in _WHOLE:
        return int
    types = {FieldDescriptor.CPPTYPE_BOOL: bool, FieldDescriptor.CPPTYPE_DOUBLE: float}
    return types.get(field.cpp_type, str)
