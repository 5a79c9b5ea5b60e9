"""Circles about the beams of the cm, at fixed polar angles: which share of each belongs to which component.

The cross section is the same all around a circle, so that nothing is integrated here: the ends of the arcs are where an
observable crosses an edge or a cut. The axis is the cosine of the azimuth. Where no observable tells left from right of
the plane of the beams, half a circle stands for all of it.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.edges import is_polar, levels_by_observable, polar_values, searched_crossings
from barnwright.engine.membership import memberships, passes
from barnwright.engine.partition import snapped
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Layout
from barnwright.engine.turning import tells_sides, turns, within_range
from barnwright.event import Event
from barnwright.integrate.panels import panels_between
from barnwright.integrate.polar_axis import Ends, Integers
from barnwright.integrate.roots import Crossings
from barnwright.kinematics import Turn, TwoBody
from barnwright.observables import Cut, Observable

Array = NDArray[np.float64]


JUST_BESIDE = 4e-15
"""sin² of the azimuth that stands for the plane of the beams itself, where angles may jump by 2π."""


@dataclass(frozen=True, slots=True)
class Arcs:
    """The arcs of some circles.

    Attributes
    ----------
    share : array, shape (circle, arc)
        What each is of its circle.
    components : integers of shape (circle or 1, arc or 1)
        For the total and every histogram entry and asymmetry: the component of each arc.
    slack : array, shape (circle, arc − 1)
        How much of the circle lies within rounding of the end between each arc and the next.
    undefined : bool
        Whether an observable has no value on an arc.
    """

    share: Array
    components: tuple[Integers, ...]
    slack: Array
    undefined: bool


@dataclass(frozen=True, slots=True)
class Circles:
    """Circles of one point of a scan.

    Attributes
    ----------
    rows : Rows
        The point.
    polar : Ends
        1 − cos and 1 + cos of the angle between leg 1 and beam a, flat.
    side : array
        +1 or −1: the half with py > 0 or py < 0, flat.
    """

    rows: Rows
    polar: Ends
    side: Array

    def values(self, observable: Observable, row: Integers | None, ends: Ends) -> Array:
        """An observable at cosines of the azimuth: one row number a line, or one for each entry of flat arrays."""
        count = self.side.size
        chosen = np.arange(count)[:, None] if row is None else row
        flat = chosen.ndim == 1
        one_minus, one_plus = (a[:, None] if flat else a for a in ends)
        circle = chosen[:, None] if flat else chosen
        polar, side = Ends(self.polar.one_minus[circle], self.polar.one_plus[circle]), self.side[circle]
        if is_polar(observable, self.rows.collision.lab_is_cm):
            return polar_values(observable, self.rows.collision.orientation, polar)
        least = JUST_BESIDE if tells_sides(observable) else 0.0
        turn = Turn(Ends(one_minus, one_plus).c, side * np.sqrt(np.maximum(one_minus * one_plus, least)))
        two_body = TwoBody(self.rows.collision, self.rows.masses, *polar, turn)
        found = np.asarray(observable.values(Event(self.rows.reaction, two_body)))
        if not flat:
            return found
        lead = found.shape[:1] if observable.quantifier is not None else ()
        return np.broadcast_to(found, (*lead, one_minus.shape[0], 1)).reshape(*lead, -1)

    def arcs(self, cuts: tuple[Cut, ...], layout: Layout) -> Arcs:
        """The arcs on which every answer is one and the same."""
        wanted, count = levels_by_observable(cuts, layout), self.side.size
        turning = {o: within_range(o, levels) for o, levels in wanted.items() if turns(o, crossed=True)}
        found = [c for o, levels in turning.items() for c in searched_crossings(o, levels, self.values, count)]
        panels = panels_between(Crossings.join(found), count)
        middle = panels.middle()

        @cache
        def values(observable: Observable) -> Array:
            found = self.values(observable, None, middle)
            polar = is_polar(observable, self.rows.collision.lab_is_cm)
            return found if polar else snapped(found, wanted[observable])

        components = tuple(memberships(layout, values, passes(cuts, values)))
        undefined = any(bool(np.isnan(values(observable)).any()) for observable in wanted)
        boundaries = panels.boundaries()
        angle = 2 * np.arctan2(np.sqrt(boundaries.one_minus), np.sqrt(boundaries.one_plus))
        return Arcs(-np.diff(angle) / np.pi, components, _slack(boundaries, panels.wobble + panels.graze), undefined)


def _slack(boundaries: Ends, cosine: Array) -> Array:
    """The share of the circle that an uncertainty of the azimuth's cosine stands for."""
    height = boundaries.one_minus[:, 1:-1] * boundaries.one_plus[:, 1:-1]
    with np.errstate(invalid="ignore"):
        return np.where(cosine > 0, cosine / np.sqrt(height + cosine), 0.0) / np.pi


def circles_at(rows: Rows, polar: Ends, cuts: tuple[Cut, ...], layout: Layout) -> Circles:
    """Circles at flat arrays of polar angles: both halves of each after one another where an observable tells them."""
    sided = any(tells_sides(o) for o in levels_by_observable(cuts, layout))
    halves = (1.0, -1.0) if sided else (1.0,)
    side = np.tile(halves, polar.one_minus.size)
    return Circles(rows, Ends(*(np.repeat(end, len(halves)) for end in polar)), side)
