"""The event: what laws and observables see of a batch of momenta."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any, Protocol

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics import CM, LAB, FourVector, Frame
from barnwright.reaction import Reaction

Array = NDArray[np.float64]
LegKey = str | int | tuple[str, int]


class Kinematics(Protocol):
    """What an event needs of the phase space that made it; legs by code."""

    @property
    def shape(self) -> tuple[int, ...]:
        """The shape of one quantity of the batch."""

    @property
    def s(self) -> Array:
        """s in GeV²."""

    @property
    def sqrt_s(self) -> Array:
        """√s in GeV."""

    @property
    def turns(self) -> bool:
        """Whether quantities of the lab change with the azimuth of the cm: where the beams cross at an angle."""

    def mass(self, code: int) -> float:
        """The mass of a leg in GeV."""

    def dot(self, first: int, second: int) -> Array:
        """The four-product of two legs in GeV²."""

    def transfer(self, first: int, second: int) -> Array:
        """The squared difference of two momenta in GeV²."""

    def vector(self, code: int, frame: Frame) -> FourVector:
        """The momentum of a leg in a frame."""


class Event:
    """A batch of events; each quantity is worked out once, when it is first asked for, and is read-only.

    Legs are asked for by name (an outgoing particle), by ``(name, k)`` for the k-th of identical ones, by number
    1…n, or as ``"beam_a"``, ``"beam_b"``. In quadrature ``s`` has the shape (point, 1), ``t`` and ``u`` (point,
    node); a law returns something that broadcasts to ``event.shape``. GeV throughout.

    Raises
    ------
    LookupError
        For a leg that the reaction lacks; the message names the candidates.
    """

    def __init__(self, reaction: Reaction, kinematics: Kinematics) -> None:
        self.reaction = reaction
        self.kinematics = kinematics
        self._known: dict[Any, Any] = {}

    def once(self, key: Any, make: Callable[[], Any]) -> Any:
        """What ``make`` returns, made when it is first asked for under this key; an array becomes read-only."""
        value = self._known.get(key)
        if value is None:
            value = make()
            if isinstance(value, np.ndarray):
                value.flags.writeable = False
            self._known[key] = value
        return value

    def _once(self, key: Any, make: Callable[[], Array]) -> Array:
        value = self._known.get(key)
        if value is None:
            value = np.asarray(make())
            value.flags.writeable = False
            self._known[key] = value
        return np.asarray(value)

    @property
    def shape(self) -> tuple[int, ...]:
        """The shape of one quantity of the batch."""
        return self.kinematics.shape

    @property
    def s(self) -> Array:
        """s in GeV²."""
        return self._once("s", self.kinematics.s.view)

    @property
    def sqrt_s(self) -> Array:
        """√s in GeV."""
        return self._once("sqrt_s", self.kinematics.sqrt_s.view)

    @property
    def t(self) -> Array:
        """t = (p_a − p_1)² in GeV²."""
        return self.transfer("beam_a", 1)

    @property
    def u(self) -> Array:
        """u = (p_a − p_2)² in GeV²."""
        return self.transfer("beam_a", 2)

    def mass(self, leg: LegKey) -> float:
        """The resolved mass of a leg in GeV; laws take masses from here, never from a table."""
        return self.kinematics.mass(self.reaction.leg(leg))

    def dot(self, first: LegKey, second: LegKey) -> Array:
        """The four-product of two legs in GeV², free of cancellations where the kinematics allows it."""
        x, y = sorted((self.reaction.leg(first), self.reaction.leg(second)))
        return self._once(("dot", x, y), lambda: self.kinematics.dot(x, y))

    def transfer(self, first: LegKey, second: LegKey) -> Array:
        """(p_first − p_second)² in GeV²."""
        x, y = sorted((self.reaction.leg(first), self.reaction.leg(second)))
        return self._once(("transfer", x, y), lambda: self.kinematics.transfer(x, y))

    def vector(self, code: int, frame: Frame = LAB) -> FourVector:
        """The momentum of the leg with this code, in light-cone components."""
        key = ("vector", code, frame)
        if key not in self._known:
            self._known[key] = self.kinematics.vector(code, frame)
        vector: FourVector = self._known[key]
        return vector

    def cm_vector(self, leg: LegKey) -> FourVector:
        """The momentum of a leg in the cm, in light-cone components: what helicity amplitudes are made of."""
        return self.vector(self.reaction.leg(leg), CM)

    def __getitem__(self, leg: LegKey) -> Array:
        """(E, px, py, pz) of a leg in the lab, GeV, shape (4, …)."""
        code = self.reaction.leg(leg)
        return self._once(("components", code), lambda: self.vector(code).components())

    @property
    def beam_a(self) -> Array:
        """The momentum of the first incoming particle in the lab, shape (4, …)."""
        return self["beam_a"]

    @property
    def beam_b(self) -> Array:
        """The momentum of the second incoming particle in the lab, shape (4, …)."""
        return self["beam_b"]
