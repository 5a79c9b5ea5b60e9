"""Integrals over panels with bounds of their errors, and what was counted on the way."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.polar_axis import Ends, Integers

Array = NDArray[np.float64]
Located = tuple[int, float, float]
"""A row, and 1 − c and 1 + c."""
Density = Callable[[Integers | None, Ends], Array]
"""``density(rows, ends)``: rows None means all of them, ends (row or 1, node); else one row number a line of ends."""

Beside = Callable[[Array, Ends], Array]
"""From values at (row, node) and their locations to the size of what they are made of."""

COUNTED = ("evaluations", "non_finite", "negative", "unresolved")
EVALUATIONS, NON_FINITE, NEGATIVE, UNRESOLVED = range(len(COUNTED))


@dataclass(frozen=True, slots=True)
class PanelIntegrals:
    """Integrals over panels, with bounds of their numerical errors.

    Attributes
    ----------
    value, error : arrays, shape (row, panel), in the unit of the density
    counts : array, shape (row, 4)
        What `COUNTED` names: nodes (those of panels without width left away), nodes at which the density was not
        finite, or below 0, and pieces that could not be refined to the tolerance.
    worst : tuple or None
        (row, 1 − c, 1 + c, value) of the first node that was not finite, or negative.
    heights : array of shape (row, panel − 1), or None
        The size of the density between each panel and the next, 0 where it is not finite; None where it was not asked.
    floor : array of shape (row, panel), or None
        The integral of what the density is made of, where it is a difference of that.
    """

    value: Array
    error: Array
    counts: Array
    worst: tuple[int, float, float, float] | None = None
    heights: Array | None = None
    floor: Array | None = None

    def floor_of(self, row: Integers, panel: Integers) -> Array | float:
        """The floor of some panels."""
        return 0.0 if self.floor is None else self.floor[row, panel]

    @property
    def clean(self) -> bool:
        """Whether the density was finite and not below 0 at every node."""
        return self.worst is None


def inspected(
    result: PanelIntegrals, values: Array, row: Integers, where: Callable[[Integers], Located]
) -> PanelIntegrals:
    """Count what is not finite or negative on the row of each line of values, and remember the first such node."""
    if values.size and np.min(values) >= 0 and np.max(values) < np.inf:
        return result
    finite = np.isfinite(values)
    negative = finite & (values < 0)
    bad = np.argwhere(~finite) if not finite.all() else np.argwhere(negative)
    if bad.size == 0:
        return result
    for kind, found in ((NON_FINITE, ~finite), (NEGATIVE, negative)):
        np.add.at(result.counts[:, kind], row, np.count_nonzero(found.reshape(len(values), -1), axis=1))
    return replace(result, worst=result.worst or (*where(bad[0]), float(values[tuple(bad[0])])))
