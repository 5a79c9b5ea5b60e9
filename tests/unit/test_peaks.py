"""Peaks: pure data."""

from __future__ import annotations

import pickle
from typing import Any, cast

import pytest

from barnwright.peaks import SHAPES, Peak


def test_peak_is_plain_data() -> None:
    """A peak holds what was declared, with defaults for the rest, and survives pickling."""
    peak = Peak(of="mu- mu+", shape="resonance", at="z_mass", width="z_width")
    assert (peak.of, peak.shape, peak.at, peak.width, peak.power) == ("mu- mu+", "resonance", "z_mass", "z_width", 1.0)
    assert pickle.loads(pickle.dumps(peak)) == peak  # noqa: S301
    assert Peak("t", "power").at is None


@pytest.mark.parametrize("shape", SHAPES)
def test_shapes(shape: str) -> None:
    """Every shape of the contract is known."""
    assert Peak("t", cast("Any", shape)).shape == shape


def test_unknown_shape_names_the_nearest() -> None:
    """A shape with a typing error is refused where it is declared."""
    message = r"^the shape of a peak is one of resonance, power, .*, not 'resonnance'; nearest: resonance$"
    with pytest.raises(ValueError, match=message):
        Peak("t", cast("Any", "resonnance"))
    with pytest.raises(ValueError, match=r", collinear, not 'flat'$"):
        Peak("t", cast("Any", "flat"))
