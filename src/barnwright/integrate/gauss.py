"""Gauss–Legendre rules on [0, 1], and a coarser rule on some of the same nodes.

Nodes and weights are arrays of shape (node,). The first order has an embedded partner: its five nodes without the
middle one, exact to third degree. Higher orders are compared with the order before.
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np
from numpy.polynomial.legendre import leggauss
from numpy.typing import NDArray

Array = NDArray[np.float64]

FIRST_ORDER = 5
ORDERS = (5, 10, 20, 40)


@lru_cache
def gauss_legendre(order: int) -> tuple[Array, Array]:
    """Nodes in (0, 1) and weights (sum 1) of a Gauss–Legendre rule."""
    nodes, weights = leggauss(order)
    nodes, weights = 0.5 * (1.0 + nodes), 0.5 * weights
    for array in (nodes, weights):
        array.flags.writeable = False
    return nodes, weights


@lru_cache
def embedded_weights() -> Array:
    """Weights on the nodes of the first order, the middle one 0, exact for cubic polynomials; sum 1."""
    nodes, _ = gauss_legendre(FIRST_ORDER)
    inner, outer = (nodes[3] - 0.5) ** 2, (nodes[4] - 0.5) ** 2
    second_moment = 1.0 / 12.0
    share = 0.5 * (second_moment - inner) / (outer - inner)
    weights = np.array([share, 0.5 - share, 0.0, 0.5 - share, share])
    weights.flags.writeable = False
    return weights


@lru_cache
def end_weights(order: int) -> tuple[Array, Array]:
    """Weights that extrapolate values on the nodes of a rule to 0 and to 1, by the one polynomial through them."""
    nodes, _ = gauss_legendre(order)
    to_low = np.array([np.prod(np.delete(nodes, k) / (np.delete(nodes, k) - nodes[k])) for k in range(order)])
    to_high = to_low[::-1].copy()
    for array in (to_low, to_high):
        array.flags.writeable = False
    return to_low, to_high
