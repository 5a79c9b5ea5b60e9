"""Derived quantities: asymmetries, ratios and envelopes."""

from __future__ import annotations

from typing import Annotated, Literal, Self

from pydantic import Field, model_validator

from barnwright.documents.base import MAX_ITEMS, Document, Expects, Name, Number, Observable
from barnwright.documents.checks import NOTHING, Finding, refuse, repeated

NOMINAL = "nominal"
"""What a derived quantity calls the request itself, beside its variations."""

Between = Annotated[tuple[Name, Name], Expects("a list of two names of variations, or of one and nominal")]
Members = Annotated[
    tuple[Name, ...],
    Field(min_length=1, max_length=MAX_ITEMS),
    Expects(f"a list of 1 to {MAX_ITEMS} names of variations"),
]


def _differ(between: tuple[str, str] | None) -> list[Finding]:
    if between is None or between[0] != between[1]:
        return []
    return [Finding(("between", 1), between[1], "a name that differs from the first", of=("between",))]


class AsymmetryRequest(Document):
    """An asymmetry, in one of two forms.

    Of an observable at a value: (above - below)/(above + below). Of two variations: (first - second)/(first + second).
    """

    name: Name
    kind: Literal["asymmetry"]
    observable: Observable | None = None
    at: Number | None = None
    between: Between | None = None

    @model_validator(mode="after")
    def _agree(self) -> Self:
        found = _differ(self.between)
        forms = ("observable", "at", "between")
        both = "observable and at, or else between"
        if self.between is None:
            missing = [name for name in ("observable", "at") if getattr(self, name) is None]
            found += [Finding((name,), NOTHING, both, of=forms) for name in missing]
        elif self.observable is not None or self.at is not None:
            found.append(Finding(("between",), list(self.between), f"{both}, not both", of=forms))
        refuse(found)
        return self

    @property
    def compared(self) -> tuple[str, tuple[str, ...]]:
        """The field that names variations, and the names."""
        return "between", self.between or ()


class RatioRequest(Document):
    """first/second of two variations, of the total and bin by bin."""

    name: Name
    kind: Literal["ratio"]
    between: Between

    @model_validator(mode="after")
    def _agree(self) -> Self:
        refuse(_differ(self.between))
        return self

    @property
    def compared(self) -> tuple[str, tuple[str, ...]]:
        """The field that names variations, and the names."""
        return "between", self.between


class EnvelopeRequest(Document):
    """The smallest and the largest of the request as it stands and of some variations, of the total and bin by bin."""

    name: Name
    kind: Literal["envelope"]
    of: Members

    @model_validator(mode="after")
    def _agree(self) -> Self:
        refuse(repeated(self.of, ("of",), last=None))
        return self

    @property
    def compared(self) -> tuple[str, tuple[str, ...]]:
        """The field that names variations, and the names."""
        return "of", self.of


DerivedRequest = Annotated[
    AsymmetryRequest | RatioRequest | EnvelopeRequest,
    Field(discriminator="kind"),
    Expects("a table whose kind is 'asymmetry', 'ratio' or 'envelope'"),
]
