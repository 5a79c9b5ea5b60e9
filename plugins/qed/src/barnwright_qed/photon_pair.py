"""qed/photon-pair: e- e+ -> gamma gamma, compton crossed; the electron's mass exact, from rest to any energy.

Source: P. A. M. Dirac, Proc. Camb. Phil. Soc. 26 (1930) 361. With what two_photons.py says of |M|² and its integral,
dσ/dc = (πα²/2sβ) |M|²/2e⁴, the two photons counted once.
"""

from __future__ import annotations

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
from barnwright_qed.annihilation import TABLE, pair_of
from barnwright_qed.coupling import ALTERNATIVES, HELICITY_CAUTION, PESKIN, RADIATION_CAUTION, Coupling
from barnwright_qed.helicity import Combination, Complex, both_parities, rows

Array = NDArray[np.float64]

HELICITIES = both_parities(TABLE)


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless; the factor ½ of the two photons belongs to the core."""
    return two_photons.squared(event, parameters, "beam_a", (1, 2))


def amplitudes(event: Event, parameters: Coupling, helicities: tuple[Combination, ...]) -> Complex:
    """M of the wanted helicities of e-, e+ and the photons; dimensionless, phases of rows left free."""
    momentum_squared = -event.transfer("beam_a", "beam_b") / 4
    return rows(event, parameters, helicities, TABLE, pair_of(event, event.mass("beam_a"), momentum_squared))


def cumulative(x: Array, point: Point, parameters: Coupling) -> Array:
    """∫ dσ/dc from c = 0 to x in GeV⁻², each pair of photons counted once; an odd function of x."""
    integral = two_photons.angular_integral(x, point, point.momentum, point.mass("beam_a"))
    scale = np.pi * parameters.alpha**2 / (4 * point.sqrt_s * point.momentum)
    return np.asarray(scale * integral)


process = Process(
    name="photon-pair",
    reaction="e- e+ -> gamma gamma",
    summary="annihilation of electrons and positrons into two photons, the electron's mass exact",
    references=("P. A. M. Dirac, Proc. Camb. Phil. Soc. 26 (1930) 361", f"{PESKIN}, section 5.5"),
    laws=(
        SquaredAmplitude(squared, massless=("gamma",)),
        HelicityAmplitudes(amplitudes, helicities=HELICITIES, massless=("gamma",)),
    ),
    closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)", massless=("gamma",)),),
    parameters=Coupling,
    peaks=(Peak(of="t", shape="power", at="e-"), Peak(of="u", shape="power", at="e-")),
    singular=("t", "u"),
    claims=Claims(
        exchange=((1, 2), ("beam_a", "beam_b")),
        crossing=("qed/compton", "qed/breit-wheeler"),
        gauge_legs=(1, 2),
        limits=("σv → πα²/m² for slow positrons, v their velocity on electrons at rest (Dirac)",),
    ),
    valid=Validity(text="lowest order in alpha on free electrons"),
    cautions=(
        "Coulomb attraction within about αc of rest, positronium and its three-photon decays are left out.",
        "Electrons in matter are bound and move.",
        "With a massless electron the forward and the backward direction diverge: cuts must keep them out.",
        HELICITY_CAUTION,
        RADIATION_CAUTION,
    ),
    alternatives=ALTERNATIVES,
)
