"""Crossings on the polar axis: found, complete, and with honest uncertainties."""

from __future__ import annotations

from collections.abc import Callable

import mpmath
import numpy as np
import pytest

from barnwright.integrate.polar_axis import BACKWARD, FORWARD, Ends, Integers
from barnwright.integrate.roots import Crossings, crossings

Array = np.ndarray


def along(function: Callable[[Ends], Array]) -> Callable[[Integers, Ends], Array]:
    """A function of the location alone, for every row."""
    return lambda row, ends: np.broadcast_to(function(ends), np.broadcast_shapes(row.shape, ends.one_plus.shape))


def transverse(ends: Ends) -> Array:
    """sin θ, which has a maximum of 1 in the middle."""
    return np.sqrt(ends.one_minus * ends.one_plus)


def located(found: Crossings, side: int) -> list[float]:
    """The sorted x of one hemisphere, grazed extrema left away."""
    return sorted(float(x) for x in found.x[(found.side == side) & ~found.grazing])


@pytest.mark.parametrize("share", [1e-1, 1e-4, 1e-8, 1e-12, 1e-14])
def test_a_double_root_below_the_maximum_is_found_on_both_sides(share: float) -> None:
    """sin θ = 1 − share has one root in each hemisphere, within its stated uncertainty."""
    level = 1 - share
    found = crossings(along(transverse), 1, np.array([level]))
    mpmath.mp.dps = 40
    exact = 1 - mpmath.sqrt(1 - mpmath.mpf(level) ** 2)
    for side in (BACKWARD, FORWARD):
        (x,) = located(found, side)
        (slack,) = found.uncertainty[(found.side == side) & ~found.grazing]
        assert abs(x - exact) <= slack
        assert slack <= 1e-7


@pytest.mark.parametrize("above", [0.0, 1e-15, 1e-12, 0.1])
def test_a_level_at_or_above_the_maximum_is_not_crossed(above: float) -> None:
    """No root is invented at or beyond the maximum; at the maximum its uncertainty is kept."""
    found = crossings(along(transverse), 1, np.array([1 + above]))
    assert located(found, BACKWARD) == located(found, FORWARD) == []
    assert bool(found.grazing.any()) == (above < 1.5e-15)
    assert all(1e-9 < slack < 1e-6 for slack in found.uncertainty)


def test_crossings_close_to_a_pole_keep_their_digits() -> None:
    """1 + c = 1e−13 is found to its last digits, although c itself cannot hold it."""
    found = crossings(along(lambda ends: ends.one_plus), 1, np.array([1e-13]))
    assert located(found, BACKWARD) == [pytest.approx(1e-13, rel=1e-14)]
    assert located(found, FORWARD) == []


def test_rows_are_independent() -> None:
    """Each row has its own function and its own crossings."""
    scale = np.array([1.0, 2.0, 4.0])
    found = crossings(lambda row, ends: scale[row] * transverse(ends), 3, np.array([1.5, 3.0]))
    assert [int(np.sum((found.row == r) & ~found.grazing)) for r in range(3)] == [0, 2, 4]


def test_a_wave_has_all_its_crossings() -> None:
    """cos(9 arccos c) is a Chebyshev polynomial: it crosses 0.3 nine times, its extrema of ±1 never beyond."""
    found = crossings(along(lambda e: np.cos(9 * np.arccos(np.clip(e.c, -1, 1)))), 1, np.array([0.3]))
    roots = sorted([x - 1 for x in located(found, BACKWARD)] + [1 - x for x in located(found, FORWARD)])
    expected = sorted(
        np.cos((np.arccos(0.3) * np.array([1] * 9) + np.array([0, 2, -2, 4, -4, 6, -6, 8, -8]) * np.pi) / 9)
    )
    assert roots == pytest.approx(expected, abs=1e-12)


def test_kinks_and_plateaus() -> None:
    """|c| is crossed on both sides of its kink; a plateau at the level is no crossing."""
    found = crossings(along(lambda e: np.abs(e.c)), 1, np.array([0.25]))
    assert located(found, BACKWARD) == located(found, FORWARD) == [pytest.approx(0.75, rel=1e-14)]
    flat = crossings(along(lambda e: np.maximum(e.c, 0.25)), 1, np.array([0.5]))
    assert located(flat, FORWARD) == [pytest.approx(0.5, rel=1e-14)]


def test_infinite_values_are_bracketed() -> None:
    """A pseudorapidity is ±∞ at the poles and crosses every level once."""

    def eta(ends: Ends) -> Array:
        with np.errstate(divide="ignore"):
            return 0.5 * (np.log(ends.one_plus) - np.log(ends.one_minus))

    found = crossings(along(eta), 1, np.array([-15.0, 0.5, 15.0]))
    assert located(found, BACKWARD) == [pytest.approx(2 / (1 + np.exp(30.0)), rel=1e-12)]
    assert located(found, FORWARD) == pytest.approx([2 / (1 + np.exp(30.0)), 2 / (1 + np.exp(1.0))], rel=1e-12)
