"""electroweak/electron-pair: e- e+ -> e- e+ through photon and Z, annihilation and scattering, electrons massless.

Sources: R. Budny, Phys. Lett. B 55 (1975) 227; PDG Review 2024, section 10 (both from memory).

Rules of this file
------------------
- Helicities of e-, e+ in and e-, e+ out; G of each pair of chiralities at s or at t: exchange.py.
  -+ -> -+: 2u (G_LL(s) + G_LL(t)), -+ -> +-: 2t G_LR(s), -- -> --: 2s G_LR(t), and those with L and R exchanged.
- 1/s + 1/t is −u/st: exact where the two cancel.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Claims, Event, HelicityAmplitudes, Peak, Process, SquaredAmplitude, Validity
from barnwright_electroweak import cautions
from barnwright_electroweak.exchange import (
    CONTRIBUTIONS,
    ELECTRON,
    EVERYTHING,
    LL,
    LR,
    RL,
    RR,
    Chiralities,
    Parts,
    amplitudes,
    products,
    rates,
    strengths,
    z_propagator,
)
from barnwright_electroweak.inputs import ElectroweakInputs

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]

MASSLESS = ("e-",)
ROWS = (
    (-1, 1, -1, 1),
    (1, -1, 1, -1),
    (-1, 1, 1, -1),
    (1, -1, -1, 1),
    (-1, -1, -1, -1),
    (1, 1, 1, 1),
)
CHIRALITIES: tuple[Chiralities, ...] = (LL, RR, LR, RL, LR, RL)
"""Of the two lines, row by row."""


def squared(event: Event, parameters: ElectroweakInputs, parts: Parts = EVERYTHING) -> Array:
    """|M|², dimensionless."""
    known, s, t, u = strengths(ELECTRON, ELECTRON, parameters), event.s, event.t, event.u
    z_s, z_t = z_propagator(s, parameters, event.sqrt_s), z_propagator(t, parameters)
    alike, unlike = ((LL, LL), (RR, RR)), ((LR, LR), (RL, RL))
    both = products(known, alike, rates(-u / (s * t), z_s + z_t, parts))
    annihilated = products(known, unlike, rates(1 / s, z_s, parts))
    scattered = products(known, unlike, rates(1 / t, z_t, parts))
    return np.asarray(np.square(u) * both + np.square(t) * annihilated + np.square(s) * scattered)


def helicity_amplitudes(event: Event, parameters: ElectroweakInputs, parts: Parts = EVERYTHING) -> Complex:
    """M of the rows of `ROWS`, dimensionless; phases of rows left free."""
    known, s, t, u = strengths(ELECTRON, ELECTRON, parameters), event.s, event.t, event.u
    z_s, z_t = z_propagator(s, parameters, event.sqrt_s), z_propagator(t, parameters)
    roads = (
        (u, amplitudes(known, -u / (s * t), z_s + z_t, parts)),
        (t, amplitudes(known, 1 / s, z_s, parts)),
        (s, amplitudes(known, 1 / t, z_t, parts)),
    )
    found = np.empty((len(ROWS), 1, *event.shape), dtype=complex)
    for row, chiralities in enumerate(CHIRALITIES):
        factor, by_chirality = roads[row // 2]
        found[row, 0] = 2 * factor * by_chirality[chiralities]
    return found


process = Process(
    name="electron-pair",
    reaction="e- e+ -> e- e+",
    summary="scattering of electrons on positrons through photon and Z, beams polarised, the electron massless",
    references=(
        "H. J. Bhabha, Proc. R. Soc. Lond. A 154 (1936) 195",
        "R. Budny, Phys. Lett. B 55 (1975) 227",
        "ALEPH, DELPHI, L3, OPAL, SLD and their electroweak groups, Phys. Rept. 427 (2006) 257, section 1.5",
    ),
    laws=(
        SquaredAmplitude(squared, massless=MASSLESS),
        HelicityAmplitudes(helicity_amplitudes, helicities=ROWS, massless=MASSLESS),
    ),
    parameters=ElectroweakInputs,
    masses={"e-": 0.0},
    contributions=CONTRIBUTIONS,
    peaks=(Peak(of="t", shape="power", at=0.0, power=2.0),),
    singular=("t",),
    claims=Claims(limits=("2e⁴ [u²(1/s + 1/t)² + (t/s)² + (s/t)²] for the photon alone (Bhabha)",)),
    valid=Validity(
        sqrt_s=(10.0, 500.0),
        text="lowest order with couplings as at the Z; at small angles the photon's momentum is far below M_Z, and "
        "alpha is nearer to 1/137",
    ),
    cautions=(
        "The cross section diverges in the forward direction: a cut must keep the momentum transfer away from 0.",
        "With a fixed width (and complex_mass) the Z of the t channel has the width too: t - M^2 + iM Gamma.",
        "One alpha serves all transfers; luminosities come from small angles and need the alpha of their own transfer.",
        cautions.BEAM_RADIATION,
        cautions.RADIATION,
    ),
    alternatives={"fermi": {"scheme": "fermi"}, "on-shell": {"scheme": "on_shell"}},
)
