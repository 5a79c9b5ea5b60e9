"""Gauss rules on [0, 1], and a coarser rule on some of the same nodes.

Nodes and weights are arrays of shape (node,). The first rule is Lobatto's with five nodes, exact to seventh degree: its
outer nodes are the ends of a panel, which neighbours share, and nothing can hide beyond them. Simpson's rule on three
of them is its embedded partner, exact to third degree. Where that is not enough, Legendre's rules of rising order are
compared with the order before.

Source: M. Abramowitz, I. Stegun, Handbook of Mathematical Functions, 25.4.32 (Lobatto), from memory.
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np
from numpy.polynomial.legendre import leggauss
from numpy.typing import NDArray

Array = NDArray[np.float64]

FIRST_ORDER = 5
ORDERS = (10, 20, 40)


@lru_cache
def gauss_legendre(order: int) -> tuple[Array, Array]:
    """Nodes in (0, 1) and weights (sum 1) of a Gauss–Legendre rule."""
    nodes, weights = leggauss(order)
    nodes, weights = 0.5 * (1.0 + nodes), 0.5 * weights
    for array in (nodes, weights):
        array.flags.writeable = False
    return nodes, weights


@lru_cache
def lobatto() -> tuple[Array, Array, Array]:
    """Nodes in [0, 1], weights, and the weights of the embedded rule, of the first rule; both sums are 1."""
    inner = 0.5 * np.sqrt(3 / 7)
    nodes = np.array([0.0, 0.5 - inner, 0.5, 0.5 + inner, 1.0])
    weights = np.array([9.0, 49.0, 64.0, 49.0, 9.0]) / 180.0
    embedded = np.array([1.0, 0.0, 4.0, 0.0, 1.0]) / 6.0
    for array in (nodes, weights, embedded):
        array.flags.writeable = False
    return nodes, weights, embedded


@lru_cache
def embedded_weights() -> Array:
    """Weights on the five nodes of Legendre's rule, the middle one 0, exact for cubic polynomials; sum 1."""
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
