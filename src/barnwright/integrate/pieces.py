"""Panels or parts of them that are worked on one by one, and a rule on each."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.axis_map import from_map
from barnwright.integrate.gauss import end_weights, gauss_legendre
from barnwright.integrate.panel_integrals import EVALUATIONS, Density, Located, PanelIntegrals, inspected
from barnwright.integrate.polar_axis import Integers, ends_of

Array = NDArray[np.float64]

AT_ONCE = 2048
"""Pieces that are evaluated at once, so that memory stays small."""


@dataclass(frozen=True, slots=True)
class Pieces:
    """Some panels or parts of them, one a line: row, hemisphere, ends in the map's variable, its scale and base."""

    row: Integers
    panel: Integers
    side: Integers
    low: Array
    high: Array
    scale: Array
    base: Array

    def take(self, chosen: Integers | NDArray[np.bool_] | slice) -> Pieces:
        """The chosen pieces."""
        return Pieces(*(getattr(self, f)[chosen] for f in ("row", "panel", "side", "low", "high", "scale", "base")))

    def halved(self) -> Pieces:
        """Both halves of every piece: all lower ones, then all upper ones."""
        middle = 0.5 * (self.low + self.high)
        twice = self.take(np.tile(np.arange(self.row.size), 2))
        return replace(twice, low=np.concatenate([self.low, middle]), high=np.concatenate([middle, self.high]))


class Rule(NamedTuple):
    """A rule on some pieces: the integral, that of the absolute value, and what may hide beyond the outermost nodes."""

    integral: Array
    size: Array
    unseen: Array


def evaluated(density: Density, pieces: Pieces, order: int, result: PanelIntegrals) -> tuple[Rule, PanelIntegrals]:
    """One rule on every piece, some at a time, and the counts brought forward."""
    parts = []
    for first in range(0, pieces.row.size, AT_ONCE):
        part, result = _evaluated_at_once(density, pieces.take(slice(first, first + AT_ONCE)), order, result)
        parts.append(part)
    return Rule(*(np.concatenate(column) for column in zip(*parts, strict=True))), result


def _evaluated_at_once(
    density: Density, pieces: Pieces, order: int, result: PanelIntegrals
) -> tuple[Rule, PanelIntegrals]:
    nodes, weights = gauss_legendre(order)
    span = (pieces.high - pieces.low)[:, None]
    x, slope = from_map(pieces.low[:, None] + span * nodes, pieces.scale[:, None], pieces.base[:, None])
    ends = ends_of(np.broadcast_to(pieces.side[:, None], x.shape), x)
    values = np.broadcast_to(density(pieces.row, ends), x.shape) * (slope * np.abs(span))
    np.add.at(result.counts[:, EVALUATIONS], pieces.row, order + 2)

    def located(bad: Integers) -> Located:
        piece, node = bad
        return int(pieces.row[piece]), float(ends.one_minus[piece, node]), float(ends.one_plus[piece, node])

    counted = inspected(result, values, pieces.row, located)
    unseen = _unseen(density, pieces, values)
    return Rule(
        np.add.reduce(values * weights, axis=1), np.add.reduce(np.abs(values) * weights, axis=1), unseen
    ), counted


def _unseen(density: Density, pieces: Pieces, values: Array) -> Array:
    """What may hide between the outermost nodes and the ends: a jump shows as an end that no polynomial leads to."""
    order = values.shape[1]
    both = np.stack([pieces.low, pieces.high], axis=1)
    x, slope = from_map(both, pieces.scale[:, None], pieces.base[:, None])
    ends = ends_of(np.broadcast_to(pieces.side[:, None], x.shape), x)
    found = np.broadcast_to(density(pieces.row, ends), x.shape) * slope * np.abs(pieces.high - pieces.low)[:, None]
    led = np.stack([np.add.reduce(values * weights, axis=1) for weights in end_weights(order)], axis=1)
    gap = gauss_legendre(order)[0][0]
    with np.errstate(invalid="ignore"):
        missed = gap * np.abs(found - led)
    return np.asarray(np.where(np.isfinite(missed), missed, 0.0).sum(axis=1))
