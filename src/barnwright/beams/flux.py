"""The flux factor of two beams."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics import Collision

Array = NDArray[np.float64]


def flux(collision: Collision, masses: tuple[float, ...]) -> Array:
    """F = 4 √s p* in GeV², shape (point, 1); masses in GeV of the beams.

    Source: PDG Review, Kinematics, "Cross sections" (F = 4 √((p_a·p_b)² − m_a² m_b²)), from memory.
    """
    return np.asarray(4 * collision.sqrt_s * collision.momentum(*masses))
