"""Where a function on the axis crosses given values: extrema first, then brackets, then roots.

An edge just below an extremum is a double root, which plain bracketing misses: so the extrema are found and refined first, and
every stretch between neighbouring nodes and extrema is monotone when its crossings are looked for.

The function has the signature ``function(row, ends) -> values``: ``row`` an integer array, ``ends`` an `Ends` of the same shape.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from .polar_axis import BACKWARD, CENTRE, FORWARD, Ends, Integers, ends_of, hemisphere_of

Array = NDArray[np.float64]
AxisFunction = Callable[[Integers, Ends], Array]

EPSILON = float(np.finfo(float).eps)
_GOLDEN = 0.5 * (np.sqrt(5.0) - 1.0)
_SIGNIFICANT = 16 * EPSILON


@dataclass(frozen=True, slots=True)
class Crossings:
    """Crossings of all rows, flattened; arrays of shape (crossing,).

    ``x`` is the distance from the pole of ``side``; ``uncertainty`` is how far rounding of the function may move it.
    """

    row: Integers
    side: Integers
    x: Array
    uncertainty: Array

    @staticmethod
    def none() -> Crossings:
        """No crossing at all."""
        whole, real = np.zeros(0, dtype=np.intp), np.zeros(0)
        return Crossings(whole, whole, real, real)

    @staticmethod
    def join(parts: list[Crossings]) -> Crossings:
        """The crossings of several functions."""
        if not parts:
            return Crossings.none()
        return Crossings(*(np.concatenate([getattr(p, f) for p in parts]) for f in ("row", "side", "x", "uncertainty")))


@dataclass(frozen=True, slots=True)
class _Stretch:
    """Intervals on which the function is taken as monotone: ends in one coordinate (mode), values there."""

    row: Integers
    mode: Integers
    low: Array
    high: Array
    at_low: Array
    at_high: Array

    def take(self, chosen: Integers) -> _Stretch:
        return _Stretch(*(getattr(self, f)[chosen] for f in ("row", "mode", "low", "high", "at_low", "at_high")))


@lru_cache
def _grid() -> tuple[Integers, Array, Integers, Array, Array]:
    """Nodes in order of c, and for each interval between them its mode and its two ends in that mode."""
    near = np.concatenate([[0.0], np.geomspace(1e-16, 0.06, 48), np.linspace(0.08, 1.0, 36)])
    mode = np.concatenate([np.full(near.size, BACKWARD), np.full(near.size - 1, FORWARD)])
    value = np.concatenate([near, near[:-1][::-1]])
    last = near.size - 1
    interval_mode = np.where(np.arange(value.size - 1) < last, BACKWARD, FORWARD)
    low, high = value[:-1].copy(), value[1:].copy()
    low[last] = 1.0
    return mode, value, interval_mode, low, high


def crossings(function: AxisFunction, rows: int, levels: Array) -> Crossings:
    """Where the function of each row crosses each level.

    Parameters
    ----------
    function : callable
    rows : int
    levels : array, increasing

    Returns
    -------
    Crossings
        A level is crossed where ``value >= level`` changes.
    """
    mode, value, interval_mode, low, high = _grid()
    row = np.arange(rows)[:, None]
    on_grid = np.broadcast_to(function(row, ends_of(mode, value)), (rows, mode.size))
    bends = _extrema(function, on_grid)
    plain = np.ones((rows, low.size), dtype=bool)
    plain[bends.row, bends.interval] = False
    r, k = np.nonzero(plain & (_rank(levels, on_grid[:, :-1]) != _rank(levels, on_grid[:, 1:])))
    straight = _Stretch(r, interval_mode[k], low[k], high[k], on_grid[r, k], on_grid[r, k + 1])
    return Crossings.join(
        [_refine(function, stretch, levels) for stretch in (straight, *bends.halves(on_grid))] + [bends.touching(levels)]
    )


@dataclass(frozen=True, slots=True)
class _Extrema:
    """Refined extrema: row, the grid interval each lies in, its place and value, and the curvature there."""

    row: Integers
    interval: Integers
    place: Array
    value: Array
    curvature: Array

    def halves(self, on_grid: Array) -> tuple[_Stretch, _Stretch]:
        """The two monotone stretches on either side of each extremum within its interval."""
        _, _, interval_mode, low, high = _grid()
        k = self.interval
        mode = interval_mode[k]
        before = _Stretch(self.row, mode, low[k], self.place, on_grid[self.row, k], self.value)
        after = _Stretch(self.row, mode, self.place, high[k], self.value, on_grid[self.row, k + 1])
        return before, after

    def touching(self, levels: Array) -> Crossings:
        """Extrema that a level meets within rounding: the crossing may or may not be there, a root of ε away."""
        gap = np.abs(self.value[:, None] - levels) <= 8 * EPSILON * np.abs(levels)
        i, _ = np.nonzero(gap)
        side, x = hemisphere_of(_grid()[2][self.interval[i]], self.place[i])
        slack = 8 * EPSILON * np.abs(self.value[i]) / np.maximum(np.abs(self.curvature[i]), 1e-300)
        return Crossings(self.row[i], side, x, 2 * np.sqrt(slack))


def _rank(levels: Array, values: Array) -> Integers:
    return np.searchsorted(levels, values, side="right")


def _extrema(function: AxisFunction, on_grid: Array) -> _Extrema:
    """Triples of grid nodes whose middle is highest or lowest, refined by golden section on either side of it."""
    _, _, interval_mode, low, high = _grid()
    with np.errstate(invalid="ignore"):
        step = np.diff(on_grid, axis=1)
        noise = _SIGNIFICANT * np.maximum(np.abs(on_grid[:, 1:]), np.abs(on_grid[:, :-1]))
        step = np.where(np.abs(step) > noise, step, 0.0)
        turn = (step[:, :-1] * step[:, 1:] < 0) | ((step[:, :-1] != 0) & (step[:, 1:] == 0))
    row, left = np.nonzero(turn)
    row, k = np.repeat(row, 2), np.stack([left, left + 1], axis=1).ravel()
    if row.size == 0:
        return _Extrema(row, k, np.zeros(0), np.zeros(0), np.zeros(0))
    sign = np.repeat(np.where(step[row[::2], left] > 0, 1.0, -1.0), 2)
    mode = interval_mode[k]
    place, value = _golden(function, row, mode, (low[k], high[k]), sign)
    inside = sign * value > sign * np.where(sign > 0, np.maximum(on_grid[row, k], on_grid[row, k + 1]),
                                            np.minimum(on_grid[row, k], on_grid[row, k + 1]))
    at_node = ~inside
    middle = np.where(np.arange(row.size) % 2 == 0, high[k], low[k])
    place = np.where(at_node, middle, place)
    value = np.where(at_node, np.where(np.arange(row.size) % 2 == 0, on_grid[row, k + 1], on_grid[row, k]), value)
    curvature = _curvature(function, row, mode, place, value)
    return _Extrema(row, k, place, value, curvature)


def _golden(
    function: AxisFunction, row: Integers, mode: Integers, interval: tuple[Array, Array], sign: Array
) -> tuple[Array, Array]:
    """The highest value of sign·function between the ends, to the square root of the rounding."""
    a, b = interval
    for _ in range(40):
        width = _GOLDEN * (b - a)
        c, d = b - width, a + width
        left = sign * function(row, ends_of(mode, c)) > sign * function(row, ends_of(mode, d))
        a, b = np.where(left, a, c), np.where(left, d, b)
    place = 0.5 * (a + b)
    return place, function(row, ends_of(mode, place))


def _curvature(function: AxisFunction, row: Integers, mode: Integers, place: Array, value: Array) -> Array:
    """X'' at an extremum from one side, towards the hemisphere's middle or pole, whichever is farther."""
    room = np.where(place > 0.5, -place, 1.0 - place)
    step = 1e-3 * room
    return 2 * (function(row, ends_of(mode, place + step)) - value) / np.square(step)


