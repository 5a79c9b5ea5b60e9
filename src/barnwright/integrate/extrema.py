"""Extrema of functions on the axis, found on the search grid and refined by golden section."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.polar_axis import Ends, Integers, ends_of
from barnwright.integrate.search_grid import search_grid

Array = NDArray[np.float64]
AxisFunction = Callable[[Integers, Ends], Array]

EPSILON = float(np.finfo(float).eps)
SAME = 8 * EPSILON
"""An extremum and a level that agree to this relative difference are taken as equal."""

_GOLDEN = 0.5 * (np.sqrt(5.0) - 1.0)


@dataclass(frozen=True, slots=True)
class Extrema:
    """Extrema of all rows, flattened, arrays of shape (extremum,).

    Attributes
    ----------
    row, interval : integers
        Where each was found: the row, and the interval of the search grid.
    place, value : arrays
        x from the pole of the interval's hemisphere, and the function there.
    sign : array
        +1 for a maximum, −1 for a minimum.
    """

    row: Integers
    interval: Integers
    place: Array
    value: Array
    sign: Array

    def grazes(self, levels: Array) -> tuple[NDArray[np.bool_], Array]:
        """Which extrema meet a level within rounding, and the values with those extrema put on the near side of it."""
        if levels.size == 0 or self.value.size == 0:
            return np.zeros(self.value.size, dtype=bool), self.value
        place = np.clip(np.searchsorted(levels, self.value), 1, max(levels.size - 1, 1))
        left, right = levels[place - 1], levels[np.minimum(place, levels.size - 1)]
        nearest = np.where(np.abs(self.value - left) < np.abs(self.value - right), left, right)
        touching = np.abs(self.value - nearest) <= SAME * np.abs(nearest)
        inner = np.where(self.sign > 0, np.nextafter(nearest, -np.inf), nearest)
        return touching, np.where(touching, inner, self.value)


def extrema(function: AxisFunction, on_grid: Array) -> Extrema:
    """All extrema that the grid shows: wherever the steps between nodes change sign, or come to a halt.

    Parameters
    ----------
    on_grid : array, shape (row, node)
        The function on the nodes of the search grid.
    """
    with np.errstate(invalid="ignore"):
        step = np.diff(on_grid, axis=1)
        noise = 2 * SAME * np.maximum(np.abs(on_grid[:, 1:]), np.abs(on_grid[:, :-1]))
        step = np.where(np.abs(step) > noise, step, 0.0)
    rising, falling, flat = step > 0, step < 0, step == 0
    turn = (rising[:, :-1] & falling[:, 1:]) | (falling[:, :-1] & rising[:, 1:]) | (~flat[:, :-1] & flat[:, 1:])
    row, left = np.nonzero(turn)
    sign = np.where(step[row, left] > 0, 1.0, -1.0)
    rows, intervals, signs = np.tile(row, 2), np.concatenate([left, left + 1]), np.tile(sign, 2)
    place, value = _in_intervals(function, on_grid, rows, intervals, signs)
    return Extrema(rows, intervals, place, value, signs)


def _in_intervals(
    function: AxisFunction, on_grid: Array, row: Integers, interval: Integers, sign: Array
) -> tuple[Array, Array]:
    """The extremum of each interval: inside it, or at whichever of its ends is higher (for sign +1)."""
    grid = search_grid()
    mode, low, high = grid.interval_mode[interval], grid.low[interval], grid.high[interval]
    at_low, at_high = on_grid[row, interval], on_grid[row, interval + 1]
    place, value = _golden(function, row, mode, (low, high), sign)
    low_is_better = sign * at_low >= sign * at_high
    end, at_end = np.where(low_is_better, low, high), np.where(low_is_better, at_low, at_high)
    inside = sign * value > sign * at_end
    return np.where(inside, place, end), np.where(inside, value, at_end)


def _golden(
    function: AxisFunction, row: Integers, mode: Integers, interval: tuple[Array, Array], sign: Array
) -> tuple[Array, Array]:
    """The highest value of sign·function between two ends; its place is good to the square root of the rounding."""
    a, b = interval
    for _ in range(42 if row.size else 0):
        width = _GOLDEN * (b - a)
        c, d = b - width, a + width
        left = sign * function(row, ends_of(mode, c)) > sign * function(row, ends_of(mode, d))
        a, b = np.where(left, a, c), np.where(left, d, b)
    place = 0.5 * (a + b)
    return place, function(row, ends_of(mode, place)) if row.size else place
