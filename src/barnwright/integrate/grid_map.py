"""The adaptive map: on each axis, steps of equal length go to the intervals between the nodes of a grid.

Rules of this file
------------------
- A map is one array of nodes, shape (axes, bins + 1), that rises from 0 to 1 on each axis. It is all that travels.
- Training adds (f·jacobian)² up over the steps of each axis. Such sums are additive; they are merged in the order of
  their chunks, so the map does not depend on how the work was divided.
- The grid moves by the rule of vegas: G. P. Lepage, J. Comput. Phys. 27 (1978) 192 and 439 (2021) 110386. Sums that say
  nothing (all zero, infinite, not a number) leave it where it is.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

Array = NDArray[np.float64]

_BELOW_ONE = 1.0 - 2.0**-53


def uniform_nodes(axes: int, bins: int) -> Array:
    """The map that changes nothing, shape (axes, bins + 1)."""
    return np.tile(np.linspace(0.0, 1.0, bins + 1), (axes, 1))


def mapped(nodes: Array, y: Array) -> tuple[Array, Array]:
    """Where the map takes points.

    Parameters
    ----------
    nodes : array, shape (axes, bins + 1)
    y : array, shape (axes, point)
        Between 0 and 1, both excluded.

    Returns
    -------
    x : array, shape (axes, point)
        Between 0 and 1, both excluded.
    jacobian : array, shape (point,)
        |dx/dy|, the inverse of the density of x.
    """
    bins = nodes.shape[1] - 1
    x, jacobian = np.empty_like(y), np.ones(y.shape[1])
    for axis, grid in enumerate(nodes):
        steps, scaled = _steps(y[axis], bins)
        width = np.diff(grid)[steps]
        np.minimum(grid[steps] + width * (scaled - steps), _BELOW_ONE, out=x[axis])
        jacobian *= width * bins
    return x, jacobian


def unmapped(nodes: Array, x: Array) -> tuple[Array, Array]:
    """The inverse: y of x, shape (axes, point), and |dx/dy| there, the inverse of the map's density, shape (point,)."""
    bins = nodes.shape[1] - 1
    y, jacobian = np.empty_like(x), np.ones(x.shape[1])
    for axis, grid in enumerate(nodes):
        steps = np.clip(np.searchsorted(grid, x[axis], side="right") - 1, 0, bins - 1)
        width = np.diff(grid)[steps]
        np.divide(steps + (x[axis] - grid[steps]) / width, bins, out=y[axis])
        jacobian *= width * bins
    return y, jacobian


def training_sums(y: Array, f2: Array, bins: int) -> tuple[Array, Array]:
    """What the points of a chunk teach: additive sums, each of shape (axes, bins).

    Parameters
    ----------
    y : array, shape (axes, point)
        Where the points were before the map.
    f2 : array, shape (point,)
        (f·jacobian)².
    bins : int

    Returns
    -------
    sum_f : array
        f2 summed over the points in a step.
    n_f : array
        How many these are.
    """
    sum_f, n_f = np.empty((len(y), bins)), np.empty((len(y), bins))
    for axis, row in enumerate(y):
        steps, _ = _steps(row, bins)
        sum_f[axis] = np.bincount(steps, weights=f2, minlength=bins)
        n_f[axis] = np.bincount(steps, minlength=bins)
    return sum_f, n_f


def adapted(nodes: Array, sum_f: Array, n_f: Array, alpha: float) -> Array:
    """The nodes after an iteration, from its sums; the same nodes where the sums say nothing.

    ``alpha`` is how fast the grid follows: 0 not at all, 0.5 is careful, 1.5 is quick.
    """
    if not np.all(np.isfinite(sum_f)) or not np.any(sum_f > 0.0):
        return nodes
    from vegas import AdaptiveMap

    grid = AdaptiveMap(nodes)
    grid.sum_f, grid.n_f = np.array(sum_f), np.array(n_f)
    grid.adapt(alpha=alpha)
    moved = np.array(grid.grid)
    return moved if np.all(np.diff(moved) > 0.0) else nodes


def _steps(y: Array, bins: int) -> tuple[NDArray[np.int64], Array]:
    """In which step of an axis points are, and y in units of steps."""
    scaled: Array = y * bins
    return np.minimum(scaled.astype(np.int64), bins - 1), scaled
