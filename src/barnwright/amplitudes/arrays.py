"""The arrays of this package: components first, then whatever axes the batch has."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]


def filled(*parts: Any) -> Complex:
    """Components that broadcast against one another as one complex array, shape (component, …)."""
    out = np.empty((len(parts), *np.broadcast_shapes(*map(np.shape, parts))), dtype=complex)
    for index, part in enumerate(parts):
        out[index] = part
    return out
