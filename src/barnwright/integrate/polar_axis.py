"""Locations on an axis c in [−1, 1] that keep all their digits near both ends.

A location is a hemisphere and the distance x = 1 − |c| in [0, 1] from its pole. In c alone the last representable
step below 1 is 1e−16, and an edge or a peak 1e−12 away from a pole would keep four digits.

Hemisphere 0 belongs to c = −1, hemisphere 1 to c = +1; they meet at x = 1. The same structure serves any interval.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Integers = NDArray[np.intp]

BACKWARD, FORWARD, CENTRE = 0, 1, 2


class Ends(NamedTuple):
    """1 − c and 1 + c of a batch of locations, each with all its digits."""

    one_minus: Array
    one_plus: Array

    @property
    def c(self) -> Array:
        """The coordinate itself, in [−1, 1]."""
        return np.where(self.one_minus < self.one_plus, 1.0 - self.one_minus, self.one_plus - 1.0)


def ends_of(mode: Integers, value: Array) -> Ends:
    """The locations ``value``: x from the backward or the forward pole, or (mode CENTRE) c itself."""
    near = np.where(mode == CENTRE, 1.0 - value, value)
    far = np.where(mode == CENTRE, 1.0 + value, 2.0 - value)
    backward = mode == BACKWARD
    return Ends(np.where(backward, far, near), np.where(backward, near, far))


def hemisphere_of(mode: Integers, value: Array) -> tuple[Integers, Array]:
    """Hemisphere and x of locations in any mode."""
    side = np.where(mode == CENTRE, np.where(value < 0, BACKWARD, FORWARD), mode)
    return side, np.where(mode == CENTRE, 1.0 - np.abs(value), value)
