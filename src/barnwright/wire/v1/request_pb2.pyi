from barnwright.wire.v1 import values_pb2 as _values_pb2
from google.protobuf.internal import containers as _containers
from google.protobuf import descriptor as _descriptor
from google.protobuf import message as _message
from typing import ClassVar as _ClassVar, Iterable as _Iterable, Mapping as _Mapping, Optional as _Optional, Union as _Union

DESCRIPTOR: _descriptor.FileDescriptor

class Request(_message.Message):
    __slots__ = ("schema", "process", "processes", "formula", "contributions", "unit", "seed", "beams", "parameters", "masses", "cuts", "histograms", "variations", "derived", "accuracy")
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
    SCHEMA_FIELD_NUMBER: _ClassVar[int]
    PROCESS_FIELD_NUMBER: _ClassVar[int]
    PROCESSES_FIELD_NUMBER: _ClassVar[int]
    FORMULA_FIELD_NUMBER: _ClassVar[int]
    CONTRIBUTIONS_FIELD_NUMBER: _ClassVar[int]
    UNIT_FIELD_NUMBER: _ClassVar[int]
    SEED_FIELD_NUMBER: _ClassVar[int]
    BEAMS_FIELD_NUMBER: _ClassVar[int]
    PARAMETERS_FIELD_NUMBER: _ClassVar[int]
    MASSES_FIELD_NUMBER: _ClassVar[int]
    CUTS_FIELD_NUMBER: _ClassVar[int]
    HISTOGRAMS_FIELD_NUMBER: _ClassVar[int]
    VARIATIONS_FIELD_NUMBER: _ClassVar[int]
    DERIVED_FIELD_NUMBER: _ClassVar[int]
    ACCURACY_FIELD_NUMBER: _ClassVar[int]
    schema: str
    process: str
    processes: _containers.RepeatedScalarFieldContainer[str]
    formula: Formula
    contributions: _containers.RepeatedScalarFieldContainer[str]
    unit: str
    seed: int
    beams: Beams
    parameters: _containers.MessageMap[str, _values_pb2.ParameterValue]
    masses: _containers.ScalarMap[str, float]
    cuts: _containers.RepeatedCompositeFieldContainer[Cut]
    histograms: _containers.RepeatedCompositeFieldContainer[HistogramRequest]
    variations: _containers.RepeatedCompositeFieldContainer[Variation]
    derived: _containers.RepeatedCompositeFieldContainer[DerivedRequest]
    accuracy: Accuracy
    def __init__(self, schema: _Optional[str] = ..., process: _Optional[str] = ..., processes: _Optional[_Iterable[str]] = ..., formula: _Optional[_Union[Formula, _Mapping]] = ..., contributions: _Optional[_Iterable[str]] = ..., unit: _Optional[str] = ..., seed: _Optional[int] = ..., beams: _Optional[_Union[Beams, _Mapping]] = ..., parameters: _Optional[_Mapping[str, _values_pb2.ParameterValue]] = ..., masses: _Optional[_Mapping[str, float]] = ..., cuts: _Optional[_Iterable[_Union[Cut, _Mapping]]] = ..., histograms: _Optional[_Iterable[_Union[HistogramRequest, _Mapping]]] = ..., variations: _Optional[_Iterable[_Union[Variation, _Mapping]]] = ..., derived: _Optional[_Iterable[_Union[DerivedRequest, _Mapping]]] = ..., accuracy: _Optional[_Union[Accuracy, _Mapping]] = ...) -> None: ...

class Beams(_message.Message):
    __slots__ = ("kind", "sqrt_s", "energies", "crossing_angle", "along_z", "polarisation", "energy", "kinetic_energy", "momentum", "target", "mass")
    class EnergiesEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: float
        def __init__(self, key: _Optional[str] = ..., value: _Optional[float] = ...) -> None: ...
    class PolarisationEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: float
        def __init__(self, key: _Optional[str] = ..., value: _Optional[float] = ...) -> None: ...
    KIND_FIELD_NUMBER: _ClassVar[int]
    SQRT_S_FIELD_NUMBER: _ClassVar[int]
    ENERGIES_FIELD_NUMBER: _ClassVar[int]
    CROSSING_ANGLE_FIELD_NUMBER: _ClassVar[int]
    ALONG_Z_FIELD_NUMBER: _ClassVar[int]
    POLARISATION_FIELD_NUMBER: _ClassVar[int]
    ENERGY_FIELD_NUMBER: _ClassVar[int]
    KINETIC_ENERGY_FIELD_NUMBER: _ClassVar[int]
    MOMENTUM_FIELD_NUMBER: _ClassVar[int]
    TARGET_FIELD_NUMBER: _ClassVar[int]
    MASS_FIELD_NUMBER: _ClassVar[int]
    kind: str
    sqrt_s: float
    energies: _containers.ScalarMap[str, float]
    crossing_angle: float
    along_z: str
    polarisation: _containers.ScalarMap[str, float]
    energy: float
    kinetic_energy: float
    momentum: float
    target: str
    mass: float
    def __init__(self, kind: _Optional[str] = ..., sqrt_s: _Optional[float] = ..., energies: _Optional[_Mapping[str, float]] = ..., crossing_angle: _Optional[float] = ..., along_z: _Optional[str] = ..., polarisation: _Optional[_Mapping[str, float]] = ..., energy: _Optional[float] = ..., kinetic_energy: _Optional[float] = ..., momentum: _Optional[float] = ..., target: _Optional[str] = ..., mass: _Optional[float] = ...) -> None: ...

