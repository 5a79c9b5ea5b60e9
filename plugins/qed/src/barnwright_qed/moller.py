"""qed/moller: e- e- -> e- e-, the electron's mass exact; bhabha crossed.

Sources: C. Møller, Ann. Phys. 14 (1932) 531; V. Berestetskii, E. Lifshitz, L. Pitaevskii, Quantum Electrodynamics,
2nd ed. (1982), § 81.

With S and C sine and cosine of θ/2 in the cm and κ = m²/p², the helicity amplitudes, both diagrams together, are e²
times

    (2 + κ)/(S²C²) − 2κ             ++ -> ++
    (2 + κ) C²/S² − κ               +− -> +−, and S²/C² for +− -> −+
    √(κ(1 + κ)) cos θ/(SC)          one helicity flips
    2κ                              ++ -> −−.
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
    """The half angle, tan² θ/2, and κ = m²/p² in the cm."""

    half: HalfAngle
    tangent_squared: Array
    kappa: Array

    @property
    def flip(self) -> Array:
        """The amplitude of one flip over e²."""
        return np.asarray(np.sqrt(self.kappa * (1 + self.kappa)) * self.half.cosine / self.half.product)


TABLE: Table = {
    (1, 1, 1, 1): lambda at: (2 + at.kappa) / np.square(at.half.product) - 2 * at.kappa,
    (1, -1, 1, -1): lambda at: (2 + at.kappa) / at.tangent_squared - at.kappa,
    (1, -1, -1, 1): lambda at: (2 + at.kappa) * at.tangent_squared - at.kappa,
    (1, 1, 1, -1): lambda at: at.flip,
    (1, 1, -1, 1): lambda at: at.flip,
    (1, -1, 1, 1): lambda at: at.flip,
    (1, -1, -1, -1): lambda at: at.flip,
    (1, 1, -1, -1): lambda at: 2 * at.kappa,
}
HELICITIES = both_parities(TABLE)


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless; the factor ½ of the two electrons belongs to the core."""
    return one_photon.squared_of_one_kind(event, parameters, "beam_a", "beam_b", (1, 2))


def amplitudes(event: Event, parameters: Coupling, helicities: tuple[Combination, ...]) -> Complex:
    """M of the wanted helicities of the four electrons; dimensionless, phases of rows left free."""
    kappa = -4 * event.mass(1) ** 2 / event.transfer("beam_a", "beam_b")
    found = Scattering(elastic_half_angle(event), event.t / event.u, kappa)
    return rows(event, parameters, helicities, TABLE, found)


process = Process(
    name="moller",
    reaction="e- e- -> e- e-",
    summary="scattering of electrons on electrons by one photon, the electron's mass exact",
    references=(
        "C. Møller, Ann. Phys. 14 (1932) 531",
        "V. Berestetskii, E. Lifshitz, L. Pitaevskii, Quantum Electrodynamics, 2nd ed. (1982), § 81",
    ),
    laws=(SquaredAmplitude(squared), HelicityAmplitudes(amplitudes, helicities=HELICITIES)),
    parameters=Coupling,
    peaks=(
        Peak(of="t", shape="power", at=0.0, power=2.0),
        Peak(of="u", shape="power", at=0.0, power=2.0),
    ),
    singular=("t", "u"),
    claims=Claims(
        exchange=((1, 2), ("beam_a", "beam_b")),
        crossing=("qed/bhabha",),
        limits=("dσ/dΩ → α²(3 + cos²θ)²/(s sin⁴θ) for either electron, far above the mass (Møller)",),
    ),
    valid=Validity(sqrt_s=(0.0, 30.0), text=BELOW_THE_Z),
    cautions=(
        "The cross section diverges forward and backward: cuts must keep both momentum transfers away from 0.",
        "Electrons in matter are bound: transfers near the binding energies scatter otherwise.",
        HELICITY_CAUTION,
        RADIATION_CAUTION,
    ),
    alternatives=ALTERNATIVES,
)
