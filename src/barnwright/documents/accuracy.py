"""How good the answer has to be, and what may be spent on it."""

from __future__ import annotations

from typing import Annotated, Literal, Self

from pydantic import Field, model_validator

from barnwright.documents.base import MAX_WHOLE, Document, Expects, Fraction

Method = Literal["closed_form", "quadrature", "monte_carlo"]


class Accuracy(Document):
    """Targets and limits of one prediction.

    ``relative`` (of the total) or ``absolute`` (in the unit of the request): either suffices. ``relative`` is 1e-3
    unless only ``absolute`` is given. ``per_bin`` must hold as well, in every bin above ``bin_floor`` of the total.
    """

    relative: Fraction | None = None
    absolute: (
        Annotated[
            float,
            Field(strict=True, gt=0, allow_inf_nan=False),
            Expects("a finite number greater than 0 (in the unit of the request)"),
        ]
        | None
    ) = None
    per_bin: Fraction | None = None
    bin_floor: Annotated[
        float,
        Field(strict=True, ge=0, lt=1, allow_inf_nan=False),
        Expects("a number from 0 to less than 1 (a share of the total)"),
    ] = 1e-6
    max_evaluations: Annotated[
        int, Field(strict=True, ge=1, le=MAX_WHOLE), Expects("a whole number from 1 to 2**53")
    ] = 20_000_000
    max_seconds: (
        Annotated[
            float, Field(strict=True, gt=0, allow_inf_nan=False), Expects("a finite number greater than 0 (seconds)")
        ]
        | None
    ) = None
    rounds: Annotated[int, Field(strict=True, ge=1, le=24), Expects("a whole number from 1 to 24")] | None = None
    method: Method | None = None

    @model_validator(mode="after")
    def _fill(self) -> Self:
        if self.relative is None and self.absolute is None:
            self.__dict__["relative"] = 1e-3
        return self
