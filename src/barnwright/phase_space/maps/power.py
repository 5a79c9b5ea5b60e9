"""A peak y^−ν, y the distance from a pole that lies below the range.

y runs from ``start`` to ``start + width``. Written with log1p and expm1, so that a pole far away (start ≫ width), from
where the peak looks flat, loses no digits. ν = 1 is the map of `logarithm`.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.maps import logarithm

Array = NDArray[np.float64]


def value(u: Array, start: Array, width: Array, power: float) -> Array:
    """y − start, between 0 and ``width``; the unit is that of ``start``."""
    if power == 1.0:
        return logarithm.value(u, start, width)
    rest = 1.0 - power
    reach = np.expm1(rest * np.log1p(width / start))
    return np.asarray(start * np.expm1(np.log1p(u * reach) / rest))


def density(y: Array, start: Array, width: Array, power: float) -> Array:
    """du/dy at the distance y from the pole."""
    if power == 1.0:
        return logarithm.density(y, start, width)
    rest = 1.0 - power
    reach = np.expm1(rest * np.log1p(width / start))
    return np.asarray(rest * (start / y) ** power / (start * reach))
