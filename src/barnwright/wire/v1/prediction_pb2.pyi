from barnwright.wire.v1 import request_pb2 as _request_pb2
from barnwright.wire.v1 import values_pb2 as _values_pb2
from google.protobuf.internal import containers as _containers
from google.protobuf import descriptor as _descriptor
from google.protobuf import message as _message
from typing import ClassVar as _ClassVar, Iterable as _Iterable, Mapping as _Mapping, Optional as _Optional, Union as _Union

DESCRIPTOR: _descriptor.FileDescriptor

class Prediction(_message.Message):
    __slots__ = ("schema", "request", "status", "method", "order", "scheme", "notes", "total", "histograms", "derived", "contributions", "processes", "variations", "parameters", "masses", "constants", "sources", "versions", "source_digests", "environment", "replicates", "diagnostics", "run")
    class ParametersEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: _values_pb2.ParameterValue
        def __init__(self, key: _Optional[str] = ..., value: _Optional[_Union[_values_pb2.ParameterValue, _Mapping]] = ...) -> None: ...
    class MassesEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: float
        def __init__(self, key: _Optional[str] = ..., value: _Optional[float] = ...) -> None: ...
    class ConstantsEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: float
        def __init__(self, key: _Optional[str] = ..., value: _Optional[float] = ...) -> None: ...
    class SourcesEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: str
        def __init__(self, key: _Optional[str] = ..., value: _Optional[str] = ...) -> None: ...
    class VersionsEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: str
        def __init__(self, key: _Optional[str] = ..., value: _Optional[str] = ...) -> None: ...
    class SourceDigestsEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: str
        def __init__(self, key: _Optional[str] = ..., value: _Optional[str] = ...) -> None: ...
    SCHEMA_FIELD_NUMBER: _ClassVar[int]
    REQUEST_FIELD_NUMBER: _ClassVar[int]
    STATUS_FIELD_NUMBER: _ClassVar[int]
    METHOD_FIELD_NUMBER: _ClassVar[int]
    ORDER_FIELD_NUMBER: _ClassVar[int]
    SCHEME_FIELD_NUMBER: _ClassVar[int]
    NOTES_FIELD_NUMBER: _ClassVar[int]
    TOTAL_FIELD_NUMBER: _ClassVar[int]
    HISTOGRAMS_FIELD_NUMBER: _ClassVar[int]
    DERIVED_FIELD_NUMBER: _ClassVar[int]
    CONTRIBUTIONS_FIELD_NUMBER: _ClassVar[int]
    PROCESSES_FIELD_NUMBER: _ClassVar[int]
    VARIATIONS_FIELD_NUMBER: _ClassVar[int]
    PARAMETERS_FIELD_NUMBER: _ClassVar[int]
    MASSES_FIELD_NUMBER: _ClassVar[int]
    CONSTANTS_FIELD_NUMBER: _ClassVar[int]
    SOURCES_FIELD_NUMBER: _ClassVar[int]
    VERSIONS_FIELD_NUMBER: _ClassVar[int]
    SOURCE_DIGESTS_FIELD_NUMBER: _ClassVar[int]
    ENVIRONMENT_FIELD_NUMBER: _ClassVar[int]
    REPLICATES_FIELD_NUMBER: _ClassVar[int]
    DIAGNOSTICS_FIELD_NUMBER: _ClassVar[int]
    RUN_FIELD_NUMBER: _ClassVar[int]
    schema: str
    request: _request_pb2.Request
    status: str
    method: str
    order: str
    scheme: str
    notes: _containers.RepeatedCompositeFieldContainer[Note]
    total: Total
    histograms: _containers.RepeatedCompositeFieldContainer[Histogram]
    derived: _containers.RepeatedCompositeFieldContainer[Derived]
    contributions: _containers.RepeatedCompositeFieldContainer[Part]
    processes: _containers.RepeatedCompositeFieldContainer[Part]
    variations: _containers.RepeatedCompositeFieldContainer[Part]
    parameters: _containers.MessageMap[str, _values_pb2.ParameterValue]
    masses: _containers.ScalarMap[str, float]
    constants: _containers.ScalarMap[str, float]
    sources: _containers.ScalarMap[str, str]
    versions: _containers.ScalarMap[str, str]
    source_digests: _containers.ScalarMap[str, str]
    environment: str
    replicates: _values_pb2.Numbers
    diagnostics: Diagnostics
    run: Run
    def __init__(self, schema: _Optional[str] = ..., request: _Optional[_Union[_request_pb2.Request, _Mapping]] = ..., status: _Optional[str] = ..., method: _Optional[str] = ..., order: _Optional[str] = ..., scheme: _Optional[str] = ..., notes: _Optional[_Iterable[_Union[Note, _Mapping]]] = ..., total: _Optional[_Union[Total, _Mapping]] = ..., histograms: _Optional[_Iterable[_Union[Histogram, _Mapping]]] = ..., derived: _Optional[_Iterable[_Union[Derived, _Mapping]]] = ..., contributions: _Optional[_Iterable[_Union[Part, _Mapping]]] = ..., processes: _Optional[_Iterable[_Union[Part, _Mapping]]] = ..., variations: _Optional[_Iterable[_Union[Part, _Mapping]]] = ..., parameters: _Optional[_Mapping[str, _values_pb2.ParameterValue]] = ..., masses: _Optional[_Mapping[str, float]] = ..., constants: _Optional[_Mapping[str, float]] = ..., sources: _Optional[_Mapping[str, str]] = ..., versions: _Optional[_Mapping[str, str]] = ..., source_digests: _Optional[_Mapping[str, str]] = ..., environment: _Optional[str] = ..., replicates: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ..., diagnostics: _Optional[_Union[Diagnostics, _Mapping]] = ..., run: _Optional[_Union[Run, _Mapping]] = ...) -> None: ...

