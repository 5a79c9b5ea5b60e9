"""An azimuth, evenly; the tangent of half the angle gives sine and cosine with one function."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

DENSITY = 0.5 / np.pi
"""du/dφ, in 1/rad."""


def value(u: Array) -> tuple[Array, Array]:
    """cos φ and sin φ of φ = 2π(u − ½)."""
    tangent = np.tan(np.pi * (u - 0.5))
    square = tangent * tangent
    over = 2.0 / (1.0 + square)
    return over - 1.0, tangent * over
