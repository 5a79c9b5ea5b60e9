"""The partition of the polar axis into panels, and the components that each panel belongs to.

Where every observable is the polar angle itself, the partition is the same for all rows, and it is kept.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.edges import axis_crossings, is_polar, levels_by_observable, polar_crossings, polar_values
from barnwright.engine.membership import OUTSIDE, memberships, passes
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Layout, Setting
from barnwright.integrate.extrema import EPSILON
from barnwright.integrate.panels import Panels, panels_between
from barnwright.integrate.polar_axis import Integers, ends_of
from barnwright.integrate.roots import Crossings
from barnwright.integrate.search_grid import search_grid
from barnwright.integrate.slices import WIDEST, slices
from barnwright.observables import Cut, Observable

Array = NDArray[np.float64]

MANY_ROWS = 64
SAME = 8 * EPSILON
"""Values that agree with a level to this relative difference are taken as equal to it."""


@dataclass(frozen=True, slots=True)
class Partition:
    """Panels, and for the total and every histogram entry and asymmetry the component of each panel.

    ``undefined`` says for each row (or for all, shape (1,)) whether an observable has no value somewhere on the axis.
    """

    panels: Panels
    components: tuple[Integers, ...]
    undefined: NDArray[np.bool_]

    def tiled(self, tile: Callable[[NDArray[np.generic]], NDArray[np.generic]]) -> Partition:
        """The same partition for rows that are repeated part after part, where its arrays have one row each."""
        old = self.panels
        if tile(old.left) is old.left and all(tile(c) is c for c in self.components):
            return self
        arrays = (np.asarray(tile(array)) for array in (old.left, old.right, old.wobble, old.graze))
        components = tuple(np.asarray(tile(component)) for component in self.components)
        return Partition(Panels(old.side, *arrays), components, np.asarray(tile(self.undefined)))

    def inside_cuts(self) -> Panels:
        """The panels with those that are cut away shrunk to nothing, at their end off the pole."""
        cut_away = self.components[0] == OUTSIDE
        return self.panels.only(~cut_away) if cut_away.any() else self.panels


def partition_of(setting: Setting, layout: Layout, rows: Rows) -> Partition:
    """The partition of a batch of rows."""
    collision = rows.collision
    wanted = levels_by_observable(setting.cuts, layout)
    sliced = setting.rule == "quadrature"
    searched = [o for o in wanted if not is_polar(o, collision.lab_is_cm)]
    if not searched:
        return _polar_partition(setting.cuts, layout, collision.orientation, sliced)
    found, given_for = axis_crossings(wanted, collision, rows.values, rows.count)
    panels = panels_between(Crossings.join([found, slices(given_for, True)]) if sliced else found, given_for)
    middle = panels.middle()
    undefined = np.any([_undefined(rows, observable) for observable in searched], axis=0)

    def values(observable: Observable) -> Array:
        found = rows.values(observable, None, middle)
        return found if observable not in searched else snapped(found, wanted[observable])

    return _partition((setting.cuts, layout), panels, values, undefined)


@lru_cache(maxsize=64)
def _polar_partition(cuts: tuple[Cut, ...], layout: Layout, orientation: int, sliced: bool) -> Partition:
    wanted = levels_by_observable(cuts, layout)
    found = Crossings.join([polar_crossings(o, orientation, levels) for o, levels in wanted.items()])
    if sliced:
        wide = bool(np.max(panels_between(found, 1).width) > WIDEST)
        found = Crossings.join([found, slices(1, wide)])
    panels = panels_between(found, 1)
    middle = panels.middle()
    defined = np.zeros(1, dtype=bool)
    return _partition((cuts, layout), panels, lambda o: polar_values(o, orientation, middle), defined)


def _partition(
    asked: tuple[tuple[Cut, ...], Layout],
    panels: Panels,
    values: Callable[[Observable], Array],
    undefined: NDArray[np.bool_],
) -> Partition:
    cuts, layout = asked
    known = lru_cache(maxsize=None)(values)
    return Partition(panels, tuple(memberships(layout, known, passes(cuts, known))), undefined)


def snapped(values: Array, levels: Array) -> Array:
    """The values, those within rounding of a level put on it: noise about a constant does not scatter it."""
    if levels.size == 0:
        return values
    place = np.clip(np.searchsorted(levels, values), 1, max(levels.size - 1, 1))
    left, right = levels[place - 1], levels[np.minimum(place, levels.size - 1)]
    with np.errstate(invalid="ignore"):
        nearest = np.where(np.abs(values - left) < np.abs(values - right), left, right)
        return np.where(np.abs(values - nearest) <= SAME * np.abs(nearest), nearest, values)


def _undefined(rows: Rows, observable: Observable) -> NDArray[np.bool_]:
    """Whether the observable of each row is not a number somewhere on the axis."""
    grid = search_grid()
    found = rows.values(observable, None, ends_of(grid.mode[None], grid.value[None]))
    wrong = np.isnan(found).any(axis=0) if observable.quantifier is not None else np.isnan(found)
    return np.broadcast_to(np.broadcast_to(wrong, (rows.count, grid.value.size)).any(axis=1), (rows.count,))


def add_panels(target: Array, component: Integers, amounts: Array) -> None:
    """target[row, component] += amounts, panel after panel; panels that are OUTSIDE are left away.

    The order of the additions is that of the panels, whichever road is taken: many rows of one partition are added
    column by column, few rows all at once.
    """
    rows, components = target.shape
    if rows == 1 and component.shape == amounts.shape:
        kept = component[0] != OUTSIDE
        target[0] += np.bincount(component[0][kept], weights=amounts[0][kept], minlength=components)
        return
    if component.shape[0] == 1 and rows >= MANY_ROWS:
        panels, summed = amounts.shape[1], np.zeros((components, rows))
        places = np.broadcast_to(component, (1, panels))[0].tolist()
        for place, column in zip(places, np.ascontiguousarray(amounts.T), strict=True):
            if place != OUTSIDE:
                summed[place] += column
        target += summed.T
        return
    shape = np.broadcast_shapes(amounts.shape, component.shape, (rows, 1))
    flat = np.where(component == OUTSIDE, components, component) + (components + 1) * np.arange(rows)[:, None]
    flat, amounts = np.broadcast_to(flat, shape), np.broadcast_to(amounts, shape)
    counted = np.bincount(flat.ravel(), weights=amounts.ravel(), minlength=rows * (components + 1))
    target += counted.reshape(rows, components + 1)[:, :components]
