"""What a prediction, and each of its variations, contributions and processes, consists of."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated, Any, Self

from pydantic import Field

from barnwright.documents.arrays import Array, ArrayDocument, FloatArray, Matrix
from barnwright.documents.base import Expects, Name, ParameterValue
from barnwright.documents.by_name import ByName
from barnwright.documents.estimate import Estimate, Total
from barnwright.documents.histogram import Histogram
from barnwright.documents.notes import Note

Values = Annotated[dict[str, ParameterValue], Expects("a table of parameters and values")]
Masses = Annotated[dict[str, float], Expects("a table of legs and masses (GeV)")]


class DerivedBins(ArrayDocument):
    """A derived quantity bin by bin: ``name`` is that of the histogram; values and errors have its shape."""

    name: Name
    values: FloatArray
    errors: FloatArray


class Derived(Estimate):
    """An asymmetry or a ratio, of the total and, between two variations, of every histogram bin by bin."""

    name: Name
    histograms: ByName[DerivedBins] = Field(default_factory=ByName[DerivedBins])

    def __str__(self) -> str:
        """``A_FB = 0.0163(4)``."""
        return f"{self.name} = {super().__str__()}"


class Results(ArrayDocument):
    """What the whole and its parts have in common.

    ``replicates``, where there are any, has shape (replicate, component), in the unit of the total. Components: the
    total; the bins (row-major), underflow and overflow of every histogram; below and above of every asymmetry.
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
