"""Helicity amplitudes of a lepton pair and two photons, for annihilation and, read backwards, for creation.

With w = m/E, β the lepton's velocity, c = cos θ between the lepton and the first photon in the cm and
D = 1 − β²c² = w² + β² sin²θ, they are e²/D times

    2w(1 + β), 2w(1 − β)            equal helicities of the leptons; the photons' equal to them, opposite to them
    2wβ sin²θ                       equal helicities of the leptons, opposite ones of the photons
    2β sin θ (1 ± c)                opposite helicities of both,

and nothing where the leptons' are opposite and the photons' equal. Obtained from the two diagrams with Dirac spinors
and circular polarisation vectors in radiation gauge.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Event
from barnwright_qed.helicity import HalfAngle, Table, half_angle

Array = NDArray[np.float64]


class Pair(NamedTuple):
    """The half angle, the mass over the energy, the velocity, and D."""

    half: HalfAngle
    w: Array
    beta: Array
    d: Array

    @property
    def scalar(self) -> Array:
        """The amplitude over e² where the photons' helicities are those of the leptons."""
        return 2 * self.w * (1 + self.beta) / self.d

    @property
    def reversed_scalar(self) -> Array:
        """The amplitude over e² where both photons' helicities are opposite to those of the leptons."""
        return 2 * self.w**3 / ((1 + self.beta) * self.d)

    @property
    def mixed(self) -> Array:
        """The amplitude over e² where the leptons' helicities are equal and the photons' are not."""
        return 8 * self.w * self.beta * np.square(self.half.product) / self.d

    def along(self, share: Array) -> Array:
        """The amplitude over e² where both helicities are opposite; ``share`` is (1 ± c)/2."""
        return 8 * self.beta * self.half.product * share / self.d


def pair_of(event: Event, mass: float, momentum_squared: Array) -> Pair:
    """What the amplitudes need; mass in GeV and squared cm momentum in GeV² of the leptons."""
    half = half_angle(event)
    energy = event.sqrt_s / 2
    w, beta = mass / energy, np.sqrt(momentum_squared) / energy
    return Pair(half, w, beta, w * w + 4 * np.square(beta * half.product))


TABLE: Table = {
    (1, 1, 1, 1): lambda pair: pair.scalar,
    (1, 1, -1, -1): lambda pair: pair.reversed_scalar,
    (1, 1, 1, -1): lambda pair: pair.mixed,
    (1, 1, -1, 1): lambda pair: pair.mixed,
    (1, -1, 1, -1): lambda pair: pair.along(pair.half.cos_squared),
    (1, -1, -1, 1): lambda pair: pair.along(pair.half.sin_squared),
}
"""Helicities of lepton, antilepton, photon, photon."""

BACKWARDS: Table = {(one, two, a, b): function for (a, b, one, two), function in TABLE.items()}
"""Helicities of photon, photon, lepton, antilepton: the same amplitudes, since time can be reversed."""
