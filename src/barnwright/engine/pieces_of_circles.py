"""The work on pieces of the polar axis: circles at their nodes, the law there, and both spread over the components."""

from __future__ import annotations

from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.answer import Answer
from barnwright.engine.circles import Arcs, circles_at
from barnwright.engine.integrand import Integrand
from barnwright.engine.law import cumulative
from barnwright.engine.membership import OUTSIDE
from barnwright.engine.polar import natural_values, worst_points
from barnwright.engine.setting import Layout
from barnwright.engine.spread import Spread, spread_over
from barnwright.event import Point
from barnwright.integrate.axis_map import from_map
from barnwright.integrate.extrema import EPSILON
from barnwright.integrate.kronrod import NODES, kronrod
from barnwright.integrate.panel_integrals import (
    COUNTED,
    EVALUATIONS,
    NEGATIVE,
    Located,
    PanelIntegrals,
    inspected,
)
from barnwright.integrate.pieces import Pieces
from barnwright.integrate.polar_axis import Ends, Integers, ends_of

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]

AT_ONCE, LARGEST = 128, 2_000_000
"""Pieces worked on at once, and pieces times components."""


@dataclass
class PieceWork:
    """Works on pieces, and counts."""

    integrand: Integrand
    layout: Layout
    undefined: bool = False
    counted: PanelIntegrals = field(init=False)

    def __post_init__(self) -> None:
        nothing = np.zeros((self.integrand.count, 0))
        self.counted = PanelIntegrals(nothing, nothing, np.zeros((self.integrand.count, len(COUNTED))))

    @property
    def evaluations(self) -> float:
        """How often each part of the law was asked."""
        return float(self.counted.counts[:, EVALUATIONS].max())

    def spread(self, pieces: Pieces) -> Spread:
        """Both rules on every piece, some of them at once."""
        step = max(1, min(AT_ONCE, LARGEST // (self.layout.components + 1)))
        starts = range(0, pieces.row.size, step)
        return Spread.joined([self._batch(pieces.take(slice(first, first + step))) for first in starts], step)

    def told(self, answer: Answer) -> Answer:
        """The answer with what was counted on the way."""
        counts = self.counted.counts
        counts[self.integrand.signed, NEGATIVE] = 0
        answer.counts[:, : len(COUNTED)] += counts
        answer.counts[:, -1] = self.undefined
        return Answer(answer.value, answer.error, answer.counts, worst_points(self.counted, self.integrand))

    def _batch(self, pieces: Pieces) -> Spread:
        setting = self.integrand.setting
        place, slope = self._places(pieces, kronrod().place)
        circles = circles_at(self.integrand.rows, Ends(*(e.ravel() for e in place)), setting.cuts, self.layout)
        arcs = circles.arcs(setting.cuts, self.layout)
        self.undefined |= arcs.undefined
        used = _used(arcs, pieces.row.size)
        if setting.rule == "closed_form":
            amounts, noise = self._differences(pieces, used)
        else:
            amounts = self._densities(place, used) * slope
            noise = np.zeros(amounts.shape[:2])
        return spread_over(arcs, amounts, noise, self.layout.components)

    def _places(self, pieces: Pieces, share: Array) -> tuple[Ends, Array]:
        """Locations at shares of every piece, (piece, share), and dc/dv there."""
        span = (pieces.high - pieces.low)[:, None]
        x, slope = from_map(pieces.low[:, None] + span * share, pieces.scale[:, None], pieces.base[:, None])
        return ends_of(np.broadcast_to(pieces.side[:, None], x.shape), x), slope * np.abs(span)

    def _densities(self, place: Ends, used: Flags) -> Array:
        """dσ/dc at the nodes that pass the cuts, (part, piece, node); 0 elsewhere, where the law is not asked."""
        found = np.zeros((self.integrand.count, *used.shape))
        some = Ends(place.one_minus[used][None], place.one_plus[used][None])
        if some.one_plus.size == 0:
            return found
        values = self.integrand.density()(None, some)
        found[:, used] = values
        self._inspect(np.broadcast_to(values, (self.integrand.count, some.one_plus.size)), some)
        return found

    def _differences(self, pieces: Pieces, used: Flags) -> tuple[Array, Array]:
        """dσ/dv at the nodes from the antiderivative, of pieces that pass the cuts; and how far rounding may go."""
        integrand, rule = self.integrand, kronrod()
        setting, rows, process = integrand.setting, integrand.rows, integrand.process
        assert setting.closed_form is not None
        asked: Flags = np.asarray(used.any(axis=1))
        found = np.zeros((integrand.count, asked.size, NODES))
        noise = np.zeros((integrand.count, asked.size))
        if not asked.any():
            return found, noise
        place, _ = self._places(pieces.take(asked), np.concatenate([[0.0], rule.place, [1.0]]))
        flat = Ends(*(end.reshape(1, -1) for end in place))
        x = natural_values(process.closed_forms[setting.closed_form].observable, rows, flat)
        point = Point.of(rows.reaction, rows.collision, rows.masses)
        heights = np.stack([cumulative(process, setting, x, point, integrand.parameters, p) for p in integrand.parts])
        heights = heights.reshape(integrand.count, -1, NODES + 2)
        along = x.reshape(-1, NODES + 2)
        upward = np.where(along[:, -1] >= along[:, 0], 1.0, -1.0)[:, None]
        found[:, asked] = upward * np.einsum("nk,jpk->jpn", rule.slopes, heights)
        noise[:, asked] = rule.rounding * EPSILON * np.abs(heights).max(axis=-1)
        self._inspect(np.abs(heights).reshape(integrand.count, -1), flat)
        return found, noise

    def _inspect(self, values: Array, place: Ends) -> None:
        """Count evaluations, and values that are not finite or negative."""
        self.counted.counts[:, EVALUATIONS] += values.shape[1]

        def located(bad: Integers) -> Located:
            part, node = bad
            return int(part), float(place.one_minus[0, node]), float(place.one_plus[0, node])

        self.counted = inspected(self.counted, values, np.arange(values.shape[0]), located)


def _used(arcs: Arcs, pieces: int) -> Flags:
    """Which nodes pass the cuts somewhere on their circles, (piece, node)."""
    inside = (np.broadcast_to(arcs.components[0], arcs.share.shape) != OUTSIDE) & (arcs.share > 0)
    return np.asarray(inside.any(axis=1).reshape(pieces, NODES, -1).any(axis=-1))
