"""Colour of SU(3): generators, and the matrix C with which flows are summed, Σ A_i C_ij A_j*.

Rules of this file
------------------
- T^a = λ^a/2 with the matrices of M. Gell-Mann, Phys. Rev. 125 (1962) 1067; Tr T^a T^b = δ^ab/2, C_F = 4/3.
- A flow is the colour tensor that multiplies one amplitude, with one axis for each coloured leg, in the same order for
  all flows of a process. C sums over all colours, initial ones too: the core averages.
"""

from __future__ import annotations

from itertools import permutations

import numpy as np
from numpy.typing import ArrayLike

from barnwright.amplitudes.arrays import Complex

ColourMatrix = tuple[tuple[complex, ...], ...]
_MOST_GLUONS = 3


def _generators() -> Complex:
    matrices = np.zeros((8, 3, 3), dtype=complex)
    for index, (i, j) in ((0, (0, 1)), (3, (0, 2)), (5, (1, 2))):
        matrices[index, i, j] = matrices[index, j, i] = 0.5
        matrices[index + 1, i, j], matrices[index + 1, j, i] = -0.5j, 0.5j
    matrices[2] = np.diag([0.5, -0.5, 0])
    matrices[7] = np.diag([1, 1, -2]) / np.sqrt(12)
    matrices.flags.writeable = False
    return matrices


GENERATORS = _generators()
"""T^a, shape (8, 3, 3): gluon, row, column."""

SINGLET: ColourMatrix = ((3.0,),)
"""C of a quark and an antiquark from a colourless source: the flow δ_ij."""


def colour_matrix(*flows: ArrayLike) -> ColourMatrix:
    """C_ij = Σ over all colours of flow i times the conjugate of flow j, for ``HelicityAmplitudes(colour=…)``.

    Parameters
    ----------
    flows : arrays of one shape
        A colour tensor for each flow: ``np.eye(3)`` for a quark pair, `GENERATORS` for one with a gluon.

    Raises
    ------
    ValueError
        Where the tensors have different shapes.
    """
    tensors = [np.asarray(flow, dtype=complex) for flow in flows]
    shapes = sorted({tensor.shape for tensor in tensors})
    if len(shapes) != 1:
        raise ValueError(f"flows: got tensors of the shapes {shapes}, expected one shape for all")
    return tuple(tuple(_number(np.sum(one * np.conj(other))) for other in tensors) for one in tensors)


def quark_line(gluons: int) -> ColourMatrix:
    """C of a quark, an antiquark and some gluons: the flows are the orders of T^a T^b … along the quark's line.

    One flow for no gluon or one (3 and 4), two for two gluons, (T^a T^b) and (T^b T^a); in general the order of
    ``itertools.permutations``, the first gluon next to the outgoing quark.

    Raises
    ------
    ValueError
        For fewer than 0 or more than 3 gluons.
    """
    if not 0 <= gluons <= _MOST_GLUONS:
        raise ValueError(f"gluons: got {gluons!r}, expected a number from 0 to {_MOST_GLUONS}")
    return colour_matrix(*(_chain(order) for order in permutations(range(gluons))))


def _chain(order: tuple[int, ...]) -> Complex:
    """T^{a(order[0])} T^{a(order[1])} …, axes (gluon 0, gluon 1, …, row, column)."""
    product: Complex = np.eye(3, dtype=complex)
    for _ in order:
        product = np.einsum("...ij,ajk->...aik", product, GENERATORS)
    return np.moveaxis(product, range(len(order)), order)


def _number(value: complex) -> complex:
    """A real number where the imaginary part is rounding only."""
    return float(value.real) if abs(value.imag) <= 1e-14 * abs(value) else complex(value)
