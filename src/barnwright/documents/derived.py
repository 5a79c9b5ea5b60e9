"""Derived quantities: asymmetries and ratios."""

from __future__ import annotations

from typing import Annotated, Literal, Self

from pydantic import Field, model_validator

from barnwright.documents.base import Document, Expects, Name, Number, Observable
from barnwright.documents.checks import NOTHING, Finding, refuse

Between = Annotated[tuple[Name, Name], Expects("a list of two names of variations")]


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


class RatioRequest(Document):
    """first/second of two variations, of the total and bin by bin."""

    name: Name
    kind: Literal["ratio"]
    between: Between

    @model_validator(mode="after")
    def _agree(self) -> Self:
        refuse(_differ(self.between))
        return self


DerivedRequest = Annotated[
    AsymmetryRequest | RatioRequest,
    Field(discriminator="kind"),
    Expects("a table whose kind is 'asymmetry' or 'ratio'"),
]
