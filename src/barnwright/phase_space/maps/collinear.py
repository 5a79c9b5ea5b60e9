"""A massless leg along another outgoing one: 1/(m² − m_e²), m the mass of the two and m_e that of the emitter.

m² − m_e² = 2ω(E − p cos θ) vanishes where the leg is soft as well. How far below the range the pole is put follows from
what keeps the leg away: its least energy, the least angle and the emitter's mass.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.maps import logarithm

Array = NDArray[np.float64]

FLOOR = 1e-9
"""The share of s below which m² − m_e² keeps a finite density where nothing keeps the leg away."""


def offset(energy: Array, emitter: float, least_energy: float, least_angle: float) -> Array:
    """A typical smallest m² − m_e² in GeV², for an emitter of half the beam's energy.

    Parameters
    ----------
    energy : array, GeV
        √s.
    emitter : float, GeV
        Its mass.
    least_energy, least_angle : floats, GeV and rad
        Of the massless leg, and between the two; 0 where no cut says.
    """
    angle = 0.5 * energy * np.square(np.sin(0.5 * least_angle))
    return np.asarray(2.0 * least_energy * (angle + emitter * emitter / energy) + FLOOR * energy * energy)


def value(u: Array, low: Array, high: Array, start: Array) -> Array:
    """m² in GeV² between ``low`` and ``high``, the pole being ``start`` below ``low``."""
    return low + logarithm.value(u, start, high - low)


def density(x: Array, low: Array, high: Array, start: Array) -> Array:
    """du/dm² in GeV⁻² at m² = x."""
    return logarithm.density(x - low + start, start, high - low)
