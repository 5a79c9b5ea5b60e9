"""qed/compton: gamma e- -> gamma e-, the electron's mass exact, from the Thomson limit to any energy.

Source: O. Klein, Y. Nishina, Z. Phys. 52 (1929) 853; |M|² in the invariant form of Peskin and Schroeder (1995),
eq. 5.87, which two_photons.py shares with what is crossed.

Rules of this file
------------------
- a = p·k and b = p·k' (p the electron before, k and k' the photons). In the cm, with v = 1 − cos θ: y = b/a = 1 − z,
  z = v (s − m²)/2s, w = v m²/s, and dσ/dv = (πα²/s) [y + 1/y − 2w/y + w²/y²]. s − m² is 2√s p; y is summed from
  positive terms, since at high energies the backward photons live where y is tiny.
- The antiderivative needs −ln(1 − z), and what is left of it when its first terms are taken away. With r = z/(1 + y),
  −ln(1 − z) = 2 artanh r = 2r (1 + r² h), h = 1/3 + r²/5 + r⁴/7 + …, and every power of z that would cancel is gone.
- With S and C sine and cosine of θ/2 and r = m²/s, y = C² + rS², and the helicity amplitudes are e²/y times

    2C (1 − rS²), 2C³               nothing flips; equal, opposite helicities of photon and electron
    2√r SC²                         the electron's flips
    2r S²C                          the photon's flips
    2r√r S³, 2√r S³                 both flip, from equal, from opposite helicities;

  obtained from the two diagrams with Dirac spinors and circular polarisation vectors in radiation gauge.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import (
    Claims,
    ClosedForm,
    Event,
    HelicityAmplitudes,
    Peak,
    Point,
    Process,
    SquaredAmplitude,
    Validity,
)
from barnwright_qed import two_photons
from barnwright_qed.coupling import ALTERNATIVES, HELICITY_CAUTION, PESKIN, RADIATION_CAUTION, Coupling
from barnwright_qed.helicity import Combination, Complex, HalfAngle, Table, both_parities, half_angle, rows
from barnwright_qed.logarithm import artanh_rest

Array = NDArray[np.float64]


class Scattering(NamedTuple):
    """S and C of the half angle, their squares, r = m²/s, 1 − r, and y."""

    sine: Array
    cosine: Array
    half: HalfAngle
    ratio: Array
    gap: Array
    y: Array


def _electron_flips(at: Scattering) -> Array:
    return np.asarray(2 * np.sqrt(at.ratio) * at.sine * at.half.cos_squared / at.y)


def _photon_flips(at: Scattering) -> Array:
    return np.asarray(2 * at.ratio * at.half.sin_squared * at.cosine / at.y)


TABLE: Table = {
    (1, 1, 1, 1): lambda at: 2 * at.cosine * (at.half.cos_squared + at.gap * at.half.sin_squared) / at.y,
    (1, -1, 1, -1): lambda at: 2 * at.cosine * at.half.cos_squared / at.y,
    (1, 1, 1, -1): _electron_flips,
    (1, -1, 1, 1): _electron_flips,
    (1, 1, -1, 1): _photon_flips,
    (1, -1, -1, -1): _photon_flips,
    (1, 1, -1, -1): lambda at: 2 * at.ratio * np.sqrt(at.ratio) * at.sine * at.half.sin_squared / at.y,
    (1, -1, -1, 1): lambda at: 2 * np.sqrt(at.ratio) * at.sine * at.half.sin_squared / at.y,
}
HELICITIES = both_parities(TABLE)


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless."""
    return two_photons.squared(event, parameters, "beam_b", ("beam_a", 1))


def amplitudes(event: Event, parameters: Coupling, helicities: tuple[Combination, ...]) -> Complex:
    """M of the wanted helicities of photon, e-, photon, e-; dimensionless, phases of rows left free."""
    half = half_angle(event)
    ratio, gap = event.mass("beam_b") ** 2 / event.s, 2 * event.cm_vector(1).momentum / event.sqrt_s
    y = half.cos_squared + ratio * half.sin_squared
    found = Scattering(np.sqrt(half.sin_squared), np.sqrt(half.cos_squared), half, ratio, gap, y)
    return rows(event, parameters, helicities, TABLE, found)


def cumulative(x: Array, point: Point, parameters: Coupling) -> Array:
    """∫ dσ/dcos θ from the forward pole (cos θ = 1) to x in GeV⁻²; never positive."""
    s, mass_squared = point.s, point.mass("beam_b") ** 2
    gap = 2 * point.sqrt_s * point.momentum
    v = 1 - x
    z, w = v * gap / (2 * s), v * mass_squared / s
    y = (2 * mass_squared + gap * (1 + x)) / (2 * s)
    r = z / (1 + y)
    rest, up = artanh_rest(r, y), 1 + r
    mean = (
        (1 + y) / 2
        + up * (1 + r * r * rest)
        - w * up * (1 + r * up * rest)
        + np.square(w * up) / 2 * ((1 + y) / (2 * y) - up * rest)
    )
    return np.asarray(-np.pi * parameters.alpha**2 / s * v * mean)


process = Process(
    name="compton",
    reaction="gamma e- -> gamma e-",
    summary="scattering of a photon on a free electron, the electron's mass exact",
    references=("O. Klein, Y. Nishina, Z. Phys. 52 (1929) 853", f"{PESKIN}, section 5.5"),
    laws=(
        SquaredAmplitude(squared, massless=("gamma",)),
        HelicityAmplitudes(amplitudes, helicities=HELICITIES, massless=("gamma",)),
    ),
    closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)", massless=("gamma",)),),
    parameters=Coupling,
    peaks=(Peak(of="u", shape="power", at="e-"),),
    singular=("u",),
    claims=Claims(
        crossing=("qed/photon-pair", "qed/breit-wheeler"),
        gauge_legs=("beam_a", 1),
        limits=("σ → 8πα²/3m² (Thomson) for photon energies far below m",),
    ),
    valid=Validity(
        text="lowest order in alpha on free electrons; bound electrons scatter otherwise below about 100 keV"
    ),
    cautions=(
        "Electrons in matter are bound: incoherent scattering in a material needs its scattering function besides.",
        "With a massless electron photons scattered backwards in the cm diverge: a cut must keep them out.",
        HELICITY_CAUTION,
        RADIATION_CAUTION,
    ),
    alternatives=ALTERNATIVES,
)
