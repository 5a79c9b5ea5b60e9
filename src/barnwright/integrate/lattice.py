"""Points of a randomly shifted rank-1 lattice in base 2.

Rules of this file
------------------
- Point k is z·φ(k) + shift modulo 1, where φ reverses the bits of k behind the binary point. So the first 2^m points
  are the whole lattice of 2^m points for every m, and any range of points is made from its two numbers alone.
- Fractions are 64-bit integers, of which addition and multiplication drop the whole part: nothing is rounded, and the
  bits of a point do not depend on the range in which it is made.
- The baker transform x → 1 − |2x − 1| makes the integrand periodic, with which the variance of a smooth one falls as
  N^-4 instead of N^-2: F. J. Hickernell, in Monte Carlo and Quasi-Monte Carlo Methods 2000 (Springer 2002), 274.
- A coordinate is the middle of one of 2^52 cells: exact, and never 0 or 1.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.block import Seed
from barnwright.integrate.generating_vector import GENERATING_VECTOR, LAST_LEVEL

Array = NDArray[np.float64]
Fractions = NDArray[np.uint64]
"""Multiples of 2^-64."""

MOST_AXES = len(GENERATING_VECTOR)
MOST_POINTS = 1 << LAST_LEVEL

_HALF = (LAST_LEVEL + 1) // 2
_MASK = (1 << _HALF) - 1


def generating_vector(axes: int) -> Fractions:
    """The first components of the generating vector, shape (axes,).

    Raises
    ------
    ValueError
        If there are more than `MOST_AXES` axes.
    """
    if not 0 < axes <= MOST_AXES:
        raise ValueError(f"axes: got {axes}, expected 1 to {MOST_AXES}")
    return np.array(GENERATING_VECTOR[:axes], dtype=np.uint64)


def random_shift(words: Seed, axes: int) -> Fractions:
    """The shift of a replicate, shape (axes,), from its seed words; that of fewer axes is a part of it."""
    return np.asarray(np.random.PCG64(np.random.SeedSequence(words)).random_raw(axes), dtype=np.uint64)


def points(first: int, count: int, vector: Fractions, shift: Fractions, baker: bool = True) -> Array:
    """Points ``first`` … ``first + count - 1`` of the shifted lattice.

    Parameters
    ----------
    first, count : int
        Numbers of points.
    vector, shift : array of uint64, shape (axes,)
        See `generating_vector` and `random_shift`.
    baker : bool
        Whether to fold the coordinates.

    Returns
    -------
    array, shape (axes, count)
        Coordinates between 0 and 1, both excluded.

    Raises
    ------
    ValueError
        If the points are not among the first `MOST_POINTS`.
    """
    if not 0 <= first <= first + count <= MOST_POINTS:
        raise ValueError(f"points: got {first} to {first + count}, expected a range within 0 to {MOST_POINTS}")
    fractions = np.multiply(vector[:, np.newaxis], _radical_inverse(first, count))
    fractions += shift[:, np.newaxis]
    signed = fractions.view(np.int64)
    if baker:
        signed ^= signed >> 63
        signed <<= 1
    fractions >>= np.uint64(12)
    coordinates = signed.astype(np.float64)
    coordinates += 0.5
    coordinates *= 2.0**-52
    return coordinates


def _radical_inverse(first: int, count: int) -> Fractions:
    """Fractions that mirror the bits of the numbers at the binary point."""
    numbers = np.arange(first, first + count)
    inverse: Fractions = _MIRRORED[numbers >> _HALF] >> np.uint64(_HALF)
    inverse |= _MIRRORED[numbers & _MASK]
    return inverse


def _mirrored(bits: int) -> Fractions:
    """The radical inverse of 0 … 2^bits - 1."""
    inverse = np.zeros(1, dtype=np.uint64)
    for bit in range(bits):
        inverse = np.concatenate([inverse, inverse | np.uint64(1 << (63 - bit))])
    return inverse


_MIRRORED = _mirrored(_HALF)