class Total(_message.Message):
    __slots__ = ("value", "error", "unit", "error_kind", "degrees_of_freedom", "upper_bound", "confidence")
    VALUE_FIELD_NUMBER: _ClassVar[int]
    ERROR_FIELD_NUMBER: _ClassVar[int]
    UNIT_FIELD_NUMBER: _ClassVar[int]
    ERROR_KIND_FIELD_NUMBER: _ClassVar[int]
    DEGREES_OF_FREEDOM_FIELD_NUMBER: _ClassVar[int]
    UPPER_BOUND_FIELD_NUMBER: _ClassVar[int]
    CONFIDENCE_FIELD_NUMBER: _ClassVar[int]
    value: float
    error: float
    unit: str
    error_kind: str
    degrees_of_freedom: float
    upper_bound: float
    confidence: float
    def __init__(self, value: _Optional[float] = ..., error: _Optional[float] = ..., unit: _Optional[str] = ..., error_kind: _Optional[str] = ..., degrees_of_freedom: _Optional[float] = ..., upper_bound: _Optional[float] = ..., confidence: _Optional[float] = ...) -> None: ...

class Histogram(_message.Message):
    __slots__ = ("name", "observables", "axis_units", "per", "edges", "values", "errors", "unit", "error_kind", "degrees_of_freedom", "underflow", "overflow", "underflow_error", "overflow_error", "solid_angles")
    NAME_FIELD_NUMBER: _ClassVar[int]
    OBSERVABLES_FIELD_NUMBER: _ClassVar[int]
    AXIS_UNITS_FIELD_NUMBER: _ClassVar[int]
    PER_FIELD_NUMBER: _ClassVar[int]
    EDGES_FIELD_NUMBER: _ClassVar[int]
    VALUES_FIELD_NUMBER: _ClassVar[int]
    ERRORS_FIELD_NUMBER: _ClassVar[int]
    UNIT_FIELD_NUMBER: _ClassVar[int]
    ERROR_KIND_FIELD_NUMBER: _ClassVar[int]
    DEGREES_OF_FREEDOM_FIELD_NUMBER: _ClassVar[int]
    UNDERFLOW_FIELD_NUMBER: _ClassVar[int]
    OVERFLOW_FIELD_NUMBER: _ClassVar[int]
    UNDERFLOW_ERROR_FIELD_NUMBER: _ClassVar[int]
    OVERFLOW_ERROR_FIELD_NUMBER: _ClassVar[int]
    SOLID_ANGLES_FIELD_NUMBER: _ClassVar[int]
    name: str
    observables: _containers.RepeatedScalarFieldContainer[str]
    axis_units: _containers.RepeatedScalarFieldContainer[str]
    per: str
    edges: _containers.RepeatedCompositeFieldContainer[_values_pb2.Axis]
    values: _values_pb2.Numbers
    errors: _values_pb2.Numbers
    unit: str
    error_kind: str
    degrees_of_freedom: float
    underflow: float
    overflow: float
    underflow_error: float
    overflow_error: float
    solid_angles: _values_pb2.Numbers
    def __init__(self, name: _Optional[str] = ..., observables: _Optional[_Iterable[str]] = ..., axis_units: _Optional[_Iterable[str]] = ..., per: _Optional[str] = ..., edges: _Optional[_Iterable[_Union[_values_pb2.Axis, _Mapping]]] = ..., values: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ..., errors: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ..., unit: _Optional[str] = ..., error_kind: _Optional[str] = ..., degrees_of_freedom: _Optional[float] = ..., underflow: _Optional[float] = ..., overflow: _Optional[float] = ..., underflow_error: _Optional[float] = ..., overflow_error: _Optional[float] = ..., solid_angles: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ...) -> None: ...