class Cut(_message.Message):
    __slots__ = ("name", "observable", "min", "max", "outside", "absent")
    NAME_FIELD_NUMBER: _ClassVar[int]
    OBSERVABLE_FIELD_NUMBER: _ClassVar[int]
    MIN_FIELD_NUMBER: _ClassVar[int]
    MAX_FIELD_NUMBER: _ClassVar[int]
    OUTSIDE_FIELD_NUMBER: _ClassVar[int]
    ABSENT_FIELD_NUMBER: _ClassVar[int]
    name: str
    observable: str
    min: float
    max: float
    outside: _containers.RepeatedScalarFieldContainer[float]
    absent: _containers.RepeatedScalarFieldContainer[str]
    def __init__(self, name: _Optional[str] = ..., observable: _Optional[str] = ..., min: _Optional[float] = ..., max: _Optional[float] = ..., outside: _Optional[_Iterable[float]] = ..., absent: _Optional[_Iterable[str]] = ...) -> None: ...

class HistogramRequest(_message.Message):
    __slots__ = ("name", "observables", "bins", "per")
    NAME_FIELD_NUMBER: _ClassVar[int]
    OBSERVABLES_FIELD_NUMBER: _ClassVar[int]
    BINS_FIELD_NUMBER: _ClassVar[int]
    PER_FIELD_NUMBER: _ClassVar[int]
    name: str
    observables: _containers.RepeatedScalarFieldContainer[str]
    bins: _containers.RepeatedCompositeFieldContainer[Bins]
    per: str
    def __init__(self, name: _Optional[str] = ..., observables: _Optional[_Iterable[str]] = ..., bins: _Optional[_Iterable[_Union[Bins, _Mapping]]] = ..., per: _Optional[str] = ...) -> None: ...

class Bins(_message.Message):
    __slots__ = ("count", "low", "high", "spacing", "edges")
    COUNT_FIELD_NUMBER: _ClassVar[int]
    LOW_FIELD_NUMBER: _ClassVar[int]
    HIGH_FIELD_NUMBER: _ClassVar[int]
    SPACING_FIELD_NUMBER: _ClassVar[int]
    EDGES_FIELD_NUMBER: _ClassVar[int]
    count: int
    low: float
    high: float
    spacing: str
    edges: _containers.RepeatedScalarFieldContainer[float]
    def __init__(self, count: _Optional[int] = ..., low: _Optional[float] = ..., high: _Optional[float] = ..., spacing: _Optional[str] = ..., edges: _Optional[_Iterable[float]] = ...) -> None: ...

class Variation(_message.Message):
    __slots__ = ("name", "parameters", "masses", "beams", "cuts")
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
    NAME_FIELD_NUMBER: _ClassVar[int]
    PARAMETERS_FIELD_NUMBER: _ClassVar[int]
    MASSES_FIELD_NUMBER: _ClassVar[int]
    BEAMS_FIELD_NUMBER: _ClassVar[int]
    CUTS_FIELD_NUMBER: _ClassVar[int]
    name: str
    parameters: _containers.MessageMap[str, _values_pb2.ParameterValue]
    masses: _containers.ScalarMap[str, float]
    beams: BeamsChange
    cuts: _containers.RepeatedCompositeFieldContainer[Cut]
    def __init__(self, name: _Optional[str] = ..., parameters: _Optional[_Mapping[str, _values_pb2.ParameterValue]] = ..., masses: _Optional[_Mapping[str, float]] = ..., beams: _Optional[_Union[BeamsChange, _Mapping]] = ..., cuts: _Optional[_Iterable[_Union[Cut, _Mapping]]] = ...) -> None: ...

class BeamsChange(_message.Message):
    __slots__ = ("polarisation",)
    class PolarisationEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: float
        def __init__(self, key: _Optional[str] = ..., value: _Optional[float] = ...) -> None: ...
    POLARISATION_FIELD_NUMBER: _ClassVar[int]
    polarisation: _containers.ScalarMap[str, float]
    def __init__(self, polarisation: _Optional[_Mapping[str, float]] = ...) -> None: ...

