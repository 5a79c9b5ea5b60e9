from barnwright.wire.v1 import values_pb2 as _values_pb2
from google.protobuf.internal import containers as _containers
from google.protobuf import descriptor as _descriptor
from google.protobuf import message as _message
from typing import ClassVar as _ClassVar, Iterable as _Iterable, Mapping as _Mapping, Optional as _Optional, Union as _Union

DESCRIPTOR: _descriptor.FileDescriptor

class ProcessSummary(_message.Message):
    __slots__ = ("name", "plugin", "distribution", "version", "reaction", "summary", "order", "broken", "kinds")
    NAME_FIELD_NUMBER: _ClassVar[int]
    PLUGIN_FIELD_NUMBER: _ClassVar[int]
    DISTRIBUTION_FIELD_NUMBER: _ClassVar[int]
    VERSION_FIELD_NUMBER: _ClassVar[int]
    REACTION_FIELD_NUMBER: _ClassVar[int]
    SUMMARY_FIELD_NUMBER: _ClassVar[int]
    ORDER_FIELD_NUMBER: _ClassVar[int]
    BROKEN_FIELD_NUMBER: _ClassVar[int]
    KINDS_FIELD_NUMBER: _ClassVar[int]
    name: str
    plugin: str
    distribution: str
    version: str
    reaction: str
    summary: str
    order: str
    broken: str
    kinds: _containers.RepeatedScalarFieldContainer[str]
    def __init__(self, name: _Optional[str] = ..., plugin: _Optional[str] = ..., distribution: _Optional[str] = ..., version: _Optional[str] = ..., reaction: _Optional[str] = ..., summary: _Optional[str] = ..., order: _Optional[str] = ..., broken: _Optional[str] = ..., kinds: _Optional[_Iterable[str]] = ...) -> None: ...

class Condition(_message.Message):
    __slots__ = ("name", "values")
    NAME_FIELD_NUMBER: _ClassVar[int]
    VALUES_FIELD_NUMBER: _ClassVar[int]
    name: str
    values: _containers.RepeatedCompositeFieldContainer[_values_pb2.ParameterValue]
    def __init__(self, name: _Optional[str] = ..., values: _Optional[_Iterable[_Union[_values_pb2.ParameterValue, _Mapping]]] = ...) -> None: ...

class Alternative(_message.Message):
    __slots__ = ("name", "values")
    class ValuesEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: _values_pb2.ParameterValue
        def __init__(self, key: _Optional[str] = ..., value: _Optional[_Union[_values_pb2.ParameterValue, _Mapping]] = ...) -> None: ...
    NAME_FIELD_NUMBER: _ClassVar[int]
    VALUES_FIELD_NUMBER: _ClassVar[int]
    name: str
    values: _containers.MessageMap[str, _values_pb2.ParameterValue]
    def __init__(self, name: _Optional[str] = ..., values: _Optional[_Mapping[str, _values_pb2.ParameterValue]] = ...) -> None: ...

class ParameterDescription(_message.Message):
    __slots__ = ("name", "type", "choices", "unit", "default", "meaning", "source", "required", "used_with")
    NAME_FIELD_NUMBER: _ClassVar[int]
    TYPE_FIELD_NUMBER: _ClassVar[int]
    CHOICES_FIELD_NUMBER: _ClassVar[int]
    UNIT_FIELD_NUMBER: _ClassVar[int]
    DEFAULT_FIELD_NUMBER: _ClassVar[int]
    MEANING_FIELD_NUMBER: _ClassVar[int]
    SOURCE_FIELD_NUMBER: _ClassVar[int]
    REQUIRED_FIELD_NUMBER: _ClassVar[int]
    USED_WITH_FIELD_NUMBER: _ClassVar[int]
    name: str
    type: str
    choices: _containers.RepeatedScalarFieldContainer[str]
    unit: str
    default: _values_pb2.ParameterValue
    meaning: str
    source: str
    required: bool
    used_with: _containers.RepeatedCompositeFieldContainer[Condition]
    def __init__(self, name: _Optional[str] = ..., type: _Optional[str] = ..., choices: _Optional[_Iterable[str]] = ..., unit: _Optional[str] = ..., default: _Optional[_Union[_values_pb2.ParameterValue, _Mapping]] = ..., meaning: _Optional[str] = ..., source: _Optional[str] = ..., required: bool = ..., used_with: _Optional[_Iterable[_Union[Condition, _Mapping]]] = ...) -> None: ...

