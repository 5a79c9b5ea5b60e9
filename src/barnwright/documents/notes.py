"""Notes, diagnostics, and the account of a run."""

from __future__ import annotations

from typing import Annotated

from pydantic import Field

from barnwright.documents.arrays import ArrayDocument, FloatArray
from barnwright.documents.base import MAX_WHOLE, Document, Expects, Number
from barnwright.documents.estimate import NotNegative

Count = Annotated[int, Field(strict=True, ge=0, le=MAX_WHOLE), Expects("a whole number from 0 to 2**53")]


class Note(Document):
    """Something the reader should know: a code for programs, a sentence for people."""

    code: str
    text: str

    def __str__(self) -> str:
        """``code: text``."""
        return f"{self.code}: {self.text}"


class Diagnostics(ArrayDocument):
    """How the number came about; what does not apply is None.

    ``rounds`` are the rungs of the ladder that were taken: asked for as ``accuracy.rounds`` they repeat the
    prediction to the bit. ``effective_fraction`` is (sum w)^2/(N sum w^2); ``largest_share`` is the largest weight's
    share of the total, ``largest_bin_shares`` the same in every bin of each histogram; ``training_pull`` is the
    difference of training and measurement in standard deviations; ``unresolved`` counts thresholds that could not be
    located to full accuracy (their error is in the bound).
    """

    evaluations: Count = 0
    rounds: Count | None = None
    effective_fraction: NotNegative | None = None
    largest_share: NotNegative | None = None
    largest_bin_shares: dict[str, FloatArray] | None = None
    training_pull: Number | None = None
    non_finite: Count = 0
    negative: Count = 0
    unresolved: Count = 0


class Run(Document):
    """When and how it was computed; the only part that may differ between equal predictions.

    ``computed_at`` is the time in UTC as ISO 8601 has it.
    """

    seconds: NotNegative
    executor: str
    computed_at: str
    from_cache: bool = False
