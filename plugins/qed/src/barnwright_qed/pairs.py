"""e- e+ into a pair of heavier leptons through one photon, the masses of both kinds exact.

Source: M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), sections 5.1 and 5.2, with the traces
kept to all orders in both masses. With E = √s/2, momenta p before and q after, and c = cos θ between e- and l- in the
cm,

    |M|² = e⁴ [1 + 4(m² + M²)/s + 16 p²q²c²/s²],   dσ/dc = |M|² q/(32π s p).

Helicity amplitudes: e² times 1 ± c where both pairs have opposite helicities; a pair of equal ones costs m/E, and
leaves sin θ or, when both are, cos θ.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Claims, ClosedForm, Event, HelicityAmplitudes, Point, Process, SquaredAmplitude, Validity
from barnwright_qed import one_photon
from barnwright_qed.coupling import ALTERNATIVES, BELOW_THE_Z, HELICITY_CAUTION, PESKIN, RADIATION_CAUTION, Coupling
from barnwright_qed.helicity import Combination, Complex, HalfAngle, Table, both_parities, half_angle, rows

Array = NDArray[np.float64]

LIMIT = "σ → 4πα²/3s far above threshold (Peskin and Schroeder, eq. 5.15)"
RESONANCES = (
    "One photon alone: hadronic resonances (J/ψ, Υ), radiation from the beams and, within about αc of the threshold's "
    "velocity, the Coulomb attraction of the pair are left out."
)


class Pairs(NamedTuple):
    """The half angle, and m/E in the cm of either kind of lepton."""

    half: HalfAngle
    light: Array
    heavy: Array


TABLE: Table = {
    (1, -1, 1, -1): lambda pair: 2 * pair.half.cos_squared,
    (1, -1, -1, 1): lambda pair: 2 * pair.half.sin_squared,
    (1, -1, 1, 1): lambda pair: 2 * pair.heavy * pair.half.product,
    (1, -1, -1, -1): lambda pair: 2 * pair.heavy * pair.half.product,
    (1, 1, 1, -1): lambda pair: 2 * pair.light * pair.half.product,
    (1, 1, -1, 1): lambda pair: 2 * pair.light * pair.half.product,
    (1, 1, 1, 1): lambda pair: pair.light * pair.heavy * pair.half.cosine,
    (1, 1, -1, -1): lambda pair: pair.light * pair.heavy * pair.half.cosine,
}
HELICITIES = both_parities(TABLE)


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless; every term is positive, so no digits are lost."""
    return one_photon.squared(event, parameters, ("beam_a", "beam_b"), (1, 2))


def amplitudes(event: Event, parameters: Coupling, helicities: tuple[Combination, ...]) -> Complex:
    """M of the wanted helicities of e-, e+, l-, l+; dimensionless, phases of rows left free."""
    energy = event.sqrt_s / 2
    found = Pairs(half_angle(event), event.mass("beam_a") / energy, event.mass(1) / energy)
    return rows(event, parameters, helicities, TABLE, found)


def cumulative(x: Array, point: Point, parameters: Coupling) -> Array:
    """∫ dσ/dc from c = 0 to x in GeV⁻²; an odd function of x."""
    s = point.s
    flat = 1 + 4 * (point.mass("beam_a") ** 2 + point.mass(1) ** 2) / s
    curved = np.square(4 * point.momentum * point.final_momentum / s) / 3
    scale = np.pi * parameters.alpha**2 * point.final_momentum / (2 * s * point.momentum)
    return np.asarray(scale * x * (flat + curved * np.square(x)))


def pair(name: str, lepton: str, word: str, crossing: tuple[str, ...] = ()) -> Process:
    """The process e- e+ -> lepton pair; ``word`` is the lepton's name in a sentence."""
    return Process(
        name=name,
        reaction=f"e- e+ -> {lepton}- {lepton}+",
        summary=f"{word} pairs from e- e+ through one photon, both masses exact",
        references=(f"{PESKIN}, sections 5.1 and 5.2",),
        laws=(SquaredAmplitude(squared), HelicityAmplitudes(amplitudes, helicities=HELICITIES)),
        closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)"),),
        parameters=Coupling,
        claims=Claims(exchange=((1, 2), ("beam_a", "beam_b")), crossing=crossing, limits=(LIMIT,)),
        valid=Validity(sqrt_s=(0.0, 30.0), text=BELOW_THE_Z),
        cautions=(RESONANCES, HELICITY_CAUTION, RADIATION_CAUTION),
        alternatives=ALTERNATIVES,
    )
