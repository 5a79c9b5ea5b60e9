"""What a block adds up.

Rules of this file
------------------
- Sums are added by `Sums.plus` alone, in the order that `folding` prescribes.
- The moments of Monte Carlo are 0 the sum of weights, 1 the sum of their squares, 2 the points that passed; those of
  the exact and embedded rules 0 the value, 1 the bound of its error.
- What is not finite stays in the sums, is counted, and its worst points are kept.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from hashlib import blake2b
from math import isfinite

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.block import Block
from barnwright.integrate.folding import Node, insert_node

Array = NDArray[np.float64]

WORST_POINTS = 4
NON_FINITE = "non_finite"
EVALUATIONS = "evaluations"


@dataclass(frozen=True, slots=True)
class WorstPoint:
    """A point at which something went wrong, or that weighs most.

    ``value`` is the integrand or the weight there; ``momenta`` the components (E, px, py, pz) in GeV of every leg, or
    the coordinates of the unit cube where there are no legs.
    """

    value: float
    momenta: tuple[tuple[float, ...], ...]


@dataclass(frozen=True, slots=True)
class Sums:
    """Additive numbers of some chunks.

    Attributes
    ----------
    added : array, shape (moment, point, variation, component)
    largest : array, shape (point, variation, component)
        The largest absolute weight.
    training : tuple of arrays, or None
        What adapts a map (of a one-dimensional grid: ``sum_f``, ``n_f``); additive.
    """

    added: Array
    largest: Array
    training: tuple[Array, ...] | None = None

    def plus(self, other: Sums) -> Sums:
        """The sums of both."""
        training = None
        if self.training is not None and other.training is not None:
            training = tuple(a + b for a, b in zip(self.training, other.training, strict=True))
        return Sums(self.added + other.added, np.maximum(self.largest, other.largest), training)

    @property
    def arrays(self) -> tuple[Array, ...]:
        """All the arrays, in a fixed order."""
        return (self.added, self.largest, *(self.training or ()))

    @property
    def finite(self) -> bool:
        """Whether every number is finite."""
        return all(bool(np.isfinite(array).all()) for array in self.arrays)


@dataclass(frozen=True, slots=True)
class Tally:
    """What a block adds up.

    Attributes
    ----------
    block : Block
    nodes : mapping of (level, index) to Sums
        The canonical nodes of the block's chunks, each already folded.
    counters : mapping of str to int
        ``evaluations``, ``non_finite``, ``negative`` and whatever else a rule counts.
    worst : tuple of WorstPoint
        At most four.
    """

    block: Block
    nodes: Mapping[Node, Sums]
    counters: Mapping[str, int] = field(default_factory=dict)
    worst: tuple[WorstPoint, ...] = ()

    def fingerprint(self) -> str:
        """A digest of every bit but the block's: equal for equal tallies, NaN included."""
        digest = blake2b(digest_size=16)
        for node, sums in sorted(self.nodes.items()):
            for array in sums.arrays:
                digest.update(repr((node, array.shape)).encode())
                digest.update(np.ascontiguousarray(array, dtype="<f8").tobytes())
        digest.update(repr((sorted(self.counters.items()), self.worst)).encode())
        return digest.hexdigest()


class TallyBuilder:
    """Takes the sums of a block's chunks one by one and folds them; lives inside one worker's call."""

    def __init__(self, block: Block) -> None:
        self._block = block
        self._next = block.chunks[0]
        self._nodes: dict[Node, Sums] = {}
        self._counters: dict[str, int] = {}
        self._worst: tuple[WorstPoint, ...] = ()

    def add(self, sums: Sums, counters: Mapping[str, int] | None = None, worst: Iterable[WorstPoint] = ()) -> None:
        """Add the next chunk.

        Raises
        ------
        IndexError
            When the block has no further chunk.
        """
        if self._next >= self._block.chunks[1]:
            raise IndexError(f"{self._block.name} has no chunk {self._next}")
        insert_node(self._nodes, (0, self._next), sums, Sums.plus)
        self._counters = added_counters(self._counters, counters or {})
        self._worst = worst_of((*self._worst, *worst))
        self._next += 1

    def tally(self) -> Tally:
        """The tally of the whole block.

        Raises
        ------
        IndexError
            When a chunk has not come yet.
        """
        if self._next < self._block.chunks[1]:
            raise IndexError(f"{self._block.name} still lacks chunk {self._next}")
        return Tally(self._block, self._nodes, self._counters, self._worst)


def added_counters(first: Mapping[str, int], second: Mapping[str, int]) -> dict[str, int]:
    """The sums of counters by name, in alphabetical order."""
    return {name: first.get(name, 0) + second.get(name, 0) for name in sorted({*first, *second})}


def worst_of(points: Iterable[WorstPoint]) -> tuple[WorstPoint, ...]:
    """The few worst points: what is not finite first, then by size; the order in which they came does not matter."""
    return tuple(sorted(points, key=_badness)[:WORST_POINTS])


def _badness(point: WorstPoint) -> tuple[bool, float, str]:
    finite = isfinite(point.value)
    return finite, -abs(point.value) if finite else 0.0, repr(point)
