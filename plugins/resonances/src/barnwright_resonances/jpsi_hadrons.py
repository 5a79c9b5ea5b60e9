"""resonances/jpsi-hadrons: e- e+ -> X, the line of the J/psi in hadrons.

Source: A. Boyarski et al., Phys. Rev. Lett. 34 (1975) 1357; PDG Review, "Cross-section formulae for specific
processes". With W = √s and k the momentum in the cm,

    σ = (2J + 1)/((2s₁ + 1)(2s₂ + 1)) (π/k²) Γ_ee Γ B/((W − M)² + Γ²/4),   ∫ σ dW = 6π² Γ_ee B/M².

The width is 3e-5 of the mass: schemes of the width differ by 1e-9 of it, far below any beam's spread.
"""

from __future__ import annotations

from typing import Annotated

import numpy as np
from numpy.typing import NDArray
from pydantic import Field

from barnwright.plugin import (
    Claims,
    Parameters,
    Point,
    Process,
    TotalCrossSection,
    Validity,
    mass_of,
    parameter,
    table_source,
    width_of,
)
from barnwright_resonances import inputs
from barnwright_resonances.lineshape import flux_factor

Array = NDArray[np.float64]


class JpsiLine(Parameters):
    """The J/psi: mass, total width, width into electrons, share of hadrons."""

    mass: inputs.Positive = parameter(
        mass_of("J/psi(1S)"), unit="GeV", meaning="mass of the J/psi", source=table_source()
    )
    width: inputs.Positive = parameter(
        width_of("J/psi(1S)"), unit="GeV", meaning="total width of the J/psi", source=table_source()
    )
    electron_width: inputs.NotNegative = parameter(
        5.53e-6, unit="GeV", meaning="width of the J/psi into e- e+", source="PDG 2024, J/psi(1S)"
    )
    branching: Annotated[float, Field(ge=0, le=1)] = parameter(
        0.877, meaning="branching fraction of the J/psi into hadrons", source="PDG 2024, J/psi(1S)"
    )


def cross_section(point: Point, parameters: JpsiLine) -> Array:
    """σ in GeV⁻², shape (point, 1)."""
    half = parameters.width / 2
    strength = parameters.electron_width * parameters.branching * half / 2
    distance = point.sqrt_s - parameters.mass
    return flux_factor(point, spin=1) * strength / (np.square(distance) + half * half)


process = Process(
    name="jpsi-hadrons",
    reaction="e- e+ -> X",
    summary="hadrons from e- e+ through the J/psi",
    references=(
        "A. Boyarski et al., Phys. Rev. Lett. 34 (1975) 1357",
        inputs.PDG_FORMULAE,
        inputs.BREIT_WIGNER,
    ),
    laws=(TotalCrossSection(cross_section),),
    parameters=JpsiLine,
    alternatives={
        "psi-2s": {
            "mass": mass_of("psi(2S)"),
            "width": width_of("psi(2S)"),
            "electron_width": 2.33e-6,
            "branching": 0.9785,
        },
    },
    claims=Claims(limits=("∫ σ d√s = 6π² Γ_ee B/M² over the line (Boyarski et al. 1975)",)),
    valid=Validity(
        sqrt_s=(3.08, 3.12),
        text="a non-relativistic Breit-Wigner line, the J/psi alone: the continuum of hadrons and its interference "
        "with the line are not in it",
    ),
    cautions=(
        "The line is 0.093 MeV wide, the energy spread of beams about 1 MeV: only the area of the line is seen.",
        inputs.RADIATION,
        inputs.SAFETY,
    ),
)
