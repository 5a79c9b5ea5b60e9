"""Beams that cross at an angle: cross sections per polar angle of the cm, times the shares of its circles.

Rules of this file
------------------
- The polar angle is the outer axis, since the law depends on it alone. Panels end where the share of a component may
  start or end: where an observable crosses an edge or a cut in the plane of the beams, at the azimuths 0 and π at which
  it has its extrema on a circle. The share grows from there like a square root, which the rule of `kronrod` takes for
  smooth. What is left (an extremum elsewhere on the circle, an edge that meets a cut) is halved until it settles.
- One point of a scan at a time, so that its bits do not depend on its company. All parts of the law share the arcs.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.answer import Answer
from barnwright.engine.integrand import Integrand
from barnwright.engine.pieces_of_circles import PieceWork
from barnwright.engine.plane import panels_of
from barnwright.engine.polar import threshold_rounding
from barnwright.engine.setting import Layout
from barnwright.engine.spread import Spread
from barnwright.integrate.axis_map import to_map
from barnwright.integrate.panel_integrals import UNRESOLVED
from barnwright.integrate.panels import Panels
from barnwright.integrate.pieces import Pieces
from barnwright.integrate.quadrature import ROUNDING, SETTLED

Array = NDArray[np.float64]

TOLERANCE, FLOOR = 3e-10, 1e-12
"""What two rules may differ by on one piece, as a share of the component and of the total."""
HALVED = 20
"""By how much the error at a kink may be larger than the difference of two rules, which can be small by accident."""
DEEPEST = 36
MOST_EVALUATIONS = 1_000_000
"""Of one point."""
MOST_OPEN, LEVELS = 128, 4
"""Open pieces that are never too many, and the levels of halving within which more than four times as many are."""


def over_circles(integrand: Integrand, layout: Layout) -> Answer:
    """Totals, bins and asymmetries of one point, part after part."""
    work = PieceWork(integrand, layout)
    panels = panels_of(integrand.setting, layout, integrand.rows)
    pieces = _pieces(panels, integrand.scales()[0])
    spread = work.spread(pieces)
    answer = Answer.empty(integrand.count, layout.components)
    answer.error[:] = _wobble(panels, pieces, spread, layout.components)
    open_pieces: list[int] = []
    for depth in range(DEEPEST + 1):
        again = _unsettled(spread, answer, pieces.row.size)
        open_pieces.append(int(np.count_nonzero(again)))
        given_up = depth == DEEPEST or work.evaluations > MOST_EVALUATIONS or _multiply(open_pieces)
        done = spread if given_up else spread.take(~again[spread.piece])
        answer.value[:] += done.summed(done.fine, layout.components)
        change = (HALVED if depth else 2) * np.abs(done.fine - done.coarse)
        answer.error[:] += done.summed(change + done.slack, layout.components)
        if given_up or not again.any():
            break
        pieces = pieces.take(again).halved()
        spread = work.spread(pieces)
    if again.any():
        _count_open(answer, spread.take(again[spread.piece]))
    answer.error[:] += (ROUNDING + _rounding(integrand)) * np.abs(answer.value)
    return work.told(answer)


def _pieces(panels: Panels, scale: Array) -> Pieces:
    """The panels that have a width, one a line."""
    wide = np.nonzero(panels.width[0] > 0)[0]
    side = panels.side[wide]
    base = np.minimum(panels.left, panels.right)[0, wide]
    left, right = (to_map(ends[0, wide], scale[side], base) for ends in (panels.left, panels.right))
    return Pieces(np.zeros(wide.size, dtype=np.intp), wide, side, left, right, scale[side], base)


def _unsettled(spread: Spread, answer: Answer, pieces: int) -> NDArray[np.bool_]:
    """Which pieces have a component on which the two rules differ by too much."""
    components = answer.value.shape[1]
    size = np.abs(answer.value) + spread.summed(np.abs(spread.fine), components)
    allowed = np.maximum(TOLERANCE * size, FLOOR * size[:, :1])
    differs = np.abs(spread.fine - spread.coarse) > allowed[:, spread.component]
    return np.bincount(spread.piece, differs.any(axis=0), pieces) > 0


def _multiply(open_pieces: list[int]) -> bool:
    """Whether halves stay as open as wholes, level after level: an observable that is all rounding, say."""
    return len(open_pieces) > LEVELS and open_pieces[-1] > max(MOST_OPEN, 4 * open_pieces[-1 - LEVELS])


def _wobble(panels: Panels, pieces: Pieces, spread: Spread, components: int) -> Array:
    """What the uncertain ends of panels mean for every component: their width times the mean height beside them."""
    before = np.concatenate([[0.0], np.cumsum(panels.wobble[0] + panels.graze[0])])
    around = np.diff(np.concatenate([before[:1], before[pieces.panel], before[-1:]]))
    moved = (around[:-1] + around[1:]) / panels.width[0, pieces.panel]
    return spread.summed(np.abs(spread.fine) * moved[spread.piece], components)


def _count_open(answer: Answer, spread: Spread) -> None:
    """Pieces that were left as they are count where they matter."""
    matters = np.abs(spread.fine - spread.coarse) > SETTLED * np.abs(answer.value).max(axis=1, keepdims=True)
    answer.counts[:, UNRESOLVED] += np.count_nonzero(matters, axis=1)


def _rounding(integrand: Integrand) -> Array:
    if integrand.setting.beams.given != "kinetic":
        return np.zeros((1, 1))
    return np.asarray(threshold_rounding(integrand.rows))
