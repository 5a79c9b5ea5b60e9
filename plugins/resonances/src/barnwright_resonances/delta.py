"""resonances/delta: pi+ p -> pi+ p through the Delta(1232)++ alone, the P33 wave.

Source: M. Gell-Mann, K. Watson, Annu. Rev. Nucl. Sci. 4 (1954) 219; J. Blatt, V. Weisskopf, Theoretical Nuclear Physics
(1952), chapter VIII, for the barrier; PDG Review, "Resonances", for the relativistic form.

Rules of this file
------------------
- Only J = 3/2, l = 1: dσ/dΩ = |T|²/k² (1 + 3 cos²θ), σ = 8π |T|²/k², k the momentum in the cm.
- T = M Γ(s)/(M² − s − i M Γ(s)), |T| = 1 at s = M²: one channel, so the wave is unitary at every energy.
- Γ(s) = Γ (M/√s)(k/k_M)³ (1 + R²k_M²)/(1 + R²k²), k_M being k at s = M² and R the range.
"""

from __future__ import annotations

from math import sqrt
from typing import Annotated

import numpy as np
from numpy.typing import NDArray
from pydantic import Field
from scipy import constants

from barnwright.plugin import (
    AngularCrossSection,
    Claims,
    ClosedForm,
    Parameters,
    Point,
    Process,
    Validity,
    mass_of,
    parameter,
    table_source,
    width_of,
)
from barnwright_resonances import inputs

Array = NDArray[np.float64]

FERMI = 1e-15 * constants.electron_volt * 1e9 / (constants.hbar * constants.speed_of_light)
"""One fm in GeV⁻¹: 1/(ħc), exact in the SI, through scipy.constants."""
THRESHOLD = 1.08
"""GeV, just above m_π + m_p = 1.0778: below it there is no momentum at the peak."""


class DeltaResonance(Parameters):
    """The Delta(1232)++ in one channel."""

    mass: Annotated[float, Field(gt=THRESHOLD)] = parameter(
        mass_of("Delta(1232)++"),
        unit="GeV",
        meaning="Breit-Wigner mass of the Delta(1232)++, where the phase of the wave is π/2",
        source=table_source(),
    )
    width: inputs.Positive = parameter(
        width_of("Delta(1232)++"),
        unit="GeV",
        meaning="Breit-Wigner width of the Delta(1232)++ at its mass",
        source=table_source(),
    )
    range: inputs.NotNegative = parameter(
        FERMI,
        unit="GeV^-1",
        meaning="range R of the centrifugal barrier; 0: the width grows with the third power of the momentum",
        source="1 fm, common practice (PDG Review, 'Resonances')",
    )


def strength(point: Point, parameters: DeltaResonance) -> Array:
    """|T|²/k² in GeV⁻², shape (point, 1)."""
    mass, k = parameters.mass, point.momentum
    at_peak = _momentum_at(mass, point.mass("beam_a"), point.mass("beam_b"))
    barrier = (1 + (parameters.range * at_peak) ** 2) / (1 + np.square(parameters.range * k))
    rate = mass * mass * parameters.width / (point.sqrt_s * at_peak) * barrier
    absorbed = rate * k * np.square(k / at_peak)
    above = (point.sqrt_s - mass) * (point.sqrt_s + mass)
    return np.asarray(np.square(rate * k / at_peak**2) * np.square(k) / (np.square(above) + np.square(absorbed)))


def _momentum_at(energy: float, first: float, second: float) -> float:
    """The momentum in the cm at this energy, from Källén's λ in its four factors; GeV."""
    total, difference = first + second, first - second
    factors = (energy - total) * (energy + total) * (energy - difference) * (energy + difference)
    return sqrt(factors) / (2 * energy)


def cross_section(point: Point, cos_theta: Array, parameters: DeltaResonance) -> Array:
    """dσ/dΩ in GeV⁻² sr⁻¹, shape (point, node)."""
    return np.asarray(strength(point, parameters) * (1 + 3 * np.square(cos_theta)))


def cumulative(x: Array, point: Point, parameters: DeltaResonance) -> Array:
    """∫ dσ/dcos θ from 0 to x in GeV⁻²; an odd function of x."""
    return np.asarray(2 * np.pi * strength(point, parameters) * x * (1 + np.square(x)))


process = Process(
    name="delta",
    reaction="pi+ p -> pi+ p",
    summary="elastic pi+ p scattering through the Delta(1232)++, a p-wave of momentum-dependent width",
    references=(
        "M. Gell-Mann, K. Watson, Annu. Rev. Nucl. Sci. 4 (1954) 219",
        "J. Blatt, V. Weisskopf, Theoretical Nuclear Physics (1952), chapter VIII",
        inputs.PDG_RESONANCES,
    ),
    laws=(AngularCrossSection(cross_section),),
    closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)"),),
    parameters=DeltaResonance,
    alternatives={
        "no-barrier": {"range": 0.0},
        "gell-mann-watson": {"range": 0.88 / 0.13957},
    },
    claims=Claims(
        limits=(
            "σ = 8π/k² at √s = M: the unitarity limit of a wave of J = 3/2",
            "σ ∝ k⁴ at threshold, as a p-wave",
        )
    ),
    valid=Validity(
        sqrt_s=(1.08, 1.35),
        text="the P33 wave alone: within about a width of the Delta it is nearly all of elastic pi+ p scattering",
    ),
    cautions=(
        "The s-wave and the other p-waves are left out; they interfere with the Delta and tilt 1 + 3 cos²θ.",
        "Coulomb scattering, which dominates at small angles, is left out.",
        inputs.SAFETY,
    ),
)
