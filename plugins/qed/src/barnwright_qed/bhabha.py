"""qed/bhabha: e- e+ -> e- e+, the electron's mass exact; moller crossed.

Sources: H. J. Bhabha, Proc. R. Soc. Lond. A 154 (1936) 195; V. Berestetskii, E. Lifshitz, L. Pitaevskii, Quantum
Electrodynamics, 2nd ed. (1982), § 81.

With S and C sine and cosine of θ/2 in the cm, c = cos θ and κ = m²/p², the helicity amplitudes, scattering and
annihilation together, are e² times

    (2 + κ)/S² − κ − cκ/(1 + κ)     ++ -> ++
    (C/S)² (κ + 2C²)                +− -> +−
    2S² − κ                         +− -> −+
    √(κ/(1 + κ)) (C/S) (κ + c)      one helicity flips
    κ + cκ/(1 + κ)                  ++ -> −−.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Claims, Event, HelicityAmplitudes, Peak, Process, SquaredAmplitude, Validity
from barnwright_qed import one_photon
from barnwright_qed.coupling import ALTERNATIVES, BELOW_THE_Z, HELICITY_CAUTION, RADIATION_CAUTION, Coupling
from barnwright_qed.helicity import Combination, Complex, HalfAngle, Table, both_parities, elastic_half_angle, rows

Array = NDArray[np.float64]


class Scattering(NamedTuple):
    """The half angle, cot² θ/2, κ = m²/p² and m²/E² in the cm."""

    half: HalfAngle
    cotangent_squared: Array
    kappa: Array
    share: Array

    @property
    def flip(self) -> Array:
        """The amplitude of one flip over e²."""
        return np.asarray(np.sqrt(self.share * self.cotangent_squared) * (self.kappa + self.half.cosine))


TABLE: Table = {
    (1, 1, 1, 1): lambda at: (2 + at.kappa) / at.half.sin_squared - at.kappa - at.share * at.half.cosine,
    (1, -1, 1, -1): lambda at: at.cotangent_squared * (at.kappa + 2 * at.half.cos_squared),
    (1, -1, -1, 1): lambda at: 2 * at.half.sin_squared - at.kappa,
    (1, 1, 1, -1): lambda at: at.flip,
    (1, 1, -1, 1): lambda at: at.flip,
    (1, -1, 1, 1): lambda at: at.flip,
    (1, -1, -1, -1): lambda at: at.flip,
    (1, 1, -1, -1): lambda at: at.kappa + at.share * at.half.cosine,
}
HELICITIES = both_parities(TABLE)


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless."""
    return one_photon.squared_of_one_kind(event, parameters, "beam_a", 2, (1, "beam_b"))


def amplitudes(event: Event, parameters: Coupling, helicities: tuple[Combination, ...]) -> Complex:
    """M of the wanted helicities of e-, e+, e-, e+; dimensionless, phases of rows left free."""
    mass_squared = event.mass(1) ** 2
    kappa = -4 * mass_squared / event.transfer("beam_a", "beam_b")
    found = Scattering(elastic_half_angle(event), event.u / event.t, kappa, 4 * mass_squared / event.s)
    return rows(event, parameters, helicities, TABLE, found)


process = Process(
    name="bhabha",
    reaction="e- e+ -> e- e+",
    summary="scattering of electrons on positrons and annihilation through one photon, the electron's mass exact",
    references=(
        "H. J. Bhabha, Proc. R. Soc. Lond. A 154 (1936) 195",
        "V. Berestetskii, E. Lifshitz, L. Pitaevskii, Quantum Electrodynamics, 2nd ed. (1982), § 81",
    ),
    laws=(SquaredAmplitude(squared), HelicityAmplitudes(amplitudes, helicities=HELICITIES)),
    parameters=Coupling,
    peaks=(Peak(of="t", shape="power", at=0.0, power=2.0),),
    singular=("t",),
    claims=Claims(
        crossing=("qed/moller",),
        limits=("dσ/dΩ → (α²/2s) [(1 + C⁴)/S⁴ − 2C⁴/S² + (1 + cos²θ)/2], C and S of θ/2, far above the mass (Bhabha)",),
    ),
    valid=Validity(sqrt_s=(0.0, 30.0), text=BELOW_THE_Z),
    cautions=(
        "The cross section diverges in the forward direction: a cut must keep the momentum transfer away from 0.",
        "Radiation from beams and final state, and hadronic resonances, are left out; a luminosity needs them.",
        HELICITY_CAUTION,
        RADIATION_CAUTION,
    ),
    alternatives=ALTERNATIVES,
)
