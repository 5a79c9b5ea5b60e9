"""Dirac matrices in the chiral representation, and a slashed vector with and without them.

γ^μ = ((0, σ^μ), (σ̄^μ, 0)) with σ^μ = (1, σ) and σ̄^μ = (1, −σ); γ⁵ = diag(−1, −1, 1, 1). M. Peskin, D. Schroeder, An
Introduction to Quantum Field Theory (1995), eqs. 3.25 and 3.72.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from barnwright.amplitudes.arrays import Array, Complex, filled
from barnwright.kinematics import FourVector

Vector = FourVector | Array | Complex
"""A momentum in light-cone components, or contravariant components (E, x, y, z) of any vector, shape (4, …)."""


def _matrices() -> Complex:
    sigma = np.array([[[1, 0], [0, 1]], [[0, 1], [1, 0]], [[0, -1j], [1j, 0]], [[1, 0], [0, -1]]])
    gamma = np.zeros((4, 4, 4), dtype=complex)
    gamma[:, :2, 2:] = sigma
    gamma[:, 2:, :2] = sigma * np.array([1, -1, -1, -1])[:, None, None]
    return gamma


def _fixed(matrix: Complex) -> Complex:
    matrix.flags.writeable = False
    return matrix


GAMMA = _fixed(_matrices())
"""γ^μ, shape (4, 4, 4): index, row, column."""
GAMMA5 = _fixed(np.diag([-1, -1, 1, 1]).astype(complex))
"""γ⁵, shape (4, 4)."""
P_LEFT = _fixed(np.diag([1, 1, 0, 0]).astype(complex))
"""(1 − γ⁵)/2, shape (4, 4)."""
P_RIGHT = _fixed(np.diag([0, 0, 1, 1]).astype(complex))
"""(1 + γ⁵)/2, shape (4, 4)."""


def slash(vector: Vector) -> Complex:
    """γ^μ a_μ as matrices, shape (4, 4, …). In a law `apply_slash` does without them.

    Parameters
    ----------
    vector : FourVector, or array of shape (4, …)
        Contravariant components. A FourVector keeps the digits of E ± pz.
    """
    plus, minus, perp, conjugate = light_cone(vector)
    entries = filled(plus, minus, perp, conjugate)
    out = np.zeros((4, 4, *entries.shape[1:]), dtype=complex)
    out[0, 2], out[0, 3], out[1, 2], out[1, 3] = entries[1], -entries[3], -entries[2], entries[0]
    out[2, 0], out[2, 1], out[3, 0], out[3, 1] = entries[0], entries[3], entries[2], entries[1]
    return out


def apply_slash(vector: Vector, spinor: Complex) -> Complex:
    """γ^μ a_μ ψ, shape (4, …); arguments broadcast. (p̸ + m) ψ is ``apply_slash(p, psi) + m * psi``.

    Linear: for p − k apply it twice and subtract, rather than subtracting momenta first.
    """
    plus, minus, perp, conjugate = light_cone(vector)
    one, two, three, four = spinor
    return filled(
        minus * three - conjugate * four,
        plus * four - perp * three,
        plus * one + conjugate * two,
        perp * one + minus * two,
    )


def light_cone(vector: Vector) -> tuple[Any, Any, Any, Any]:
    """(a⁰ + a³, a⁰ − a³, a¹ + ia², a¹ − ia²) of a vector, real or complex."""
    if isinstance(vector, FourVector):
        perp = vector.px + 1j * vector.py
        return vector.plus, vector.minus, perp, np.conj(perp)
    energy, x, y, z = vector
    return energy + z, energy - z, x + 1j * y, x - 1j * y


def dot(first: Vector, second: Vector) -> Complex | Array:
    """a·b = a⁰b⁰ − a¹b¹ − a²b² − a³b³ without conjugation, shape (…).

    Parameters
    ----------
    first, second : FourVector, or arrays of shape (4, …)
        Contravariant components, real or complex. A FourVector enters with its light-cone components.
    """
    if isinstance(first, FourVector) or isinstance(second, FourVector):
        a, b = light_cone(first), light_cone(second)
        return np.asarray(0.5 * (a[0] * b[1] + a[1] * b[0] - a[2] * b[3] - a[3] * b[2]))
    return np.asarray(first[0] * second[0] - first[1] * second[1] - first[2] * second[2] - first[3] * second[3])
