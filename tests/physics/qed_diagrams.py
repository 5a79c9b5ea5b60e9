"""Diagrams of quantum electrodynamics from Dirac matrices, one helicity at a time, in many digits.

The second opinion on helicity amplitudes written by hand: spinors of the Dirac representation, circular polarisation
vectors in radiation gauge, and the Feynman rules, with numbers of mpmath. Momenta are (E, px, py, pz) in the cm, in the
plane y = 0; e = 1; legs in written order.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from itertools import product
from typing import Any

import mpmath
import numpy as np

METRIC = (1, -1, -1, -1)
ONE = np.array([[mpmath.mpc(i == j) for j in range(4)] for i in range(4)], dtype=object)
_PAULI = (((0, 1), (1, 0)), ((0, -1j), (1j, 0)), ((1, 0), (0, -1)))

Vector = Sequence[Any]
Diagrams = Callable[[Sequence[Vector], Sequence[int], Sequence[Any]], Any]
COMBINATIONS = tuple(product((1, -1), repeat=4))


def _gamma(index: int) -> Any:
    matrix = np.array(ONE * 0)
    if index == 0:
        return np.diag([mpmath.mpc(1), mpmath.mpc(1), mpmath.mpc(-1), mpmath.mpc(-1)])
    for i, j in product(range(2), repeat=2):
        entry = mpmath.mpc(_PAULI[index - 1][i][j])
        matrix[i, j + 2], matrix[i + 2, j] = entry, -entry
    return matrix


GAMMA = [_gamma(index) for index in range(4)]


def slash(vector: Vector) -> Any:
    """γ·p."""
    return sum((METRIC[i] * vector[i] * GAMMA[i] for i in range(1, 4)), vector[0] * GAMMA[0])


def dot(first: Vector, second: Vector) -> Any:
    """The four-product, without a complex conjugate."""
    return sum(METRIC[i] * first[i] * second[i] for i in range(4))


def _size(momentum: Vector) -> Any:
    return mpmath.sqrt(sum(p * p for p in momentum[1:]))


def _half_angle(momentum: Vector) -> tuple[Any, Any]:
    """Cosine and sine of half the angle from +z towards +x."""
    angle = mpmath.atan2(momentum[1], momentum[3])
    return mpmath.cos(angle / 2), mpmath.sin(angle / 2)


def _two(momentum: Vector, helicity: int) -> tuple[Any, Any]:
    """The two-spinor with the spin along (+1) or against (−1) the momentum."""
    cosine, sine = _half_angle(momentum)
    return (cosine, sine) if helicity > 0 else (-sine, cosine)


def u(momentum: Vector, helicity: int, mass: Any) -> Any:
    """The spinor of a particle that comes in."""
    upper = mpmath.sqrt(momentum[0] + mass)
    lower = helicity * _size(momentum) / upper
    spin = _two(momentum, helicity)
    return np.array([upper * spin[0], upper * spin[1], lower * spin[0], lower * spin[1]], dtype=object)


def v(momentum: Vector, helicity: int, mass: Any) -> Any:
    """The spinor of an antiparticle of this helicity that goes out: (p̸ + m) v = 0, its spin turned round."""
    lower = mpmath.sqrt(momentum[0] + mass)
    upper = -helicity * _size(momentum) / lower
    spin = _two(momentum, -helicity)
    return np.array([upper * spin[0], upper * spin[1], lower * spin[0], lower * spin[1]], dtype=object)


def bar(spinor: Any) -> Any:
    """ū."""
    return np.array([mpmath.conj(x) for x in spinor], dtype=object).dot(GAMMA[0])


def polarisation(momentum: Vector, helicity: int) -> list[Any]:
    """ε of a photon that comes in: ∓(ê₁ ± i ê₂)/√2, ê₂ along y."""
    size, root = _size(momentum), mpmath.sqrt(2)
    x, z = momentum[3] / size, -momentum[1] / size
    return [mpmath.mpf(0), -helicity * x / root, mpmath.mpc(0, -1) / root, -helicity * z / root]


def _conj(vector: Vector) -> list[Any]:
    return [mpmath.conj(x) for x in vector]


def current(left: Any, right: Any) -> list[Any]:
    """l̄ γ^μ r."""
    return [bar(left).dot(matrix).dot(right) for matrix in GAMMA]


def _plus(first: Vector, second: Vector, sign: int = 1) -> list[Any]:
    return [x + sign * y for x, y in zip(first, second, strict=True)]


def _square(vector: Vector) -> Any:
    return dot(vector, vector)


def pair(p: Sequence[Vector], h: Sequence[int], m: Sequence[Any]) -> Any:
    """f f~ -> F F~ by one photon."""
    before = current(v(p[1], h[1], m[1]), u(p[0], h[0], m[0]))
    return dot(before, current(u(p[2], h[2], m[2]), v(p[3], h[3], m[3]))) / _square(_plus(p[0], p[1]))


def electron_muon(p: Sequence[Vector], h: Sequence[int], m: Sequence[Any]) -> Any:
    """f F -> f F by one photon."""
    one = current(u(p[2], h[2], m[2]), u(p[0], h[0], m[0]))
    return dot(one, current(u(p[3], h[3], m[3]), u(p[1], h[1], m[1]))) / _square(_plus(p[0], p[2], -1))


def moller(p: Sequence[Vector], h: Sequence[int], m: Sequence[Any]) -> Any:
    """f f -> f f: the second diagram has the outgoing fermions exchanged, and the opposite sign."""
    exchanged = [[entries[i] for i in (0, 1, 3, 2)] for entries in (p, h, m)]
    return electron_muon(p, h, m) - electron_muon(*exchanged)


def bhabha(p: Sequence[Vector], h: Sequence[int], m: Sequence[Any]) -> Any:
    """f f~ -> f f~: scattering minus annihilation."""
    one = current(u(p[2], h[2], m[2]), u(p[0], h[0], m[0]))
    other = current(v(p[1], h[1], m[1]), v(p[3], h[3], m[3]))
    return dot(one, other) / _square(_plus(p[0], p[2], -1)) - pair(p, h, m)


def _line(left: Any, vectors: tuple[Vector, Vector], inside: tuple[Vector, Vector], mass: Any, right: Any) -> Any:
    """Both orders of two photons on a lepton; ``inside`` is the momentum between them, for either order."""
    first, second = (slash(vector) for vector in vectors)
    one, two = (slash(q) + mass * ONE for q in inside)
    diagram = bar(left).dot(second).dot(one).dot(first).dot(right) / (_square(inside[0]) - mass**2)
    return diagram + bar(left).dot(first).dot(two).dot(second).dot(right) / (_square(inside[1]) - mass**2)


def photons_of(reaction: str, p: Sequence[Vector], h: Sequence[int]) -> tuple[Vector, Vector]:
    """The polarisation vectors of a reaction's photons, conjugate where they go out."""
    legs = {"compton": (0, 2), "photon-pair": (2, 3), "breit-wheeler": (0, 1)}[reaction]
    vectors = [polarisation(p[leg], h[leg]) for leg in legs]
    one, two = (vector if leg < 2 else _conj(vector) for leg, vector in zip(legs, vectors, strict=True))
    return one, two


