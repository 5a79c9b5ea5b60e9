"""Values with errors."""

from __future__ import annotations

import pytest

from barnwright.documents import Estimate, Total
from barnwright.errors import CalculationError


def _total(**changes: object) -> Total:
    return Total.build(**{"value": 84.32, "error": 0.07, "unit": "pb", "error_kind": "statistical", **changes})


def test_text() -> None:
    """Two significant digits of an error at most, in the unit."""
    assert str(_total()) == "84.32(7) pb"


def test_interval_of_student() -> None:
    """Student's t with 15 degrees of freedom: 2.131 at 95 % (two-sided, from memory of the printed tables)."""
    low, high = _total(degrees_of_freedom=15).interval(0.95)
    assert (high - 84.32) / 0.07 == pytest.approx(2.131, abs=5e-4)
    assert 84.32 - low == pytest.approx(high - 84.32)


def test_interval_of_a_normal_error() -> None:
    """Without degrees of freedom the normal distribution: 1.960 at 95 % (from memory of the printed tables)."""
    assert (_total().interval(0.95)[1] - 84.32) / 0.07 == pytest.approx(1.960, abs=5e-4)
    assert (_total().interval(0.6827)[1] - 84.32) / 0.07 == pytest.approx(1.0, abs=1e-4)


def test_a_bound_is_a_bound() -> None:
    """A numerical bound holds at any confidence."""
    bound = _total(error_kind="numerical_bound")
    assert bound.interval(0.5) == bound.interval(0.999) == (84.32 - 0.07, 84.32 + 0.07)


def test_upper_bound() -> None:
    """No point passed: the interval begins at 0, and no greater confidence than the bound's own is granted."""
    total = _total(value=None, error=None, upper_bound=0.01234, confidence=0.95)
    assert total.interval(0.95) == total.interval(0.5) == (0.0, 0.01234)
    assert str(total) == "< 0.012 pb (95 % confidence)"
    with pytest.raises(ValueError, match=r"^confidence: got 0\.99, expected a number greater than 0 and at most 0\.95"):
        total.interval(0.99)


def test_no_interval() -> None:
    """What is not known has no interval, and a confidence lies between 0 and 1."""
    with pytest.raises(CalculationError, match=r"^no interval: the value or its error is not known$"):
        _total(error=None).interval(0.95)
    with pytest.raises(ValueError, match=r"^confidence: got 95, expected a number between 0 and 1$"):
        _total().interval(95)
    assert str(Estimate.build(value=None, error=None, error_kind="statistical")) == "not known"
