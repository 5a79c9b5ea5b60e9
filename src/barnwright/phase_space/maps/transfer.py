"""The peak 1/(M² − t)^ν of an exchange, in the angle between a beam and what it turns into.

In the frame where the splitting system rests, M² − t = 2kp (x + δ) with x = 1 − cos of that angle, k the beam's and p
the product's momentum: a power of x + δ. x runs between ``ends``.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.maps import power

Array = NDArray[np.float64]

FLOOR = 1e-9
"""The least δ: where masses put the pole on the axis, what cuts do not exclude keeps a finite density."""


def delta(nearest: Array, slope: Array) -> Array:
    """δ from M² − t at zero angle and 2kp, both in GeV²."""
    return np.maximum(nearest / slope, FLOOR)


def value(u: Array, ends: tuple[Array, Array], delta: Array, exponent: float) -> Array:
    """x = 1 − cos."""
    low, high = ends
    return low + power.value(u, low + delta, high - low, exponent)


def density(distance: Array, ends: tuple[Array, Array], delta: Array, exponent: float) -> Array:
    """du/dcos at ``distance`` = x + δ."""
    low, high = ends
    return power.density(distance, low + delta, high - low, exponent)
