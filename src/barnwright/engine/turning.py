"""Which observables change when an event is turned about the beams in the cm, and the questions that ask for them."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.edges import levels_by_observable
from barnwright.engine.setting import Layout, Setting
from barnwright.integrate.polar_axis import Integers
from barnwright.kinematics import LAB
from barnwright.observables import Observable
from barnwright.observables.rows import ROWS
from barnwright.observables.tree import Leading, Leaf, leaves

Array = NDArray[np.float64]

ONE_SIDED = frozenset({"phi", "delta_phi"})
"""Rows of the table that change their sign when left and right are exchanged."""


def turns(observable: Observable, crossed: bool) -> bool:
    """Whether it changes with the azimuth; where beams cross at an angle, everything of the lab does."""
    if observable.azimuthal or not crossed:
        return observable.azimuthal
    return any(_of_the_lab(leaf) for tree in observable.trees for leaf in leaves(tree))


def _of_the_lab(leaf: Leaf) -> bool:
    if any(isinstance(leg, Leading) for leg in leaf.legs):
        return True
    row = ROWS.get(leaf.function)
    return row is not None and row.frame is not None and leaf.frame == LAB


def tells_sides(observable: Observable) -> bool:
    """Whether it changes when the event is reflected at the plane of the beams."""
    return any(leaf.function in ONE_SIDED for tree in observable.trees for leaf in leaves(tree))


def within_range(observable: Observable, levels: Array) -> Array:
    """The levels that some values lie below and others above: not the ends of the range, which values only touch."""
    low, high = observable.range
    return levels[(levels > low) & (levels < high)]


@dataclass(frozen=True, slots=True)
class Split:
    """The questions of a layout that can be answered at one azimuth, and those that cannot.

    ``still`` and ``turning`` are layouts of their own, ``still_places`` and ``turning_places`` say which component of
    the whole each of their components is. Where a cut turns, all questions do, and ``still`` is None; else
    both have the total.
    """

    components: int
    still: Layout | None
    turning: Layout
    still_places: Integers
    turning_places: Integers


def split(setting: Setting, layout: Layout, crossed: bool) -> Split | None:
    """The questions sorted; None where nothing turns."""
    if not any(turns(o, crossed) for o in levels_by_observable(setting.cuts, layout)):
        return None
    everything = np.arange(layout.components)
    if any(turns(cut.observable, crossed) for cut in setting.cuts):
        return Split(layout.components, None, layout, everything[:0], everything)
    still, turning = (_part(layout, crossed, wanted) for wanted in (False, True))
    return Split(layout.components, still[0], turning[0], still[1], turning[1])


def _part(layout: Layout, crossed: bool, wanted: bool) -> tuple[Layout, Integers]:
    """The histograms and asymmetries that do or do not turn, with the total, and where their components belong."""
    histograms, asymmetries, binned, places = [], [], [], [np.zeros(1, dtype=np.intp)]
    for number, histogram in enumerate(layout.histograms):
        if any(turns(o, crossed) for o in histogram.observables) == wanted:
            histograms.append(histogram)
            place = layout.histogram_slice(number)
            places.append(np.arange(place.start, place.stop))
    for number, asymmetry in enumerate(layout.asymmetries):
        if turns(asymmetry.observable, crossed) == wanted:
            asymmetries.append(asymmetry)
            places.append(layout.asymmetry_start(number) + np.arange(2))
    for number, one in enumerate(layout.binned):
        asked = (one.asymmetry.observable, *one.histogram.observables)
        if any(turns(o, crossed) for o in asked) == wanted:
            binned.append(one)
            places.append(layout.binned_start(number) + np.arange(one.components))
    return Layout(tuple(histograms), tuple(asymmetries), tuple(binned)), np.concatenate(places)
