"""Polarisation vectors of definite helicity of photons, gluons, W and Z.

Rules of this file
------------------
- Contravariant (0, x, y, z) of an *incoming* boson; an outgoing one has the conjugate.
- ε(±1) along +z is (0, ∓1, −i, 0)/√2, turned by θ about the axis (−sin φ, cos φ, 0) as the spinors are; hence
  ε(−h) = −ε(h)*. At rest the spin is measured along +z.
- ε(0) = (p, E p/|p|)/m; only massive bosons have it. Contracted with a conserved current, its parts of order E/m
  cancel.
"""

from __future__ import annotations

import numpy as np

from barnwright.amplitudes.arrays import Complex, filled
from barnwright.amplitudes.directions import Direction, direction
from barnwright.kinematics import FourVector


def polarisation_vector(vector: FourVector, helicity: int) -> Complex:
    """ε^μ(k, h) of an incoming vector boson, shape (4, …); conjugate it for an outgoing one.

    Parameters
    ----------
    vector : FourVector
        GeV.
    helicity : −1, 0 or +1
        0 only for a massive boson.

    Raises
    ------
    ValueError
        For another helicity, and for 0 where the mass is 0.
    """
    return polarisation_in(vector, direction(vector), helicity)


def polarisation_in(vector: FourVector, towards: Direction, helicity: int) -> Complex:
    """ε^μ of a momentum whose `direction` is known."""
    if helicity not in (-1, 0, 1):
        raise ValueError(f"helicity: got {helicity!r}, expected -1, 0 or 1 (of a vector boson)")
    if helicity:
        return _transverse(towards, helicity)
    if np.any(np.asarray(vector.mass) == 0):
        raise ValueError("helicity: got 0, expected -1 or 1, the only ones of a massless vector boson")
    return _longitudinal(vector, towards)


def _longitudinal(vector: FourVector, towards: Direction) -> Complex:
    cosine, sine, phase = towards
    along = vector.energy / vector.mass
    across = 2 * sine * cosine * along
    z = (cosine - sine) * (cosine + sine) * along
    return filled(vector.momentum / vector.mass, across * phase.real, across * phase.imag, z)


def _transverse(towards: Direction, helicity: int) -> Complex:
    cosine, sine, phase = towards
    turned = phase if helicity > 0 else np.conj(phase)
    scale = np.sqrt(0.5)
    tilt = 2 * scale * sine * turned
    x = helicity * (tilt * sine * phase.real - scale)
    y = helicity * tilt * sine * phase.imag - 1j * scale
    return filled(0.0, x, y, helicity * tilt * cosine)