class DerivedRequest(_message.Message):
    __slots__ = ("name", "kind", "observable", "at", "between", "of")
    NAME_FIELD_NUMBER: _ClassVar[int]
    KIND_FIELD_NUMBER: _ClassVar[int]
    OBSERVABLE_FIELD_NUMBER: _ClassVar[int]
    AT_FIELD_NUMBER: _ClassVar[int]
    BETWEEN_FIELD_NUMBER: _ClassVar[int]
    OF_FIELD_NUMBER: _ClassVar[int]
    name: str
    kind: str
    observable: str
    at: float
    between: _containers.RepeatedScalarFieldContainer[str]
    of: _containers.RepeatedScalarFieldContainer[str]
    def __init__(self, name: _Optional[str] = ..., kind: _Optional[str] = ..., observable: _Optional[str] = ..., at: _Optional[float] = ..., between: _Optional[_Iterable[str]] = ..., of: _Optional[_Iterable[str]] = ...) -> None: ...

class Accuracy(_message.Message):
    __slots__ = ("relative", "absolute", "per_bin", "bin_floor", "max_evaluations", "max_seconds", "rounds", "method")
    RELATIVE_FIELD_NUMBER: _ClassVar[int]
    ABSOLUTE_FIELD_NUMBER: _ClassVar[int]
    PER_BIN_FIELD_NUMBER: _ClassVar[int]
    BIN_FLOOR_FIELD_NUMBER: _ClassVar[int]
    MAX_EVALUATIONS_FIELD_NUMBER: _ClassVar[int]
    MAX_SECONDS_FIELD_NUMBER: _ClassVar[int]
    ROUNDS_FIELD_NUMBER: _ClassVar[int]
    METHOD_FIELD_NUMBER: _ClassVar[int]
    relative: float
    absolute: float
    per_bin: float
    bin_floor: float
    max_evaluations: int
    max_seconds: float
    rounds: int
    method: str
    def __init__(self, relative: _Optional[float] = ..., absolute: _Optional[float] = ..., per_bin: _Optional[float] = ..., bin_floor: _Optional[float] = ..., max_evaluations: _Optional[int] = ..., max_seconds: _Optional[float] = ..., rounds: _Optional[int] = ..., method: _Optional[str] = ...) -> None: ...

class Formula(_message.Message):
    __slots__ = ("reaction", "squared_amplitude", "spin_colour", "parameters", "peaks")
    class ParametersEntry(_message.Message):
        __slots__ = ("key", "value")
        KEY_FIELD_NUMBER: _ClassVar[int]
        VALUE_FIELD_NUMBER: _ClassVar[int]
        key: str
        value: float
        def __init__(self, key: _Optional[str] = ..., value: _Optional[float] = ...) -> None: ...
    REACTION_FIELD_NUMBER: _ClassVar[int]
    SQUARED_AMPLITUDE_FIELD_NUMBER: _ClassVar[int]
    SPIN_COLOUR_FIELD_NUMBER: _ClassVar[int]
    PARAMETERS_FIELD_NUMBER: _ClassVar[int]
    PEAKS_FIELD_NUMBER: _ClassVar[int]
    reaction: str
    squared_amplitude: str
    spin_colour: str
    parameters: _containers.ScalarMap[str, float]
    peaks: _containers.RepeatedCompositeFieldContainer[FormulaPeak]
    def __init__(self, reaction: _Optional[str] = ..., squared_amplitude: _Optional[str] = ..., spin_colour: _Optional[str] = ..., parameters: _Optional[_Mapping[str, float]] = ..., peaks: _Optional[_Iterable[_Union[FormulaPeak, _Mapping]]] = ...) -> None: ...

class FormulaPeak(_message.Message):
    __slots__ = ("of", "shape", "at", "width", "power")
    OF_FIELD_NUMBER: _ClassVar[int]
    SHAPE_FIELD_NUMBER: _ClassVar[int]
    AT_FIELD_NUMBER: _ClassVar[int]
    WIDTH_FIELD_NUMBER: _ClassVar[int]
    POWER_FIELD_NUMBER: _ClassVar[int]
    of: str
    shape: str
    at: _values_pb2.NumberOrName
    width: _values_pb2.NumberOrName
    power: float
    def __init__(self, of: _Optional[str] = ..., shape: _Optional[str] = ..., at: _Optional[_Union[_values_pb2.NumberOrName, _Mapping]] = ..., width: _Optional[_Union[_values_pb2.NumberOrName, _Mapping]] = ..., power: _Optional[float] = ...) -> None: ...
