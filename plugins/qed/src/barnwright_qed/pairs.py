"""e- e+ into a pair of heavier leptons through one photon, the masses of both kinds exact.

Source: M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), section 5.1, with the traces kept to
all orders in both masses. With E = √s/2, momenta p before and q after, and c = cos θ between e- and l- in the cm,

    |M|² = e⁴ [1 + 4(m² + M²)/s + 16 p²q²c²/s²],   dσ/dc = |M|² q/(32π s p).
"""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Claims, ClosedForm, Event, Point, Process, SquaredAmplitude, Validity
from barnwright_qed.coupling import RADIATION_CAUTION, Coupling

Array = NDArray[np.float64]

LIMIT = "σ → 4πα²/3s far above threshold (Peskin and Schroeder, eq. 5.15)"
RESONANCES = (
    "One photon alone: hadronic resonances (J/ψ, Υ), radiation from the beams and, within about αc of the threshold's "
    "velocity, the Coulomb attraction of the pair are left out."
)


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless; every term is positive, so no digits are lost."""
    light, heavy = event.mass("beam_a") ** 2, event.mass(1) ** 2
    bracket = (
        event.dot("beam_a", 1) * event.dot("beam_b", 2)
        + event.dot("beam_a", 2) * event.dot("beam_b", 1)
        + heavy * event.dot("beam_a", "beam_b")
        + light * event.dot(1, 2)
        + 2 * light * heavy
    )
    return np.asarray(8 * (4 * np.pi * parameters.alpha) ** 2 * bracket / np.square(event.s))


def cumulative(x: Array, point: Point, parameters: Coupling) -> Array:
    """∫ dσ/dc from c = 0 to x in GeV⁻²; an odd function of x."""
    s = point.s
    flat = 1 + 4 * (point.mass("beam_a") ** 2 + point.mass(1) ** 2) / s
    curved = np.square(4 * point.momentum * point.final_momentum / s) / 3
    scale = np.pi * parameters.alpha**2 * point.final_momentum / (2 * s * point.momentum)
    return np.asarray(scale * x * (flat + curved * np.square(x)))


def pair(name: str, lepton: str, word: str, **more: Any) -> Process:
    """The process e- e+ -> lepton pair; ``word`` is the lepton's name in a sentence."""
    return Process(
        name=name,
        reaction=f"e- e+ -> {lepton}- {lepton}+",
        summary=f"{word} pairs from e- e+ through one photon, both masses exact",
        references=("M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), section 5.1",),
        laws=(SquaredAmplitude(squared),),
        closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)"),),
        parameters=Coupling,
        claims=Claims(exchange=((1, 2),), limits=(LIMIT,)),
        valid=Validity(
            sqrt_s=(0.0, 30.0),
            text="lowest order in alpha with the photon alone; above about 30 GeV the Z boson is felt",
        ),
        cautions=(RESONANCES, RADIATION_CAUTION),
        **more,
    )
