"""The rows of a block: points of a scan above threshold, times azimuths where an observable asks for one."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.edges import is_polar, polar_values
from barnwright.engine.setting import Masses
from barnwright.event import Event, Point
from barnwright.integrate.polar_axis import Ends, Integers
from barnwright.kinematics import Collision, TwoBody
from barnwright.observables import Observable
from barnwright.reaction import Reaction

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Rows:
    """What a batch of events is made from; collision and azimuth have the shape (row, 1)."""

    reaction: Reaction
    collision: Collision
    masses: Masses
    azimuth: Array

    @classmethod
    def of(cls, reaction: Reaction, collision: Collision, masses: Masses) -> Rows:
        """The rows of a collision at azimuth 0."""
        return cls(reaction, collision, masses, np.zeros((1, 1)))

    @property
    def count(self) -> int:
        """How many rows there are."""
        return int(self.collision.sqrt_s.shape[0])

    def take(self, row: int) -> Rows:
        """One of the rows of a batch at azimuth 0."""
        return Rows(self.reaction, self.collision.take(slice(row, row + 1)), self.masses, self.azimuth)

    def event(self, row: Integers | None, ends: Ends) -> Event:
        """The events at locations on the polar axis.

        ``row`` None: all rows, ends of shape (row or 1, node). Else ends of shape (line, node) with a row number a
        line, or row numbers of the same shape as the ends.
        """
        collision, azimuth = self.collision, self.azimuth
        if row is not None:
            chosen = row if row.ndim == ends.one_plus.ndim else row[:, None]
            flat = chosen.ravel()
            shape = chosen.shape
            collision = self._reshaped(flat, shape)
            azimuth = azimuth.ravel() if azimuth.size == 1 else azimuth[flat, 0].reshape(shape)
        return Event(self.reaction, TwoBody(collision, self.masses, ends.one_minus, ends.one_plus, azimuth))

    def point(self, row: Integers | None, ends: Ends) -> Point:
        """What an angular law sees beside the angle; parameters as for `event`."""
        collision = self.collision
        if row is not None:
            chosen = row if row.ndim == ends.one_plus.ndim else row[:, None]
            collision = self._reshaped(chosen.ravel(), chosen.shape)
        return Point.of(self.reaction, collision, self.masses)

    def two_body(self, ends: Ends) -> TwoBody:
        """The bare kinematics of all rows at locations of shape (row or 1, node)."""
        return TwoBody(self.collision, self.masses, ends.one_minus, ends.one_plus, self.azimuth)

    def _reshaped(self, flat: Integers, shape: tuple[int, ...]) -> Collision:
        return self.collision.mapped(lambda array: array[flat, 0].reshape(shape))

    def values(self, observable: Observable, row: Integers | None, ends: Ends) -> Array:
        """An observable at locations on the polar axis, entries first where it has a quantifier."""
        if is_polar(observable, self.collision.lab_is_cm):
            return polar_values(observable, self.collision.orientation, ends)
        with np.errstate(all="ignore"):
            return observable.values(self.event(row, ends))
