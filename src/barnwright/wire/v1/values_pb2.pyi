from google.protobuf.internal import containers as _containers
from google.protobuf import descriptor as _descriptor
from google.protobuf import message as _message
from typing import ClassVar as _ClassVar, Iterable as _Iterable, Mapping as _Mapping, Optional as _Optional, Union as _Union

DESCRIPTOR: _descriptor.FileDescriptor

class ParameterValue(_message.Message):
    __slots__ = ("number", "integer", "boolean", "word")
    NUMBER_FIELD_NUMBER: _ClassVar[int]
    INTEGER_FIELD_NUMBER: _ClassVar[int]
    BOOLEAN_FIELD_NUMBER: _ClassVar[int]
    WORD_FIELD_NUMBER: _ClassVar[int]
    number: float
    integer: int
    boolean: bool
    word: str
    def __init__(self, number: _Optional[float] = ..., integer: _Optional[int] = ..., boolean: bool = ..., word: _Optional[str] = ...) -> None: ...

class NumberOrName(_message.Message):
    __slots__ = ("number", "word")
    NUMBER_FIELD_NUMBER: _ClassVar[int]
    WORD_FIELD_NUMBER: _ClassVar[int]
    number: float
    word: str
    def __init__(self, number: _Optional[float] = ..., word: _Optional[str] = ...) -> None: ...

class Numbers(_message.Message):
    __slots__ = ("shape", "values", "known")
    SHAPE_FIELD_NUMBER: _ClassVar[int]
    VALUES_FIELD_NUMBER: _ClassVar[int]
    KNOWN_FIELD_NUMBER: _ClassVar[int]
    shape: _containers.RepeatedScalarFieldContainer[int]
    values: _containers.RepeatedScalarFieldContainer[float]
    known: _containers.RepeatedScalarFieldContainer[bool]
    def __init__(self, shape: _Optional[_Iterable[int]] = ..., values: _Optional[_Iterable[float]] = ..., known: _Optional[_Iterable[bool]] = ...) -> None: ...

class Axis(_message.Message):
    __slots__ = ("entries",)
    ENTRIES_FIELD_NUMBER: _ClassVar[int]
    entries: _containers.RepeatedScalarFieldContainer[float]
    def __init__(self, entries: _Optional[_Iterable[float]] = ...) -> None: ...

class ParameterTable(_message.Message):
    __slots__ = ("entries",)
    class EntriesEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: ParameterValue
        def __init__(self, key: _Optional[str] = ..., value: _Optional[_Union[ParameterValue, _Mapping]] = ...) -> None: ...
    ENTRIES_FIELD_NUMBER: _ClassVar[int]
    entries: _containers.MessageMap[str, ParameterValue]
    def __init__(self, entries: _Optional[_Mapping[str, ParameterValue]] = ...) -> None: ...

class MassTable(_message.Message):
    __slots__ = ("entries",)
    class EntriesEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: float
        def __init__(self, key: _Optional[str] = ..., value: _Optional[float] = ...) -> None: ...
    ENTRIES_FIELD_NUMBER: _ClassVar[int]
    entries: _containers.ScalarMap[str, float]
    def __init__(self, entries: _Optional[_Mapping[str, float]] = ...) -> None: ...

class NumbersTable(_message.Message):
    __slots__ = ("entries",)
    class EntriesEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: Numbers
        def __init__(self, key: _Optional[str] = ..., value: _Optional[_Union[Numbers, _Mapping]] = ...) -> None: ...
    ENTRIES_FIELD_NUMBER: _ClassVar[int]
    entries: _containers.MessageMap[str, Numbers]
    def __init__(self, entries: _Optional[_Mapping[str, Numbers]] = ...) -> None: ...