class Derived(_message.Message):
    __slots__ = ("name", "value", "error", "unit", "error_kind", "degrees_of_freedom", "histograms", "low", "high")
    NAME_FIELD_NUMBER: _ClassVar[int]
    VALUE_FIELD_NUMBER: _ClassVar[int]
    ERROR_FIELD_NUMBER: _ClassVar[int]
    UNIT_FIELD_NUMBER: _ClassVar[int]
    ERROR_KIND_FIELD_NUMBER: _ClassVar[int]
    DEGREES_OF_FREEDOM_FIELD_NUMBER: _ClassVar[int]
    HISTOGRAMS_FIELD_NUMBER: _ClassVar[int]
    LOW_FIELD_NUMBER: _ClassVar[int]
    HIGH_FIELD_NUMBER: _ClassVar[int]
    name: str
    value: float
    error: float
    unit: str
    error_kind: str
    degrees_of_freedom: float
    histograms: _containers.RepeatedCompositeFieldContainer[DerivedBins]
    low: float
    high: float
    def __init__(self, name: _Optional[str] = ..., value: _Optional[float] = ..., error: _Optional[float] = ..., unit: _Optional[str] = ..., error_kind: _Optional[str] = ..., degrees_of_freedom: _Optional[float] = ..., histograms: _Optional[_Iterable[_Union[DerivedBins, _Mapping]]] = ..., low: _Optional[float] = ..., high: _Optional[float] = ...) -> None: ...

class DerivedBins(_message.Message):
    __slots__ = ("name", "values", "errors", "low", "high")
    NAME_FIELD_NUMBER: _ClassVar[int]
    VALUES_FIELD_NUMBER: _ClassVar[int]
    ERRORS_FIELD_NUMBER: _ClassVar[int]
    LOW_FIELD_NUMBER: _ClassVar[int]
    HIGH_FIELD_NUMBER: _ClassVar[int]
    name: str
    values: _values_pb2.Numbers
    errors: _values_pb2.Numbers
    low: _values_pb2.Numbers
    high: _values_pb2.Numbers
    def __init__(self, name: _Optional[str] = ..., values: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ..., errors: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ..., low: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ..., high: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ...) -> None: ...

