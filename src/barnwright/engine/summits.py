"""Where the extremum of an observable on a circle, away from the plane of the beams, passes an edge or a cut.

There a bin begins or ends to have a share of the circles, like a square root of the polar angle. Extrema are counted on
circles at the nodes of the search grid: where the number of those above a level changes from one to the next, the place
of the change is found by bisection. What is missed costs time, not accuracy: halving finds it as well.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.circles import Circles
from barnwright.engine.rows import Rows
from barnwright.engine.turning import tells_sides
from barnwright.integrate.extrema import EPSILON
from barnwright.integrate.polar_axis import CENTRE, Ends, Integers, ends_of, hemisphere_of
from barnwright.integrate.roots import Crossings
from barnwright.integrate.search_grid import search_grid
from barnwright.observables import Observable

Array = NDArray[np.float64]

AWAY = 1e-5
"""1 − |cos φ| of the azimuth from which on an extremum counts as away from the plane of the beams."""
MOST = 400
"""Changes that are looked for; an observable with more is left to halving."""
STEPS = 24
NARROWED = 22
"""Golden sections; the value is off by the square of the width, a relative 1e-11."""
GOLDEN = 0.5 * (np.sqrt(5.0) - 1.0)
NOISE = 1e3 * EPSILON
APART = 1e-9
"""Changes closer to one another than this, as a share of an interval of the grid, are one."""


def summit_crossings(observable: Observable, levels: Array, rows: Rows) -> Iterator[Crossings]:
    """The changes of one point for every entry and side of the observable, good to 1e-9 of an interval of the grid."""
    grid = search_grid()
    for side in (1.0, -1.0) if tells_sides(observable) else (1.0,):
        for entry in range(observable.entries):
            asked = _Summits(observable, entry, side, rows)
            numbers, all_of_them = asked.above(ends_of(grid.mode, grid.value), levels)
            lasting = (all_of_them[1:] == all_of_them[:-1])[:, None]  # none comes or goes at the plane of the beams
            interval, level = np.nonzero((numbers[1:] != numbers[:-1]) & lasting)
            if 0 < interval.size <= MOST:
                yield _bisected(asked, numbers[interval, level], interval, levels[level])


class _Summits:
    """The extrema of one entry of an observable on halves of circles."""

    def __init__(self, observable: Observable, entry: int, side: float, rows: Rows) -> None:
        self._observable, self._entry, self._side, self._rows = observable, entry, side, rows

    def above(self, polar: Ends, levels: Array) -> tuple[Integers, Integers]:
        """How many lie above each level, (circle, level), and how many there are, on circles at polar angles."""
        row, value = self._found(polar)
        count, places = polar.one_minus.size, levels.size + 1
        ranks = np.searchsorted(levels, value, side="right")
        table = np.bincount(row * places + ranks, minlength=count * places).reshape(count, places)
        counts = np.asarray(table[:, ::-1].cumsum(axis=1)[:, ::-1])
        return counts[:, 1:], counts[:, 0]

    def above_own(self, polar: Ends, levels: Array) -> Integers:
        """How many lie above a level of its own on each circle, (circle,)."""
        row, value = self._found(polar)
        return np.bincount(row[value >= levels[row]], minlength=polar.one_minus.size)

    def _found(self, polar: Ends) -> tuple[Integers, Array]:
        """Circle and value of every extremum away from the plane of the beams."""
        grid, count = search_grid(), polar.one_minus.size
        circles = Circles(self._rows, polar, np.full(count, self._side))

        def values(row: Integers, ends: Ends) -> Array:
            found = circles.values(self._observable, row, ends)
            return found[self._entry] if self._observable.quantifier is not None else found

        across = ends_of(grid.mode, grid.value)
        on_grid = values(np.arange(count)[:, None], Ends(across.one_minus[None], across.one_plus[None]))
        row, node, sign = _turning_points(np.broadcast_to(on_grid, (count, grid.mode.size)))
        away = np.minimum(across.one_minus[node], across.one_plus[node]) > AWAY
        row, node, sign = row[away], node[away], sign[away]
        best = _highest(
            lambda c: sign * values(row, ends_of(np.array(CENTRE), c)), across.c[node - 1], across.c[node + 1]
        )
        return row, sign * best


def _turning_points(on_grid: Array) -> tuple[Integers, Integers, Array]:
    """Row, node and sign (+1: a maximum) of every node beside which a function goes up and down, above all rounding."""
    with np.errstate(invalid="ignore"):
        step = np.diff(on_grid, axis=1)
        noise = NOISE * np.maximum(np.abs(on_grid[:, 1:]), np.abs(on_grid[:, :-1]))
        up, down = step > noise, step < -noise
    row, left = np.nonzero((up[:, :-1] & down[:, 1:]) | (down[:, :-1] & up[:, 1:]))
    return row, left + 1, np.where(up[row, left], 1.0, -1.0)


def _highest(function: Callable[[Array], Array], low: Array, high: Array) -> Array:
    """The highest values between two ends, by golden section."""
    first, second = high - GOLDEN * (high - low), low + GOLDEN * (high - low)
    at_first, at_second = function(first), function(second)
    for _ in range(NARROWED if low.size else 0):
        left = at_first > at_second
        low, high = np.where(left, low, first), np.where(left, second, high)
        new = np.where(left, high - GOLDEN * (high - low), low + GOLDEN * (high - low))
        at_new = function(new)
        first, second = np.where(left, new, second), np.where(left, first, new)
        at_first, at_second = np.where(left, at_new, at_second), np.where(left, at_first, at_new)
    return np.maximum(at_first, at_second)


def _bisected(asked: _Summits, before: Integers, interval: Integers, levels: Array) -> Crossings:
    grid = search_grid()
    mode, low, high = grid.interval_mode[interval], grid.low[interval].copy(), grid.high[interval].copy()
    for _ in range(STEPS):
        middle = 0.5 * (low + high)
        same = asked.above_own(ends_of(mode, middle), levels) == before
        low, high = np.where(same, middle, low), np.where(same, high, middle)
    order = np.lexsort((low, interval))
    width = np.abs(grid.high - grid.low)[interval[order]]
    new = (np.diff(interval[order], prepend=-1) != 0) | (np.diff(low[order], prepend=-1.0) > APART * width)
    chosen = order[new]
    side, x = hemisphere_of(mode[chosen], low[chosen])
    nothing = np.zeros(chosen.size)
    return Crossings(np.zeros(chosen.size, dtype=np.intp), side, x, nothing, nothing.astype(bool))
