"""Gauss–Legendre quadrature of a density over panels, refined where a panel asks for it.

A panel is accepted when the fine rule and the coarser one agree to `TOLERANCE` of its own integral; otherwise the
order rises to 40 and then the panel is halved, near a pole geometrically (x from the pole keeps its digits). What a
panel does depends on that panel alone, so a point of a scan has the bits of a point asked for by itself.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.extrema import EPSILON
from barnwright.integrate.gauss import FIRST_ORDER, ORDERS, embedded_weights, gauss_legendre
from barnwright.integrate.panels import Panels
from barnwright.integrate.polar_axis import Ends, Integers, ends_of

Array = NDArray[np.float64]
Located = tuple[int, float, float]
"""A row, and 1 − c and 1 + c."""
Density = Callable[[Integers | None, Ends], Array]
"""``density(rows, ends)``: rows None means all of them, ends (row or 1, node); else one row number a line of ends."""

COUNTED = ("evaluations", "non_finite", "negative", "unresolved")
EVALUATIONS, NON_FINITE, NEGATIVE, UNRESOLVED = range(len(COUNTED))

TOLERANCE = 4e-14
ROUNDING = 4 * EPSILON
DEEPEST = 60
SETTLED = 1e-9
"""A panel that was left open has settled all the same when its error is a smaller share of the row's largest panel."""
MOST_OPEN = 256
"""Pieces of one panel that may still be open; an integrand that needs more does not settle."""
MOST_EVALUATIONS = 4_000_000
"""Of one row."""
AT_ONCE = 2048
"""Pieces that are evaluated at once, so that memory stays small."""


@dataclass(frozen=True, slots=True)
class PanelIntegrals:
    """Integrals over panels, with bounds of their numerical errors.

    Attributes
    ----------
    value, error : arrays, shape (row, panel), in the unit of the density
    counts : array, shape (row, 4)
        What `COUNTED` names: nodes (those of panels without width left away), nodes at which the density was not
        finite, or below 0, and pieces that could not be refined to the tolerance.
    worst : tuple or None
        (row, 1 − c, 1 + c, value) of the first node that was not finite, or negative.
    """

    value: Array
    error: Array
    counts: Array
    worst: tuple[int, float, float, float] | None = None

    @property
    def clean(self) -> bool:
        """Whether the density was finite and not below 0 at every node."""
        return self.worst is None


@dataclass(frozen=True, slots=True)
class _Pieces:
    """Some panels or parts of them, one a line: row, hemisphere, ends in the map's variable, scale of the map."""

    row: Integers
    panel: Integers
    side: Integers
    low: Array
    high: Array
    scale: Array

    def take(self, chosen: Integers | NDArray[np.bool_] | slice) -> _Pieces:
        return _Pieces(*(getattr(self, f)[chosen] for f in ("row", "panel", "side", "low", "high", "scale")))

    def halved(self) -> _Pieces:
        middle = 0.5 * (self.low + self.high)
        twice = self.take(np.tile(np.arange(self.row.size), 2))
        return replace(twice, low=np.concatenate([self.low, middle]), high=np.concatenate([middle, self.high]))


def to_map(x: Array, scale: Array) -> Array:
    """The map's variable w of x: x itself where the scale is infinite, ln(1 + x/δ) near a peak of width δ."""
    if np.all(np.isinf(scale)):
        return x
    with np.errstate(invalid="ignore"):
        return np.where(np.isinf(scale), x, np.log1p(x / scale))


def from_map(w: Array, scale: Array) -> tuple[Array, Array]:
    """x of w, and dx/dw."""
    if np.all(np.isinf(scale)):
        return w, np.ones_like(scale)
    with np.errstate(invalid="ignore", over="ignore"):
        flat = np.isinf(scale)
        x = np.where(flat, w, scale * np.expm1(np.where(flat, 0.0, w)))
        return x, np.where(flat, 1.0, x + scale)


