"""What one setting's integration yields for a batch of rows, before it becomes a tally."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from barnwright.integrate.polar_axis import Integers
from barnwright.integrate.tally import WorstPoint

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Answer:
    """Values and error bounds in GeV⁻², shape (row, component), and what was counted on the way."""

    value: Array
    error: Array
    evaluations: int = 0
    non_finite: int = 0
    negative: int = 0
    unresolved: int = 0
    worst: tuple[WorstPoint, ...] = ()

    @staticmethod
    def empty(rows: int, components: int) -> Answer:
        """Zeros that are exact."""
        return Answer(np.zeros((rows, components)), np.zeros((rows, components)))

    def filled(self, rows: Integers, found: Answer) -> Answer:
        """This answer with the chosen rows taken from another."""
        self.value[rows], self.error[rows] = found.value, found.error
        return self.counted(found)

    def counted(self, other: Answer) -> Answer:
        """This answer with the other's counts added."""
        return replace(
            self,
            evaluations=self.evaluations + other.evaluations,
            non_finite=self.non_finite + other.non_finite,
            negative=self.negative + other.negative,
            unresolved=self.unresolved + other.unresolved,
            worst=self.worst or other.worst,
        )

    def counters(self) -> dict[str, int]:
        """The counts by name, as a tally carries them."""
        return {
            "evaluations": self.evaluations,
            "non_finite": self.non_finite,
            "negative": self.negative,
            "unresolved": self.unresolved,
        }
