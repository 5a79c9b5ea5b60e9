"""Cuts: an observable and where it has to lie."""

from __future__ import annotations

from typing import Annotated, Any, Self

from pydantic import SerializerFunctionWrapHandler, model_serializer, model_validator

from barnwright.documents.base import Document, Expects, Name, Number, Observable
from barnwright.documents.checks import NOTHING, Finding, refuse

Crack = Annotated[
    tuple[Number, Number], Expects("a list of two numbers, the lower first, between which nothing passes")
]


class CutChange(Document):
    """What a variation says about a cut: only the name is needed, the rest is merged into the cut of that name.

    A limit that is given as None is taken away; what is not given stays as it is, so it is never written.
    """

    name: Name
    observable: Observable | None = None
    min: Number | None = None
    max: Number | None = None
    outside: Crack | None = None

    @model_serializer(mode="wrap")
    def _only_given(self, written: SerializerFunctionWrapHandler) -> dict[str, Any]:
        return {name: value for name, value in written(self).items() if name in self.model_fields_set}


class Cut(Document):
    """A condition on an observable: ``min <= value <= max``, and not inside the crack ``outside``.

    Values in GeV or rad, as the observable has it. The name is ``cut-1``, ``cut-2``, ... unless given.
    """

    name: Name = ""
    observable: Observable
    min: Number | None = None
    max: Number | None = None
    outside: Crack | None = None

    @model_validator(mode="after")
    def _agree(self) -> Self:
        found = []
        low, high, crack = self.min, self.max, self.outside
        if low is None and high is None and crack is None:
            expected = "at least one of min, max and outside"
            found.append(Finding(("min",), NOTHING, expected, of=("min", "max", "outside")))
        if low is not None and high is not None and not low < high:
            found.append(Finding(("max",), high, f"a number greater than min = {low!r}", of=("min", "max")))
        if crack is not None and not crack[0] < crack[1]:
            expected = "two numbers, the lower first"
            found.append(Finding(("outside",), list(crack), expected, repr([crack[1], crack[0]]), of=("outside",)))
        refuse(found)
        return self


def named(cuts: tuple[Cut, ...]) -> tuple[Cut, ...]:
    """The same cuts, those without a name called after their place: cut-1, cut-2, ..."""
    taken = {cut.name for cut in cuts}
    filled = []
    for number, cut in enumerate(cuts, start=1):
        if not cut.name:
            name = default_name(number, taken)
            taken.add(name)
            filled.append(cut.model_copy(update={"name": name}))
        else:
            filled.append(cut)
    return tuple(filled)


def default_name(number: int, taken: set[Any]) -> str:
    """``cut-number``, or the next number whose name is free."""
    while f"cut-{number}" in taken:
        number += 1
    return f"cut-{number}"
