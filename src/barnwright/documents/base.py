"""The base of every document, and the plain values that documents are made of.

Rules of this room:

- Syntax only. A document knows which fields exist and what kind of value each takes; whether an observable,
  a process or a parameter of that name exists is decided later, where the physics is known.
- Numbers are numbers: a text that looks like one, or a truth value, is refused; so are NaN and infinity.
- Unknown keys are errors everywhere.
- What a field expects is written once, beside its type, as ``Expects``; every finding about it quotes that.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated, Any, ClassVar, Self

from pydantic import BaseModel, ConfigDict, Field, Strict

MAX_ITEMS = 1000
MAX_NAME = 100
MAX_TEXT = 10_000
MAX_WHOLE = 2**53


@dataclass(frozen=True, slots=True)
class Expects:
    """What a field takes, as shown to a person: ``a number greater than 0 (GeV)``."""

    text: str


class Document(BaseModel):
    """Base of all documents: frozen, unknown keys refused, written with the field names of the contract."""

    model_config = ConfigDict(
        frozen=True, extra="forbid", allow_inf_nan=False, serialize_by_alias=True, protected_namespaces=()
    )

    #: What ``build`` needs of each class, made on first use.
    _blueprint: ClassVar[Blueprint | None] = None

    @classmethod
    def build(cls, **fields: Any) -> Self:
        """Make a document from values that are known to be good, without checking them.

        This is the cheap road (a few microseconds) for documents that the program makes itself; fields that are left
        out take their defaults. Documents that come from outside go through ``model_validate``.

        Raises:
            TypeError: when a required field is missing, or a field does not exist.
        """
        blueprint = cls.__dict__.get("_blueprint")
        if blueprint is None:
            blueprint = cls._blueprint = Blueprint.of(cls)
        if not blueprint.required <= fields.keys() <= blueprint.values.keys():
            wrong = sorted(blueprint.required - fields.keys()) + sorted(fields.keys() - blueprint.values.keys())
            raise TypeError(f"{cls.__name__}.build: fields missing or unknown: {', '.join(wrong)}")
        made = cls.__new__(cls)
        object.__setattr__(made, "__dict__", {**blueprint.values, **fields})
        object.__setattr__(made, "__pydantic_fields_set__", set(fields))
        object.__setattr__(made, "__pydantic_extra__", None)
        object.__setattr__(made, "__pydantic_private__", blueprint.private and dict(blueprint.private))
        return made


@dataclass(frozen=True, slots=True)
class Blueprint:
    """The fields of a document in order with their defaults (None where required), and its private values."""

    values: dict[str, Any]
    required: frozenset[str]
    private: dict[str, Any] | None

    @classmethod
    def of(cls, document: type[Document]) -> Blueprint:
        """The blueprint of a class of documents."""
        fields = document.model_fields
        required = frozenset(name for name, field in fields.items() if field.is_required())
        values = {
            name: None if name in required else field.get_default(call_default_factory=True)
            for name, field in fields.items()
        }
        private = {name: field.get_default() for name, field in document.__private_attributes__.items()}
        return cls(values, required, private or None)


_VISIBLE = r"^[^\x00-\x1f\x7f]+$"

Number = Annotated[float, Field(strict=True, allow_inf_nan=False), Expects("a finite number")]
Fraction = Annotated[
    float, Field(strict=True, gt=0, le=1, allow_inf_nan=False), Expects("a number greater than 0 and at most 1")
]
Energy = Annotated[
    float, Field(strict=True, gt=0, allow_inf_nan=False), Expects("a finite number greater than 0 (GeV)")
]
Mass = Annotated[float, Field(strict=True, ge=0, allow_inf_nan=False), Expects("a finite number not less than 0 (GeV)")]
Polarisation = Annotated[float, Field(strict=True, ge=-1, le=1, allow_inf_nan=False), Expects("a number from -1 to 1")]
Name = Annotated[
    str,
    Field(strict=True, min_length=1, max_length=MAX_NAME, pattern=_VISIBLE),
    Expects(f"a name of 1 to {MAX_NAME} printable characters"),
]
Text = Annotated[
    str,
    Field(strict=True, min_length=1, max_length=MAX_TEXT, pattern=_VISIBLE),
    Expects(f"a text of 1 to {MAX_TEXT} printable characters in one line"),
]
Observable = Annotated[
    str,
    Field(strict=True, min_length=1, max_length=MAX_TEXT, pattern=_VISIBLE),
    Expects(f"an observable, as a text of at most {MAX_TEXT} characters"),
]
#: Whole numbers above 2**53 in size, which no JSON reader keeps, are taken as floats.
ParameterValue = Annotated[
    Annotated[bool, Strict()]
    | Annotated[int, Field(strict=True, ge=-MAX_WHOLE, le=MAX_WHOLE)]
    | Annotated[float, Field(strict=True, allow_inf_nan=False)]
    | Annotated[str, Field(strict=True, min_length=1, max_length=MAX_NAME, pattern=_VISIBLE)],
    Expects("a finite number, true, false or a word"),
]
