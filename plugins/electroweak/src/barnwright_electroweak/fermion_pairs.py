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
- c comes from pq c = E² − a·1; |M|² is summed as a polynomial in it, with what depends on s alone worked out first.
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
    PHOTON,
    RL,
    RR,
    Fermion,
    Parts,
    Rates,
    Strengths,
    Z,
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
    """|M|² = constant + w (linear + quadratic w), w = pq c; shape (point, 1), from a pure number to GeV⁻⁴."""

    constant: Array
    linear: Array
    quadratic: Array


class Angles(NamedTuple):
    """1 + cos θ, 1 − cos θ, cos θ and sin θ; shape (point, node)."""

    plus: Array
    minus: Array
    cosine: Array
    sine: Array


@dataclass(frozen=True, slots=True)
class FermionPair:
    """The laws of e- e+ -> f f~ for one kind of fermion f."""

    fermion: Fermion

    def squared(self, event: Event, parameters: ElectroweakInputs, parts: Parts = EVERYTHING) -> Array:
        """|M|², dimensionless."""
        known = self._coefficients(event, event.mass(1), parameters, parts)
        w = _along(event)
        total = known.quadratic * w
        total += known.linear
        total *= w
        total += known.constant
        return np.asarray(total)

    def cumulative(self, x: Array, point: Point, parameters: ElectroweakInputs, parts: Parts = EVERYTHING) -> Array:
        """∫ dσ/dc from c = 0 to x in GeV⁻²; dσ/dc = |M|² q/(32π s p)."""
        known = self._coefficients(point, point.mass(1), parameters, parts)
        step = point.momentum * point.final_momentum
        w = x * step
        scale = point.final_momentum / (32 * np.pi * point.s * point.momentum)
        return np.asarray(scale * x * (known.constant + w * (known.linear / 2 + w * (known.quadratic / 3))))

    def amplitudes(
        self,
        event: Event,
        parameters: ElectroweakInputs,
        helicities: tuple[Combination, ...],
        parts: Parts = EVERYTHING,
    ) -> Complex:
        """M of the wanted helicities of e-, e+, f, f~ in the cm, dimensionless; phases of rows left free."""
        lines = _Lines.of(event, strengths(ELECTRON, self.fermion, parameters), parameters, parts)
        at: Angles = event.once(("angles", "beam_a"), lambda: _angles(event))
        found = np.empty((len(helicities), 1, *event.shape), dtype=complex)
        for row, combination in zip(found, helicities, strict=True):
            kinds = _kinds(combination)
            np.multiply(lines.strength(kinds), _angular(at, kinds), out=row[0])
            if kinds == (0, 0):
                row[0] -= combination[0] * combination[2] * lines.spin_zero
        return found

    def _coefficients(
        self, collision: Event | Point, heavy: float, parameters: ElectroweakInputs, parts: Parts
    ) -> Coefficients:
        known, s, light = strengths(ELECTRON, self.fermion, parameters), collision.s, collision.mass("beam_a")
        z = z_propagator(s, parameters, collision.sqrt_s)
        at = rates(1 / s, z, parts)
        flat = heavy**2 * (s / 2 - light**2) * products(known, ((LL, LR), (RR, RL)), at)
        if light:
            flat = flat + light**2 * _light(s, heavy**2, known, at)
            if Z in parts:
                contact = np.abs(z_propagator(0.0, parameters)) ** 2 - at.z
                flat = flat + 4 * (light * heavy * known.parity(1, 1)) ** 2 * contact
        backward, forward = products(known, ((LL, LL), (RR, RR)), at), products(known, ((LR, LR), (RL, RL)), at)
        colours, quarter, even = 4.0 * self.fermion.colours, s / 4, backward + forward
        constant, linear = even * np.square(quarter) + flat, 2 * (backward - forward) * quarter
        return Coefficients(colours * constant, colours * linear, colours * even)


def _light(s: Array, heavy_squared: float, known: Strengths, at: Rates) -> Array:
    """What the electron's mass squared multiplies."""
    one = (s / 2 - heavy_squared) * products(known, ((LL, RL), (RR, LR)), at)
    return np.asarray(one + 2 * heavy_squared * products(known, ((LL, RR), (LR, RL)), at))


class _Lines(NamedTuple):
    """What the lines and the propagators make of s G, shape (point, 1).

    ``photon`` and ``z`` are s times the propagators, 0 where they are switched off; ``weak`` has the couplings to the Z
    by (γ^μ, γ^μγ⁵) of both lines, an axial one with its velocity; ``shares`` are m/E and M/E.
    """

    photon: Array | float
    z: Complex | float
    weak: tuple[Array | float, ...]
    shares: tuple[Array, Array]
    spin_zero: Complex | float

    @classmethod
    def of(cls, event: Event, known: Strengths, parameters: ElectroweakInputs, parts: Parts) -> _Lines:
        s, sqrt_s = event.s, event.sqrt_s
        shares = (2 * event.mass("beam_a") / sqrt_s, 2 * event.mass(1) / sqrt_s)
        photon = known.photon if PHOTON in parts else 0.0
        if Z not in parts:
            return cls(photon, 0.0, (0.0,) * 4, shares, 0.0)
        before = np.sqrt(-event.transfer("beam_a", "beam_b")) / sqrt_s
        after = np.sqrt(-event.transfer(1, 2)) / sqrt_s
        weak = (
            known.parity(0, 0),
            after * known.parity(0, 1),
            before * known.parity(1, 0),
            before * after * known.parity(1, 1),
        )
        spin_zero: Complex | float = 0.0
        if event.mass("beam_a"):
            spin_zero = s * shares[0] * shares[1] * known.parity(1, 1) * z_propagator(0.0, parameters)
        return cls(photon, s * z_propagator(s, parameters, sqrt_s), weak, shares, spin_zero)

    def strength(self, kinds: tuple[int, int]) -> Complex:
        """s G of the two lines, each of helicities (1, −1), (−1, 1) or of equal ones: 1, −1 or 0."""
        one, other = kinds
        vector, right, left, axial = self.weak
        total = np.asarray(
            self.photon + (vector + other * right + one * (left + other * axial)) * self.z, dtype=complex
        )
        for kind, share in zip(kinds, self.shares, strict=True):
            if not kind:
                total = total * share
        return total


def _kinds(combination: Combination) -> tuple[int, int]:
    """Of each line: the helicity of the fermion where the other one has the opposite, else 0."""
    a, b, one, two = combination
    return (a - b) // 2, (one - two) // 2


def _angular(at: Angles, kinds: tuple[int, int]) -> Array:
    if 0 not in kinds:
        return at.plus if kinds[0] == kinds[1] else at.minus
    return at.sine if any(kinds) else at.cosine


def _along(event: Event) -> Array:
    """pq cos θ in GeV², from the sum of a·1 and a·2, which is s/2."""
    return np.asarray(event.once(("along", "beam_a"), lambda: event.s / 4 - event.dot("beam_a", 1)))


def _angles(event: Event) -> Angles:
    """At the threshold, where there is no angle, the cosine is 0."""
    step = np.sqrt(event.transfer("beam_a", "beam_b") * event.transfer(1, 2)) / 4
    cosine = _along(event) / np.maximum(step, TINY)
    plus, minus = 1 + cosine, 1 - cosine
    return Angles(plus, minus, cosine, np.sqrt(np.maximum(plus * minus, 0.0)))
