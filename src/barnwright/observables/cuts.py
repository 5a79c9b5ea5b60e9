"""Cuts: an observable and where it has to lie.

``min <= value <= max`` passes, and so does what lies below or above the crack, its ends included. Of ``each(…)``
every value has to pass, of ``any(…)`` one.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.event import Event
from barnwright.observables.observable import Observable

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Cut:
    """A condition on an observable; limits in the observable's unit, None where there is none."""

    name: str
    observable: Observable
    min: float | None = None
    max: float | None = None
    outside: tuple[float, float] | None = None

    def passes(self, event: Event) -> NDArray[np.bool_]:
        """Which events pass; broadcasts to ``event.shape``."""
        return self.accepts(self.observable.values(event))

    def accepts(self, values: Array) -> NDArray[np.bool_]:
        """Which values pass; the first axis is that of the entries where the observable has a quantifier."""
        inside = np.ones(np.shape(values), dtype=bool)
        if self.min is not None:
            inside &= values >= self.min
        if self.max is not None:
            inside &= values <= self.max
        if self.outside is not None:
            inside &= (values <= self.outside[0]) | (values >= self.outside[1])
        if self.observable.quantifier is None:
            return inside
        return np.asarray(inside.any(axis=0) if self.observable.quantifier == "any" else inside.all(axis=0))
