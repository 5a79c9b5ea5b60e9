"""The prediction: the document that answers."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated, Literal, Self

from pydantic import Field, ValidationError

from barnwright.documents.arrays import Matrix
from barnwright.documents.base import Expects
from barnwright.documents.by_name import ByName
from barnwright.documents.canonical import canonical_text
from barnwright.documents.estimate import Total
from barnwright.documents.findings import violations_of
from barnwright.documents.formats import read_json
from barnwright.documents.histogram import Histogram
from barnwright.documents.notes import Diagnostics, Note, Run
from barnwright.documents.request import Request
from barnwright.documents.results import Derived, Masses, Part, Results, Values
from barnwright.errors import RequestError
from barnwright.pictures import picture

if TYPE_CHECKING:
    from os import PathLike

    from matplotlib.figure import Figure

Status = Literal["converged", "evaluation_limit", "time_limit", "cancelled", "suspect"]
Method = Literal["closed_form", "quadrature", "monte_carlo"]
Numbers = Annotated[dict[str, float], Expects("a table of names and numbers")]
Texts = Annotated[dict[str, str], Expects("a table of names and texts")]


class Prediction(Results):
    """What was asked, what came out, and all that is needed to get it again.

    ``request`` has every default filled in; ``parameters``, ``masses`` (GeV) and ``constants`` are what was used,
    ``sources`` where they come from; ``versions``, ``source_digests`` (SHA-256) and ``environment`` say by what code.
    ``contributions``, ``processes`` and ``variations`` are read by name or position and have the same shape.
    ``run`` is the only part that may differ between equal predictions.
    """

    schema_: Literal["barnwright.prediction/1"] = Field(default="barnwright.prediction/1", alias="schema")
    request: Request
    status: Status
    method: Method
    order: str
    scheme: str | None = None
    notes: tuple[Note, ...] = ()
    total: Total
    histograms: ByName[Histogram] = Field(default_factory=ByName[Histogram])
    derived: ByName[Derived] = Field(default_factory=ByName[Derived])
    contributions: ByName[Part] = Field(default_factory=ByName[Part])
    processes: ByName[Part] = Field(default_factory=ByName[Part])
    variations: ByName[Part] = Field(default_factory=ByName[Part])
    parameters: Values
    masses: Masses
    constants: Numbers
    sources: Texts
    versions: Texts
    source_digests: Texts
    environment: str
    replicates: Matrix | None = None
    diagnostics: Diagnostics
    run: Run

    @property
    def schema(self) -> str:  # type: ignore[override]
        """The schema of the document."""
        return self.schema_

    @classmethod
    def from_json(cls, text: str) -> Self:
        """The prediction of a JSON text, wholly checked.

        Raises:
            RequestError: with every finding.
        """
        try:
            return cls.model_validate(read_json(text))
        except ValidationError as error:
            raise RequestError(violations_of(error, cls)) from None

    def canonical_json(self) -> str:
        """The one JSON text of this prediction without ``run``: equal for predictions of the same bits."""
        return canonical_text(self.model_dump(mode="json", exclude={"run"}))

    def same_bits(self, other: Prediction) -> bool:
        """Whether the two are the same to the last bit, ``run`` apart."""
        return self.canonical_json() == other.canonical_json()

    def plot(self, path: str | PathLike[str] | None = None) -> Figure:
        """The picture of the histograms: a matplotlib figure, written to ``path`` (png, pdf or svg) if one is given.

        Raises:
            RequestError: when there is no histogram, or the path names no picture.
            BarnwrightError: when matplotlib (extra ``plot``) is missing.
        """
        return picture(self, path)

    @property
    def title(self) -> str:
        """The process, the processes, or the reaction of the formula."""
        request = self.request
        if request.formula is not None:
            return request.formula.reaction
        return request.process or " + ".join(request.processes or ())

    def __repr__(self) -> str:
        """Process, total and status in one line."""
        return f"<Prediction {self.title}: {self.total}, {self.status} ({self.method})>"

    def __str__(self) -> str:
        """Process, total and status, then derived quantities and notes, a line each."""
        lines = [f"{self.title}: {self.total}, {self.status} ({self.method}, order {self.order})"]
        lines += [f"  {derived}" for derived in self.derived]
        lines += [f"  note {note}" for note in self.notes]
        return "\n".join(lines)
