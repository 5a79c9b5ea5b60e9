"""Slices of the polar axis, so that quadrature looks closely enough to see what nobody has declared.

Every hemisphere is sliced geometrically towards its pole, two decades a slice: forward and backward peaks of any
width are seen. Where the edges of the request leave wide panels, it is sliced evenly as well: bumps as narrow as a
few hundredths of the axis are seen anywhere.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.polar_axis import BACKWARD, FORWARD
from barnwright.integrate.roots import Crossings

EVEN = 64
WIDEST = 1 / 16
"""A panel wider than this in cos θ asks for even slices."""
_TOWARDS_POLE = 1.37 * 10.0 ** np.arange(-14, 0, 2)
"""No round numbers: edges of requests are, and one within rounding of a slice could not be told from it in cos θ."""


def slices(rows: int, even: bool, steps: int = EVEN) -> Crossings:
    """The ends of the slices of both hemispheres, the same for every row; ``even`` for those in equal steps as well."""
    inner = np.concatenate([_TOWARDS_POLE, np.arange(1, steps) / steps]) if even else _TOWARDS_POLE
    both: NDArray[np.float64] = np.tile(inner, 2)
    return Crossings(
        np.repeat(np.arange(rows), both.size),
        np.tile(np.repeat([BACKWARD, FORWARD], inner.size), rows),
        np.tile(both, rows),
        np.zeros(both.size * rows),
        np.zeros(both.size * rows, dtype=bool),
    )
