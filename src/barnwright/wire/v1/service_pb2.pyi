from barnwright.wire.v1 import prediction_pb2 as _prediction_pb2
from barnwright.wire.v1 import process_pb2 as _process_pb2
from barnwright.wire.v1 import request_pb2 as _request_pb2
from barnwright.wire.v1 import values_pb2 as _values_pb2
from google.protobuf.internal import containers as _containers
from google.protobuf import descriptor as _descriptor
from google.protobuf import message as _message
from typing import ClassVar as _ClassVar, Iterable as _Iterable, Mapping as _Mapping, Optional as _Optional, Union as _Union

DESCRIPTOR: _descriptor.FileDescriptor

class ListProcessesRequest(_message.Message):
    __slots__ = ("particles", "plugin", "kind")
    PARTICLES_FIELD_NUMBER: _ClassVar[int]
    PLUGIN_FIELD_NUMBER: _ClassVar[int]
    KIND_FIELD_NUMBER: _ClassVar[int]
    particles: _containers.RepeatedScalarFieldContainer[str]
    plugin: str
    kind: str
    def __init__(self, particles: _Optional[_Iterable[str]] = ..., plugin: _Optional[str] = ..., kind: _Optional[str] = ...) -> None: ...

class ListProcessesResponse(_message.Message):
    __slots__ = ("processes",)
    PROCESSES_FIELD_NUMBER: _ClassVar[int]
    processes: _containers.RepeatedCompositeFieldContainer[_process_pb2.ProcessSummary]
    def __init__(self, processes: _Optional[_Iterable[_Union[_process_pb2.ProcessSummary, _Mapping]]] = ...) -> None: ...

class GetProcessRequest(_message.Message):
    __slots__ = ("name",)
    NAME_FIELD_NUMBER: _ClassVar[int]
    name: str
    def __init__(self, name: _Optional[str] = ...) -> None: ...

class GetProcessResponse(_message.Message):
    __slots__ = ("process",)
    PROCESS_FIELD_NUMBER: _ClassVar[int]
    process: _process_pb2.ProcessDescription
    def __init__(self, process: _Optional[_Union[_process_pb2.ProcessDescription, _Mapping]] = ...) -> None: ...

class ValidateRequestRequest(_message.Message):
    __slots__ = ("request",)
    REQUEST_FIELD_NUMBER: _ClassVar[int]
    request: _request_pb2.Request
    def __init__(self, request: _Optional[_Union[_request_pb2.Request, _Mapping]] = ...) -> None: ...

class ValidateRequestResponse(_message.Message):
    __slots__ = ("request", "cost", "violations")
    REQUEST_FIELD_NUMBER: _ClassVar[int]
    COST_FIELD_NUMBER: _ClassVar[int]
    VIOLATIONS_FIELD_NUMBER: _ClassVar[int]
    request: _request_pb2.Request
    cost: Cost
    violations: _containers.RepeatedCompositeFieldContainer[Violation]
    def __init__(self, request: _Optional[_Union[_request_pb2.Request, _Mapping]] = ..., cost: _Optional[_Union[Cost, _Mapping]] = ..., violations: _Optional[_Iterable[_Union[Violation, _Mapping]]] = ...) -> None: ...

class Cost(_message.Message):
    __slots__ = ("points", "components", "blocks")
    POINTS_FIELD_NUMBER: _ClassVar[int]
    COMPONENTS_FIELD_NUMBER: _ClassVar[int]
    BLOCKS_FIELD_NUMBER: _ClassVar[int]
    points: int
    components: int
    blocks: int
    def __init__(self, points: _Optional[int] = ..., components: _Optional[int] = ..., blocks: _Optional[int] = ...) -> None: ...

class Violation(_message.Message):
    __slots__ = ("field", "value", "expected", "nearest", "position")
    FIELD_FIELD_NUMBER: _ClassVar[int]
    VALUE_FIELD_NUMBER: _ClassVar[int]
    EXPECTED_FIELD_NUMBER: _ClassVar[int]
    NEAREST_FIELD_NUMBER: _ClassVar[int]
    POSITION_FIELD_NUMBER: _ClassVar[int]
    field: str
    value: str
    expected: str
    nearest: str
    position: int
    def __init__(self, field: _Optional[str] = ..., value: _Optional[str] = ..., expected: _Optional[str] = ..., nearest: _Optional[str] = ..., position: _Optional[int] = ...) -> None: ...

class Violations(_message.Message):
    __slots__ = ("violations",)
    VIOLATIONS_FIELD_NUMBER: _ClassVar[int]
    violations: _containers.RepeatedCompositeFieldContainer[Violation]
    def __init__(self, violations: _Optional[_Iterable[_Union[Violation, _Mapping]]] = ...) -> None: ...

class PredictRequest(_message.Message):
    __slots__ = ("request",)
    REQUEST_FIELD_NUMBER: _ClassVar[int]
    request: _request_pb2.Request
    def __init__(self, request: _Optional[_Union[_request_pb2.Request, _Mapping]] = ...) -> None: ...

class PredictResponse(_message.Message):
    __slots__ = ("prediction",)
    PREDICTION_FIELD_NUMBER: _ClassVar[int]
    prediction: _prediction_pb2.Prediction
    def __init__(self, prediction: _Optional[_Union[_prediction_pb2.Prediction, _Mapping]] = ...) -> None: ...

class ScanRequest(_message.Message):
    __slots__ = ("request", "over")
    REQUEST_FIELD_NUMBER: _ClassVar[int]
    OVER_FIELD_NUMBER: _ClassVar[int]
    request: _request_pb2.Request
    over: _containers.RepeatedCompositeFieldContainer[ScanAxis]
    def __init__(self, request: _Optional[_Union[_request_pb2.Request, _Mapping]] = ..., over: _Optional[_Iterable[_Union[ScanAxis, _Mapping]]] = ...) -> None: ...

class ScanAxis(_message.Message):
    __slots__ = ("key", "values")
    KEY_FIELD_NUMBER: _ClassVar[int]
    VALUES_FIELD_NUMBER: _ClassVar[int]
    key: str
    values: _containers.RepeatedCompositeFieldContainer[_values_pb2.ParameterValue]
    def __init__(self, key: _Optional[str] = ..., values: _Optional[_Iterable[_Union[_values_pb2.ParameterValue, _Mapping]]] = ...) -> None: ...

class ScanResponse(_message.Message):
    __slots__ = ("first", "points", "predictions")
    FIRST_FIELD_NUMBER: _ClassVar[int]
    POINTS_FIELD_NUMBER: _ClassVar[int]
    PREDICTIONS_FIELD_NUMBER: _ClassVar[int]
    first: int
    points: int
    predictions: _containers.RepeatedCompositeFieldContainer[_prediction_pb2.Prediction]
    def __init__(self, first: _Optional[int] = ..., points: _Optional[int] = ..., predictions: _Optional[_Iterable[_Union[_prediction_pb2.Prediction, _Mapping]]] = ...) -> None: ...
