"""Bins that floats cannot tell apart."""

from __future__ import annotations

import pytest

import barnwright
from barnwright.errors import RequestError

FORMULA = {"reaction": "e- e+ -> mu- mu+", "squared_amplitude": "1", "spin_colour": "averaged"}


@pytest.mark.parametrize(("low", "high"), [(0.5, 0.5000000000000001), (-1e308, 1e308)])
def test_too_many_bins_for_their_range(low: float, high: float) -> None:
    """A finding of the request that names the field, next to all the others."""
    histogram = {"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 10, "low": low, "high": high}]}
    cut = {"name": "c", "observable": "pt(mu)", "min": 1.0}
    with pytest.raises(RequestError, match=r"histograms\[0\].bins\[0\].count: got 10, expected fewer bins") as caught:
        barnwright.predict(
            formula=FORMULA, beams={"kind": "collider", "sqrt_s": 10.0}, histograms=[histogram], cuts=[cut]
        )
    assert {violation.field for violation in caught.value.violations} == {
        "histograms[0].bins[0].count",
        "cuts[0].observable",
    }
