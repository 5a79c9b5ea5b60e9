"""The plane of the beams, where observables have their extrema on circles about the beams: panels of the polar axis."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.edges import axis_crossings, levels_by_observable, searched_crossings
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Layout, Setting
from barnwright.engine.summits import summit_crossings
from barnwright.engine.turning import tells_sides, turns, within_range
from barnwright.event import Event
from barnwright.integrate.panels import Panels, panels_between
from barnwright.integrate.polar_axis import Ends, Integers
from barnwright.integrate.roots import Crossings
from barnwright.integrate.slices import slices
from barnwright.kinematics import Turn, TwoBody
from barnwright.observables import Observable

Array = NDArray[np.float64]

STEPS = 16
"""Even slices of a hemisphere, for quadrature."""


def panels_of(setting: Setting, layout: Layout, rows: Rows) -> Panels:
    """Panels of the polar axis of one point, that end where an edge or a cut is crossed at azimuth 0 or π."""
    wanted = levels_by_observable(setting.cuts, layout)
    turning = [o for o in wanted if turns(o, crossed=True)]
    still = {o: levels for o, levels in wanted.items() if o not in turning}
    found = [axis_crossings(still, rows.collision, rows.values, 1)[0]]
    for observable in turning:
        levels = within_range(observable, wanted[observable])
        found.extend(_in_the_plane(observable, levels, rows))
        found.extend(summit_crossings(observable, levels, rows))
    if setting.rule == "quadrature":
        found.append(slices(1, True, STEPS))
    return panels_between(Crossings.join(found), 1)


def _in_the_plane(observable: Observable, levels: Array, rows: Rows) -> Iterator[Crossings]:
    """Crossings at azimuths 0 and π, as limits from the half with py > 0, and from the other where it differs."""
    for sine in (0.0, -0.0) if tells_sides(observable) else (0.0,):
        for cosine in (1.0, -1.0):
            turn = Turn(np.array([[cosine]]), np.array([[sine]]))
            for found in searched_crossings(observable, levels, _at(rows, turn), 1):
                yield replace(found, uncertainty=np.zeros_like(found.uncertainty))  # shares of circles begin at 0 here


def _at(rows: Rows, turn: Turn) -> Callable[[Observable, Integers, Ends], Array]:
    """Observables of the one row at an azimuth, entries first; the shape is that of the ends."""

    def values(observable: Observable, row: Integers, ends: Ends) -> Array:
        del row
        two_body = TwoBody(rows.collision, rows.masses, *np.atleast_2d(*ends), turn)
        found = np.asarray(observable.values(Event(rows.reaction, two_body)))
        lead = found.shape[:1] if observable.quantifier is not None else ()
        return np.broadcast_to(found, (*lead, *two_body.shape)).reshape(*lead, *ends.one_plus.shape)

    return values
