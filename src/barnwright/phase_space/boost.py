"""From the rest frame of a mother to the centre of mass: stable along any axis.

Rules of this file
------------------
- The axes in a mother's rest frame: the third along her flight, the first in the plane of flight and z (on the side
  away from z), the second normal to both: the usual helicity axes. Source: M. Jacob and G. C. Wick, Ann. Phys. 7 (1959)
  404, from memory.
- A boost along the flight multiplies E + p_∥ by η = (E_m + P)/m and divides E − p_∥ by it; both are made of 1 ± cos and
  E* − p*, sums of positive terms: a leg that is soft, or flies against a fast mother, keeps its digits.
- GeV. Bodies of arrays that broadcast, no branches.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Pair = tuple[Array, Array]
Vector = tuple[Array, Array, Array, Array]

TINY = 1e-150
"""Added to px, so that a mother at rest, or along z, has a direction: one far below rounding of any other."""


class Axes(NamedTuple):
    """The flight of a mother: |P|, cosine and sine of its polar angle, cosine and sine of its azimuth."""

    momentum: Array
    cosine: Array
    sine: Array
    across: Array
    upward: Array


class Inside(NamedTuple):
    """Two parts in their mother's rest frame, seen from the first.

    Attributes
    ----------
    momentum : array, GeV
    small : two arrays, GeV
        E* − p* of each part.
    halves : two arrays
        1 − cos and 1 + cos of the angle to the third axis.
    transverse : two arrays
        The direction's components along the first and the second axis.
    """

    momentum: Array
    small: Pair
    halves: Pair
    transverse: Pair


def axes_of(px: Array, py: Array, pz: Array) -> Axes:
    """The flight of a momentum."""
    shifted = px + TINY
    square = shifted * shifted + py * py
    across = np.sqrt(square)
    momentum = np.sqrt(square + pz * pz)
    over, sideways = 1.0 / momentum, 1.0 / across
    return Axes(momentum, pz * over, across * over, shifted * sideways, py * sideways)


def into_cm(energy: Array, mass: Array, axes: Axes, inside: Inside) -> tuple[Vector, Vector]:
    """(E, px, py, pz) of both parts in the centre of mass, their mother having ``energy``, ``mass`` and ``axes``."""
    total, half = energy + axes.momentum, 0.5 / mass
    grow, shrink = total * half, 0.5 * mass / total
    against, along = inside.momentum * inside.halves[0], inside.momentum * inside.halves[1]
    plus, minus = (inside.small[0] + along) * grow, (inside.small[0] + against) * shrink
    plus_too, minus_too = (inside.small[1] + against) * grow, (inside.small[1] + along) * shrink
    ahead, ahead_too = plus - minus, plus_too - minus_too
    qx, qy = inside.momentum * inside.transverse[0], inside.momentum * inside.transverse[1]
    qx_out, qx_down, qy_x, qy_y = qx * axes.cosine, qx * axes.sine, qy * axes.upward, qy * axes.across
    out, out_too = ahead * axes.sine + qx_out, ahead_too * axes.sine - qx_out
    return (
        (plus + minus, out * axes.across - qy_x, out * axes.upward + qy_y, ahead * axes.cosine - qx_down),
        (
            plus_too + minus_too,
            out_too * axes.across + qy_x,
            out_too * axes.upward - qy_y,
            ahead_too * axes.cosine + qx_down,
        ),
    )


def at_rest(energies: Pair, inside: Inside) -> tuple[Vector, Vector]:
    """(E, px, py, pz) of both parts of the whole, which rests; the third axis is z."""
    px, py = inside.momentum * inside.transverse[0], inside.momentum * inside.transverse[1]
    pz = inside.momentum * (0.5 * (inside.halves[1] - inside.halves[0]))
    return (energies[0], px, py, pz), (energies[1], -px, -py, -pz)


def around(halves: Pair, turn: Pair) -> Pair:
    """The transverse components of a direction with these 1 ∓ cos and this cosine and sine of the azimuth."""
    sine = np.sqrt(halves[0] * halves[1])
    return sine * turn[0], sine * turn[1]


def around_beam(direction: Pair, halves: Pair, transverse: Pair) -> tuple[Pair, Pair]:
    """1 ∓ cos and transverse components with respect to the flight of a direction that is given with respect to a beam.

    ``direction`` is the unit vector of the beam along the first and the third axis (z lies in their plane).
    """
    side, ahead = direction
    tilt, upward = transverse
    cosine = 0.5 * (halves[1] - halves[0])
    along, outward = ahead * cosine - side * tilt, side * cosine + ahead * tilt
    square = outward * outward + upward * upward
    large = 1.0 + np.abs(along)
    small = square / large
    forward = along > 0
    return (np.where(forward, small, large), np.where(forward, large, small)), (outward, upward)


class Beside(NamedTuple):
    """A beam, for a part that may fly close to it.

    Attributes
    ----------
    in_cm : E and p_z of the beam, GeV
    momentum, rest : its |k| and E − |k| in the mother's rest frame, GeV
    direction : its unit vector there, along the first and the third axis
    """

    in_cm: Pair
    momentum: Array
    rest: Array
    direction: Pair


def beside_beam(energy: Array, mass: Array, axes: Axes, inside: Inside, beam: Beside) -> Vector:
    """(E, px, py, pz) in the centre of mass of the first part, where ``inside`` is with respect to a beam.

    It is a k + b P plus what is across both in the mother's rest frame, with k the beam's momentum and P the mother's:
    close to the beam no component is a difference of larger ones.
    Source of the decomposition: V. V. Sudakov, Sov. Phys. JETP 3 (1956) 65, from memory.
    """
    p, (side, ahead) = inside.momentum, beam.direction
    a = p * (0.5 * (inside.halves[1] - inside.halves[0])) / beam.momentum
    b = (inside.small[0] + p * inside.halves[0] - a * beam.rest) / mass
    qx, qy = p * inside.transverse[0], p * inside.transverse[1]
    out, forward = qx * ahead, -qx * side / mass
    along = forward * energy
    radial = b * (axes.momentum * axes.sine) + out * axes.cosine + along * axes.sine
    return (
        a * beam.in_cm[0] + b * energy + forward * axes.momentum,
        radial * axes.across - qy * axes.upward,
        radial * axes.upward + qy * axes.across,
        a * beam.in_cm[1] + b * (axes.momentum * axes.cosine) + along * axes.cosine - out * axes.sine,
    )
