"""Histograms: one or two observables and their bins."""

from __future__ import annotations

from itertools import pairwise
from typing import Annotated, Literal, Self

from pydantic import Field, model_validator

from barnwright.documents.base import Document, Expects, Name, Number, Observable
from barnwright.documents.checks import NOTHING, Finding, Shown, refuse

MAX_BINS = 10_000

Per = Literal["value", "bin", "solid_angle"]


class Bins(Document):
    """The bins of one axis: ``count`` bins from ``low`` to ``high``, or the ``edges`` themselves."""

    count: (
        Annotated[int, Field(strict=True, ge=1, le=MAX_BINS), Expects(f"a whole number from 1 to {MAX_BINS}, the bins")]
        | None
    ) = None
    low: Number | None = None
    high: Number | None = None
    spacing: Literal["linear", "log"] = "linear"
    edges: (
        Annotated[
            tuple[Number, ...],
            Field(min_length=2, max_length=MAX_BINS + 1),
            Expects(f"a list of 2 to {MAX_BINS + 1} increasing numbers"),
        ]
        | None
    ) = None

    @property
    def number(self) -> int:
        """How many bins the axis has."""
        return len(self.edges) - 1 if self.edges is not None else self.count or 0

    @model_validator(mode="after")
    def _agree(self) -> Self:
        refuse(self._of_edges(self.edges) if self.edges is not None else self._of_range())
        return self

    def _of_edges(self, edges: tuple[float, ...]) -> list[Finding]:
        found = [
            Finding((name,), getattr(self, name), f"no {name} where the edges are given", of=(name, "edges"))
            for name in ("count", "low", "high")
            if getattr(self, name) is not None
        ]
        if self.spacing == "log":
            found.append(
                Finding(("spacing",), "log", "no spacing where the edges are given", "linear", of=("spacing", "edges"))
            )
        for index, (one, two) in enumerate(pairwise(edges), start=1):
            if not one < two:
                expected = f"a number greater than the edge before it, {one!r}"
                found.append(Finding(("edges", index), two, expected, of=("edges",)))
                break
        return found

    def _of_range(self) -> list[Finding]:
        names = ("count", "low", "high")
        found = [
            Finding((name,), NOTHING, "count, low and high, or else edges", of=(name, "edges"))
            for name in names
            if getattr(self, name) is None
        ]
        if self.low is None or self.high is None:
            return found
        if not self.low < self.high:
            found.append(Finding(("high",), self.high, f"a number greater than low = {self.low!r}", of=("low", "high")))
        if self.spacing == "log" and self.low <= 0:
            expected = "a number greater than 0, since the spacing is logarithmic"
            found.append(Finding(("low",), self.low, expected, of=("low", "spacing")))
        return found


class HistogramRequest(Document):
    """A histogram to be filled: one observable, or two for a two-dimensional one, and the bins of each.

    ``per``: "value" gives the density in the observables, "bin" the content of each bin, "solid_angle" the density
    in solid angle.
    """

    name: Name
    observables: Annotated[
        tuple[Observable, ...], Field(min_length=1, max_length=2), Expects("a list of one or two observables")
    ]
    bins: Annotated[
        tuple[Bins, ...],
        Field(min_length=1, max_length=2),
        Expects("a list of tables, each with count, low and high, or with edges; one for each observable"),
    ]
    per: Per = "value"

    @property
    def number(self) -> int:
        """How many bins the histogram has, all axes together."""
        number = 1
        for axis in self.bins:
            number *= axis.number
        return number

    @model_validator(mode="after")
    def _agree(self) -> Self:
        found = []
        axes, asked = len(self.bins), len(self.observables)
        if axes != asked:
            expected = f"as many bins as observables, {asked}"
            found.append(Finding(("bins",), Shown(f"{axes} of them"), expected, of=("bins", "observables")))
        if self.number > MAX_BINS:
            found.append(Finding(("bins",), Shown(f"{self.number} bins"), f"at most {MAX_BINS} bins", of=("bins",)))
        refuse(found)
        return self
