"""Cross sections of pieces of the polar axis, spread over the components by the shares of their circles."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.circles import Arcs
from barnwright.engine.membership import OUTSIDE
from barnwright.integrate.kronrod import kronrod
from barnwright.integrate.polar_axis import Integers

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Spread:
    """What pieces have of components, entry by entry; where there is no entry they have nothing.

    Attributes
    ----------
    piece, component : integers, shape (entry,)
    fine, coarse, slack : arrays, shape (part, entry), GeV⁻²
        By both rules, and how much of it rounding leaves open.
    """

    piece: Integers
    component: Integers
    fine: Array
    coarse: Array
    slack: Array

    def take(self, chosen: NDArray[np.bool_]) -> Spread:
        """Some of the entries."""
        return Spread(*(getattr(self, name)[..., chosen] for name in ("piece", "component", "fine", "coarse", "slack")))

    def summed(self, amounts: Array, components: int) -> Array:
        """Amounts of shape (part, entry) added up, (part, component)."""
        return np.stack([np.bincount(self.component, row, components) for row in amounts])

    @staticmethod
    def joined(batches: list[Spread], pieces: int) -> Spread:
        """Batches of so many pieces each, one after another."""
        piece = np.concatenate([batch.piece + number * pieces for number, batch in enumerate(batches)])
        names = ("component", "fine", "coarse", "slack")
        return Spread(piece, *(np.concatenate([getattr(b, name) for b in batches], axis=-1) for name in names))


def spread_over(arcs: Arcs, amounts: Array, noise: Array, components: int) -> Spread:
    """Both rules on all pieces.

    Parameters
    ----------
    arcs : Arcs
        Of the circles (or of all halves) at every node of every piece.
    amounts : array, shape (part, piece, node), GeV⁻²
        dσ/dv, v from 0 to 1 on each piece.
    noise : array, shape (part, piece), GeV⁻²
        How far rounding may move any component of a piece.
    components : int
    """
    parts, pieces, nodes = amounts.shape
    halves = arcs.share.shape[0] // (pieces * nodes)
    first = np.repeat(np.arange(pieces), nodes * halves)[:, None] * (components + 1)
    rule, size = kronrod(), pieces * (components + 1)
    fine, coarse = (
        np.repeat((amounts * weights).reshape(parts, -1), halves, axis=1)[:, :, None] / halves
        for weights in (rule.fine, rule.coarse)
    )
    found = np.zeros((3, parts, size))
    for component in arcs.components:
        flat = first + np.where(component == OUTSIDE, components, component)
        flat = np.broadcast_to(flat, arcs.share.shape)
        uncertain = np.where(flat[:, 1:] != flat[:, :-1], arcs.slack, 0.0)
        for part in range(parts):
            found[0, part] += _counted(flat, arcs.share * fine[part], size)
            found[1, part] += _counted(flat, arcs.share * coarse[part], size)
            if uncertain.any():
                moved = uncertain * np.abs(fine[part])
                found[2, part] += _counted(flat[:, 1:], moved, size) + _counted(flat[:, :-1], moved, size)
    table = found.reshape(3, parts, pieces, components + 1)[..., :components]
    piece, place = np.nonzero((table[:2] != 0).any(axis=(0, 1)))
    fine, coarse, slack = table[:, :, piece, place]
    return Spread(piece, place, fine, coarse, slack + noise[:, piece])


def _counted(flat: Integers, amounts: Array, size: int) -> Array:
    return np.bincount(flat.ravel(), amounts.ravel(), size).astype(np.float64, copy=False)
