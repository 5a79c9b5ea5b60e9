"""e- e+ into a pair of other fermions through photon and Z, all masses exact, at lowest order.

Sources: F. A. Berends, R. Kleiss, S. Jadach, Nucl. Phys. B 202 (1982) 63, and PDG Review 2024, section 10 (both from
memory) for massless electrons; masses of both kinds by the traces, kept to all orders.

Rules of this file
------------------
- Momenta a and b in, 1 and 2 out, m the electron's mass, M the other; in the cm E = √s/2, velocities β and β', p and q
  the momenta, c = cos θ between e- and the fermion. G_τρ by chirality of the electron and the fermion: exchange.py.
- |M|² = N {4 (|G_LL|² + |G_RR|²)(a·2)² + 4 (|G_LR|² + |G_RL|²)(a·1)² + 4M² a·b Re(G_LL G_LR* + G_RR G_RL*)
  + 4m² 1·2 Re(G_LL G_RL* + G_RR G_LR*) + 8m²M² Re(G_LL G_RR* + G_LR G_RL*) + 16m²M² g²(|P(0)|² − |P(s)|²)},
  N colours. The last term is the Z's spin 0, through q^μq^ν/M_Z²: (1 − s/M_Z²) P(s) = P(0), without a pole.
- Helicity amplitudes: s G (1 ± c), G by the helicities: a line of opposite helicities (λ, −λ) has (1 ± β)/2 of each
  chirality, one of equal helicities the mean of both, a factor m/E, and sin θ for 1 ± c (c where both lines are equal).
- c comes from a·1 = (E² − pq) + pq(1 − c) and a·2, which keep their digits at both poles.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Event, Point
from barnwright_electroweak.exchange import (
    ELECTRON,
    EVERYTHING,
    LL,
    LR,
    RL,
    RR,
    Chiralities,
    Fermion,
    Parts,
    Rates,
    Strengths,
    Z,
    amplitudes,
    products,
    rates,
    strengths,
    z_propagator,
)
from barnwright_electroweak.inputs import ElectroweakInputs

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]
Combination = tuple[int, ...]

TINY = np.finfo(float).tiny


class Coefficients(NamedTuple):
    """|M|² = backward (a·2)² + forward (a·1)² + flat; GeV⁻⁴ and a pure number, shape (point, 1)."""

    backward: Array
    forward: Array
    flat: Array


class Angles(NamedTuple):
    """1 + cos θ and 1 − cos θ, every digit kept at the poles; shape (point, node)."""

    plus: Array
    minus: Array

    @property
    def sine(self) -> Array:
        """sin θ."""
        return np.sqrt(self.plus * self.minus)


@dataclass(frozen=True, slots=True)
class FermionPair:
    """The laws of e- e+ -> f f~ for one kind of fermion f."""

    fermion: Fermion

    def squared(self, event: Event, parameters: ElectroweakInputs, parts: Parts = EVERYTHING) -> Array:
        """|M|², dimensionless."""
        known = self._coefficients(event.s, event.mass("beam_a"), event.mass(1), parameters, parts)
        backward, forward = event.dot("beam_a", 2), event.dot("beam_a", 1)
        return np.asarray(known.backward * np.square(backward) + known.forward * np.square(forward) + known.flat)

    def cumulative(self, x: Array, point: Point, parameters: ElectroweakInputs, parts: Parts = EVERYTHING) -> Array:
        """∫ dσ/dc from c = 0 to x in GeV⁻²; dσ/dc = |M|² q/(32π s p)."""
        known = self._coefficients(point.s, point.mass("beam_a"), point.mass(1), parameters, parts)
        quarter, step = point.s / 4, point.momentum * point.final_momentum
        even = known.backward + known.forward
        constant = even * np.square(quarter) + known.flat
        odd, curved = (known.backward - known.forward) * quarter * step, even * np.square(step) / 3
        scale = point.final_momentum / (32 * np.pi * point.s * point.momentum)
        return np.asarray(scale * x * (constant + x * (odd + curved * x)))

    def amplitudes(
        self,
        event: Event,
        parameters: ElectroweakInputs,
        helicities: tuple[Combination, ...],
        parts: Parts = EVERYTHING,
    ) -> Complex:
        """M of the wanted helicities of e-, e+, f, f~ in the cm, dimensionless; phases of rows left free."""
        lines = _Lines.of(event, strengths(ELECTRON, self.fermion, parameters), parameters, parts)
        at, known = _angles(event), {}
        found = np.empty((len(helicities), 1, *event.shape), dtype=complex)
        for row, combination in zip(found, helicities, strict=True):
            kinds = _kinds(combination)
            if kinds not in known:
                known[kinds] = _angular(at, kinds)
            np.multiply(lines.strength(kinds), known[kinds], out=row[0])
            if kinds == (0, 0):
                row[0] += combination[0] * combination[2] * lines.spin_zero
        return found

    def _coefficients(
        self, s: Array, light: float, heavy: float, parameters: ElectroweakInputs, parts: Parts
    ) -> Coefficients:
        known = strengths(ELECTRON, self.fermion, parameters)
        z = z_propagator(s, parameters)
        at = rates(1 / s, z, parts)
        flat = heavy**2 * (s / 2 - light**2) * products(known, ((LL, LR), (RR, RL)), at)
        if light:
            flat = flat + light**2 * _light(s, heavy**2, known, at)
            if Z in parts:
                contact = np.abs(z_propagator(0.0, parameters)) ** 2 - at.z
                flat = flat + 4 * (light * heavy * known.axial) ** 2 * contact
        backward, forward = products(known, ((LL, LL), (RR, RR)), at), products(known, ((LR, LR), (RL, RL)), at)
        colours = 4.0 * self.fermion.colours
        return Coefficients(colours * backward, colours * forward, colours * flat)


def _light(s: Array, heavy_squared: float, known: Strengths, at: Rates) -> Array:
    """What the electron's mass squared multiplies."""
    one = (s / 2 - heavy_squared) * products(known, ((LL, RL), (RR, LR)), at)
    return np.asarray(one + 2 * heavy_squared * products(known, ((LL, RR), (LR, RL)), at))


