"""Invariants of two momenta without cancellation: four-products, and transfers from a beam.

A four-momentum is (E, px, py, pz) in GeV, its squared mass (GeV²) is given beside it. Bodies of arrays that broadcast.
"""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Components = tuple[Array, Array, Array, Array]


def four_product(first: Components, second: Components, squares: tuple[Any, Any]) -> Array:
    """p·q in GeV², also of momenta that are almost parallel.

    For an acute angle E E' − **p**·**q** is (m² E'² + m'² **p**² + |**p** × **q**|²)/(E E' + **p**·**q**), a sum of
    positive terms.
    """
    energy, px, py, pz = first
    other, qx, qy, qz = second
    along = px * qx + py * qy + pz * qz
    x, y, z = py * qz - pz * qy, pz * qx - px * qz, px * qy - py * qx
    above = x * x + y * y + z * z
    if np.any(squares[0]):
        above = above + squares[0] * (other * other)
    if np.any(squares[1]):
        above = above + squares[1] * (energy * energy - squares[0])
    both = energy * other
    acute = along > 0
    return np.where(acute, above / np.where(acute, both + along, 1.0), both - along)


def light_cone(energy: Array, along: Array, square: Any, across: Array) -> tuple[Array, Array]:
    """E + p_z and E − p_z in GeV, the small one from (m² + p_t²)/large; ``across`` is p_t² in GeV²."""
    large = energy + np.abs(along)
    small = (square + across) / np.where(large > 0, large, 1.0)
    forward = along >= 0
    return np.where(forward, large, small), np.where(forward, small, large)


def below_pole(
    beam: tuple[Array, float], plus: Array, square: Any, across: Array | float, exchanged: float = 0.0
) -> Array:
    """M² − t in GeV², with t = (p_beam − p)² and M the mass of what is exchanged; negative where t > M².

    With r = (E + p_z of the beam)/(E + p_z), +z along the beam, −t is r p_t² + (r − 1)(r m² − m_b²)/r: nothing is lost
    for massless particles at small angles, nor in elastic scattering. Where the beam itself is exchanged (it radiates
    what flies off), M² − t is r p_t² + (r − 1) m² + m_b²/r: nothing is lost for soft radiation.

    Parameters
    ----------
    beam : its E + p_z and its mass, GeV
    plus, square, across : of the other momentum E + p_z (GeV), m² and p_t² (GeV²)
    exchanged : M, GeV
    """
    ratio = beam[0] / plus
    if exchanged == beam[1]:
        rest = (ratio - 1.0) * square + beam[1] ** 2 / ratio
    else:
        rest = exchanged**2 + (ratio - 1.0) * (ratio * square - beam[1] ** 2) / ratio
    return np.asarray(ratio * across + rest)