class ProcessDescription(_message.Message):
    __slots__ = ("name", "plugin", "distribution", "version", "reaction", "summary", "order", "broken", "laws", "parameters", "masses", "contributions", "derived", "singular", "validity", "sqrt_s_min", "sqrt_s_max", "cautions", "references", "observables", "request", "kinds", "signed_contributions", "polarised_beams", "closing_cuts", "claims", "alternatives")
    class MassesEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: float
        def __init__(self, key: _Optional[str] = ..., value: _Optional[float] = ...) -> None: ...
    NAME_FIELD_NUMBER: _ClassVar[int]
    PLUGIN_FIELD_NUMBER: _ClassVar[int]
    DISTRIBUTION_FIELD_NUMBER: _ClassVar[int]
    VERSION_FIELD_NUMBER: _ClassVar[int]
    REACTION_FIELD_NUMBER: _ClassVar[int]
    SUMMARY_FIELD_NUMBER: _ClassVar[int]
    ORDER_FIELD_NUMBER: _ClassVar[int]
    BROKEN_FIELD_NUMBER: _ClassVar[int]
    LAWS_FIELD_NUMBER: _ClassVar[int]
    PARAMETERS_FIELD_NUMBER: _ClassVar[int]
    MASSES_FIELD_NUMBER: _ClassVar[int]
    CONTRIBUTIONS_FIELD_NUMBER: _ClassVar[int]
    DERIVED_FIELD_NUMBER: _ClassVar[int]
    SINGULAR_FIELD_NUMBER: _ClassVar[int]
    VALIDITY_FIELD_NUMBER: _ClassVar[int]
    SQRT_S_MIN_FIELD_NUMBER: _ClassVar[int]
    SQRT_S_MAX_FIELD_NUMBER: _ClassVar[int]
    CAUTIONS_FIELD_NUMBER: _ClassVar[int]
    REFERENCES_FIELD_NUMBER: _ClassVar[int]
    OBSERVABLES_FIELD_NUMBER: _ClassVar[int]
    REQUEST_FIELD_NUMBER: _ClassVar[int]
    KINDS_FIELD_NUMBER: _ClassVar[int]
    SIGNED_CONTRIBUTIONS_FIELD_NUMBER: _ClassVar[int]
    POLARISED_BEAMS_FIELD_NUMBER: _ClassVar[int]
    CLOSING_CUTS_FIELD_NUMBER: _ClassVar[int]
    CLAIMS_FIELD_NUMBER: _ClassVar[int]
    ALTERNATIVES_FIELD_NUMBER: _ClassVar[int]
    name: str
    plugin: str
    distribution: str
    version: str
    reaction: str
    summary: str
    order: str
    broken: str
    laws: _containers.RepeatedScalarFieldContainer[str]
    parameters: _containers.RepeatedCompositeFieldContainer[ParameterDescription]
    masses: _containers.ScalarMap[str, float]
    contributions: _containers.RepeatedScalarFieldContainer[str]
    derived: _containers.RepeatedScalarFieldContainer[str]
    singular: _containers.RepeatedScalarFieldContainer[str]
    validity: str
    sqrt_s_min: float
    sqrt_s_max: float
    cautions: _containers.RepeatedScalarFieldContainer[str]
    references: _containers.RepeatedScalarFieldContainer[str]
    observables: _containers.RepeatedScalarFieldContainer[str]
    request: str
    kinds: _containers.RepeatedScalarFieldContainer[str]
    signed_contributions: _containers.RepeatedScalarFieldContainer[str]
    polarised_beams: _containers.RepeatedScalarFieldContainer[str]
    closing_cuts: _containers.RepeatedScalarFieldContainer[str]
    claims: _containers.RepeatedScalarFieldContainer[str]
    alternatives: _containers.RepeatedCompositeFieldContainer[Alternative]
    def __init__(self, name: _Optional[str] = ..., plugin: _Optional[str] = ..., distribution: _Optional[str] = ..., version: _Optional[str] = ..., reaction: _Optional[str] = ..., summary: _Optional[str] = ..., order: _Optional[str] = ..., broken: _Optional[str] = ..., laws: _Optional[_Iterable[str]] = ..., parameters: _Optional[_Iterable[_Union[ParameterDescription, _Mapping]]] = ..., masses: _Optional[_Mapping[str, float]] = ..., contributions: _Optional[_Iterable[str]] = ..., derived: _Optional[_Iterable[str]] = ..., singular: _Optional[_Iterable[str]] = ..., validity: _Optional[str] = ..., sqrt_s_min: _Optional[float] = ..., sqrt_s_max: _Optional[float] = ..., cautions: _Optional[_Iterable[str]] = ..., references: _Optional[_Iterable[str]] = ..., observables: _Optional[_Iterable[str]] = ..., request: _Optional[str] = ..., kinds: _Optional[_Iterable[str]] = ..., signed_contributions: _Optional[_Iterable[str]] = ..., polarised_beams: _Optional[_Iterable[str]] = ..., closing_cuts: _Optional[_Iterable[str]] = ..., claims: _Optional[_Iterable[str]] = ..., alternatives: _Optional[_Iterable[_Union[Alternative, _Mapping]]] = ...) -> None: ...
