"""resonances/breit-wigner: e- e+ -> X, one resonance of any spin over a constant background.

Source: G. Breit, E. Wigner, Phys. Rev. 49 (1936) 519, in the relativistic form of the PDG Review, "Resonances"; the
line is that of `lineshape`. A coherent background adds √σ_b e^{iφ} to the amplitude √(4πg) T/k.
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

NAMES = ("resonance", "background")
CROSS = "resonance*background"


class BreitWigner(Parameters):
    """One resonance and what lies under it."""

    mass: inputs.Positive = parameter(unit="GeV", meaning=f"mass M, {inputs.OWN_FORM}")
    width: inputs.Positive = parameter(unit="GeV", meaning=f"total width Γ, {inputs.OWN_FORM}")
    initial_width: inputs.NotNegative = parameter(unit="GeV", meaning="width into e- e+, at s = M²")
    final_width: inputs.NotNegative = parameter(unit="GeV", meaning="width into the final state, at s = M²")
    spin: inputs.Spin = inputs.spin()
    width_scheme: inputs.WidthScheme = inputs.width_scheme()
    background: inputs.NotNegative = parameter(
        0.0, unit="GeV^-2", meaning="cross section under the line, the same at all energies", source="none assumed"
    )
    background_phase: float = parameter(
        0.0,
        unit="rad",
        meaning="phase φ of a coherent background; the resonance's own rises from 0 to π and is π/2 at M, so φ = π/2 "
        "adds to the peak; not read when coherent is false",
        source="none assumed",
    )
    coherent: bool = parameter(
        True,
        meaning="true: the amplitude gets √background e^{iφ}; false: the cross section gets background",
        source="choice of this process",
    )


def cross_section(point: Point, parameters: BreitWigner, parts: frozenset[str]) -> Array:
    """The parts of σ in GeV⁻², shape (point, 1)."""
    partial = root(parameters.initial_width, parameters.final_width)
    amplitude = line(point, parameters.mass, parameters.width, partial, parameters.width_scheme)
    resonance = np.sqrt(flux_factor(point, parameters.spin)) * amplitude
    if parameters.coherent:
        background = np.sqrt(parameters.background) * np.exp(1j * parameters.background_phase)
        return interfering(resonance, background, NAMES, parts)
    line_alone, flat = np.square(np.abs(resonance)), np.full_like(point.s, parameters.background)
    terms: dict[str, Array] = {"resonance": line_alone, "background": flat, CROSS: np.zeros_like(point.s)}
    return np.asarray(sum(terms[part] for part in sorted(parts)))


def _vector(name: str, electron_width: float, final_width: float) -> dict[str, float]:
    """A vector meson of the table; its widths into electrons and into the final state in GeV as in the PDG of 2024."""
    return {
        "mass": mass_of(name),
        "width": width_of(name),
        "initial_width": electron_width,
        "final_width": final_width,
    }


J_PSI = _vector("J/psi(1S)", 5.53e-6, 0.877 * width_of("J/psi(1S)"))

process = Process(
    name="breit-wigner",
    reaction="e- e+ -> X",
    summary="one resonance of any spin in e- e+ annihilation, over a constant background",
    references=(inputs.BREIT_WIGNER, inputs.PDG_RESONANCES, inputs.PDG_FORMULAE, inputs.SAME_LINE),
    laws=(TotalCrossSection(cross_section),),
    parameters=BreitWigner,
    contributions={"resonance": "resonance", "background": "background", "interference": CROSS},
    example=J_PSI,
    alternatives={
        "phi-to-kaons": _vector("phi(1020)", 1.27e-6, 0.491 * width_of("phi(1020)")),
        "j-psi": J_PSI,
        "psi-2s": _vector("psi(2S)", 2.33e-6, 0.9785 * width_of("psi(2S)")),
        "upsilon-1s": _vector("Upsilon(1S)", 1.34e-6, 0.926 * width_of("Upsilon(1S)")),
        "incoherent-background": {**J_PSI, "background": 6e-5, "coherent": False},
        "fixed-width": {**J_PSI, "width_scheme": "fixed"},
    },
    claims=Claims(limits=("σ = g (4π/k²) Γ_i Γ_f/Γ² at s = M², at most g 4π/k² (unitarity; Breit and Wigner 1936)",)),
    valid=Validity(
        text="one isolated resonance, within some widths of its mass and away from the thresholds of its decays"
    ),
    cautions=(
        inputs.NO_THRESHOLDS,
        "Γ_i Γ_f above Γ²/4 cannot be unless initial and final state are one: the widths are taken as they are given.",
        inputs.RADIATION,
        inputs.SAFETY,
    ),
)
