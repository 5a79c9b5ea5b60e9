"""The direction of a momentum as half angles, from light-cone components and without a difference that cancels.

Rules of this file
------------------
- The larger of cos(θ/2) and sin(θ/2) comes from p + |pz|, the smaller from it and pt: near ±z the small one keeps all
  its digits, and cos² + sin² = 1 to rounding whatever the momentum.
- Exactly along ±z the azimuth is the one that the vector carries (0 for beams). At rest the direction is +z.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from barnwright.amplitudes.arrays import Array, Complex
from barnwright.kinematics import FourVector


class Direction(NamedTuple):
    """cos(θ/2), sin(θ/2) and e^{iφ} of a momentum."""

    cosine: Array
    sine: Array
    phase: Complex


def direction(vector: FourVector) -> Direction:
    """The direction of a momentum; arrays that broadcast against one another."""
    pz = vector.pz
    larger = vector.momentum + np.abs(pz)
    tangent = vector.pt / np.where(larger > 0, larger, 1.0)
    large = 1 / np.sqrt(1 + tangent * tangent)
    small = tangent * large
    forward = pz >= 0
    phase = np.asarray(np.exp(1j * np.asarray(vector.phi)))
    return Direction(np.where(forward, large, small), np.where(forward, small, large), phase)
