"""The map of the axis near a pole: even steps of the logarithm of x + δ resolve a peak of width δ.

Every panel has a map of its own, counted from its end at the pole's side, its base: ln((x + δ)/(base + δ)). Counted
from the pole itself, a narrow panel far from it would be the difference of two large logarithms.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def to_map(x: Array, scale: Array, base: Array) -> Array:
    """The map's variable w of x: x itself where the scale is infinite, the logarithm near a peak of width δ."""
    if np.all(np.isinf(scale)):
        return x
    with np.errstate(invalid="ignore"):
        return np.where(np.isinf(scale), x, np.log1p((x - base) / (base + scale)))


def from_map(w: Array, scale: Array, base: Array) -> tuple[Array, Array]:
    """x of w, and dx/dw."""
    if np.all(np.isinf(scale)):
        return w, np.ones_like(scale)
    with np.errstate(invalid="ignore", over="ignore"):
        flat = np.isinf(scale)
        x = np.where(flat, w, base + (base + scale) * np.expm1(np.where(flat, 0.0, w)))
        return x, np.where(flat, 1.0, x + scale)
