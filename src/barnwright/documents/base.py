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

    #: Values of the fields that may be left out, filled on first use by ``build``.
    _defaults: ClassVar[dict[str, Any] | None] = None

    @classmethod
    def build(cls, **fields: Any) -> Self:
        """Make a document from values that are known to be good, without checking them.

        This is the cheap road (about a microsecond) for documents that the program makes itself; fields that are
        left out take their defaults. Documents that come from outside go through ``model_validate``.
        """
        defaults = cls.__dict__.get("_defaults")
        if defaults is None:
            defaults = {
                name: field.get_default(call_default_factory=True)
                for name, field in cls.model_fields.items()
                if not field.is_required()
            }
            cls._defaults = defaults
        made = cls.__new__(cls)
        object.__setattr__(made, "__dict__", {**defaults, **fields})
        object.__setattr__(made, "__pydantic_fields_set__", set(fields))
        object.__setattr__(made, "__pydantic_extra__", None)
        object.__setattr__(made, "__pydantic_private__", None)
        return made


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
ParameterValue = Annotated[
    Annotated[bool, Strict()]
    | Annotated[int, Field(strict=True, ge=-MAX_WHOLE, le=MAX_WHOLE)]
    | Annotated[float, Field(strict=True, allow_inf_nan=False)]
    | Annotated[str, Field(strict=True, min_length=1, max_length=MAX_NAME, pattern=_VISIBLE)],
    Expects("a finite number, a whole number of at most 2**53 in size, true, false or a word"),
]
