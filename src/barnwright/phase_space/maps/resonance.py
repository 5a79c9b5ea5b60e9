"""A Breit-Wigner in an invariant: even steps of the arctangent.

The line is h/((m² − c)² + h²). A fixed width Γ has c = M² and h = M Γ. A running one, 1/((m² − M²)² + m⁴ Γ²/M²), is the
same line with c = M²/(1 + Γ²/M²) and h = c Γ/M: the square is completed, nothing is approximated.
Source: D. Bardin, A. Leike, T. Riemann, M. Sachwitz, Phys. Lett. B 206 (1988) 539, for the equivalence.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def line(mass: float, width: float, running: bool) -> tuple[float, float]:
    """Centre c and half width h in GeV² of a resonance with mass and width in GeV."""
    centre = mass * mass / (1.0 + (width / mass) ** 2) if running else mass * mass
    return centre, centre * width / mass


def value(u: Array, low: Array, high: Array, centre: float, half_width: float) -> Array:
    """m² in GeV² between ``low`` and ``high``.

    tan of the sum of the lower end's angle and a share of the range, with the lower end's tangent taken out: far from
    the line, where both ends have almost the same angle, nothing cancels.
    """
    start = (low - centre) / half_width
    tangent = np.tan(u * angle(low, high, centre, half_width))
    return np.asarray(low + half_width * (1.0 + start * start) * tangent / (1.0 - start * tangent))


def density(x: Array, low: Array, high: Array, centre: float, half_width: float) -> Array:
    """du/dm² in GeV⁻² at m² = x."""
    away = x - centre
    line_height = half_width / (away * away + half_width * half_width)
    return np.asarray(line_height / angle(low, high, centre, half_width))


def angle(low: Array, high: Array, centre: float, half_width: float) -> Array:
    """The angle between two m², as seen from the pole: in [0, π)."""
    inner = half_width * half_width + (low - centre) * (high - centre)
    return np.asarray(np.arctan2((high - low) * half_width, inner))
