"""Gauss quadrature of a density over panels, refined where a panel asks for it.

A panel is accepted when the first rule and the coarser one in it agree to `TOLERANCE` of its own integral; otherwise
the order rises to 40 and then the panel is halved, near a pole geometrically (x from the pole keeps its digits). What a
panel does depends on that panel alone, so a point of a scan has the bits of a point asked for by itself.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.axis_map import from_map, to_map
from barnwright.integrate.extrema import EPSILON
from barnwright.integrate.gauss import ORDERS, lobatto
from barnwright.integrate.panel_integrals import (
    COUNTED,
    EVALUATIONS,
    UNRESOLVED,
    Beside,
    Density,
    Located,
    PanelIntegrals,
    inspected,
)
from barnwright.integrate.panels import Panels
from barnwright.integrate.pieces import Pieces, evaluated
from barnwright.integrate.polar_axis import Ends, Integers

Array = NDArray[np.float64]

TOLERANCE = 4e-14
ROUNDING = 16 * EPSILON
"""Of a sum of products, as a share of it: what arithmetic in a law and in adding up may leave."""
DEEPEST = 60
SETTLED = 1e-9
"""A panel that was left open has settled all the same when its error is a smaller share of the row's largest panel."""
MOST_OPEN = 256
"""Pieces of one panel that may still be open; an integrand that needs more does not settle."""
MOST_EVALUATIONS = 4_000_000
"""Of one row."""


def integrate_panels(
    density: Density, panels: Panels, scales: Array, rows: int, beside: Beside | None = None
) -> PanelIntegrals:
    """Integrate a density over every panel of every row.

    Parameters
    ----------
    density : callable
    panels : Panels
    scales : array, shape (row or 1, 2)
        δ of the backward and the forward pole (∞: no peak there).
    rows : int
    beside : callable, optional
        From the density at the first nodes and their locations, (row, node), to the size of what it is made of: an
        interference need not settle better than its parts do, of which it may be the rounding.
    """
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):  # what is not finite is counted instead
        return _integrated(density, panels, (scales[:, panels.side], rows), beside)


def _integrated(density: Density, panels: Panels, form: tuple[Array, int], beside: Beside | None) -> PanelIntegrals:
    scale, rows = form
    base = np.minimum(panels.left, panels.right)
    left, right = to_map(panels.left, scale, base), to_map(panels.right, scale, base)
    ends, measure = _first_nodes(panels, (scale, base), left, right)
    count = panels.side.size
    found = np.broadcast_to(density(None, ends), (rows, 4 * count + 1))
    values, edges = _by_panel(found, measure), found[:, 3 * count :]
    _, weights, embedded = lobatto()
    fine, error = _weighted(values, weights), np.abs(_weighted(values, weights - embedded))
    counts = np.zeros((rows, len(COUNTED)))
    wide = np.count_nonzero(panels.width, axis=1)
    counts[:, EVALUATIONS] = np.where(wide > 0, 1 + 4 * wide, 0)
    floor = np.zeros_like(fine)
    if beside is not None:
        floor = np.nan_to_num(_weighted(_by_panel(beside(found, ends), measure), weights), posinf=0.0)
    result = PanelIntegrals(fine, error, counts, heights=known_heights(edges[:, 1:-1]), floor=floor)

    def located(bad: Integers) -> Located:
        row, node = bad
        place = (min(int(row), ends.one_plus.shape[0] - 1), node)
        return int(row), float(ends.one_minus[place]), float(ends.one_plus[place])

    seen = np.broadcast_to(np.tile(panels.width > 0, 3), (rows, 3 * count))
    result = inspected(result, np.where(seen, found[:, : 3 * count], 0.0), np.arange(rows), located)
    size = fine if result.clean else _weighted([np.abs(value) for value in values], weights)
    open_end = ~(error < np.inf)
    if open_end.any():  # not finite at an end, as at a pole: rules without ends decide
        fine[open_end], error[open_end] = 0.0, np.inf
    todo = np.nonzero(open_end | (error > TOLERANCE * np.maximum(size, floor)))
    if todo[0].size:
        shape = (rows, count)
        numbers = (np.broadcast_to(array, shape)[todo] for array in (left, right, scale, base))
        pieces = Pieces(todo[0], todo[1], panels.side[todo[1]], *numbers)
        result = _refined(density, pieces, result)
    return replace(result, error=result.error + ROUNDING * np.maximum(np.abs(result.value), floor))


