"""A value with its error: what kind of error it is, and the interval that it means."""

from __future__ import annotations

import math
from typing import Annotated, Literal

from pydantic import Field

from barnwright.documents.base import Document, Expects, Number
from barnwright.errors import CalculationError
from barnwright.units import Quantity

NotNegative = Annotated[
    float, Field(strict=True, ge=0, allow_inf_nan=False), Expects("a finite number not less than 0")
]
Unit = Annotated[str, Field(strict=True, max_length=100), Expects("a unit, as text")]
ErrorKind = Literal["statistical", "numerical_bound"]


class Estimate(Document):
    """A value and its error, both None where unknown.

    A ``statistical`` error is one standard deviation, estimated with ``degrees_of_freedom`` (None: known as in a
    normal distribution); a ``numerical_bound`` is what the value is off by at most.
    """

    value: Number | None
    error: NotNegative | None
    unit: Unit = ""
    error_kind: ErrorKind
    degrees_of_freedom: Annotated[float, Field(strict=True, gt=0, allow_inf_nan=False)] | None = None

    def interval(self, confidence: float = 0.95) -> tuple[float, float]:
        """Lower and upper limit that hold the true value with this confidence, in ``unit``.

        Student's t for a statistical error; a numerical bound holds whatever the confidence.

        Raises:
            ValueError: when the confidence does not lie between 0 and 1.
            CalculationError: when the value or its error is not known.
        """
        if not 0 < confidence < 1:
            raise ValueError(f"confidence: got {confidence!r}, expected a number between 0 and 1")
        if self.value is None or self.error is None:
            raise CalculationError("no interval: the value or its error is not known")
        half = self.error
        if self.error_kind == "statistical":
            half *= student_quantile(0.5 + confidence / 2, self.degrees_of_freedom)
        return self.value - half, self.value + half

    def __str__(self) -> str:
        """``84.32(7) pb``."""
        return "not known" if self.value is None else str(Quantity(self.value, self.error, self.unit))


class Total(Estimate):
    """The total; where no point of many passed the cuts, only an ``upper_bound`` with its ``confidence`` is known."""

    upper_bound: NotNegative | None = None
    confidence: Annotated[float, Field(strict=True, gt=0, lt=1)] | None = None

    def interval(self, confidence: float = 0.95) -> tuple[float, float]:
        """As for any estimate; from 0 to the upper bound where only that is known, up to its own confidence."""
        if self.upper_bound is None or self.confidence is None:
            return super().interval(confidence)
        if not 0 < confidence <= self.confidence:
            expected = f"a number greater than 0 and at most {self.confidence!r}, that of the upper bound"
            raise ValueError(f"confidence: got {confidence!r}, expected {expected}")
        return 0.0, self.upper_bound

    def __str__(self) -> str:
        """``84.32(7) pb``, or ``< 0.012 pb (95 % confidence)``."""
        if self.upper_bound is None or self.confidence is None:
            return super().__str__()
        bound = Quantity(float(f"{self.upper_bound:.2g}"), None, self.unit)
        return f"< {bound} ({100 * self.confidence:g} % confidence)"


def student_quantile(probability: float, degrees_of_freedom: float | None) -> float:
    """The quantile of Student's t distribution, of the normal one where the degrees of freedom are None."""
    from scipy.stats import norm, t

    if degrees_of_freedom is None or math.isinf(degrees_of_freedom):
        return float(norm.ppf(probability))
    return float(t.ppf(probability, degrees_of_freedom))