def _refine(function: AxisFunction, stretch: _Stretch, levels: Array) -> Crossings:
    """All levels between the end values of each stretch, by Chandrupatla's method (1997)."""
    first, last = _rank(levels, stretch.at_low), _rank(levels, stretch.at_high)
    count = np.abs(last - first)
    which = np.repeat(np.arange(count.size), count)
    if which.size == 0:
        return Crossings.none()
    offset = np.arange(which.size) - np.repeat(np.cumsum(count) - count, count)
    level = levels[np.minimum(first, last)[which] + offset]
    part = stretch.take(which)
    place = _chandrupatla(function, part, level)
    side, x = hemisphere_of(part.mode, place)
    return Crossings(part.row, side, x, _uncertainty(function, part, place, level))


def _chandrupatla(function: AxisFunction, part: _Stretch, level: Array) -> Array:
    """Roots of function − level inside brackets; T. R. Chandrupatla, Adv. Eng. Software 28 (1997) 145, from memory."""
    a, b = part.high.copy(), part.low.copy()
    fa, fb = part.at_high - level, part.at_low - level
    c, fc = a.copy(), fa.copy()
    t = np.full_like(a, 0.5)
    for _ in range(120):
        xt = a + t * (b - a)
        ft = function(part.row, ends_of(part.mode, xt)) - level
        same = (ft >= 0) == (fa >= 0)
        c, fc = np.where(same, a, b), np.where(same, fa, fb)
        b, fb = np.where(same, b, a), np.where(same, fb, fa)
        a, fa = xt, ft
        best, f_best = np.where(np.abs(fa) < np.abs(fb), a, b), np.where(np.abs(fa) < np.abs(fb), fa, fb)
        tolerance = 2 * EPSILON * np.abs(best) + 1e-300
        with np.errstate(divide="ignore", invalid="ignore"):
            limit = 0.5 * tolerance / np.abs(b - a)
            if np.all((limit > 0.5) | (f_best == 0)):
                break
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
    room = np.minimum(np.abs(place - part.low), np.abs(part.high - place))
    step = 1e-3 * np.where(room > 0, room, np.abs(part.high - part.low))
    up, down = (function(part.row, ends_of(part.mode, place + s * step)) for s in (1.0, -1.0))
    here = level
    with np.errstate(divide="ignore", invalid="ignore"):
        size = EPSILON * np.maximum(np.abs(level), np.abs(part.at_high - part.at_low) * EPSILON)
        linear = 4 * size / np.abs((up - down) / (2 * step))
        square = np.sqrt(8 * size / np.abs((up + down - 2 * here) / np.square(step)))
        moved = np.fmin(linear, square)
    return np.where(np.isfinite(moved), moved, 0.0) + 2 * EPSILON * np.abs(place)
