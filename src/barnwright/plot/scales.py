"""Linear or logarithmic, chosen from the numbers themselves."""

from __future__ import annotations

import numpy as np
import numpy.typing as npt

Array = npt.NDArray[np.float64]

#: Values whose largest and smallest differ by more than this are read off a logarithmic axis more easily.
WIDE = 50.0


def axis_scale(edges: Array) -> str:
    """Give "log" for positive edges or points that grow by ratios rather than by steps, else "linear"."""
    finite = edges[np.isfinite(edges)]
    if len(finite) < 3 or finite.min() <= 0 or finite.max() < 10 * finite.min():
        return "linear"
    steps, ratios = np.diff(finite), np.diff(np.log(finite))
    return "log" if _unevenness(ratios) < _unevenness(steps) else "linear"


def value_scale(*values: Array) -> str:
    """Give "log" where every value that is not 0 is positive and they span more than WIDE, else "linear"."""
    everything = np.concatenate([np.ravel(array) for array in values])
    seen = everything[np.isfinite(everything) & (everything != 0)]
    if len(seen) < 2 or seen.min() < 0:
        return "linear"
    return "log" if seen.max() > WIDE * seen.min() else "linear"


def centres(edges: Array) -> Array:
    """The middle of every bin as the eye sees it on the axis of these edges."""
    if axis_scale(edges) == "log":
        return np.asarray(np.sqrt(edges[:-1] * edges[1:]))
    return np.asarray(0.5 * (edges[:-1] + edges[1:]))


def _unevenness(steps: Array) -> float:
    mean = float(np.mean(np.abs(steps)))
    return float(np.std(steps)) / mean if mean > 0 else float("inf")
