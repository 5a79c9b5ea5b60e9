"""qed/electron-muon: e- mu- -> e- mu-, muon-pair crossed; both masses exact.

Sources: M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), section 5.4; N. F. Mott, Proc. R. Soc.
Lond. A 124 (1929) 425, for the limit of a heavy target.

With S and C sine and cosine of θ/2 in the cm, momentum p, energies E and F, masses m and M of electron and muon,
t = −4p²S², and the helicity amplitudes are e² times

    [EF C²/p² + 1 + S²]/S²      nothing flips, equal helicities
    (EF/p² + 1) C²/S²           nothing flips, opposite helicities
    mF C/(p²S), ME C/(p²S)      the electron's flips, the muon's does
    mM/p²                       both flip.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Claims, Event, HelicityAmplitudes, Peak, Process, SquaredAmplitude, Validity
from barnwright_qed import one_photon
from barnwright_qed.coupling import ALTERNATIVES, BELOW_THE_Z, HELICITY_CAUTION, PESKIN, RADIATION_CAUTION, Coupling
from barnwright_qed.helicity import Combination, Complex, HalfAngle, Table, both_parities, half_angle, rows

Array = NDArray[np.float64]


class Scattering(NamedTuple):
    """The half angle, cot θ/2, and EF, mF, ME, mM over p²."""

    half: HalfAngle
    cotangent: Array
    energies: Array
    electron: Array
    muon: Array
    both: Array


TABLE: Table = {
    (1, 1, 1, 1): lambda at: (at.energies * at.half.cos_squared + 1 + at.half.sin_squared) / at.half.sin_squared,
    (1, -1, 1, -1): lambda at: (at.energies + 1) * np.square(at.cotangent),
    (1, 1, -1, 1): lambda at: at.electron * at.cotangent,
    (1, -1, -1, -1): lambda at: at.electron * at.cotangent,
    (1, 1, 1, -1): lambda at: at.muon * at.cotangent,
    (1, -1, 1, 1): lambda at: at.muon * at.cotangent,
    (1, 1, -1, -1): lambda at: at.both,
    (1, -1, -1, 1): lambda at: at.both,
}
HELICITIES = both_parities(TABLE)


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless."""
    return one_photon.squared(event, parameters, ("beam_a", 1), ("beam_b", 2))


def amplitudes(event: Event, parameters: Coupling, helicities: tuple[Combination, ...]) -> Complex:
    """M of the wanted helicities of e-, mu-, e-, mu-; dimensionless, phases of rows left free."""
    half = half_angle(event)
    electron, muon = event.cm_vector(1), event.cm_vector(2)
    inverse = 1 / np.square(electron.momentum)
    found = Scattering(
        half,
        cotangent=half.product / half.sin_squared,
        energies=electron.energy * muon.energy * inverse,
        electron=electron.mass * muon.energy * inverse,
        muon=muon.mass * electron.energy * inverse,
        both=electron.mass * muon.mass * inverse,
    )
    return rows(event, parameters, helicities, TABLE, found)


process = Process(
    name="electron-muon",
    reaction="e- mu- -> e- mu-",
    summary="scattering of electrons on muons by one photon, both masses exact",
    references=(f"{PESKIN}, section 5.4", "N. F. Mott, Proc. R. Soc. Lond. A 124 (1929) 425"),
    laws=(SquaredAmplitude(squared), HelicityAmplitudes(amplitudes, helicities=HELICITIES)),
    parameters=Coupling,
    peaks=(Peak(of="t", shape="power", at=0.0, power=2.0),),
    singular=("t",),
    claims=Claims(
        crossing=("qed/muon-pair",),
        limits=(
            "dσ/dΩ → α²(1 − β² sin²(θ/2))/(4β²p² sin⁴(θ/2)) for a muon much heavier than the energy (Mott)",
            "dσ/dΩ → α²/(4m²v⁴ sin⁴(θ/2)), slow electrons on a heavy muon (Rutherford)",
        ),
    ),
    valid=Validity(sqrt_s=(0.0, 30.0), text=BELOW_THE_Z),
    cautions=(
        "The cross section diverges in the forward direction: a cut must keep the momentum transfer away from 0.",
        "One photon alone: slow particles, with α/β not small, need Coulomb waves; radiation is left out.",
        HELICITY_CAUTION,
        RADIATION_CAUTION,
    ),
    alternatives=ALTERNATIVES,
)