def compton(p: Sequence[Vector], h: Sequence[int], m: Sequence[Any], photons: Any = None) -> Any:
    """gamma f -> gamma f."""
    vectors = photons or photons_of("compton", p, h)
    inside = (_plus(p[1], p[0]), _plus(p[1], p[2], -1))
    return _line(u(p[3], h[3], m[3]), vectors, inside, m[1], u(p[1], h[1], m[1]))


def photon_pair(p: Sequence[Vector], h: Sequence[int], m: Sequence[Any], photons: Any = None) -> Any:
    """f f~ -> gamma gamma."""
    vectors = photons or photons_of("photon-pair", p, h)
    inside = (_plus(p[0], p[2], -1), _plus(p[0], p[3], -1))
    return _line(v(p[1], h[1], m[1]), vectors, inside, m[0], u(p[0], h[0], m[0]))


def breit_wheeler(p: Sequence[Vector], h: Sequence[int], m: Sequence[Any], photons: Any = None) -> Any:
    """gamma gamma -> f f~."""
    vectors = photons or photons_of("breit-wheeler", p, h)
    inside = (_plus(p[0], p[3], -1), _plus(p[1], p[3], -1))
    return _line(u(p[2], h[2], m[2]), vectors, inside, m[2], v(p[3], h[3], m[3]))