def _by_panel(found: Array, measure: Array) -> list[Array]:
    """Values at the five nodes of every panel, times dc: five arrays of (row, panel)."""
    rows, count = found.shape[0], measure.shape[-1]
    inner, edges = found[:, : 3 * count].reshape(rows, 3, count), found[:, 3 * count :]
    values = (edges[:, :-1], inner[:, 0], inner[:, 1], inner[:, 2], edges[:, 1:])
    return [value * measure[:, k % measure.shape[1]] for k, value in enumerate(values)]


def known_heights(density: Array) -> Array:
    """The size of a density where it is finite, 0 elsewhere."""
    return np.asarray(np.where(np.isfinite(density), np.abs(density), 0.0))


def _first_nodes(panels: Panels, form: tuple[Array, Array], left: Array, right: Array) -> tuple[Ends, Array]:
    """The nodes of the first rule, and dc, (row or 1, node or 1, panel); ``form`` is scale and base of the map."""
    scale, base = form
    if np.isinf(scale).all():
        return panels.first_nodes, panels.width[:, None, :]
    nodes = lobatto()[0]
    span = (right - left)[:, None, :]
    x, slope = from_map(left[:, None, :] + span * nodes[:, None], scale[:, None, :], base[:, None, :])
    return panels.located(x[:, 1:-1]), np.broadcast_to(slope * np.abs(span), x.shape)


def _weighted(values: Sequence[Array], weights: Array) -> Array:
    """The weighted sum, node by node in a fixed order, so that bits never depend on the batch."""
    total: Array = values[0] * weights[0]
    for value, weight in zip(values[1:], weights[1:], strict=True):
        total += value * weight
    return total


def _refined(density: Density, pieces: Pieces, result: PanelIntegrals) -> PanelIntegrals:
    """Raise the order of the pieces that need it, then halve what is left."""
    value, error = result.value, result.error
    before = value[pieces.row, pieces.panel]
    for order in ORDERS:
        now, result = evaluated(density, pieces, order, result)
        change = np.abs(now.integral - before) + now.unseen
        value[pieces.row, pieces.panel], error[pieces.row, pieces.panel] = now.integral, change
        again = change > TOLERANCE * np.maximum(now.size, result.floor_of(pieces.row, pieces.panel))
        pieces, before = pieces.take(again), now.integral[again]
        if pieces.row.size == 0:
            return result
    value[pieces.row, pieces.panel] = error[pieces.row, pieces.panel] = 0.0
    return _halved(density, pieces, result)


def _halved(density: Density, pieces: Pieces, result: PanelIntegrals) -> PanelIntegrals:
    """Halve the pieces until each half agrees with its coarser rule; add the halves up in a fixed order.

    A panel with too many open pieces, or a row that has cost too much, is left as it is, and counted where it matters.
    """
    left_open = np.zeros(result.value.shape, dtype=bool)
    for depth in range(DEEPEST):
        pieces = pieces.halved()
        coarse, result = evaluated(density, pieces, ORDERS[-2], result)
        fine, result = evaluated(density, pieces, ORDERS[-1], result)
        change = np.abs(fine.integral - coarse.integral) + fine.unseen
        whole = np.abs(result.value[pieces.row, pieces.panel])
        whole = np.maximum(whole, result.floor_of(pieces.row, pieces.panel))
        settled = ~(change > TOLERANCE * np.maximum(fine.size, whole))
        given_up = ~settled & (_hopeless(pieces.take(~settled), pieces, result) | (depth == DEEPEST - 1))
        done = settled | given_up
        place = (pieces.row[done], pieces.panel[done])
        np.add.at(result.value, place, fine.integral[done])
        np.add.at(result.error, place, 2 * change[done])  # at a singular end both rules err on one side
        left_open[pieces.row[given_up], pieces.panel[given_up]] = True
        pieces = pieces.take(~done)
        if pieces.row.size == 0:
            break
    size = np.abs(result.value) if result.floor is None else np.maximum(np.abs(result.value), result.floor)
    matters = left_open & (result.error > SETTLED * size.max(axis=1, keepdims=True))
    result.counts[:, UNRESOLVED] += np.count_nonzero(matters, axis=1)
    return result


def _hopeless(still_open: Pieces, pieces: Pieces, result: PanelIntegrals) -> NDArray[np.bool_]:
    """Which pieces belong to a panel with too many open ones, or to a row that has cost too much."""
    number = np.zeros(result.value.shape, dtype=np.intp)
    np.add.at(number, (still_open.row, still_open.panel), 1)
    crowded = number[pieces.row, pieces.panel] > MOST_OPEN
    return np.asarray(crowded | (result.counts[pieces.row, EVALUATIONS] > MOST_EVALUATIONS))
