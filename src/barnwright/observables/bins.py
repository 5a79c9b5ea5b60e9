"""Bin edges from a count and a range."""

from __future__ import annotations

from typing import Literal

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def edges_of(count: int, low: float, high: float, spacing: Literal["linear", "log"] = "linear") -> Array:
    """``count + 1`` increasing edges; the first and the last are ``low`` and ``high`` to the bit.

    Raises
    ------
    ValueError
        When the edges cannot be told apart, or a logarithmic spacing does not start above 0.
    """
    if spacing == "log" and not low > 0:
        raise ValueError(f"low: got {low!r}, expected a number greater than 0 for logarithmic bins")
    edges = np.geomspace(low, high, count + 1) if spacing == "log" else np.linspace(low, high, count + 1)
    edges[0], edges[-1] = low, high
    if not np.all(np.diff(edges) > 0):
        raise ValueError(f"{count} bins from {low!r} to {high!r} are too narrow to be told apart")
    return edges
