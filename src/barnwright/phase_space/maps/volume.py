"""The invariant of k + 1 bodies inside k + 2, as phase space itself distributes it: flat n-body phase space.

For massless bodies the share v = m²/M² of a mother's M² follows k(k + 1) v^(k−1) (1 − v), so that a chain of such maps
with even angles has the same weight everywhere. For massive ones v is the squared ratio of the kinetic energies m − Σ
and M − Σ', with the same law; the weight then varies gently.
Source: S. Plätzer, arXiv:1308.2922, from memory. Its equation u = (k + 1) v^k − k v^(k+1) is solved by one step of
Halley's method from a start that is right to 1e−5; the result is right to 4e−15 for every u and k < 8.
"""

from __future__ import annotations

from functools import lru_cache
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

LAST = 1.0 - 2.0**-53
"""The largest share: at 1 the bodies would be at rest and the density 0."""


class Room(NamedTuple):
    """Σ of the bodies' masses (GeV), the largest kinetic energy that is left for them (GeV), and k."""

    masses: float
    kinetic: Array
    bodies: int


def value(u: Array, room: Room) -> Array:
    """m in GeV, from the threshold to what the mother leaves."""
    return np.asarray(room.masses + room.kinetic * np.sqrt(_share(u, room.bodies)))


def density(mass: Array, room: Room) -> Array:
    """du/dm² in GeV⁻² at a mass m."""
    k = room.bodies
    ratio = (mass - room.masses) / room.kinetic
    v = np.minimum(ratio * ratio, LAST)
    above = (k * (k + 1)) * (ratio - v * ratio) / (mass * room.kinetic)
    return np.asarray(above if k == 1 else above * v ** (k - 1))


def fraction(mass: Array, room: Room) -> Array:
    """u of a mass m."""
    k, ratio = room.bodies, (mass - room.masses) / room.kinetic
    v = np.clip(ratio * ratio, 0.0, 1.0)
    return np.asarray(((k + 1) - k * v) * v**k)


def _share(u: Array, k: int) -> Array:
    """v of (k + 1) v^k − k v^(k+1) = u."""
    if k == 1:
        return np.minimum(u / (1.0 + np.sqrt(1.0 - u)), LAST)
    v = _start(u, k)
    rest = (k + 1) - k * v
    power = v if k == 2 else v ** (k - 1)
    excess = rest * (v * power) - u
    slope = (k * (k + 1)) * power * (1.0 - v)
    bend = excess * (rest - 2.0) / (v * (1.0 - v))
    return np.minimum(v - excess / (slope - 0.5 * bend), LAST)


def _start(u: Array, k: int) -> Array:
    """v to 1e−5: r = u^(1/k) times a function of t = √(1 − r) that is smooth at both ends."""
    highest, *rest = _polynomial(k)
    r = np.sqrt(u) if k == 2 else u ** (1.0 / k)
    t = np.sqrt(1.0 - r)
    found = np.full((), highest)
    for coefficient in rest:
        found = found * t + coefficient
    return np.asarray(np.minimum(r * found, LAST))


@lru_cache
def _polynomial(k: int) -> tuple[float, ...]:
    """Coefficients of v/r in t, the highest first: 1 at t = 0, where v = 1, and through seven points, bisected."""
    t = 0.5 - 0.5 * np.cos(np.pi * (np.arange(7) + 0.5) / 7)
    r = 1.0 - t * t
    low, high = np.zeros(7), np.ones(7)
    for _ in range(60):
        middle = 0.5 * (low + high)
        below = ((k + 1) - k * middle) * middle**k < r**k
        low, high = np.where(below, middle, low), np.where(below, high, middle)
    slopes = np.polynomial.polynomial.polyfit(t, (low / r - 1.0) / t, 6)
    return (*map(float, slopes[::-1]), 1.0)
