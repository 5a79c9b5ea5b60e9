"""What the beams of a request come down to: which way they go and with what energies, for every point of a scan."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class BeamSettings:
    """Beams of a 2 → n request; energies in GeV, one entry a point.

    Attributes
    ----------
    given : "sqrt_s" or "kinetic"
        Whether √s was given, or the kinetic energies of both beams (0 for a target).
    first, second : tuples of float
        √s (second empty), or the kinetic energies of beam a and beam b.
    orientation : int
        +1 when beam a moves along +z in the cm, −1 when beam b does.
    target : int or None
        The leg code (−1 or −2) of a particle at rest in the lab.
    polarisation : two floats
        (N_R − N_L)/(N_R + N_L) of beam a and beam b, by helicity in the cm.
    crossing_angle : float, rad
        The full angle between two beams that move, 0 where they meet head on.
    """

    given: Literal["sqrt_s", "kinetic"]
    first: tuple[float, ...]
    second: tuple[float, ...] = ()
    orientation: int = 1
    target: int | None = None
    polarisation: tuple[float, float] = (0.0, 0.0)
    crossing_angle: float = 0.0