def integrate_panels(density: Density, panels: Panels, scales: Array, rows: int) -> PanelIntegrals:
    """Integrate a density over every panel of every row.

    Parameters
    ----------
    density : callable
    panels : Panels
    scales : array, shape (row or 1, 2)
        δ of the backward and the forward pole (∞: no peak there).
    rows : int
    """
    with np.errstate(invalid="ignore", over="ignore"):  # what is not finite is counted, not warned about
        return _integrated(density, panels, scales[:, panels.side], rows)


def _integrated(density: Density, panels: Panels, scale: Array, rows: int) -> PanelIntegrals:
    left, right = to_map(panels.left, scale), to_map(panels.right, scale)
    ends, measure = _first_nodes(panels, scale, left, right)
    nodes, weights = gauss_legendre(FIRST_ORDER)
    found = density(None, ends)
    shape = (rows, nodes.size * panels.side.size)
    values = (found if found.shape == shape else np.broadcast_to(found, shape)).reshape(rows, nodes.size, -1) * measure
    fine = _weighted(values, weights)
    error = np.abs(_weighted(values, weights - embedded_weights()))
    counts = np.zeros((rows, len(COUNTED)))
    counts[:, EVALUATIONS] = FIRST_ORDER * np.count_nonzero(panels.width, axis=1)
    result = PanelIntegrals(fine, error, counts)

    def located(bad: Integers) -> Located:
        row, node, panel = bad
        place = (min(row, ends.one_plus.shape[0] - 1), node * panels.side.size + panel)
        return int(row), float(ends.one_minus[place]), float(ends.one_plus[place])

    result = _inspected(result, values, np.arange(rows), located)
    size = fine if result.clean else _weighted(np.abs(values), weights)
    todo = np.nonzero(error > TOLERANCE * size)
    if todo[0].size:
        shape = (rows, panels.side.size)
        low, high, width = (np.broadcast_to(a, shape)[todo] for a in (left, right, scale))
        pieces = _Pieces(todo[0], todo[1], panels.side[todo[1]], low, high, width)
        result = _refined(density, pieces, result)
    return replace(result, error=result.error + ROUNDING * np.abs(result.value))


def _first_nodes(panels: Panels, scale: Array, left: Array, right: Array) -> tuple[Ends, Array]:
    """The nodes of the first order, (row or 1, node × panel), and dc, (row or 1, node or 1, panel)."""
    if np.isinf(scale).all():
        ends, width = panels.first_nodes
        return ends, width[:, None, :]
    nodes, _ = gauss_legendre(FIRST_ORDER)
    span = (right - left)[:, None, :]
    x, slope = from_map(left[:, None, :] + span * nodes[:, None], scale[:, None, :])
    ends = ends_of(np.broadcast_to(panels.side, x.shape), x)
    return Ends(*(e.reshape(e.shape[0], -1) for e in ends)), slope * np.abs(span)


def _weighted(values: Array, weights: Array) -> Array:
    """The weighted sum over the middle axis, node by node in a fixed order, so that bits never depend on the batch."""
    total: Array = values[:, 0] * weights[0]
    for k in range(1, weights.size):
        if weights[k]:
            total += values[:, k] * weights[k]
    return total


def _refined(density: Density, pieces: _Pieces, result: PanelIntegrals) -> PanelIntegrals:
    """Raise the order of the pieces that need it, then halve what is left."""
    value, error = result.value, result.error
    before = value[pieces.row, pieces.panel]
    for order in ORDERS[1:]:
        now, size, result = _evaluated(density, pieces, order, result)
        change = np.abs(now - before)
        value[pieces.row, pieces.panel], error[pieces.row, pieces.panel] = now, change
        again = change > TOLERANCE * size
        pieces, before = pieces.take(again), now[again]
        if pieces.row.size == 0:
            return result
    value[pieces.row, pieces.panel] = error[pieces.row, pieces.panel] = 0.0
    return _halved(density, pieces, result)


