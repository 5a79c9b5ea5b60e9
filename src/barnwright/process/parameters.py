"""Parameters: the numbers and words that a law depends on, declared as fields of a frozen model.

class Coupling(Parameters):
    alpha: float = parameter(0.0072973525643, meaning="electromagnetic coupling", source="CODATA 2022")
"""

from __future__ import annotations

import types
import warnings
from collections.abc import Mapping
from dataclasses import dataclass
from functools import lru_cache
from typing import Any, Literal, Union, get_args, get_origin

from pydantic import BaseModel, ConfigDict, Field, create_model
from pydantic.fields import FieldInfo
from pydantic_core import PydanticUndefined

from barnwright.errors import RequestError, Violation, show

ParameterValue = float | int | bool | str

_KINDS: dict[Any, Literal["float", "int", "bool"]] = {float: "float", int: "int", bool: "bool"}


class Parameters(BaseModel):
    """The base of a process's parameters: frozen, no unknown names, finite numbers; as it is, a process without any."""

    model_config = ConfigDict(
        frozen=True, extra="forbid", strict=True, allow_inf_nan=False, validate_default=True, protected_namespaces=()
    )


def parameter(
    default: Any = ...,
    *,
    unit: str = "",
    meaning: str = "",
    source: str = "",
    used_with: Mapping[str, tuple[ParameterValue, ...]] | None = None,
) -> Any:
    """Declare a field of `Parameters`.

    Parameters
    ----------
    default : float, int, bool or one of declared words
        In the natural units of ``unit``; left away, a request must give it.
    unit : str
        "GeV", "GeV^-2", …; "" for a pure number.
    meaning, source : str
        What it is, and where the default comes from.
    used_with : values of other parameters by name, optional
        ``{"scheme": ("alpha",)}``: the laws read it only where each of these has one of its values; a request that
        sets it otherwise is refused, and says so.
    """
    extra: dict[str, Any] = {"unit": unit, "source": source}
    if used_with:
        extra["used_with"] = {name: list(values) for name, values in used_with.items()}
    return Field(default, description=meaning, json_schema_extra=extra)


@dataclass(frozen=True, slots=True)
class ParameterFacts:
    """What a user must know of a parameter; ``choices`` are the words of a ``word``, ``default`` None when required.

    ``used_with`` holds (name, values) of the other parameters that decide whether it is used.
    """

    name: str
    type: Literal["float", "int", "bool", "word"]
    choices: tuple[str, ...]
    unit: str
    default: ParameterValue | None
    meaning: str
    source: str
    required: bool
    used_with: tuple[tuple[str, tuple[ParameterValue, ...]], ...] = ()

    def is_used(self, values: Mapping[str, ParameterValue]) -> bool:
        """Whether the laws read it, given the values of all parameters."""
        return all(values.get(name) in allowed for name, allowed in self.used_with)


@lru_cache(maxsize=1024)
def facts_of(model: type[Parameters]) -> tuple[ParameterFacts, ...]:
    """The facts of every parameter in the order of declaration.

    Raises
    ------
    TypeError
        For a field that is no float, int, bool or `Literal` of words; the message names it.
    """
    return tuple(_facts(name, field) for name, field in model.model_fields.items())


def _facts(name: str, field: FieldInfo) -> ParameterFacts:
    kind, choices = _type_of(name, field.annotation)
    extra = field.json_schema_extra if isinstance(field.json_schema_extra, dict) else {}
    return ParameterFacts(
        name=name,
        type=kind,
        choices=choices,
        unit=str(extra.get("unit", "")),
        default=None if field.default is PydanticUndefined else field.default,
        meaning=field.description or "",
        source=str(extra.get("source", "")),
        required=field.is_required(),
        used_with=tuple((key, tuple(values)) for key, values in _table(extra.get("used_with")).items()),
    )


def _table(value: Any) -> dict[str, Any]:
    return value if isinstance(value, dict) else {}


def _type_of(name: str, annotation: Any) -> tuple[Literal["float", "int", "bool", "word"], tuple[str, ...]]:
    if annotation in _KINDS:
        return _KINDS[annotation], ()
    words = get_args(annotation)
    if get_origin(annotation) is Literal and all(isinstance(word, str) for word in words):
        return "word", words
    shown = (
        annotation
        if get_origin(annotation) in (Union, types.UnionType)
        else getattr(annotation, "__name__", annotation)
    )
    raise TypeError(f"parameter {name} is a {shown}, expected float, int, bool or Literal of words")


def parameters_model(defaults: Mapping[str, float]) -> type[Parameters]:
    """A model of float parameters from the names and defaults of a formula.

    Raises
    ------
    RequestError
        For names that begin with an underscore or with ``model_``.
    """
    expected = "a name that begins with a letter, not with model_"
    wrong = [name for name in defaults if name.startswith(("_", "model_"))]
    if wrong:
        raise RequestError(Violation(f"formula.parameters.{name}", show(name), expected) for name in wrong)
    fields: dict[str, Any] = {name: (float, parameter(value, source="formula")) for name, value in defaults.items()}
    with warnings.catch_warnings():
        warnings.filterwarnings("ignore", message="Field name .* shadows an attribute", category=UserWarning)
        return create_model("FormulaParameters", __base__=Parameters, **fields)
