"""electroweak/inverse-muon-decay: nu(mu) e- -> mu- nu(e) in the contact limit, both masses exact.

Source: G. 't Hooft, Phys. Lett. B 37 (1971) 195; P. Vilain et al. (CHARM II), Phys. Lett. B 364 (1995) 121.

Rules of this file
------------------
- L = −2√2 G_F [μ̄γ^α P_L ν_μ][ν̄_eγ_α P_L e]. Averaged over the electron alone, since a neutrino has one helicity:
  |M|² = 64 G_F² (p_ν·p_e)(p_μ·p_ν'), of an S wave: the same at every angle.
- In the cm the products are k√s and q√s with k and q the momenta before and after, so σ = 4 G_F² q²/π.
- One helicity amplitude does not vanish: electron and muon left-handed, since the pairs have no spin along their line.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import (
    Claims,
    ClosedForm,
    Event,
    HelicityAmplitudes,
    Parameters,
    Point,
    Process,
    SquaredAmplitude,
    Validity,
)
from barnwright_electroweak import inputs
from barnwright_electroweak.cautions import BOUND_ELECTRONS, RADIATION

Array = NDArray[np.float64]

MASSLESS = ("nu(mu)", "nu(e)")


class FermiInputs(Parameters):
    """Fermi's constant: all that the contact limit of the charged current knows."""

    fermi_constant: inputs.Positive = inputs.fermi_constant()


def squared(event: Event, parameters: FermiInputs) -> Array:
    """|M|², dimensionless."""
    return np.asarray(64 * parameters.fermi_constant**2 * event.dot("beam_a", "beam_b") * event.dot(1, 2))


def amplitudes(event: Event, parameters: FermiInputs) -> Array:
    """The one amplitude that does not vanish, dimensionless, real up to a phase: 8√2 G_F √(kq) √s."""
    before, after = event.cm_vector("beam_a"), event.cm_vector(2)
    product = 8 * np.sqrt(2) * parameters.fermi_constant * event.sqrt_s * np.sqrt(before.energy * after.energy)
    return np.asarray(product)[None, None]


def cumulative(x: Array, point: Point, parameters: FermiInputs) -> Array:
    """∫ dσ/dcos θ from 0 to x in GeV⁻²."""
    return np.asarray(2 * np.square(parameters.fermi_constant * point.final_momentum) / np.pi * x)


process = Process(
    name="inverse-muon-decay",
    reaction="nu(mu) e- -> mu- nu(e)",
    summary="muon neutrinos turn electrons into muons, in the contact limit, both masses exact",
    references=(
        "G. 't Hooft, Phys. Lett. B 37 (1971) 195",
        "P. Vilain et al. (CHARM II), Phys. Lett. B 364 (1995) 121",
    ),
    laws=(
        SquaredAmplitude(squared, massless=MASSLESS),
        HelicityAmplitudes(amplitudes, helicities=((-1, -1, -1, -1),), massless=MASSLESS),
    ),
    closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)", massless=MASSLESS),),
    parameters=FermiInputs,
    claims=Claims(
        limits=(
            "threshold at E = (m_mu² - m_e²)/2m_e = 10.9 GeV on an electron at rest",
            "σ → G_F² s/π for s far above m_mu², 17.2e-42 cm²/GeV times E on an electron at rest",
        ),
    ),
    valid=Validity(
        sqrt_s=(0.0, 5.0),
        text="contact limit, s far below M_W²: at √s = 5 GeV (24 TeV on an electron at rest) the W's propagator lowers "
        "σ by about 0.4 %",
    ),
    cautions=(
        "Radiative corrections, a few per cent of σ, are left out.",
        BOUND_ELECTRONS,
        RADIATION,
    ),
)
