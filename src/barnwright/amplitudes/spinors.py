"""Spinors of definite helicity, massive and massless, in the chiral representation.

Rules of this file
------------------
- Components (left, left, right, right): u = (√(p·σ) ξ, √(p·σ̄) ξ), v = (√(p·σ) η, −√(p·σ̄) η), so ū u = 2m, v̄ v = −2m,
  u†u = v†v = 2E. M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), section 3.3.
- Helicity +1 and −1 mean ±1/2 of the *physical* particle; for an antiparticle too.
- ξ₊ = (cos θ/2, e^{iφ} sin θ/2), ξ₋ = (−e^{−iφ} sin θ/2, cos θ/2): the spinors of +z turned by θ about the axis
  (−sin φ, cos φ, 0), hence independent of φ at +z. At rest the spin is measured along +z.
- v = C ūᵀ = iγ²u*: η = −ξ₋ for helicity +1 and ξ₊ for −1.
- √(E − p) is m/√(E + p), never a difference; it is exactly 0 for a massless particle.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from barnwright.amplitudes.arrays import Array, Complex, filled
from barnwright.amplitudes.directions import Direction, direction
from barnwright.kinematics import FourVector


class Frame(NamedTuple):
    """What all spinors of one momentum share: √(E + p), √(E − p) and the direction."""

    large: Array
    small: Array
    towards: Direction


def frame(vector: FourVector) -> Frame:
    """√(E + p), √(E − p) in √GeV and the direction of a momentum."""
    large = np.sqrt(vector.energy + vector.momentum)
    small = np.asarray(vector.mass / np.where(large > 0, large, 1.0))
    return Frame(large, small, direction(vector))


def spinor_u(vector: FourVector, helicity: int) -> Complex:
    """u(p, h) of a particle, √GeV, shape (4, …) with what the vector's arrays broadcast to.

    Parameters
    ----------
    vector : FourVector
        GeV, e.g. ``event.cm_vector("beam_a")``.
    helicity : −1 or +1
        Twice the helicity of the particle.

    Raises
    ------
    ValueError
        For any other helicity.
    """
    return u_in(frame(vector), helicity)


def spinor_v(vector: FourVector, helicity: int) -> Complex:
    """v(p, h) of an antiparticle with the physical helicity h, √GeV, shape (4, …); arguments as for `spinor_u`.

    Raises
    ------
    ValueError
        For a helicity other than −1 and +1.
    """
    return v_in(frame(vector), helicity)


def adjoint(spinor: Complex) -> Complex:
    """ψ̄ = ψ†γ⁰, shape (4, …): in the chiral representation the conjugate with its halves exchanged."""
    return np.conj(spinor)[[2, 3, 0, 1]]


def u_in(known: Frame, helicity: int) -> Complex:
    """u of a momentum whose `frame` is known."""
    _check(helicity)
    left, right = (known.small, known.large) if helicity > 0 else (known.large, known.small)
    up, down = _two_component(known.towards, helicity)
    return filled(left * up, left * down, right * up, right * down)


def v_in(known: Frame, helicity: int) -> Complex:
    """v of a momentum whose `frame` is known."""
    _check(helicity)
    left, right = (-known.large, known.small) if helicity > 0 else (known.small, -known.large)
    up, down = _two_component(known.towards, -helicity)
    return filled(left * up, left * down, right * up, right * down)


def _two_component(towards: Direction, sign: int) -> tuple[Array | Complex, Array | Complex]:
    """The eigenvector of σ·p/|p| with this eigenvalue."""
    if sign > 0:
        return towards.cosine, towards.sine * towards.phase
    return -towards.sine * np.conj(towards.phase), towards.cosine


def _check(helicity: int) -> None:
    if helicity not in (-1, 1):
        raise ValueError(f"helicity: got {helicity!r}, expected -1 or 1 (twice the helicity of a fermion)")
