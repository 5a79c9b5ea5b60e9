"""Trying a function at the check points: shapes, finite numbers, signs, and events that leave one another alone.

Rules of this file
------------------
- A finding is a sentence: what was expected, the offending values and where.
- The whole of a law is asked on a batch of three points and on each point alone: the same numbers must come out, or
  events of a batch influence each other. Its parts, one keyword at a time, are asked on the batch only.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.errors import show
from barnwright.process import Parts

from .check_points import COSINES, CheckPoints

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]

AGREEMENT = 1e-9
ALL = slice(0, 3)


@dataclass(frozen=True, slots=True)
class Trial:
    """How one function is asked, and what its values must be like.

    Attributes
    ----------
    points : CheckPoints
    nodes : int
        Values at each of the points: one an angle, or one.
    ask : function of some of the points and the parts
    signs : function of the values, shape (3, nodes), and whether they may be negative
        Gives findings.
    """

    points: CheckPoints
    nodes: int
    ask: Callable[[slice, Parts | None], Any]
    signs: Callable[[Array, bool], list[str]]

    def findings(self, parts: Parts | None, may_be_negative: bool, alone: bool) -> list[str]:
        """Everything about one set of parts; ``alone``: each point on its own too."""
        try:
            with np.errstate(all="ignore"):
                together = self.ask(ALL, parts)
                ones = [self.ask(slice(k, k + 1), parts) for k in range(3)] if alone else []
        except (Exception, SystemExit) as error:
            return [f"raised {type(error).__name__}: {error}"]
        for found, rows in ((together, 3), *((one, 1) for one in ones)):
            if wrong := _misshapen(found, (rows, self.nodes)):
                return [wrong]
        values = self._full(together, 3)
        if not np.isfinite(values).all():
            return offending(values, ~np.isfinite(values), self.points, "finite numbers")
        found = self.signs(values, may_be_negative)
        return [*found, *self._mixing(values, np.concatenate([self._full(one, 1) for one in ones]))] if ones else found

    def _full(self, found: Any, rows: int) -> Array:
        return np.broadcast_to(np.asarray(found, dtype=float), (rows, self.nodes))

    def _mixing(self, together: Array, alone: Array) -> list[str]:
        scale = np.max(np.abs(together), axis=1, keepdims=True)
        expected = "the same values for a point alone as in a batch of three"
        return offending(together, np.abs(together - alone) > AGREEMENT * scale, self.points, expected)


def offending(values: Array, wrong: Flags, points: CheckPoints, expected: str) -> list[str]:
    """The sentence about values of shape (3, node) of which some are wrong; none when none is."""
    if not wrong.any():
        return []
    row, node = (int(k) for k in np.argwhere(wrong)[0])
    where = f"sqrt_s = {points.sqrt_s[row]:.6g} GeV"
    if values.shape[1] == COSINES.size:
        where += f", cos_theta = {COSINES[0, node]:g}"
    return [f"expected {expected}, got {values[row, node]:.6g} at {where}; {int(wrong.sum())} of {values.size} points"]


def listed(values: Array) -> str:
    """Numbers for a finding."""
    return ", ".join(f"{value:.6g}" for value in values)


def _misshapen(found: Any, shape: tuple[int, int]) -> str | None:
    values = np.asarray(found)
    if values.dtype.kind not in "fiu":
        return f"expected an array of real numbers, got {show(found)} of type {values.dtype}"
    try:
        fits = np.broadcast_shapes(values.shape, shape) == shape
    except ValueError:
        fits = False
    axes = "(point, node)" if shape[1] > 1 else "(point, 1)"
    return None if fits else f"expected an array that broadcasts to {axes} = {shape}, got shape {values.shape}"
