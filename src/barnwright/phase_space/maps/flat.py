"""An invariant, evenly."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def value(u: Array, low: Array, high: Array) -> Array:
    """m² in GeV² between ``low`` and ``high``."""
    return low + u * (high - low)


def density(low: Array, high: Array) -> Array:
    """du/dm² in GeV⁻², the same everywhere."""
    return 1.0 / (high - low)
