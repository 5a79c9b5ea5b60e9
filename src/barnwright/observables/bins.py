"""Bin edges from a count and a range."""

from __future__ import annotations

import math
from typing import Literal

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

MOST_BINS = 10_000


def edges_of(count: int, low: float, high: float, spacing: Literal["linear", "log"] = "linear") -> Array:
    """``count + 1`` increasing edges; the first and the last are ``low`` and ``high`` to the bit.

    Raises
    ------
    ValueError
        For fewer bins than 1 or more than `MOST_BINS`, a range that is not finite or does not rise, a logarithmic
        spacing that does not start above 0, and edges that cannot be told apart.
    """
    if not 1 <= count <= MOST_BINS:
        raise ValueError(f"count: got {count!r}, expected a whole number from 1 to {MOST_BINS}")
    if not (math.isfinite(low) and math.isfinite(high) and low < high):
        raise ValueError(f"low, high: got {low!r}, {high!r}, expected two numbers, the second one greater")
    if spacing == "log" and not low > 0:
        raise ValueError(f"low: got {low!r}, expected a number greater than 0 for logarithmic bins")
    with np.errstate(over="ignore", invalid="ignore"):
        edges = np.geomspace(low, high, count + 1) if spacing == "log" else np.linspace(low, high, count + 1)
        edges[0], edges[-1] = low, high
        rising = bool(np.all(np.diff(edges) > 0))
    if not rising:
        raise ValueError(f"count: got {count}, expected fewer bins from {low!r} to {high!r}, to be told apart")
    return edges
