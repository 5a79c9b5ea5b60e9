"""What a prediction, and each of its variations, contributions and processes, consists of."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING, Annotated, Any, Self

from pydantic import Field, model_validator

from barnwright.documents.arrays import Array, ArrayDocument, FloatArray, Matrix
from barnwright.documents.base import Expects, Name, Number, ParameterValue
from barnwright.documents.by_name import ByName
from barnwright.documents.checks import Finding, Shown, refuse
from barnwright.documents.estimate import Estimate, Total
from barnwright.documents.histogram import Histogram
from barnwright.documents.notes import Note

Values = Annotated[dict[str, ParameterValue], Expects("a table of parameters and values")]
Masses = Annotated[dict[str, float], Expects("a table of legs and masses (GeV)")]


class DerivedBins(ArrayDocument):
    """A derived quantity bin by bin: ``name`` is that of the histogram, whose shape all arrays have.

    Asymmetries and ratios are those of the contents. Of an envelope ``values`` and ``errors`` are those of the
    histogram, ``low`` and ``high`` the smallest and the largest value, all in the histogram's unit.
    """

    name: Name
    values: FloatArray
    errors: FloatArray
    low: FloatArray | None = None
    high: FloatArray | None = None

    @model_validator(mode="after")
    def _agree(self) -> Self:
        shape = self.values.shape
        found = [
            Finding((name,), Shown(f"shape {values.shape}"), f"the shape of values, {shape}")
            for name, values in (("errors", self.errors), ("low", self.low), ("high", self.high))
            if values is not None and values.shape != shape
        ]
        refuse(found)
        return self


class Derived(Estimate):
    """An asymmetry, a ratio or an envelope, of the total and, between variations, of every histogram bin by bin.

    An envelope has the total itself, and ``low`` and ``high``, the smallest and the largest of it and its variations.
    """

    name: Name
    low: Number | None = None
    high: Number | None = None
    histograms: ByName[DerivedBins] = Field(default_factory=ByName[DerivedBins])

    def __str__(self) -> str:
        """``A_FB = 0.0163(4)``, ``scale = 84.32(7) pb, 82.1 to 86.4 pb``."""
        return f"{self.name} = {super().__str__()}{self.spread}"

    @property
    def spread(self) -> str:
        """Of an envelope, its ends as text after the value: ``, 82.1 to 86.4 pb``; else nothing."""
        if self.low is None or self.high is None:
            return ""
        digits = max(3, _digits(self.low, self.high))
        return f", {self.low:.{digits}g} to {self.high:.{digits}g} {self.unit}".rstrip()


class Results(ArrayDocument):
    """What the whole and its parts have in common.

    ``replicates``, where there are any, has shape (replicate, component), in the unit of the total. Components: the
    total; the bins (row-major), underflow and overflow of every histogram; below and above of every
    asymmetry, and of those in bins bin after bin.
    """

    if TYPE_CHECKING:
        total: Total
        histograms: ByName[Histogram]
        derived: ByName[Derived]
        replicates: Array | None

    @classmethod
    def build(cls, **fields: Any) -> Self:
        """As ``Document.build``; the histograms get their replicates."""
        made = super().build(**fields)
        made.model_post_init(None)
        return made

    def model_post_init(self, _context: Any, /) -> None:
        """Give each histogram its columns of the replicates; pydantic calls this after a validation."""
        if self.replicates is None:
            return
        first = 1
        for histogram in self.histograms:
            histogram.attach(self.replicates[:, first : first + histogram.values.size])
            first += histogram.values.size + 2


class Part(Results):
    """One variation, contribution or process: the same shape as the whole, and what is its own."""

    name: Name
    total: Total
    histograms: ByName[Histogram] = Field(default_factory=ByName[Histogram])
    derived: ByName[Derived] = Field(default_factory=ByName[Derived])
    parameters: Values | None = None
    masses: Masses | None = None
    notes: tuple[Note, ...] = ()
    replicates: Matrix | None = None

    def __repr__(self) -> str:
        """Name and total."""
        return f"<Part {self.name!r}: {self.total}>"

    __str__ = __repr__


def _digits(low: float, high: float) -> int:
    """How many digits tell two numbers apart to two digits of their difference, at most 12."""
    size, apart = max(abs(low), abs(high)), high - low
    return min(12, 2 + math.ceil(math.log10(size / apart))) if apart > 0 else 6
