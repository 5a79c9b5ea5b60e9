"""A polar angle: its cosine, evenly.

``low`` and ``high`` are the ends of 1 − cos; 0 and 2 are the whole range.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def value(u: Array, low: Array, high: Array) -> tuple[Array, Array]:
    """1 − cos and 1 + cos."""
    width = high - low
    ahead = u * width
    return low + ahead, (2.0 - high) + (width - ahead)


def everywhere(u: Array) -> tuple[Array, Array]:
    """1 − cos and 1 + cos over the whole range."""
    ahead = 2.0 * u
    return ahead, 2.0 - ahead


def density(low: Array, high: Array) -> Array:
    """du/dcos, the same everywhere."""
    return 1.0 / (high - low)