class Part(_message.Message):
    __slots__ = ("name", "total", "histograms", "derived", "parameters", "masses", "notes", "replicates")
    NAME_FIELD_NUMBER: _ClassVar[int]
    TOTAL_FIELD_NUMBER: _ClassVar[int]
    HISTOGRAMS_FIELD_NUMBER: _ClassVar[int]
    DERIVED_FIELD_NUMBER: _ClassVar[int]
    PARAMETERS_FIELD_NUMBER: _ClassVar[int]
    MASSES_FIELD_NUMBER: _ClassVar[int]
    NOTES_FIELD_NUMBER: _ClassVar[int]
    REPLICATES_FIELD_NUMBER: _ClassVar[int]
    name: str
    total: Total
    histograms: _containers.RepeatedCompositeFieldContainer[Histogram]
    derived: _containers.RepeatedCompositeFieldContainer[Derived]
    parameters: _values_pb2.ParameterTable
    masses: _values_pb2.MassTable
    notes: _containers.RepeatedCompositeFieldContainer[Note]
    replicates: _values_pb2.Numbers
    def __init__(self, name: _Optional[str] = ..., total: _Optional[_Union[Total, _Mapping]] = ..., histograms: _Optional[_Iterable[_Union[Histogram, _Mapping]]] = ..., derived: _Optional[_Iterable[_Union[Derived, _Mapping]]] = ..., parameters: _Optional[_Union[_values_pb2.ParameterTable, _Mapping]] = ..., masses: _Optional[_Union[_values_pb2.MassTable, _Mapping]] = ..., notes: _Optional[_Iterable[_Union[Note, _Mapping]]] = ..., replicates: _Optional[_Union[_values_pb2.Numbers, _Mapping]] = ...) -> None: ...

class Note(_message.Message):
    __slots__ = ("code", "text")
    CODE_FIELD_NUMBER: _ClassVar[int]
    TEXT_FIELD_NUMBER: _ClassVar[int]
    code: str
    text: str
    def __init__(self, code: _Optional[str] = ..., text: _Optional[str] = ...) -> None: ...

class Diagnostics(_message.Message):
    __slots__ = ("evaluations", "rounds", "effective_fraction", "largest_share", "largest_bin_shares", "training_pull", "non_finite", "negative", "unresolved")
    EVALUATIONS_FIELD_NUMBER: _ClassVar[int]
    ROUNDS_FIELD_NUMBER: _ClassVar[int]
    EFFECTIVE_FRACTION_FIELD_NUMBER: _ClassVar[int]
    LARGEST_SHARE_FIELD_NUMBER: _ClassVar[int]
    LARGEST_BIN_SHARES_FIELD_NUMBER: _ClassVar[int]
    TRAINING_PULL_FIELD_NUMBER: _ClassVar[int]
    NON_FINITE_FIELD_NUMBER: _ClassVar[int]
    NEGATIVE_FIELD_NUMBER: _ClassVar[int]
    UNRESOLVED_FIELD_NUMBER: _ClassVar[int]
    evaluations: int
    rounds: int
    effective_fraction: float
    largest_share: float
    largest_bin_shares: _values_pb2.NumbersTable
    training_pull: float
    non_finite: int
    negative: int
    unresolved: int
    def __init__(self, evaluations: _Optional[int] = ..., rounds: _Optional[int] = ..., effective_fraction: _Optional[float] = ..., largest_share: _Optional[float] = ..., largest_bin_shares: _Optional[_Union[_values_pb2.NumbersTable, _Mapping]] = ..., training_pull: _Optional[float] = ..., non_finite: _Optional[int] = ..., negative: _Optional[int] = ..., unresolved: _Optional[int] = ...) -> None: ...

class Run(_message.Message):
    __slots__ = ("seconds", "executor", "computed_at", "from_cache")
    SECONDS_FIELD_NUMBER: _ClassVar[int]
    EXECUTOR_FIELD_NUMBER: _ClassVar[int]
    COMPUTED_AT_FIELD_NUMBER: _ClassVar[int]
    FROM_CACHE_FIELD_NUMBER: _ClassVar[int]
    seconds: float
    executor: str
    computed_at: str
    from_cache: bool
    def __init__(self, seconds: _Optional[float] = ..., executor: _Optional[str] = ..., computed_at: _Optional[str] = ..., from_cache: bool = ...) -> None: ...
