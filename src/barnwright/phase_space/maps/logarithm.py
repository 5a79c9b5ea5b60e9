"""A peak 1/y, y the distance from a pole that lies below the range: even steps of ln y.

y runs from ``start`` to ``start + width``. Written with log1p and expm1, so that a pole far away (start ≫ width), from
where the peak looks flat, loses no digits.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def value(u: Array, start: Array, width: Array) -> Array:
    """y − start, between 0 and ``width``; the unit is that of ``start``."""
    return np.asarray(start * np.expm1(u * np.log1p(width / start)))


def density(y: Array, start: Array, width: Array) -> Array:
    """du/dy at the distance y from the pole."""
    return np.asarray(1.0 / (y * np.log1p(width / start)))
