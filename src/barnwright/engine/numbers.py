"""The numbers of all points of a plan, or of one member of a sum, in the unit of the request."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import reduce
from operator import add

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Numbers:
    """Contents, their error bounds and counts, points in the order of the scan.

    Attributes
    ----------
    value, error : arrays, shape (point, variation, component)
    counts : array, shape (point, 5)
        What `COUNTS` names, of the whole variation axis of a point.
    """

    value: Array
    error: Array
    counts: Array

    @staticmethod
    def summed(parts: Sequence[Numbers]) -> Numbers:
        """Contents and bounds add up, one member after another."""
        if len(parts) == 1:
            return parts[0]
        return Numbers(*(reduce(add, (getattr(part, name) for part in parts)) for name in ("value", "error", "counts")))
