"""The rows of the table once more: textbook formulas on explicit four-vectors (E, px, py, pz), in 40 digits.

Nothing here knows light-cone components, factored Källén functions or the code under test.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from itertools import product

import mpmath
from mpmath import mp, mpf

mpmath.mp.dps = 40

Vector = tuple[mpf, mpf, mpf, mpf]
Momenta = dict[int, Vector]


def added(*vectors: Vector) -> Vector:
    """The sum of four-vectors."""
    return tuple(mp.fsum(parts) for parts in zip(*vectors, strict=True))  # type: ignore[return-value]


def minus(x: Vector, y: Vector) -> Vector:
    """x − y."""
    return tuple(a - b for a, b in zip(x, y, strict=True))  # type: ignore[return-value]


def dot(x: Vector, y: Vector) -> mpf:
    """The four-product, metric (+, −, −, −)."""
    return x[0] * y[0] - x[1] * y[1] - x[2] * y[2] - x[3] * y[3]


def size(x: Vector) -> mpf:
    """|p|."""
    return mp.sqrt(x[1] ** 2 + x[2] ** 2 + x[3] ** 2)


def boosted(x: Vector, system: Vector) -> Vector:
    """x where ``system`` is at rest: the matrix of a pure boost, Jackson (11.98), from memory."""
    beta = [component / system[0] for component in system[1:]]
    square = mp.fsum(b * b for b in beta)
    if square == 0:
        return x
    gamma = 1 / mp.sqrt(1 - square)
    matrix = [[gamma, *(-gamma * b for b in beta)]]
    for i in range(3):
        row = [(gamma - 1) * beta[i] * beta[j] / square + (1 if i == j else 0) for j in range(3)]
        matrix.append([-gamma * beta[i], *row])
    return tuple(mp.fsum(m * c for m, c in zip(row, x, strict=True)) for row in matrix)  # type: ignore[return-value]


@dataclass(frozen=True)
class Scene:
    """One event: momenta by leg code in the lab, and how to look at it."""

    lab: Momenta

    @property
    def total(self) -> Vector:
        """The momentum of the beams."""
        return added(self.lab[-1], self.lab[-2])

    def seen(self, frame: str, rest: Sequence[int] = ()) -> Momenta:
        """All momenta in the lab, in the cm, or where ``rest`` are at rest together (boosted from the cm)."""
        if frame == "lab":
            return self.lab
        cm = {code: boosted(vector, self.total) for code, vector in self.lab.items()}
        if frame == "cm":
            return cm
        system = added(*(cm[code] for code in rest))
        return {code: boosted(vector, system) for code, vector in cm.items()}


def two_to_two(
    kinetic: tuple[float, float], masses: tuple[float, float, float, float], aim: tuple[float, float], ahead: int = 1
) -> Scene:
    """A 2 → 2 event from kinetic energies; ``aim`` is cos θ* of leg 1 to beam a and its azimuth; ``ahead`` is −1 when
    beam b moves along +z."""
    m_a, m_b, m_1, m_2 = map(mpf, masses)
    t_a, t_b = map(mpf, kinetic)
    cosine, azimuth = map(mpf, aim)
    p_a, p_b = mp.sqrt(t_a * (t_a + 2 * m_a)), mp.sqrt(t_b * (t_b + 2 * m_b))
    zero = mpf(0)
    beam_a, beam_b = (t_a + m_a, zero, zero, ahead * p_a), (t_b + m_b, zero, zero, -ahead * p_b)
    total = added(beam_a, beam_b)
    s = dot(total, total)
    q = mp.sqrt((s - (m_1 + m_2) ** 2) * (s - (m_1 - m_2) ** 2)) / (2 * mp.sqrt(s))
    sine = mp.sqrt(1 - cosine**2)
    px, py, pz = q * sine * mp.cos(azimuth), q * sine * mp.sin(azimuth), ahead * q * cosine
    backwards = (total[0], -total[1], -total[2], -total[3])
    first = boosted((mp.sqrt(q * q + m_1**2), px, py, pz), backwards)
    second = boosted((mp.sqrt(q * q + m_2**2), -px, -py, -pz), backwards)
    return Scene({-1: beam_a, -2: beam_b, 1: first, 2: second})


def theta(x: Vector) -> mpf:
    """The polar angle."""
    return mp.acos(x[3] / size(x))


def azimuth_of(x: Vector) -> mpf:
    """The azimuth in (−π, π]."""
    return mp.atan2(x[2], x[1])


def rapidity(x: Vector) -> mpf:
    """½ ln((E + pz)/(E − pz))."""
    return mp.log((x[0] + x[3]) / (x[0] - x[3])) / 2


def pseudorapidity(x: Vector) -> mpf:
    """−ln tan(θ/2)."""
    return -mp.log(mp.tan(theta(x) / 2))


def mass(x: Vector) -> mpf:
    """√m², with the sign of m²; rounding of 40 digits counts as 0."""
    square = dot(x, x)
    if abs(square) < mpf(10) ** -30:
        return mpf(0)
    return mp.sign(square) * mp.sqrt(abs(square))


ONE: dict[str, Callable[[Vector], mpf]] = {
    "energy": lambda x: x[0],
    "kinetic_energy": lambda x: x[0] - mass(x),
    "momentum": size,
    "pt": lambda x: mp.hypot(x[1], x[2]),
    "theta": theta,
    "cos_theta": lambda x: x[3] / size(x),
    "phi": azimuth_of,
    "rapidity": rapidity,
    "pseudorapidity": pseudorapidity,
}


def angle(x: Vector, y: Vector) -> mpf:
    """The angle between two momenta."""
    product_ = x[1] * y[1] + x[2] * y[2] + x[3] * y[3]
    return mp.acos(min(max(product_ / (size(x) * size(y)), mpf(-1)), mpf(1)))


def delta_phi(x: Vector, y: Vector) -> mpf:
    """The difference of the azimuths in (−π, π]; half a turn within 35 digits is +π."""
    difference = azimuth_of(x) - azimuth_of(y)
    if abs(abs(difference) - mp.pi) < mpf(10) ** -35:
        return +mp.pi
    turns = mp.floor(difference / (2 * mp.pi) + mpf("0.5"))
    return difference - 2 * mp.pi * turns


PAIR: dict[str, Callable[[Vector, Vector], mpf]] = {
    "angle": angle,
    "acollinearity": lambda x, y: mp.pi - angle(x, y),
    "delta_phi": delta_phi,
    "acoplanarity": lambda x, y: mp.pi - abs(delta_phi(x, y)),
    "delta_eta": lambda x, y: pseudorapidity(x) - pseudorapidity(y),
    "delta_rapidity": lambda x, y: rapidity(x) - rapidity(y),
    "delta_r": lambda x, y: mp.hypot(pseudorapidity(x) - pseudorapidity(y), delta_phi(x, y)),
}


def thrust(vectors: Sequence[Vector]) -> mpf:
    """The largest |Σ ±p| / Σ|p| over all signs: every axis gives each momentum a sign."""
    best = mpf(0)
    for signs in product((1, -1), repeat=len(vectors)):
        sums = [mp.fsum(sign * v[i] for sign, v in zip(signs, vectors, strict=True)) for i in (1, 2, 3)]
        best = max(best, mp.sqrt(mp.fsum(c * c for c in sums)))
    return best / mp.fsum(size(v) for v in vectors)
