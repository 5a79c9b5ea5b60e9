"""Squared amplitudes from Dirac matrices alone, in many digits: the second opinion on laws written by hand.

Momenta are (E, px, py, pz) of mpmath numbers; the matrices are those of Dirac, with the metric (+, −, −, −).
"""

from __future__ import annotations

from typing import Any

import mpmath

METRIC = (1, -1, -1, -1)
_PAULI = (((0, 1), (1, 0)), ((0, -1j), (1j, 0)), ((1, 0), (0, -1)))


def _gamma(index: int) -> Any:
    matrix = mpmath.zeros(4)
    if index == 0:
        return mpmath.diag([1, 1, -1, -1])
    for i in range(2):
        for j in range(2):
            matrix[i, j + 2], matrix[i + 2, j] = _PAULI[index - 1][i][j], -_PAULI[index - 1][i][j]
    return matrix


GAMMA = [_gamma(index) for index in range(4)]
ONE = mpmath.eye(4)


def slash(momentum: Any) -> Any:
    """γ·p."""
    return sum((METRIC[i] * momentum[i] * GAMMA[i] for i in range(1, 4)), momentum[0] * GAMMA[0])


def trace(matrix: Any) -> Any:
    """The real part of a trace."""
    return mpmath.re(sum(matrix[i, i] for i in range(4)))


def pair(momenta: tuple[Any, Any, Any, Any], light: Any, heavy: Any, alpha: Any) -> Any:
    """|M|² of f f~ -> F F~ through one photon, averaged over the four initial states.

    e⁴/4s² Tr[(p₂ − m)γ^μ(p₁ + m)γ^ν] Tr[(q₁ + M)γ_μ(q₂ − M)γ_ν], straight from the Feynman rules.
    """
    a, b, one, two = momenta
    s = (a[0] + b[0]) ** 2 - sum((a[i] + b[i]) ** 2 for i in range(1, 4))
    total = mpmath.mpf(0)
    before = [(slash(b) - light * ONE) * gamma * (slash(a) + light * ONE) for gamma in GAMMA]
    after = [(slash(one) + heavy * ONE) * gamma * (slash(two) - heavy * ONE) for gamma in GAMMA]
    for mu in range(4):
        for nu in range(4):
            left, right = before[mu] * GAMMA[nu], after[mu] * GAMMA[nu]
            product = sum(left[i, i] for i in range(4)) * sum(right[i, i] for i in range(4))
            total += METRIC[mu] * METRIC[nu] * mpmath.re(product)
    return (4 * mpmath.pi * alpha) ** 2 * total / (4 * s**2)


def compton(momenta: tuple[Any, Any, Any, Any], mass: Any, alpha: Any) -> Any:
    """|M|² of gamma e -> gamma e, averaged, with −g_{μν} for the sums over the photons' polarisations.

    The two diagrams: Γ^{μν} = γ^μ (p + k + m) γ^ν/(s − m²) + γ^ν (p − k' + m) γ^μ/(u − m²).
    """
    k, p, out, after = momenta
    product_in, product_out = _dot(p, k), _dot(p, out)
    first = slash([p[i] + k[i] for i in range(4)]) + mass * ONE
    second = slash([p[i] - out[i] for i in range(4)]) + mass * ONE
    total = mpmath.mpf(0)
    for mu in range(4):
        for nu in range(4):
            vertex = GAMMA[mu] * first * GAMMA[nu] / (2 * product_in) - GAMMA[nu] * second * GAMMA[mu] / (
                2 * product_out
            )
            mirror = GAMMA[nu] * first * GAMMA[mu] / (2 * product_in) - GAMMA[mu] * second * GAMMA[nu] / (
                2 * product_out
            )
            whole = (slash(after) + mass * ONE) * vertex * (slash(p) + mass * ONE) * mirror
            total += METRIC[mu] * METRIC[nu] * trace(whole)
    return (4 * mpmath.pi * alpha) ** 2 * total / 4


def _dot(first: Any, second: Any) -> Any:
    return sum(METRIC[i] * first[i] * second[i] for i in range(4))


def two_to_two(sqrt_s: Any, masses: tuple[Any, Any, Any, Any], one_minus: Any, one_plus: Any) -> tuple[Any, ...]:
    """Momenta of a 2 → 2 collision in the cm, beam a along +z, leg 1 at 1 − cos θ and 1 + cos θ."""
    masses = tuple(map(mpmath.mpf, masses))

    def momentum(first: Any, second: Any) -> Any:
        square = (sqrt_s**2 - (first + second) ** 2) * (sqrt_s**2 - (first - second) ** 2)
        return mpmath.sqrt(square) / (2 * sqrt_s)

    p, q = momentum(*masses[:2]), momentum(*masses[2:])
    x, z = q * mpmath.sqrt(one_minus * one_plus), q * (one_plus - one_minus) / 2
    energies = [mpmath.sqrt(size**2 + mass**2) for size, mass in zip((p, p, q, q), masses, strict=True)]
    spatial = ((0, 0, p), (0, 0, -p), (x, 0, z), (-x, 0, -z))
    return tuple([energy, *space] for energy, space in zip(energies, spatial, strict=True))
