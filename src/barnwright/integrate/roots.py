"""Where a function on the axis crosses given levels: extrema first, then brackets, then roots.

An edge just below an extremum is a double root, which plain bracketing misses: so the extrema are found and refined
first, and every stretch between neighbouring nodes and extrema is monotone when its crossings are looked for.

The function has the signature ``function(row, ends) -> values``: ``row`` an integer array, ``ends`` an `Ends`, which
broadcast.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.extrema import EPSILON, AxisFunction, Extrema, extrema
from barnwright.integrate.polar_axis import Integers, ends_of, hemisphere_of
from barnwright.integrate.search_grid import search_grid

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Crossings:
    """Crossings of all rows, flattened; arrays of shape (crossing,).

    Attributes
    ----------
    row, side : integers
    x : array
        Distance from the pole of ``side``.
    uncertainty : array
        How far rounding of the function may move the crossing.
    grazing : bools
        An extremum that meets a level within rounding: the function stays on one side of it, the uncertainty counts
        all the same.
    """

    row: Integers
    side: Integers
    x: Array
    uncertainty: Array
    grazing: NDArray[np.bool_]

    @staticmethod
    def none() -> Crossings:
        """No crossing at all."""
        whole, real = np.zeros(0, dtype=np.intp), np.zeros(0)
        return Crossings(whole, whole, real, real, np.zeros(0, dtype=bool))

    @staticmethod
    def join(parts: list[Crossings]) -> Crossings:
        """The crossings of several functions."""
        if not parts:
            return Crossings.none()
        fields = ("row", "side", "x", "uncertainty", "grazing")
        return Crossings(*(np.concatenate([getattr(p, f) for p in parts]) for f in fields))


@dataclass(frozen=True, slots=True)
class _Stretch:
    """Intervals on which the function is taken as monotone: ends in one hemisphere, values there."""

    row: Integers
    mode: Integers
    low: Array
    high: Array
    at_low: Array
    at_high: Array

    def take(self, chosen: Integers) -> _Stretch:
        return _Stretch(*(getattr(self, f)[chosen] for f in ("row", "mode", "low", "high", "at_low", "at_high")))


def crossings(function: AxisFunction, rows: int, levels: Array) -> Crossings:
    """Where the function of each row crosses each level (``value >= level`` changes).

    Parameters
    ----------
    function : callable
    rows : int
    levels : array, increasing
    """
    grid = search_grid()
    row = np.arange(rows)[:, None]
    on_grid = np.broadcast_to(function(row, ends_of(grid.mode[None], grid.value[None])), (rows, grid.mode.size))
    bends = extrema(function, on_grid)
    plain = _rank(levels, on_grid[:, :-1]) != _rank(levels, on_grid[:, 1:])
    plain[bends.row, bends.interval] = False
    r, k = np.nonzero(plain)
    straight = _Stretch(r, grid.interval_mode[k], grid.low[k], grid.high[k], on_grid[r, k], on_grid[r, k + 1])
    touching, inner = bends.grazes(levels)
    stretches = (straight, *_halves(bends, inner, on_grid))
    return Crossings.join([*(_refine(function, s, levels) for s in stretches), _grazing(bends, touching, on_grid)])


def _halves(bends: Extrema, inner: Array, on_grid: Array) -> tuple[_Stretch, _Stretch]:
    """The two monotone stretches on either side of each extremum within its interval."""
    grid, k = search_grid(), bends.interval
    mode = grid.interval_mode[k]
    before = _Stretch(bends.row, mode, grid.low[k], bends.place, on_grid[bends.row, k], inner)
    after = _Stretch(bends.row, mode, bends.place, grid.high[k], inner, on_grid[bends.row, k + 1])
    return before, after


def _grazing(bends: Extrema, touching: NDArray[np.bool_], on_grid: Array) -> Crossings:
    """The extrema that a level touches, with the stretch over which the function stays within rounding of it."""
    row, k, place = bends.row[touching], bends.interval[touching], bends.place[touching]
    grid = search_grid()
    width = np.abs(grid.high[k] - grid.low[k])
    drop = np.abs(2 * bends.value[touching] - on_grid[row, k] - on_grid[row, k + 1])
    with np.errstate(divide="ignore", invalid="ignore"):
        reach = width * np.sqrt(16 * EPSILON * np.abs(bends.value[touching]) / drop)
    side, x = hemisphere_of(grid.interval_mode[k], place)
    return Crossings(row, side, x, np.fmin(reach, width), np.ones(row.size, dtype=bool))


def _rank(levels: Array, values: Array) -> Integers:
    return np.searchsorted(levels, values, side="right")


def _refine(function: AxisFunction, stretch: _Stretch, levels: Array) -> Crossings:
    """All levels between the end values of each stretch."""
    first, last = _rank(levels, stretch.at_low), _rank(levels, stretch.at_high)
    count = np.where(stretch.low == stretch.high, 0, np.abs(last - first))
    which = np.repeat(np.arange(count.size), count)
    if which.size == 0:
        return Crossings.none()
    offset = np.arange(which.size) - np.repeat(np.cumsum(count) - count, count)
    level = levels[np.minimum(first, last)[which] + offset]
    part = stretch.take(which)
    place = _chandrupatla(function, part, level)
    side, x = hemisphere_of(part.mode, place)
    return Crossings(part.row, side, x, _uncertainty(function, part, place, level), np.zeros(x.size, dtype=bool))


def _chandrupatla(function: AxisFunction, part: _Stretch, level: Array) -> Array:
    """Roots of function − level inside brackets; T. R. Chandrupatla, Adv. Eng. Software 28 (1997) 145, from memory.

    A root that is found stays as it is while others go on, so that its bits do not depend on its company.
    """
    a, b = part.high.copy(), part.low.copy()
    fa, fb = part.at_high - level, part.at_low - level
    c, fc = a.copy(), fa.copy()
    t = np.full_like(a, 0.5)
    best, live = a.copy(), np.arange(a.size)
    for _ in range(120):
        xt = a + t * (b - a)
        ft = function(part.row[live], ends_of(part.mode[live], xt)) - level[live]
        same = (ft >= 0) == (fa >= 0)
        c, fc = np.where(same, a, b), np.where(same, fa, fb)
        b, fb = np.where(same, b, a), np.where(same, fb, fa)
        a, fa = xt, ft
        best[live] = nearer = np.where(np.abs(fa) < np.abs(fb), a, b)
        with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
            limit = 0.5 * (2 * EPSILON * np.abs(nearer) + 1e-300) / np.abs(b - a)
            open_ = ~((limit > 0.5) | (fa == 0) | (fb == 0))
            if not open_.any():
                break
            a, b, c, fa, fb, fc, limit, live = (array[open_] for array in (a, b, c, fa, fb, fc, limit, live))
            t = np.clip(_next_step((a, fa), (b, fb), (c, fc)), np.minimum(limit, 0.5), np.maximum(1 - limit, 0.5))
    return best


def _next_step(a: tuple[Array, Array], b: tuple[Array, Array], c: tuple[Array, Array]) -> Array:
    """Inverse quadratic interpolation where it is safe, bisection elsewhere, as a share of the bracket."""
    xi, phi = (a[0] - b[0]) / (c[0] - b[0]), (a[1] - b[1]) / (c[1] - b[1])
    safe = (phi**2 < xi) & ((1 - phi) ** 2 < 1 - xi)
    alpha = (c[0] - a[0]) / (b[0] - a[0])
    step = (a[1] / (b[1] - a[1])) * (c[1] / (b[1] - c[1])) + alpha * (a[1] / (c[1] - a[1])) * (b[1] / (c[1] - b[1]))
    return np.where(safe & np.isfinite(step), step, 0.5)


def _uncertainty(function: AxisFunction, part: _Stretch, place: Array, level: Array) -> Array:
    """How far rounding moves a crossing: 4ε|X/X′|, or √(8ε|X/X″|) where that is smaller (close to an extremum)."""
    size = EPSILON * np.maximum(np.abs(level), np.minimum(np.abs(part.at_low), np.abs(part.at_high)))
    room = np.minimum(np.abs(place - part.low), np.abs(part.high - place))
    width = np.abs(part.high - part.low)
    step = np.minimum(0.1 * np.maximum(room, 1e-3 * width), np.where(place > 0, 0.5 * place, width))
    up, down = (function(part.row, ends_of(part.mode, place + s * step)) for s in (1.0, -1.0))
    with np.errstate(divide="ignore", invalid="ignore"):
        rise = np.abs(up - down)
        linear = np.where(rise > 16 * size, 8 * size * step / rise, np.inf)
        square = width * np.sqrt(4 * size / np.abs(part.at_high - part.at_low))
        moved = np.fmin(linear, square)
    return np.where(np.isfinite(moved), moved, 0.0) + 2 * EPSILON * np.abs(place)