def _halved(density: Density, pieces: _Pieces, result: PanelIntegrals) -> PanelIntegrals:
    """Halve the pieces until each half agrees with its coarser rule; add the halves up in a fixed order.

    A panel with too many open pieces, or a row that has cost too much, is left as it is, and counted where it matters.
    """
    left_open = np.zeros(result.value.shape, dtype=bool)
    for depth in range(DEEPEST):
        pieces = pieces.halved()
        coarse, _, result = _evaluated(density, pieces, ORDERS[-2], result)
        fine, size, result = _evaluated(density, pieces, ORDERS[-1], result)
        change = np.abs(fine - coarse)
        whole = np.abs(result.value[pieces.row, pieces.panel])
        settled = ~(change > TOLERANCE * np.maximum(size, whole))
        given_up = ~settled & (_hopeless(pieces.take(~settled), pieces, result) | (depth == DEEPEST - 1))
        done = settled | given_up
        place = (pieces.row[done], pieces.panel[done])
        np.add.at(result.value, place, fine[done])
        np.add.at(result.error, place, 2 * change[done])  # at a singular end both rules err on one side
        left_open[pieces.row[given_up], pieces.panel[given_up]] = True
        pieces = pieces.take(~done)
        if pieces.row.size == 0:
            break
    matters = left_open & (result.error > SETTLED * np.abs(result.value).max(axis=1, keepdims=True))
    result.counts[:, UNRESOLVED] += np.count_nonzero(matters, axis=1)
    return result


def _hopeless(still_open: _Pieces, pieces: _Pieces, result: PanelIntegrals) -> NDArray[np.bool_]:
    """Which pieces belong to a panel with too many open ones, or to a row that has cost too much."""
    number = np.zeros(result.value.shape, dtype=np.intp)
    np.add.at(number, (still_open.row, still_open.panel), 1)
    crowded = number[pieces.row, pieces.panel] > MOST_OPEN
    return np.asarray(crowded | (result.counts[pieces.row, EVALUATIONS] > MOST_EVALUATIONS))


def _evaluated(
    density: Density, pieces: _Pieces, order: int, result: PanelIntegrals
) -> tuple[Array, Array, PanelIntegrals]:
    """One rule on every piece, some at a time: integral, integral of the absolute value, counts brought forward."""
    integral, size = np.empty(pieces.row.size), np.empty(pieces.row.size)
    for first in range(0, pieces.row.size, AT_ONCE):
        some = slice(first, first + AT_ONCE)
        integral[some], size[some], result = _evaluated_at_once(density, pieces.take(some), order, result)
    return integral, size, result


def _evaluated_at_once(
    density: Density, pieces: _Pieces, order: int, result: PanelIntegrals
) -> tuple[Array, Array, PanelIntegrals]:
    nodes, weights = gauss_legendre(order)
    span = (pieces.high - pieces.low)[:, None]
    x, slope = from_map(pieces.low[:, None] + span * nodes, pieces.scale[:, None])
    ends = ends_of(np.broadcast_to(pieces.side[:, None], x.shape), x)
    values = np.broadcast_to(density(pieces.row, ends), x.shape) * (slope * np.abs(span))
    np.add.at(result.counts[:, EVALUATIONS], pieces.row, order)

    def located(bad: Integers) -> Located:
        piece, node = bad
        return int(pieces.row[piece]), float(ends.one_minus[piece, node]), float(ends.one_plus[piece, node])

    counted = _inspected(result, values, pieces.row, located)
    return np.add.reduce(values * weights, axis=1), np.add.reduce(np.abs(values) * weights, axis=1), counted


def _inspected(
    result: PanelIntegrals, values: Array, row: Integers, where: Callable[[Integers], Located]
) -> PanelIntegrals:
    """Count what is not finite or negative on the row of each line of values, and remember the first such node."""
    if values.size and np.min(values) >= 0 and np.max(values) < np.inf:
        return result
    finite = np.isfinite(values)
    negative = finite & (values < 0)
    bad = np.argwhere(~finite) if not finite.all() else np.argwhere(negative)
    if bad.size == 0:
        return result
    for kind, found in ((NON_FINITE, ~finite), (NEGATIVE, negative)):
        np.add.at(result.counts[:, kind], row, np.count_nonzero(found.reshape(len(values), -1), axis=1))
    return replace(result, worst=result.worst or (*where(bad[0]), float(values[tuple(bad[0])])))
