"""Any number of outgoing legs: every invariant and momentum of a batch of events.

Rules of this file
------------------
- Momenta come from the phase space in the centre of mass, beam a along +z (a decaying parent rests), and as (E, px, py,
  pz). Where beam b is the one that moves along +z (`Collision.orientation`), they are turned by π about the x axis.
- The two of E ± pz that is small is made from the mass shell; four-products and transfers are sums of positive terms.
- Leg codes: −1 and −2 the beams a and b, 1…n the outgoing legs. GeV. A quantity broadcasts to the shape of the events
  together with the collision's arrays: (1, event) where those have the shape (1, 1).
"""

from __future__ import annotations

from functools import cached_property
from itertools import combinations

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics.collision import Collision
from barnwright.kinematics.crossed_beams import CrossedBeams
from barnwright.kinematics.four_vector import Exact, FourVector, boost_to_rest
from barnwright.kinematics.frame import CM, Frame
from barnwright.kinematics.invariants import Components, below_pole, four_product, light_cone

Array = NDArray[np.float64]


class ManyBody:
    """The kinematics of a batch of events with n outgoing legs.

    Parameters
    ----------
    collision : Collision
        Arrays of the shape (1, 1), or of the events.
    masses : floats, GeV
        Of the one or two incoming legs, then of the outgoing ones.
    momenta : array (leg, 4, event), GeV
        Of the outgoing legs in the centre of mass.
    """

    def __init__(self, collision: Collision, masses: tuple[float, ...], momenta: Array) -> None:
        self.collision = collision
        missing = max(collision.sqrt_s.ndim - (momenta.ndim - 2), 0)
        self._momenta = momenta.reshape(*momenta.shape[:2], *(1,) * missing, *momenta.shape[2:])
        self._incoming = len(masses) - momenta.shape[0]
        codes = (*range(-1, -1 - self._incoming, -1), *range(1, 1 + momenta.shape[0]))
        self._masses: dict[int, float] = dict(zip(codes, masses, strict=True))
        self._vectors: dict[int, FourVector] = {}

    @cached_property
    def shape(self) -> tuple[int, ...]:
        """The shape of one quantity of the batch."""
        return np.broadcast_shapes(self.collision.sqrt_s.shape, self._momenta.shape[2:])

    @property
    def turns(self) -> bool:
        """Whether quantities of the lab change with the azimuth of the cm: where the beams cross at an angle."""
        return self.collision.crossed is not None

    @property
    def sqrt_s(self) -> Array:
        """√s in GeV."""
        return self.collision.sqrt_s

    @cached_property
    def s(self) -> Array:
        """s in GeV²."""
        return self.collision.s

    def mass(self, code: int) -> float:
        """The mass of a leg in GeV."""
        return self._masses[code]

    def dot(self, first: int, second: int) -> Array:
        """The four-product of two legs in GeV²."""
        if first == second:
            return np.full_like(self.sqrt_s, self._masses[first] ** 2)
        if min(first, second) > 0:
            squares = self._masses[first] ** 2, self._masses[second] ** 2
            return four_product(self._components(first), self._components(second), squares)
        one, other = self._cm_vector(first), self._cm_vector(second)  # a beam has no pt
        return np.asarray(0.5 * (one.plus * other.minus + one.minus * other.plus))

    def transfer(self, first: int, second: int) -> Array:
        """(p_first − p_second)² in GeV²."""
        m, n = self._masses[first], self._masses[second]
        beams = sum(code < 0 for code in (first, second))
        if beams == 0:
            return np.asarray(m * m + n * n - 2 * self.dot(first, second))
        if beams == 1:
            return self._from_beam(min(first, second), max(first, second))
        if first == second:
            return np.zeros_like(self.sqrt_s)
        return np.asarray(np.square((m - n) * (m + n) / self.sqrt_s) - 4 * np.square(self._beam_momentum))

    def vector(self, code: int, frame: Frame) -> FourVector:
        """The momentum of a leg in a frame."""
        if frame.kind == "cm" or (frame.kind == "rest" and len(set(frame.legs)) == self._momenta.shape[0]):
            return self._cm_vector(code)
        if frame.kind == "lab":
            return self._lab_vector(code)
        if frame.legs == (code,):
            mass = np.full(self.shape, self._masses[code])
            zero = np.zeros_like(mass)
            return FourVector(mass, mass, zero, zero, self._masses[code], Exact(px=zero, py=zero))
        return boost_to_rest(self._cm_vector(code), self._system(frame.legs))

    @cached_property
    def _beam_momentum(self) -> Array:
        """The beams' momentum in the cm; 0 for a decay."""
        if self._incoming == 1:
            return np.zeros_like(self.sqrt_s)
        return self.collision.momentum(self._masses[-1], self._masses[-2])

    def _from_beam(self, beam: int, leg: int) -> Array:
        """(p_beam − p_leg)² in GeV²."""
        mass = self._masses[leg]
        one, other = self._cm_vector(beam), self._cm_vector(leg)
        forward = self._is_forward(beam)
        large, plus = (one.plus, other.plus) if forward else (one.minus, other.minus)
        return -below_pole((large, self._masses[beam]), plus, mass * mass, np.square(other.pt))

    def _is_forward(self, beam: int) -> bool:
        """Whether a beam moves along +z in the cm (a parent at rest does as well as not)."""
        return (beam == -1) == (self.collision.orientation == 1)

    def _components(self, leg: int) -> Components:
        energy, px, py, pz = self._momenta[leg - 1]
        return (energy, px, py, pz) if self.collision.orientation == 1 else (energy, px, -py, -pz)

    def _cm_vector(self, code: int) -> FourVector:
        known = self._vectors.get(code)
        if known is None:
            known = self._vectors[code] = self._beam(code) if code < 0 else self._leg(code)
        return known

    def _beam(self, code: int) -> FourVector:
        mass, momentum = self._masses[code], self._beam_momentum
        large = np.hypot(momentum, mass) + momentum
        small = np.zeros_like(large) if mass == 0 else mass * mass / large
        zero = np.zeros_like(large)
        plus, minus = (large, small) if self._is_forward(code) else (small, large)
        return FourVector(plus, minus, zero, zero, mass)

    def _leg(self, leg: int) -> FourVector:
        mass = self._masses[leg]
        energy, px, py, pz = self._components(leg)
        across = px * px + py * py
        plus, minus = light_cone(energy, pz, mass * mass, across)
        return FourVector(plus, minus, np.sqrt(across), None, mass, Exact(energy=energy, px=px, py=py))

    def _system(self, legs: tuple[int, ...]) -> FourVector:
        """Legs together in the cm, with a mass from four-products."""
        system = self._cm_vector(legs[0])
        for code in legs[1:]:
            system = system + self._cm_vector(code)
        square: Array = np.asarray(sum(self._masses[code] ** 2 for code in legs))
        for first, second in combinations(legs, 2):
            square = square + 2 * self.dot(first, second)
        return FourVector(system.plus, system.minus, system.pt, system.phi, np.sqrt(square))

    def _lab_vector(self, code: int) -> FourVector:
        if self.collision.crossed is not None:
            return self._crossed_vector(code, self.collision.crossed)
        in_cm, stretch = self._cm_vector(code), self.collision.stretch
        if self.collision.lab_is_cm:
            return in_cm
        exact = Exact(kinetic=self._recoil_energy(code), px=in_cm.px, py=in_cm.py)
        return FourVector(in_cm.plus * stretch, in_cm.minus / stretch, in_cm.pt, None, in_cm.mass, exact)

    def _crossed_vector(self, code: int, crossed: CrossedBeams) -> FourVector:
        """The lab momentum of a leg where the beams cross at an angle."""
        mass, vector = self._masses[code], self.vector(code, CM)
        if code < 0:
            return crossed.beam(code, mass, self._is_forward(code))
        momentum = np.maximum(vector.momentum, 1e-300)
        pt = np.maximum(vector.pt, 1e-300)
        large = 1 + np.abs(vector.pz) / momentum
        small = np.square(vector.pt / momentum) / large
        forward = vector.pz >= 0
        halves = np.where(forward, large, small), np.where(forward, small, large)
        rest = mass * mass / (vector.energy + momentum)
        sine = np.where(vector.pt > 0, vector.py / pt, 0.0)
        return crossed.to_lab(mass, (momentum, rest), halves, (np.where(vector.pt > 0, vector.px / pt, 1.0), sine))

    def _recoil_energy(self, code: int) -> Array | None:
        """Kinetic energy of an outgoing leg where a target is at rest: ((m_T − m)² − (p_T − p)²)/2m_T."""
        target = self.collision.target
        if target is None or code < 0:
            return None
        at_rest = self._masses[target]
        return np.asarray(((at_rest - self._masses[code]) ** 2 - self.transfer(target, code)) / (2 * at_rest))
