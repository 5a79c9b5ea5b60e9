"""A massless leg of little energy: 1/ω.

In the rest frame of a mother of mass M the leg has ω = (M² − m²)/2M, with m the mass of everything else. The map makes
the gap M² − m² (GeV²) itself, so that a leg of any softness keeps its digits.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.maps import logarithm

Array = NDArray[np.float64]

FLOOR = 1e-6
"""Where no cut bounds the energy: the share of the largest gap below which the density stays finite."""


def start(low: Array, high: Array) -> Array:
    """The distance from the pole at which the range of gaps begins, GeV²."""
    return np.maximum(low, FLOOR * high)


def value(u: Array, low: Array, high: Array) -> Array:
    """The gap in GeV² between ``low`` and ``high``."""
    return low + logarithm.value(u, start(low, high), high - low)


def density(gap: Array, low: Array, high: Array) -> Array:
    """du/dgap in GeV⁻²."""
    first = start(low, high)
    return logarithm.density(gap + (first - low), first, high - low)
