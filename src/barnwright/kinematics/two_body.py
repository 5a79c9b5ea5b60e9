"""Two particles into two: every invariant and momentum from √s and the polar angle.

Rules of this file
------------------
- The polar angle is between leg 1 and beam a in the centre of mass, given as 1 − cos θ and 1 + cos θ *apart*: near a
  pole the small one of them carries the digits (a Compton photon scattered backwards at 10 TeV lives at 1 + cos θ ~
  1e−7).
- A four-product of a beam and an outgoing leg is (E E' − p p') + p p'(1 ∓ cos θ), both terms positive; a squared
  momentum transfer is (E − E')² − (p − p')² − 2 p p'(1 ∓ cos θ), where the first two vanish identically for elastic
  scattering.
- Leg codes: −1 and −2 the beams a and b, 1 and 2 the outgoing legs. GeV.
"""

from __future__ import annotations

from functools import cached_property
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics.collision import Collision
from barnwright.kinematics.crossed_beams import CrossedBeams
from barnwright.kinematics.four_vector import Exact, FourVector, boost_to_rest
from barnwright.kinematics.frame import CM, Frame

Array = NDArray[np.float64]


class Turn(NamedTuple):
    """Cosine and sine of an azimuth."""

    cosine: Array
    sine: Array


class TwoBody:
    """The kinematics of a 2 → 2 batch.

    Parameters
    ----------
    collision : Collision
        Arrays of shape (point, 1).
    masses : four floats, GeV
        Of beam a, beam b, leg 1, leg 2.
    one_minus_cos, one_plus_cos : arrays of shape (point or 1, node)
    azimuth : array in rad, or Turn
        Of leg 1, in the cm (and in the lab, unless the beams cross at an angle).
    """

    def __init__(
        self,
        collision: Collision,
        masses: tuple[float, ...],
        one_minus_cos: Array,
        one_plus_cos: Array,
        azimuth: Array | float | Turn = 0.0,
    ) -> None:
        self.collision = collision
        self._masses = dict(zip((-1, -2, 1, 2), masses, strict=True))
        self.one_minus_cos, self.one_plus_cos = one_minus_cos, one_plus_cos
        self._turned = azimuth
        self._energies: dict[int, Array] = {}
        self._small: dict[int, Array] = {}

    @cached_property
    def shape(self) -> tuple[int, ...]:
        """The shape of one quantity of the batch, (point, node)."""
        around = self._turned.cosine if isinstance(self._turned, Turn) else np.asarray(self._turned)
        return np.broadcast_shapes(self.collision.sqrt_s.shape, self.one_minus_cos.shape, around.shape)

    @cached_property
    def _azimuth(self) -> Array:
        """The azimuth of leg 1 in rad."""
        turned = self._turned
        angle = np.arctan2(turned.sine, turned.cosine) if isinstance(turned, Turn) else turned
        return np.asarray(angle, dtype=float)

    @cached_property
    def _turn(self) -> Turn:
        """Cosine and sine of the azimuth of leg 1."""
        turned = self._turned
        return turned if isinstance(turned, Turn) else Turn(np.cos(self._azimuth), np.sin(self._azimuth))

    @property
    def turns(self) -> bool:
        """Whether quantities of the lab change with the azimuth of the cm: where the beams cross at an angle."""
        return self.collision.crossed is not None

    @property
    def sqrt_s(self) -> Array:
        """√s in GeV, (point, 1)."""
        return self.collision.sqrt_s

    @cached_property
    def s(self) -> Array:
        """s in GeV², (point, 1)."""
        return self.collision.s

    def mass(self, code: int) -> float:
        """The mass of a leg in GeV."""
        return self._masses[code]

    @cached_property
    def incoming_momentum(self) -> Array:
        """cm momentum of the beams in GeV, (point, 1)."""
        return self.collision.momentum(self._masses[-1], self._masses[-2])

    @cached_property
    def outgoing_momentum(self) -> Array:
        """cm momentum of the outgoing legs in GeV, (point, 1)."""
        return self.collision.momentum(self._masses[1], self._masses[2])

    def _momentum(self, code: int) -> Array:
        return self.incoming_momentum if code < 0 else self.outgoing_momentum

    def _energy(self, code: int) -> Array:
        """cm energy of a leg in GeV."""
        if code not in self._energies:
            equal = code > 0 and self._masses[1] == self._masses[2]
            self._energies[code] = 0.5 * self.sqrt_s if equal else np.hypot(self._momentum(code), self._masses[code])
        return self._energies[code]

    def _energy_minus_momentum(self, code: int) -> Array:
        """E − p in the cm, from m²/(E + p)."""
        if code not in self._small:
            total = self._energy(code) + self._momentum(code)
            self._small[code] = np.zeros_like(total) if self._masses[code] == 0 else self._masses[code] ** 2 / total
        return self._small[code]

    def _one_minus(self, first: int, second: int) -> Array:
        """1 − cos of the cm angle between a beam and an outgoing leg."""
        return self.one_minus_cos if (first == -1) == (second == 1) else self.one_plus_cos

    def dot(self, first: int, second: int) -> Array:
        """The four-product of two legs in GeV²."""
        if first == second:
            return np.full_like(self.sqrt_s, self._masses[first] ** 2)
        if (first < 0) == (second < 0):
            return self._energy(first) * self._energy(second) + np.square(self._momentum(first))
        beam, leg = min(first, second), max(first, second)
        p, q = self.incoming_momentum, self.outgoing_momentum
        floor = self._energy_minus_momentum(beam) * self._energy(leg) + p * self._energy_minus_momentum(leg)
        return floor + p * q * self._one_minus(beam, leg)

    def transfer(self, first: int, second: int) -> Array:
        """(p_first − p_second)² in GeV²."""
        if (first < 0) == (second < 0):
            m, n = self._masses[first], self._masses[second]
            return np.asarray(np.square((m - n) * (m + n) / self.sqrt_s) - 4 * np.square(self._momentum(first)))
        beam, leg = min(first, second), max(first, second)
        energies, momenta = self._energy_difference(beam, leg), self._momentum_difference
        ceiling = (energies - momenta) * (energies + momenta)
        return ceiling - 2 * self.incoming_momentum * self.outgoing_momentum * self._one_minus(beam, leg)

    def _energy_difference(self, beam: int, leg: int) -> Array:
        m = self._masses
        other_beam, other_leg = -3 - beam, 3 - leg
        squares = (m[beam] - m[leg]) * (m[beam] + m[leg]) - (m[other_beam] - m[other_leg]) * (
            m[other_beam] + m[other_leg]
        )
        return np.asarray(squares / (2 * self.sqrt_s))

    @cached_property
    def _momentum_difference(self) -> Array:
        m = self._masses
        sums = (m[-1] - m[1]) * (m[-1] + m[1]) + (m[-2] - m[2]) * (m[-2] + m[2])  # exactly 0 where it is elastic
        before, after = (m[-1] - m[-2]) * (m[-1] + m[-2]), (m[1] - m[2]) * (m[1] + m[2])
        squares = -0.5 * sums + (before - after) * (before + after) / (4 * self.s)
        total = self.incoming_momentum + self.outgoing_momentum
        return np.asarray(squares / np.where(total > 0, total, 1.0))

    @property
    def t(self) -> Array:
        """t = (p_a − p_1)² in GeV²."""
        return self.transfer(-1, 1)

    @property
    def u(self) -> Array:
        """u = (p_a − p_2)² in GeV²."""
        return self.transfer(-1, 2)

    def vector(self, code: int, frame: Frame) -> FourVector:
        """The momentum of a leg in a frame."""
        if frame.kind == "rest" and set(frame.legs) != {1, 2}:
            system = self._cm_vector(frame.legs[0])
            return self._at_rest(code) if frame.legs == (code,) else boost_to_rest(self._cm_vector(code), system)
        return self._lab_vector(code) if frame.kind == "lab" else self._cm_vector(code)

    def _at_rest(self, code: int) -> FourVector:
        mass = np.full_like(self.sqrt_s, self._masses[code])
        zero = np.zeros_like(mass)
        return FourVector(mass, mass, zero, zero, self._masses[code])

    def _cm_vector(self, code: int) -> FourVector:
        momentum, small = self._momentum(code), self._energy_minus_momentum(code)
        if code < 0:
            large = self._energy(code) + momentum
            zero = np.zeros_like(momentum)
            forward = (code == -1) == (self.collision.orientation == 1)
            return FourVector(*((large, small) if forward else (small, large)), zero, zero, self._masses[code])
        along, against = self._halves(code)
        pt = momentum * np.sqrt(self.one_minus_cos * self.one_plus_cos)
        plus, minus = small + momentum * along, small + momentum * against
        exact = Exact(energy=self._energy(code), momentum=momentum)
        if code == 2:
            exact = exact._replace(px=-pt * np.cos(self._azimuth), py=-pt * np.sin(self._azimuth))
        return FourVector(plus, minus, pt, self._phi(code), self._masses[code], exact)

    def _halves(self, code: int) -> tuple[Array, Array]:
        """1 + cos and 1 − cos of the angle of an outgoing leg to +z in the cm."""
        with_z = (code == 1) == (self.collision.orientation == 1)
        return (self.one_plus_cos, self.one_minus_cos) if with_z else (self.one_minus_cos, self.one_plus_cos)

    def _phi(self, code: int) -> Array:
        if code == 1:
            return self._azimuth
        return np.where(self._azimuth > 0, self._azimuth - np.pi, self._azimuth + np.pi)

    def _lab_vector(self, code: int) -> FourVector:
        if self.collision.crossed is not None:
            return self._crossed_vector(code, self.collision.crossed)
        in_cm, stretch = self.vector(code, CM), self.collision.stretch
        if self.collision.lab_is_cm:
            return in_cm
        exact = Exact(kinetic=self._recoil_energy(code))
        return FourVector(in_cm.plus * stretch, in_cm.minus / stretch, in_cm.pt, in_cm.phi, in_cm.mass, exact)

    def _crossed_vector(self, code: int, crossed: CrossedBeams) -> FourVector:
        """The lab momentum of a leg where the beams cross at an angle."""
        mass = self._masses[code]
        if code < 0:
            return crossed.beam(code, mass, (code == -1) == (self.collision.orientation == 1))
        turn = self._turn if code == 1 else Turn(-self._turn.cosine, -self._turn.sine)
        in_cm = self._momentum(code), self._energy_minus_momentum(code)
        return crossed.to_lab(mass, in_cm, self._halves(code), turn)

    def _recoil_energy(self, code: int) -> Array | None:
        """Kinetic energy of an outgoing leg where a target is at rest: ((m_T − m)² − (p_T − p)²)/2m_T."""
        target = self.collision.target
        if target is None or code < 0:
            return None
        at_rest = self._masses[target]
        return np.asarray(((at_rest - self._masses[code]) ** 2 - self.transfer(target, code)) / (2 * at_rest))
