"""From beam settings to the collision: √s, and the rapidity of the centre of mass in the lab.

Everything is built from kinetic energies, so a soft photon on a target keeps its digits:
s − (m_a + m_b)² = 2 (T_a T_b + T_a m_b + T_b m_a + p_a p_b) for beams head on. √s itself is rounded to a few ε where it
was not given as such; what that means close above the threshold of a final state, the error of the answer says.
Beams that cross at an angle are worked out in `crossing`.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.beams.beam_settings import BeamSettings
from barnwright.beams.crossing import cross
from barnwright.kinematics import Collision

Array = NDArray[np.float64]


def kinetic_from_energy(energy: float, mass: float) -> float:
    """T = E − m in GeV."""
    return energy - mass


def kinetic_from_momentum(momentum: float, mass: float) -> float:
    """T = p²/(E + m) in GeV."""
    energy = float(np.hypot(momentum, mass))
    return momentum * momentum / (energy + mass) if momentum else 0.0


def collide(beams: BeamSettings, masses: tuple[float, ...]) -> Collision:
    """The collision at every point, arrays of shape (point, 1).

    Parameters
    ----------
    beams : BeamSettings
    masses : two floats, GeV
        Of beam a and beam b.
    """
    first = np.array(beams.first, dtype=float)[:, None]
    if beams.given == "sqrt_s":
        return Collision(first, np.zeros_like(first), np.ones_like(first), beams.orientation, None, True)
    second = np.array(beams.second, dtype=float)[:, None]
    m_a, m_b = masses
    if beams.crossing_angle:
        return cross((first, second), (m_a, m_b), beams.crossing_angle, beams.orientation)
    p_a, p_b = (np.sqrt(t * (t + 2 * m)) for t, m in ((first, m_a), (second, m_b)))
    excess = 2 * (first * second + first * m_b + second * m_a + p_a * p_b)
    total = m_a + m_b
    sqrt_s = np.sqrt(total * total + excess)
    correction = excess / (sqrt_s + total) - (sqrt_s - total)
    ahead, behind = (
        ((first, m_a, p_a), (second, m_b, p_b)) if beams.orientation == 1 else ((second, m_b, p_b), (first, m_a, p_a))
    )
    stretch = np.sqrt((_large(*ahead) + _small(*behind)) / (_small(*ahead) + _large(*behind)))
    return Collision(sqrt_s, correction, stretch, beams.orientation, beams.target)


def _large(kinetic: Array, mass: float, momentum: Array) -> Array:
    """E + p."""
    return kinetic + mass + momentum


def _small(kinetic: Array, mass: float, momentum: Array) -> Array:
    """E − p, from m²/(E + p)."""
    return np.asarray(mass * mass / (kinetic + mass + momentum))