class _Lines(NamedTuple):
    """s G by chirality, the velocities of both lines, m/E and M/E, and the amplitude of spin 0; shape (point, 1)."""

    by_chirality: dict[Chiralities, Complex]
    velocities: tuple[Array, Array]
    shares: tuple[Array, Array]
    spin_zero: Complex

    @classmethod
    def of(cls, event: Event, known: Strengths, parameters: ElectroweakInputs, parts: Parts) -> _Lines:
        s, sqrt_s = event.s, event.sqrt_s
        found = amplitudes(known, 1 / s, z_propagator(s, parameters), parts)
        before, after = event.transfer("beam_a", "beam_b"), event.transfer(1, 2)
        shares = (2 * event.mass("beam_a") / sqrt_s, 2 * event.mass(1) / sqrt_s)
        contact = z_propagator(0.0, parameters) if Z in parts else np.zeros((), dtype=complex)
        return cls(
            {chiralities: s * strength for chiralities, strength in found.items()},
            (np.sqrt(-before) / sqrt_s, np.sqrt(-after) / sqrt_s),
            shares,
            np.asarray(s * shares[0] * shares[1] * known.axial * contact),
        )

    def strength(self, kinds: tuple[int, int]) -> Complex:
        """s G of the two lines, each of helicities (1, −1), (−1, 1) or of equal ones: 1, −1 or 0."""
        total: Complex = np.zeros((), dtype=complex)
        for chiralities, strength in self.by_chirality.items():
            weight: Array | float = 1.0
            for kind, chirality, velocity in zip(kinds, chiralities, self.velocities, strict=True):
                weight = weight * ((1 + kind * chirality * velocity) / 2)
            total = total + weight * strength
        for kind, share in zip(kinds, self.shares, strict=True):
            total = total if kind else total * share
        return total


def _kinds(combination: Combination) -> tuple[int, int]:
    """Of each line: the helicity of the fermion where the other one has the opposite, else 0."""
    a, b, one, two = combination
    return (a - b) // 2, (one - two) // 2


def _angular(at: Angles, kinds: tuple[int, int]) -> Array:
    if 0 not in kinds:
        return at.plus if kinds[0] == kinds[1] else at.minus
    return at.sine if any(kinds) else (at.plus - at.minus) / 2


def _angles(event: Event) -> Angles:
    quarter, light, heavy = event.s / 4, event.mass("beam_a") ** 2, event.mass(1) ** 2
    step = np.sqrt(event.transfer("beam_a", "beam_b") * event.transfer(1, 2)) / 4
    floor = (quarter * (light + heavy) - light * heavy) / (quarter + step)
    step = np.maximum(step, TINY)
    return Angles((event.dot("beam_a", 2) - floor) / step, (event.dot("beam_a", 1) - floor) / step)
