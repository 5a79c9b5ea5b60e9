"""The nodes on which a function of the axis is first looked at: geometric towards both poles, even in between."""

from __future__ import annotations

from functools import lru_cache
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.polar_axis import BACKWARD, FORWARD, Integers

Array = NDArray[np.float64]


class SearchGrid(NamedTuple):
    """Nodes in the order of c, and the intervals between neighbours.

    ``mode`` and ``value`` locate the nodes; ``interval_mode`` is the hemisphere of each interval and ``low``,
    ``high`` are x at its end of smaller and of larger c.
    """

    mode: Integers
    value: Array
    interval_mode: Integers
    low: Array
    high: Array


@lru_cache
def search_grid() -> SearchGrid:
    """The one grid of all searches."""
    near = np.concatenate([[0.0], np.geomspace(1e-16, 0.06, 48), np.linspace(0.08, 1.0, 36)])
    mode = np.concatenate([np.full(near.size, BACKWARD), np.full(near.size - 1, FORWARD)])
    value = np.concatenate([near, near[:-1][::-1]])
    last = near.size - 1
    interval_mode = np.where(np.arange(value.size - 1) < last, BACKWARD, FORWARD)
    low, high = value[:-1].copy(), value[1:].copy()
    return SearchGrid(mode, value, interval_mode, low, high)
