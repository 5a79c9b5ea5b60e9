"""qed/breit-wheeler, -muon and -tau: gamma gamma -> lepton pair, photon-pair backwards; the lepton's mass exact.

Source: G. Breit, J. A. Wheeler, Phys. Rev. 46 (1934) 1087. With what two_photons.py says of |M|² and its integral,
dσ/dc = (πα²β/s) |M|²/2e⁴.
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
from barnwright_qed.annihilation import BACKWARDS, pair_of
from barnwright_qed.coupling import ALTERNATIVES, HELICITY_CAUTION, PESKIN, RADIATION_CAUTION, Coupling
from barnwright_qed.helicity import Combination, Complex, both_parities, rows

Array = NDArray[np.float64]

HELICITIES = both_parities(BACKWARDS)


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless."""
    return two_photons.squared(event, parameters, 1, ("beam_a", "beam_b"))


def amplitudes(event: Event, parameters: Coupling, helicities: tuple[Combination, ...]) -> Complex:
    """M of the wanted helicities of the photons and the leptons; dimensionless, phases of rows left free."""
    momentum_squared = np.square(event.cm_vector(1).momentum)
    return rows(event, parameters, helicities, BACKWARDS, pair_of(event, event.mass(1), momentum_squared))


def cumulative(x: Array, point: Point, parameters: Coupling) -> Array:
    """∫ dσ/dc from c = 0 to x in GeV⁻²; an odd function of x."""
    integral = two_photons.angular_integral(x, point, point.final_momentum, point.mass(1))
    scale = 2 * np.pi * parameters.alpha**2 * point.final_momentum / (point.s * point.sqrt_s)
    return np.asarray(scale * integral)


def creation(name: str, lepton: str, word: str, crossing: tuple[str, ...] = ()) -> Process:
    """The process gamma gamma -> lepton pair; ``word`` is the lepton's name in a sentence."""
    return Process(
        name=name,
        reaction=f"gamma gamma -> {lepton}- {lepton}+",
        summary=f"{word} pairs from two photons, the mass exact",
        references=("G. Breit, J. A. Wheeler, Phys. Rev. 46 (1934) 1087", f"{PESKIN}, section 5.5"),
        laws=(
            SquaredAmplitude(squared, massless=("gamma",)),
            HelicityAmplitudes(amplitudes, helicities=HELICITIES, massless=("gamma",)),
        ),
        closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)", massless=("gamma",)),),
        parameters=Coupling,
        peaks=(Peak(of="t", shape="power", at=f"{lepton}-"), Peak(of="u", shape="power", at=f"{lepton}-")),
        singular=("t", "u"),
        claims=Claims(
            exchange=((1, 2), ("beam_a", "beam_b")),
            crossing=crossing,
            gauge_legs=("beam_a", "beam_b"),
            limits=("σ → πα²β/m² at threshold, β the leptons' velocity in the cm (Breit and Wheeler)",),
        ),
        valid=Validity(text="lowest order in alpha, photons on their mass shell"),
        cautions=(
            "Slow pairs, within about αc of rest in the cm, feel a Coulomb attraction that is left out.",
            "With a massless lepton the forward and the backward direction diverge: cuts must keep them out.",
            HELICITY_CAUTION,
            RADIATION_CAUTION,
        ),
        alternatives=ALTERNATIVES,
    )


electron = creation("breit-wheeler", "e", "electron", ("qed/compton", "qed/photon-pair"))
muon = creation("breit-wheeler-muon", "mu", "muon")
tau = creation("breit-wheeler-tau", "tau", "tau")
