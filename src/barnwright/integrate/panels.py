"""Panels: the pieces of the axis between neighbouring crossings, on each of which every answer is one smooth integral.

Panels run in the order of c from −1 to +1; every row has the same number of them, the spare ones with no width.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.gauss import lobatto
from barnwright.integrate.polar_axis import BACKWARD, FORWARD, Ends, Integers, ends_of
from barnwright.integrate.roots import Crossings

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Panels:
    """Panels of each row.

    Attributes
    ----------
    side : integers, shape (panel,)
        The hemisphere of each panel.
    left, right : arrays, shape (row or 1, panel)
        x, the distance from the pole, at the end of smaller and of larger c.
    wobble, graze : arrays, shape (row or 1, panel − 1)
        The uncertainty in c of the boundary between each panel and the next where a level is crossed, and where one
        is grazed.
    """

    side: Integers
    left: Array
    right: Array
    wobble: Array
    graze: Array

    @cached_property
    def width(self) -> Array:
        """Width in c."""
        return np.abs(self.right - self.left)

    def only(self, chosen: NDArray[np.bool_]) -> Panels:
        """The same panels with all but the chosen shrunk to nothing, at their end off the pole."""
        end = np.maximum(self.left, self.right)
        left, right = (np.where(chosen, x, end) for x in (self.left, self.right))
        return Panels(self.side, left, right, self.wobble, self.graze)

    def without_spares(self, array: NDArray[Any]) -> NDArray[Any]:
        """Something about panels, (row or 1, panel), with that of the next one towards the pole where one has no width.

        The spare panels that rows of a batch have in the middle of the axis must not hide what a row by itself would
        see.
        """
        shape = np.broadcast_shapes(array.shape, self.width.shape)
        wide, filled = np.broadcast_to(self.width > 0, shape), np.array(np.broadcast_to(array, shape))
        backward = int(np.count_nonzero(self.side == BACKWARD))
        for half in (slice(None, backward), slice(None, backward - shape[1] - 1, -1)):  # seen from either pole
            number = np.where(wide[:, half], np.arange(wide[:, half].shape[1]), 0)
            nearest = np.maximum.accumulate(number, axis=1)
            filled[:, half] = np.take_along_axis(filled[:, half], nearest, axis=1)
        return filled

    def shared_ends(self) -> tuple[Integers, Array]:
        """Hemisphere and x of the ends that neighbours share, (panel + 1,) and (row or 1, panel + 1), as c rises.

        A panel without width lies at its end off the pole, so each end is taken from the panel that lies beyond it.
        """
        backward = int(np.count_nonzero(self.side == BACKWARD))
        x = np.concatenate(
            [self.left[:, :1], self.right[:, :backward], self.left[:, backward + 1 :], self.right[:, -1:]], axis=1
        )
        side = np.concatenate([self.side[:1], self.side[:backward], self.side[backward + 1 :], self.side[-1:]])
        return side, x

    @cached_property
    def first_nodes(self) -> Ends:
        """The inner nodes of the first rule, node after node, then the shared ends; (row or 1, 4 × panel + 1)."""
        nodes = lobatto()[0][1:-1]
        inner = self.left[:, None, :] + (self.right - self.left)[:, None, :] * nodes[:, None]
        return self.located(inner)

    def located(self, inner: Array) -> Ends:
        """The locations x of inner nodes, (row or 1, node, panel), and of the shared ends after them."""
        side, x = self.shared_ends()
        sides = np.concatenate([np.tile(self.side, inner.shape[1]), side])
        ends = np.broadcast_to(x, (inner.shape[0], x.shape[1]))  # a peak may have another width in every row
        return ends_of(sides[None], np.concatenate([inner.reshape(inner.shape[0], -1), ends], axis=1))

    def middle(self) -> Ends:
        """A location inside each panel, shape (row or 1, panel): the geometric mean where the ends lie far apart."""
        low, high = np.minimum(self.left, self.right), np.maximum(self.left, self.right)
        far = (high > 100 * low) & (low > 1e-15)  # what is closer to the pole may be the rounding of a crossing
        inside = np.where(far & (low > 0), np.sqrt(low * high), 0.5 * (low + high))
        return ends_of(np.broadcast_to(self.side, inside.shape), inside)

    def boundaries(self) -> Ends:
        """All ends in the order of c, shape (row or 1, panel + 1)."""
        x = np.concatenate([self.left, self.right[:, -1:]], axis=1)
        side = np.append(self.side, FORWARD)
        return ends_of(np.broadcast_to(side, x.shape), x)


def panels_between(found: Crossings, rows: int) -> Panels:
    """The panels that the crossings of ``rows`` rows cut out of [−1, 1]."""
    backward, backward_slack = _sorted_by_row(found, rows, BACKWARD)
    forward, forward_slack = _sorted_by_row(found, rows, FORWARD)
    pole, centre = np.zeros((rows, 1)), np.ones((rows, 1))
    rising = np.concatenate([pole, backward, centre], axis=1)
    falling = np.concatenate([pole, forward, centre], axis=1)[:, ::-1]
    side = np.repeat([BACKWARD, FORWARD], [rising.shape[1] - 1, falling.shape[1] - 1])
    at_centre = _at_centre(found, rows)
    wobble, graze = (
        np.concatenate([b, m, f[:, ::-1]], axis=1)
        for b, m, f in zip(backward_slack, at_centre, forward_slack, strict=True)
    )
    return Panels(
        side,
        np.concatenate([rising[:, :-1], falling[:, :-1]], axis=1),
        np.concatenate([rising[:, 1:], falling[:, 1:]], axis=1),
        wobble,
        graze,
    )


def _at_centre(found: Crossings, rows: int) -> tuple[Array, Array]:
    """Uncertainties of crossings that lie in the middle of the axis, crossed and grazed, shape (row, 1)."""
    wobble, graze = np.zeros(rows), np.zeros(rows)
    for slack, kind in ((wobble, ~found.grazing), (graze, found.grazing)):
        here = (found.x >= 1) & kind
        np.maximum.at(slack, found.row[here], found.uncertainty[here])
    return wobble[:, None], graze[:, None]


def _sorted_by_row(found: Crossings, rows: int, side: int) -> tuple[Array, tuple[Array, Array]]:
    """x of one hemisphere's crossings, (row, most crossings), sorted, padded with 1; and its two uncertainties."""
    chosen = (found.side == side) & (found.x > 0) & (found.x < 1)
    order = np.lexsort((found.x[chosen], found.row[chosen]))
    row, x, slack, grazing = (a[chosen][order] for a in (found.row, found.x, found.uncertainty, found.grazing))
    count = np.bincount(row, minlength=rows)
    place = np.arange(row.size) - np.repeat(np.cumsum(count) - count, count)
    most = int(count.max())
    padded, wobble, graze = np.ones((rows, most)), np.zeros((rows, most)), np.zeros((rows, most))
    padded[row, place] = x
    wobble[row, place], graze[row, place] = np.where(grazing, 0.0, slack), np.where(grazing, slack, 0.0)
    return padded, (wobble, graze)
