"""The compiled observable, and how it is asked for values."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from barnwright.event import Event
from barnwright.kinematics import Frame
from barnwright.observables.evaluate import evaluate
from barnwright.observables.tree import Leading, Tree, leaves

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class AxisForm:
    """The polar axis of two bodies itself: ``cosine`` or ``angle`` of leg 1 or 2; ``folded`` for its absolute value."""

    kind: Literal["cosine", "angle"]
    leg: int
    frame: Frame
    folded: bool = False


@dataclass(frozen=True, slots=True)
class Observable:
    """A function of the event; hashable pure data.

    Attributes
    ----------
    text : str
        As it was asked for, with single spaces.
    trees : tuple of Tree
        One for every entry.
    unit : str
        "GeV", "GeV^2", "rad", … or "".
    quantifier : "each", "any" or None
        Whether it has one value for each of identical particles, and how a cut reads them.
    range : pair of float
        What values can occur, as far as the table tells.
    azimuthal : bool
        Whether it changes when everything is turned about the beam.
    axes : tuple of AxisForm
        One for every entry, where all of them are the polar axis of two bodies in closed form; else none.
    """

    text: str
    trees: tuple[Tree, ...]
    unit: str
    quantifier: Literal["each", "any"] | None
    range: tuple[float, float]
    azimuthal: bool
    axes: tuple[AxisForm, ...] = ()

    @property
    def axis(self) -> AxisForm | None:
        """The polar axis that it is, where it has one value."""
        return self.axes[0] if self.axes and self.quantifier is None else None

    @property
    def tree(self) -> Tree:
        """The tree of the first entry."""
        return self.trees[0]

    @property
    def entries(self) -> int:
        """How many values an event has."""
        return len(self.trees)

    def values(self, event: Event) -> Array:
        """The values, in `unit`, broadcasting to ``event.shape``; entries first where there is a quantifier.

        Infinite where the table says so, not a number where arithmetic has no value: ``sqrt`` of what is negative.
        """
        with np.errstate(all="ignore"):
            if self.quantifier is None:
                return evaluate(self.trees[0], event)
            return np.stack(np.broadcast_arrays(*[evaluate(tree, event) for tree in self.trees]))

    def __hash__(self) -> int:
        return hash(self.text)


def tied_selections(observable: Observable) -> tuple[Leading, ...]:
    """Every ``leading(…)`` by energy: undecided where the lab is the cm of two identical bodies."""
    legs = (leg for tree in observable.trees for leaf in leaves(tree) for leg in leaf.legs)
    return tuple(leg for leg in legs if isinstance(leg, Leading) and leg.by == "energy")
