"""From final sums to values and errors.

Rules of this file
------------------
- Strata add up. Sums over replicates and strata are made one after another, so that the bits of one component never
  depend on how many others there are.
- Replicates are independent and equally good: the value is their mean, the error its standard error, and the pull
  follows Student's t with R − 1 degrees of freedom.
- Unknown is NaN in an array of errors: an error from fewer than `FEWEST_HITS` points that passed a replicate is
  unknown.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from functools import reduce
from math import sqrt
from operator import add
from typing import Literal

import numpy as np

from barnwright.integrate.settled import Settled
from barnwright.integrate.tally import Array

Rule = Literal["exact", "embedded", "replicates"]

FEWEST_HITS = 10


@dataclass(frozen=True, slots=True)
class Estimate:
    """Values with their errors, in the unit of the sums.

    Attributes
    ----------
    value : array, shape (point, variation, component)
    error : array, shape (point, variation, component)
        A bound for the rules exact and embedded, one standard error for replicates; NaN: unknown.
    rule : "exact", "embedded" or "replicates"
    degrees_of_freedom : int or None
        R − 1 for replicates.
    """

    value: Array
    error: Array
    rule: Rule
    degrees_of_freedom: int | None = None


def estimate(settled: Settled, rule: Rule, chunk: int) -> Estimate:
    """What a closed round says.

    Parameters
    ----------
    settled : Settled
    rule : "exact", "embedded" or "replicates"
    chunk : int
        Points in a chunk.
    """
    if rule != "replicates":
        parts = [settled.added_of(stratum, 0) for stratum in settled.strata]
        return Estimate(_total(part[0] for part in parts), _total(part[1] for part in parts), rule)
    values = replicate_values(settled, chunk)
    count = len(values)
    mean = _total(values) / count
    error = np.sqrt(_total((value - mean) ** 2 for value in values)) / sqrt(count * (count - 1))
    return Estimate(mean, np.where(hits(settled) < FEWEST_HITS * count, np.nan, error), rule, count - 1)


def replicate_values(settled: Settled, chunk: int) -> Array:
    """The value of every replicate, (replicate, point, variation, component); `chunk` is the points in a chunk."""
    return np.stack([_replicate_value(settled, replicate, chunk) for replicate in settled.replicates])


def hits(settled: Settled) -> Array:
    """How many points passed, of all strata and replicates; shape (point, variation, component)."""
    return _total(settled.added_of(s, r)[2] for s in settled.strata for r in settled.replicates)


def _replicate_value(settled: Settled, replicate: int, chunk: int) -> Array:
    return _total(
        settled.added_of(stratum, replicate)[0] / (chunk * settled.chunks_of(stratum, replicate))
        for stratum in settled.strata
    )


def _total(arrays: Iterable[Array]) -> Array:
    """The sum of arrays, one after another."""
    return reduce(add, arrays)
