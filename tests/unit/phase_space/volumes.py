"""Volumes of phase space and integrals over it by roads that know nothing of the code under test."""

from __future__ import annotations

from collections.abc import Callable
from math import factorial, pi, sqrt

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Integrand = Callable[[Array], Array]

NODES, WEIGHTS = np.polynomial.legendre.leggauss(40)


def massless_volume(n: int, s: float) -> float:
    """(2π)^(4−3n) (π/2)^(n−1) s^(n−2)/((n−1)!(n−2)!); R. Kleiss, W. J. Stirling, S. D. Ellis, CPC 40 (1986) 359."""
    return (2 * pi) ** (4 - 3 * n) * (pi / 2) ** (n - 1) * s ** (n - 2) / (factorial(n - 1) * factorial(n - 2))


def two_body(s: Array, first: float, second: Array | float) -> Array:
    """λ^½(s, m₁², m₂²)/8πs; PDG Review, Kinematics, from memory."""
    root = (s - (first + second) ** 2) * (s - (first - second) ** 2)
    return np.sqrt(np.maximum(root, 0.0)) / (8 * pi * s)


def massive_volume(masses: tuple[float, ...], sqrt_s: float) -> float:
    """By recursion: Φ_n(s) = ∫ dm²/2π Φ₂(s; m_n, m) Φ_(n−1)(m²); E. Byckling and K. Kajantie, from memory.

    The roots at both ends of the range are taken out by m = (low + high)/2 − (high − low)/2 · cos θ.
    """
    return float(_volume(masses, np.array([sqrt_s]))[0])


def _volume(masses: tuple[float, ...], mass: Array) -> Array:
    if len(masses) == 2:
        return two_body(mass * mass, masses[0], masses[1])
    low, high = sum(masses[:-1]), mass - masses[-1]
    angle = 0.5 * pi * (NODES + 1.0)
    weight = 0.5 * pi * WEIGHTS * np.sin(angle)
    half = 0.5 * (high - low)[:, None]
    inner = low + half * (1.0 - np.cos(angle))
    table = np.linspace(low, float(mass.max()) - masses[-1], 201)
    rest = (
        _volume(masses[:-1], inner.ravel()).reshape(inner.shape)
        if len(masses) < 5
        else _looked_up(masses, inner, table)
    )
    outer = two_body((mass * mass)[:, None], masses[-1], inner)
    return np.asarray(np.sum(weight * half * 2 * inner / (2 * pi) * outer * rest, axis=1))


def _looked_up(masses: tuple[float, ...], inner: Array, table: Array) -> Array:
    """The inner volume from a table in m, its behaviour at the threshold, a power of the kinetic energy, taken out."""
    power = 1.5 * (len(masses) - 2) - 1.0
    kinetic = table - table[0]
    known = _volume(masses[:-1], table[1:]) / kinetic[1:] ** power
    smooth = np.polynomial.Chebyshev.fit(table[1:], known, 40)
    return np.asarray(smooth(inner) * (inner - table[0]) ** power)


def mean_and_error(values: Array) -> tuple[float, float]:
    """Of independent values."""
    return float(values.mean()), float(values.std() / sqrt(values.size))


def products(momenta: Array) -> Callable[[int, int], Array]:
    """p_i·p_j in GeV² by leg numbers, written out."""

    def dot(i: int, j: int) -> Array:
        x, y = momenta[i - 1], momenta[j - 1]
        return np.asarray(x[0] * y[0] - x[1] * y[1] - x[2] * y[2] - x[3] * y[3])

    return dot
