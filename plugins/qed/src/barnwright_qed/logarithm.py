"""The logarithm of two photons on a lepton, without the terms that would cancel.

Far below the mass, and slowly moving, the closed forms are differences of powers and a logarithm. With
artanh r = r (1 + r² h), h = 1/3 + r²/5 + r⁴/7 + …, the powers that would cancel are gone.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

SERIES_BELOW = 1 / 3
"""r above which h is taken from the logarithm, where that loses less than two digits."""
SERIES = 1 / np.arange(37, 2, -2)
"""Coefficients of h, the highest first; at r² = 1/9 the first one left away is 2e-19 of the sum."""


def artanh_rest(r: Array, y: Array) -> Array:
    """(artanh(r)/r − 1)/r² = 1/3 + r²/5 + r⁴/7 + … for 0 ≤ r < 1, with y = (1 − r)/(1 + r) known to all its digits."""
    small = np.minimum(r, SERIES_BELOW)
    large = np.maximum(r, SERIES_BELOW)
    series = np.polyval(SERIES, np.square(small))
    return np.where(r < SERIES_BELOW, series, (-np.log(y) / (2 * large) - 1) / np.square(large))
