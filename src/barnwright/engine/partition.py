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
from barnwright.integrate.panels import Panels, panels_between
from barnwright.integrate.polar_axis import BACKWARD, FORWARD, Integers
from barnwright.integrate.roots import Crossings
from barnwright.observables import Cut, Observable

Array = NDArray[np.float64]

MANY_ROWS = 64
FEW_LEVELS = 32
SLICES = 16
"""Equal slices of each hemisphere for a quadrature with few edges of its own: an integrand is looked at closely enough
to see a bump as narrow as a hundredth of the axis, also where nobody has declared a peak."""


@dataclass(frozen=True, slots=True)
class Partition:
    """Panels, and for the total and every histogram entry and asymmetry the component of each panel."""

    panels: Panels
    components: tuple[Integers, ...]


def partition_of(setting: Setting, layout: Layout, rows: Rows) -> Partition:
    """The partition of a batch of rows."""
    collision = rows.collision
    wanted = levels_by_observable(setting.cuts, layout)
    sliced = setting.rule == "quadrature" and sum(levels.size for levels in wanted.values()) < FEW_LEVELS
    if all(is_polar(observable, collision.lab_is_cm) for observable in wanted):
        return _polar_partition(setting.cuts, layout, collision.orientation, sliced)
    found, given_for = axis_crossings(wanted, collision, rows.values, rows.count)
    panels = panels_between(Crossings.join([found, slices(given_for)]) if sliced else found, given_for)
    middle = panels.middle()
    return _partition(setting.cuts, layout, panels, lambda observable: rows.values(observable, None, middle))


@lru_cache(maxsize=64)
def _polar_partition(cuts: tuple[Cut, ...], layout: Layout, orientation: int, sliced: bool) -> Partition:
    wanted = levels_by_observable(cuts, layout)
    parts = [polar_crossings(o, orientation, levels) for o, levels in wanted.items()]
    found = Crossings.join([*parts, slices(1)] if sliced else parts)
    panels = panels_between(found, 1)
    middle = panels.middle()
    return _partition(cuts, layout, panels, lambda observable: polar_values(observable, orientation, middle))


def slices(rows: int) -> Crossings:
    """The ends of the slices of both hemispheres, the same for every row."""
    inner = np.arange(1, SLICES) / SLICES
    count = 2 * inner.size
    return Crossings(
        np.repeat(np.arange(rows), count),
        np.tile(np.repeat([BACKWARD, FORWARD], inner.size), rows),
        np.tile(inner, 2 * rows),
        np.zeros(count * rows),
        np.zeros(count * rows, dtype=bool),
    )


def _partition(
    cuts: tuple[Cut, ...], layout: Layout, panels: Panels, values: Callable[[Observable], Array]
) -> Partition:
    known = lru_cache(maxsize=None)(values)
    return Partition(panels, tuple(memberships(layout, known, passes(cuts, known))))


def add_panels(target: Array, component: Integers, amounts: Array) -> None:
    """target[row, component] += amounts, panel after panel; panels that are OUTSIDE are left away.

    The order of the additions is that of the panels, whichever road is taken: many rows of one partition are added
    column by column, few rows all at once.
    """
    rows, components = target.shape
    if component.shape[0] == 1 and rows >= MANY_ROWS:
        panels, summed = amounts.shape[1], np.zeros_like(target)
        for panel, place in enumerate(np.broadcast_to(component, (1, panels))[0].tolist()):
            if place != OUTSIDE:
                summed[:, place] += amounts[:, panel]
        target += summed
        return
    shape = np.broadcast_shapes(amounts.shape, component.shape, (rows, 1))
    flat = np.where(component == OUTSIDE, components, component) + (components + 1) * np.arange(rows)[:, None]
    flat, amounts = np.broadcast_to(flat, shape), np.broadcast_to(amounts, shape)
    counted = np.bincount(flat.ravel(), weights=amounts.ravel(), minlength=rows * (components + 1))
    target += counted.reshape(rows, components + 1)[:, :components]
