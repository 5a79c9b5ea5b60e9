"""What one setting's integration yields for a batch of rows, before it becomes a tally.

Where a setting has several parts, its rows come part after part.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.panel_integrals import COUNTED
from barnwright.integrate.polar_axis import Integers
from barnwright.integrate.tally import WorstPoint

Array = NDArray[np.float64]

COUNTS = (*COUNTED, "undefined")
"""What is counted at every point; the last is 1 where an observable has no value somewhere."""


@dataclass(frozen=True, slots=True)
class Answer:
    """Values and error bounds in GeV⁻², shape (row, component), and what was counted in each row, (row, `COUNTS`)."""

    value: Array
    error: Array
    counts: Array
    worst: tuple[WorstPoint, ...] = ()

    @staticmethod
    def empty(rows: int, components: int) -> Answer:
        """Zeros that are exact."""
        return Answer(np.zeros((rows, components)), np.zeros((rows, components)), np.zeros((rows, len(COUNTS))))

    @staticmethod
    def joined(parts: Sequence[Answer]) -> Answer:
        """The rows of several answers, one after another."""
        worst = next((part.worst for part in parts if part.worst), ())
        value, error, counts = zip(*((part.value, part.error, part.counts) for part in parts), strict=True)
        return Answer(np.concatenate(value), np.concatenate(error), np.concatenate(counts), worst)

    def copy(self) -> Answer:
        """An answer with arrays of its own."""
        return Answer(self.value.copy(), self.error.copy(), self.counts.copy(), self.worst)

    def rows(self, first: int, count: int) -> Answer:
        """Some of the rows."""
        chosen = slice(first, first + count)
        return Answer(self.value[chosen], self.error[chosen], self.counts[chosen], self.worst)

    def filled(self, rows: Integers, found: Answer) -> Answer:
        """This answer with the chosen rows taken from another."""
        self.value[rows], self.error[rows], self.counts[rows] = found.value, found.error, found.counts
        return Answer(self.value, self.error, self.counts, self.worst or found.worst)

    def placed(self, rows: slice, components: Integers, found: Answer) -> Answer:
        """This answer with another in some of its rows and components; what both counted is added up."""
        self.value[rows, components], self.error[rows, components] = found.value, found.error
        counts = self.counts[rows]
        undefined = np.maximum(counts[:, -1], found.counts[:, -1])
        counts += found.counts
        counts[:, -1] = undefined
        return Answer(self.value, self.error, self.counts, self.worst or found.worst)
