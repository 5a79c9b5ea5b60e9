"""The map of the axis near a pole: even steps of ln(1 + x/δ) resolve a peak of width δ."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def to_map(x: Array, scale: Array) -> Array:
    """The map's variable w of x: x itself where the scale is infinite, ln(1 + x/δ) near a peak of width δ."""
    if np.all(np.isinf(scale)):
        return x
    with np.errstate(invalid="ignore"):
        return np.where(np.isinf(scale), x, np.log1p(x / scale))


def from_map(w: Array, scale: Array) -> tuple[Array, Array]:
    """x of w, and dx/dw."""
    if np.all(np.isinf(scale)):
        return w, np.ones_like(scale)
    with np.errstate(invalid="ignore", over="ignore"):
        flat = np.isinf(scale)
        x = np.where(flat, w, scale * np.expm1(np.where(flat, 0.0, w)))
        return x, np.where(flat, 1.0, x + scale)
