"""Panels: the pieces of the axis between neighbouring crossings, on each of which every answer is one smooth integral.

Panels run in the order of c from −1 to +1; every row has the same number of them, the spare ones with no width.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from .polar_axis import BACKWARD, FORWARD, Ends, Integers, ends_of
from .roots import Crossings

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Panels:
    """Panels of each row.

    Attributes
    ----------
    side : integers, shape (panel,)
        The hemisphere of each panel.
    left, right : arrays, shape (row or 1, panel)
        x, the distance from the pole, at the end of smaller and of larger c.
    wobble : array, shape (row or 1, panel − 1)
        The uncertainty in c of the boundary between each panel and the next.
    """

    side: Integers
    left: Array
    right: Array
    wobble: Array

    @property
    def width(self) -> Array:
        """Width in c."""
        return np.abs(self.right - self.left)

    def middle(self) -> Ends:
        """A location inside each panel, shape (row or 1, panel): the geometric mean where the ends lie far apart."""
        low, high = np.minimum(self.left, self.right), np.maximum(self.left, self.right)
        far = high > 100 * low
        inside = np.where(far & (low > 0), np.sqrt(low * high), 0.5 * (low + high))
        return ends_of(np.broadcast_to(self.side, inside.shape), inside)

    def boundaries(self) -> Ends:
        """All ends in the order of c, shape (row or 1, panel + 1)."""
        x = np.concatenate([self.left, self.right[:, -1:]], axis=1)
        side = np.append(self.side, FORWARD)
        return ends_of(np.broadcast_to(side, x.shape), x)


def panels_between(found: Crossings, rows: int) -> Panels:
    """The panels that the crossings of ``rows`` rows cut out of [−1, 1]."""
    backward, backward_wobble = _sorted_by_row(found, rows, BACKWARD)
    forward, forward_wobble = _sorted_by_row(found, rows, FORWARD)
    pole, centre = np.zeros((rows, 1)), np.ones((rows, 1))
    rising = np.concatenate([pole, backward, centre], axis=1)
    falling = np.concatenate([pole, forward, centre], axis=1)[:, ::-1]
    side = np.repeat([BACKWARD, FORWARD], [rising.shape[1] - 1, falling.shape[1] - 1])
    return Panels(
        side,
        np.concatenate([rising[:, :-1], falling[:, :-1]], axis=1),
        np.concatenate([rising[:, 1:], falling[:, 1:]], axis=1),
        np.concatenate([backward_wobble, pole, forward_wobble[:, ::-1]], axis=1),
    )


def _sorted_by_row(found: Crossings, rows: int, side: int) -> tuple[Array, Array]:
    """x and uncertainty of one hemisphere's crossings, (row, most crossings), sorted, padded with the centre."""
    chosen = (found.side == side) & (found.x > 0) & (found.x < 1)
    row, x, wobble = found.row[chosen], found.x[chosen], found.uncertainty[chosen]
    order = np.lexsort((x, row))
    row, x, wobble = row[order], x[order], wobble[order]
    count = np.bincount(row, minlength=rows)
    place = np.arange(row.size) - np.repeat(np.cumsum(count) - count, count)
    most = int(count.max()) if rows else 0
    padded, slack = np.ones((rows, most)), np.zeros((rows, most))
    padded[row, place], slack[row, place] = x, wobble
    return padded, slack
