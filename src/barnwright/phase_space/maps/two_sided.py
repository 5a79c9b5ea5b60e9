"""Peaks along both beams at once: 1/(1 − cos + δ) + 1/(1 + cos + δ'): even steps of the logarithm of their ratio.

x = 1 − cos runs from ``low`` to ``high``; both δ are positive.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]


def value(u: Array, ends: tuple[Array, Array], deltas: tuple[Array, Array]) -> tuple[Array, Array]:
    """1 − cos and 1 + cos."""
    first, last = _logarithms(ends, deltas)
    ratio = np.exp(first + u * (last - first))
    total = 2.0 + deltas[0] + deltas[1]
    over = total / (1.0 + ratio)
    return np.maximum(ratio * over - deltas[0], 0.0), np.maximum(over - deltas[1], 0.0)


def density(distances: tuple[Array, Array], ends: tuple[Array, Array], deltas: tuple[Array, Array]) -> Array:
    """du/dcos at the distances 1 − cos + δ and 1 + cos + δ' from the two poles."""
    first, last = _logarithms(ends, deltas)
    return np.asarray((1.0 / distances[0] + 1.0 / distances[1]) / (last - first))


def _logarithms(ends: tuple[Array, Array], deltas: tuple[Array, Array]) -> tuple[Array, Array]:
    """ln of the ratio of the distances at both ends."""
    first, last = (np.log((x + deltas[0]) / (2.0 - x + deltas[1])) for x in ends)
    return first, last
