"""nuclear/electron-proton: e- p -> e- p through one photon, both masses exact, the proton point-like or with structure.

Source: M. Rosenbluth, Phys. Rev. 79 (1950) 615; R. Sachs, Phys. Rev. 126 (1962) 2256; the tensors as in Peskin and
Schroeder (1995), problem 6.1, with the electron's mass kept.

Rules of this file
------------------
- With K, P the sums of the momenta of the electron and of the proton before and after, Q² = −t, m and M the masses, and
  G² = (G_E² + τ G_M²)/(1 + τ):

      |M|² = (e⁴/Q⁴) { G² [(K·P)² − Q² P²] + 2 G_M² Q² (Q² − 2m²) },   P² = 4M² + Q².

- (K·P)² − Q² P² = 8 s k² (1 + cos θ) + 4m² P² in the cm, terms that are positive: the left side loses its digits where
  light electrons are scattered backwards. k² (1 + cos θ) is taken as 2k² p_t²/Q², exact up to the pole at Q² = 0.
- G² − G_M² = (G_E² − G_M²)/(1 + τ), so 4m²Q² (G² − G_M²) is one term, and 0 for a point.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.amplitudes import current, dot, external_states, helicity_rows, scalar_current
from barnwright.plugin import Claims, Event, HelicityAmplitudes, Peak, Process, SquaredAmplitude, Validity
from barnwright_nuclear.form_factors import ElasticInputs, sachs

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]

SAFETY = (
    "Cross sections feed shielding, dose and beam-safety estimates: this one holds at lowest order within its range of "
    "validity; work that can hurt someone follows local rules and a qualified radiation-protection expert."
)


def squared(event: Event, parameters: ElasticInputs) -> Array:
    """|M|², dimensionless."""
    q2 = -event.t
    light, heavy = event.mass("beam_a") ** 2, event.mass("beam_b") ** 2
    tau = q2 / (4 * heavy)
    found = sachs(q2, parameters)
    scattered = event.cm_vector(1)
    electric = 16 * (event.s * np.square(scattered.momentum * scattered.pt) / q2 + light * heavy)
    magnetic = 2 * np.square(found.magnetic * q2)
    unlike = (np.square(found.electric) - np.square(found.magnetic)) / (1 + tau)
    bracket = found.mean_squared(tau) * electric + magnetic + 4 * light * q2 * unlike
    return np.asarray(np.square(4 * np.pi * parameters.alpha / q2) * bracket)


def amplitudes(event: Event, parameters: ElasticInputs) -> Complex:
    """(helicity, 1, …): e² j·J/t with j the electron's current and J = G_M ūγ^μu − F₂ (p + p')^μ ūu/2M the proton's."""
    electron, proton, scattered, recoil = external_states(event)
    mass = event.mass("beam_b")
    tau = -event.t / (4 * mass * mass)
    found = sachs(-event.t, parameters)
    leptonic = current(scattered, electron)
    momenta = event.cm_vector("beam_b").components() + event.cm_vector(2).components()
    convection = found.pauli(tau) / (2 * mass) * scalar_current(recoil, proton) * dot(leptonic, momenta)
    whole = found.magnetic * dot(leptonic, current(recoil, proton)) - convection
    return helicity_rows(event, 4 * np.pi * parameters.alpha / event.t * whole)


process = Process(
    name="electron-proton",
    reaction="e- p -> e- p",
    summary="elastic scattering of electrons on protons through one photon, both masses exact",
    references=(
        "M. Rosenbluth, Phys. Rev. 79 (1950) 615",
        "N. Mott, Proc. R. Soc. Lond. A 124 (1929) 425",
        "E. Rutherford, Phil. Mag. 21 (1911) 669",
        "R. Sachs, Phys. Rev. 126 (1962) 2256",
        "L. Hand, D. Miller, R. Wilson, Rev. Mod. Phys. 35 (1963) 335",
    ),
    laws=(SquaredAmplitude(squared), HelicityAmplitudes(amplitudes)),
    parameters=ElasticInputs,
    peaks=(Peak(of="t", shape="power", at=0.0, power=2),),
    singular=("t",),
    alternatives={
        "point": {"form_factors": "point"},
        "dipole": {"form_factors": "dipole"},
        "soft-dipole": {"form_factors": "dipole", "dipole_scale": 0.66},
    },
    claims=Claims(
        limits=(
            "dσ/dΩ → (α/2μv²)²/sin⁴(θ/2) in the cm for v ≪ 1, μ the reduced mass (Rutherford 1911)",
            "dσ/dΩ → (α/2pv)² (1 − v² sin²(θ/2))/sin⁴(θ/2) for energies far below M (Mott 1929)",
            "the point proton is the scattering of two unlike Dirac particles, as in qed/electron-muon",
        )
    ),
    valid=Validity(
        text="one photon exchanged; the dipole describes the data to some per cent up to Q² of about 1 GeV² (G_M "
        "beyond, while G_E falls below it)"
    ),
    cautions=(
        "Two-photon exchange and radiation are left out: a measured peak loses 10 to 30 % to its radiative tail.",
        "A slow electron (α/v not small) feels more than one photon; a proton in an atom is screened at Q of keV.",
        SAFETY,
    ),
)
