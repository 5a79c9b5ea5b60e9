"""The Gauss–Kronrod rule of 7 and 15 nodes, and a change of variable that smooths square roots at both ends.

Arrays are made when first asked for. The nodes that Kronrod adds are the zeros of Stieltjes's polynomial E of degree 8,
for which ∫ P₇ E x^k dx = 0 up to k = 7; the weights integrate Legendre polynomials exactly (A. S. Kronrod, Nodes and
Weights of Quadrature Formulas, Consultants Bureau 1965, from memory).
"""

from __future__ import annotations

from functools import lru_cache
from typing import NamedTuple

import numpy as np
from numpy.polynomial import legendre
from numpy.typing import NDArray

Array = NDArray[np.float64]

GAUSS_ORDER = 7
NODES = 2 * GAUSS_ORDER + 1


class Kronrod(NamedTuple):
    """The rule on [0, 1] for ∫ f dv with v = u²(3 − 2u): where f is like a square root at an end, it is smooth in u.

    ``place`` is v at the nodes in u, shape (15,), ``fine`` the weights and ``coarse`` those of the Gauss rule (0 where
    it has no node). ``slopes``, shape (15, 17), makes dF/dv at the nodes from F at the low end, at the nodes and at the
    high end, by the one polynomial in u through them; ``rounding`` is how far an error of 1 in F may go in ∫ |dF|.
    """

    place: Array
    fine: Array
    coarse: Array
    slopes: Array
    rounding: float


@lru_cache
def kronrod() -> Kronrod:
    """The rule."""
    inner, gauss = legendre.leggauss(GAUSS_ORDER)
    nodes = np.sort(np.concatenate([inner, _stieltjes_zeros()]))
    vandermonde = legendre.legvander(nodes, NODES - 1).T
    fine = np.linalg.solve(vandermonde, np.eye(NODES)[0] * 2.0)
    coarse = np.zeros(NODES)
    coarse[1::2] = gauss
    u = 0.5 * (1.0 + nodes)
    measure = 6.0 * u * (1.0 - u)
    slopes = _slopes(u)
    rounding = float(np.sum(0.5 * fine[:, None] * np.abs(slopes)))
    arrays = (u * u * (3.0 - 2.0 * u), 0.5 * fine * measure, 0.5 * coarse * measure, slopes / measure[:, None])
    for array in arrays:
        array.flags.writeable = False
    return Kronrod(*arrays, rounding)


def _slopes(u: Array) -> Array:
    """d/du at the nodes from values at 0, the nodes and 1: J.-P. Berrut and L. N. Trefethen, SIAM Rev. 46, 501."""
    x = np.concatenate([[0.0], u, [1.0]])
    apart = x[:, None] - x + np.eye(x.size)
    weights = 1 / np.prod(4 * apart, axis=1)
    matrix = weights / weights[:, None] / apart
    np.fill_diagonal(matrix, 0.0)
    np.fill_diagonal(matrix, -matrix.sum(axis=1))
    return np.asarray(matrix[1:-1])


def _stieltjes_zeros() -> Array:
    """Zeros of E = Σ e_j P_j with e_8 = 1, odd in no term; polished by Newton's method."""
    x, w = legendre.leggauss(GAUSS_ORDER + NODES)
    p = legendre.legvander(x, GAUSS_ORDER + 1)
    products = np.einsum("n,n,nj,nk->kj", w, p[:, GAUSS_ORDER], p, p)
    unknown = np.arange(0, GAUSS_ORDER + 1, 2)
    tests = np.arange(1, GAUSS_ORDER + 1, 2)
    matrix, right = products[np.ix_(tests, unknown)], -products[tests, GAUSS_ORDER + 1]
    e = np.zeros(GAUSS_ORDER + 2)
    e[unknown], e[GAUSS_ORDER + 1] = np.linalg.solve(matrix, right), 1.0
    zeros = legendre.legroots(e).real
    for _ in range(3):
        zeros = zeros - legendre.legval(zeros, e) / legendre.legval(zeros, legendre.legder(e))
    return np.sort(0.5 * (zeros - zeros[::-1]))
