"""Two beams that cross at an angle: √s, and the way from the centre of mass to the lab.

With α the full angle and ζ = α/2 the beams go along (sin ζ, 0, ±cos ζ), so that
s − (m₁ + m₂)² = 2 (T₁T₂ + T₁m₂ + T₂m₁ + p₁p₂ cos α) = 2 (E₁E₂ − p₁p₂ − m₁m₂) + 4 p₁p₂ cos²ζ.

Rules of this file
------------------
- Beam 1 is the one that goes towards +z. Everything is made from kinetic energies, and of two numbers whose difference
  may be small the difference itself is worked out: J = E₂p₁ − E₁p₂ from (p₁m₂)² − (p₂m₁)², and from J the rest, as
  (E₁E₂ − p₁p₂)² − (m₁m₂)² = J². Nothing cancels for beams of very different energies, almost collinear ones, slow ones
  or massless ones.
- The matrix [[a, b], [c, d]] of `CrossedBeams` follows from the light-like directions of the cm's z axis:
  ac = sin ζ [p*(p₁ + p₂) + K]/2p*√s and bd = sin ζ [p*(p₁ + p₂) − K]/2p*√s with K = E₂*p₁ − E₁*p₂, whose product of
  brackets is (2p₁p₂ cos ζ)² − J²; ad + bc = cos ζ (E₂p₁ + E₁p₂)/p*√s; a² + b² = (E + P_z)/√s; c² + d² = (E − P_z)/√s.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics import Collision, CrossedBeams

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class _Beam:
    """Kinetic energies of shape (point, 1) and a mass, GeV."""

    kinetic: Array
    mass: float

    @property
    def energy(self) -> Array:
        return self.kinetic + self.mass

    @property
    def momentum(self) -> Array:
        return np.sqrt(self.kinetic * (self.kinetic + 2 * self.mass))

    def less_along(self, half: float) -> Array:
        """E − p cos ζ: the smaller of E ± p_z."""
        rest = self.mass * self.mass / (self.energy + self.momentum)
        return np.asarray(rest + 2 * self.momentum * np.sin(0.5 * half) ** 2)

    def more_along(self, half: float) -> Array:
        """E + p cos ζ."""
        return np.asarray(self.energy + self.momentum * np.cos(half))


def cross(kinetic: tuple[Array, Array], masses: tuple[float, float], angle: float, orientation: int) -> Collision:
    """The collision of beams that move and cross at an angle, arrays of shape (point, 1).

    Parameters
    ----------
    kinetic : two arrays of shape (point, 1), GeV
        E − m of beam a and of beam b; not 0.
    masses : two floats, GeV
    angle : float, rad
        The full angle, above 0 and below π.
    orientation : int
        +1 when beam a goes towards +z, −1 when beam b does.
    """
    a_and_b = [_Beam(t, m) for t, m in zip(kinetic, masses, strict=True)]
    one, two = a_and_b if orientation == 1 else reversed(a_and_b)
    half, total = 0.5 * angle, one.mass + two.mass
    difference, product = _difference(one, two), one.momentum * two.momentum
    parallel, masses_product = _parallel(one, two), one.mass * two.mass
    closing = product * np.cos(half) ** 2
    with np.errstate(invalid="ignore"):
        speed = np.where(difference == 0, 0.0, difference * difference / (parallel + masses_product))
    excess = 2 * speed + 4 * closing
    sqrt_s = np.sqrt(total * total + excess)
    correction = excess / (sqrt_s + total) - (sqrt_s - total)
    root = np.sqrt(difference * difference + 4 * closing * (parallel + closing))
    matrix = _matrix(one, two, half, (sqrt_s, root))
    crossed = CrossedBeams(half, kinetic, matrix)
    return Collision(sqrt_s, correction, np.ones_like(sqrt_s), orientation, crossed=crossed)


def _difference(one: _Beam, two: _Beam) -> Array:
    """J = E₂p₁ − E₁p₂."""
    apart = (one.kinetic - two.kinetic) * two.mass + two.kinetic * (two.mass - one.mass)  # T₁m₂ − T₂m₁
    squares = apart * (one.kinetic * two.mass + two.kinetic * one.mass + 2 * one.mass * two.mass)
    return np.asarray(squares / (two.energy * one.momentum + one.energy * two.momentum))


def _parallel(one: _Beam, two: _Beam) -> Array:
    """E₁E₂ − p₁p₂."""
    first, second = one.momentum * two.mass, two.momentum * one.mass
    squares = first * first + second * second + (one.mass * two.mass) ** 2
    return np.asarray(squares / (one.energy * two.energy + one.momentum * two.momentum))


def _matrix(one: _Beam, two: _Beam, half: float, size: tuple[Array, Array]) -> tuple[Array, Array, Array, Array]:
    """a, b, c, d from the formulas above; ``size``: √s and p*√s."""
    sqrt_s, root = size
    larger, smaller = _brackets(one, two, half, root / sqrt_s)
    ahead = larger[1] > 0
    scale = np.sin(half) / (2 * root)
    ac, bd = (scale * np.where(towards, larger[0], smaller) for towards in (ahead, ~ahead))
    ad = 0.5 * (1 + np.cos(half) * (two.energy * one.momentum + one.energy * two.momentum) / root)
    c_over_d, b_over_a = ac / ad, bd / ad
    forward, backward = one.more_along(half) + two.less_along(half), one.less_along(half) + two.more_along(half)
    a = np.sqrt(forward / sqrt_s / (1 + b_over_a * b_over_a))
    d = np.sqrt(backward / sqrt_s / (1 + c_over_d * c_over_d))
    return a, b_over_a * a, c_over_d * d, d


def _brackets(one: _Beam, two: _Beam, half: float, cm_momentum: Array) -> tuple[tuple[Array, Array], Array]:
    """The larger of p*(p₁ + p₂) ± K with the sign of K, and the smaller one, in GeV²."""
    p, q, difference = one.momentum, two.momentum, _difference(one, two)
    first, second = (np.hypot(cm_momentum, mass) * beam for mass, beam in ((two.mass, p), (one.mass, q)))
    apart = one.kinetic - two.kinetic
    squares = apart * (one.kinetic + two.kinetic + 2 * one.mass) + 2 * two.kinetic * (one.mass - two.mass)  # p₁² − p₂²
    slower = difference * (two.energy * p + one.energy * q)
    k = (cm_momentum * cm_momentum * squares + slower) / (first + second)
    larger = cm_momentum * (p + q) + np.abs(k)
    reach, away = 2 * p * q * np.cos(half), np.abs(difference)
    return (larger, np.where(k >= 0, 1.0, -1.0)), (reach - away) * (reach + away) / larger
