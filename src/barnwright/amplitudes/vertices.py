"""The vertex of three vector bosons.

V = (a·b)(k_a − k_b)·c + (b·c)(k_b − k_c)·a + (c·a)(k_c − k_a)·b with all momenta incoming. Fields of
W⁺ and W⁻ with a photon or a Z: M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), figure 21.9.
"""

from __future__ import annotations

import numpy as np

from barnwright.amplitudes.arrays import Array, Complex
from barnwright.amplitudes.dirac import Vector, dot


def three_vector_vertex(
    waves: tuple[Complex | Array, Complex | Array, Complex | Array], momenta: tuple[Vector, Vector, Vector]
) -> Complex:
    """V of three vector wave functions, shape (…), in GeV for polarisation vectors.

    For ``waves = (outgoing W+, outgoing W-, photon or Z)`` the vertex is i g V with g = e for the photon and
    g_Z cos²θ = g cos θ for the Z, in the signs of `photon_coupling` and `z_coupling`; for three gluons it is the
    coefficient of g_s f^abc.

    Parameters
    ----------
    waves : three arrays, (4, …)
        Contravariant; polarisation vectors or currents.
    momenta : three FourVectors, or arrays of shape (4, …), GeV
        All incoming: an outgoing boson has ``-vector.components()``.
    """
    a, b, c = waves
    k_a, k_b, k_c = momenta
    first = dot(a, b) * (dot(k_a, c) - dot(k_b, c))
    second = dot(b, c) * (dot(k_b, a) - dot(k_c, a))
    third = dot(c, a) * (dot(k_c, b) - dot(k_a, b))
    return np.asarray(first + second + third)
