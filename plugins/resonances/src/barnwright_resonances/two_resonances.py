"""resonances/two-resonances: e- e+ -> X, two resonances of one spin in one final state, and their interference.

Source: PDG Review, "Resonances"; each line is that of `lineshape`, and the amplitude is T_1 + e^{iφ} T_2.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import (
    Claims,
    Parameters,
    Point,
    Process,
    TotalCrossSection,
    Validity,
    mass_of,
    parameter,
    width_of,
)
from barnwright_resonances import inputs
from barnwright_resonances.lineshape import flux_factor, interfering, line, root

Array = NDArray[np.float64]

NAMES = ("first", "second")
CROSS = "first*second"


class TwoResonances(Parameters):
    """Two resonances of the same spin, and the phase between them."""

    first_mass: inputs.Positive = parameter(unit="GeV", meaning=f"mass of the first, {inputs.OWN_FORM}")
    first_width: inputs.Positive = parameter(unit="GeV", meaning=f"total width of the first, {inputs.OWN_FORM}")
    first_initial_width: inputs.NotNegative = parameter(unit="GeV", meaning="width of the first into e- e+")
    first_final_width: inputs.NotNegative = parameter(unit="GeV", meaning="width of the first into the final state")
    second_mass: inputs.Positive = parameter(unit="GeV", meaning=f"mass of the second, {inputs.OWN_FORM}")
    second_width: inputs.Positive = parameter(unit="GeV", meaning=f"total width of the second, {inputs.OWN_FORM}")
    second_initial_width: inputs.NotNegative = parameter(unit="GeV", meaning="width of the second into e- e+")
    second_final_width: inputs.NotNegative = parameter(unit="GeV", meaning="width of the second into the final state")
    relative_phase: float = parameter(
        0.0, unit="rad", meaning="phase φ by which the second amplitude is turned", source="none assumed"
    )
    spin: inputs.Spin = inputs.spin()
    width_scheme: inputs.WidthScheme = inputs.width_scheme()


def cross_section(point: Point, parameters: TwoResonances, parts: frozenset[str]) -> Array:
    """The parts of σ in GeV⁻², shape (point, 1)."""
    p = parameters
    scheme = p.width_scheme
    first = line(point, p.first_mass, p.first_width, root(p.first_initial_width, p.first_final_width), scheme)
    second = line(point, p.second_mass, p.second_width, root(p.second_initial_width, p.second_final_width), scheme)
    turned = np.exp(1j * p.relative_phase) * second
    return flux_factor(point, p.spin) * interfering(first, turned, NAMES, parts)


RHO_OMEGA = {
    "first_mass": mass_of("rho(770)0"),
    "first_width": width_of("rho(770)0"),
    "first_initial_width": 7.04e-6,
    "first_final_width": width_of("rho(770)0"),
    "second_mass": mass_of("omega(782)"),
    "second_width": width_of("omega(782)"),
    "second_initial_width": 0.63e-6,
    "second_final_width": 0.0153 * width_of("omega(782)"),
    "relative_phase": 1.8,
}
"""GeV and rad; partial widths of the PDG 2024, the phase about that of e- e+ -> pi+ pi- (from memory)."""

process = Process(
    name="two-resonances",
    reaction="e- e+ -> X",
    summary="two interfering resonances of one spin in e- e+ annihilation",
    references=(inputs.PDG_RESONANCES, inputs.BREIT_WIGNER, inputs.PDG_FORMULAE, inputs.SAME_LINE),
    laws=(TotalCrossSection(cross_section),),
    parameters=TwoResonances,
    contributions={"first": "first", "second": "second", "interference": CROSS},
    example=RHO_OMEGA,
    alternatives={"rho-omega": RHO_OMEGA, "rho-omega-fixed": {**RHO_OMEGA, "width_scheme": "fixed"}},
    claims=Claims(limits=("σ = σ_1 + σ_2 + 2 √(σ_1 σ_2) cos(δ_1 − δ_2 − φ), δ the phases of the two lines",)),
    valid=Validity(text="two resonances of one spin and one final state, away from the thresholds of their decays"),
    cautions=(
        "A sum of two strong lines breaks unitarity where they overlap: trust it where one is weak or they are apart.",
        inputs.NO_THRESHOLDS,
        inputs.RADIATION,
        inputs.SAFETY,
    ),
)
