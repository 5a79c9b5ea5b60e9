"""resonances/z-hadrons: e- e+ -> X, the lineshape of the Z in pseudo-observables.

Source: ALEPH, DELPHI, L3, OPAL, SLD and the electroweak groups, Phys. Rept. 427 (2006) 257, section 1.5: with the
width running,

    σ(s) = (12π/M²) s Γ_e Γ_had / ((s − M²)² + s² Γ²/M²),   σ⁰ = σ(M²) = 12π Γ_e Γ_had/(M² Γ²).
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.amplitudes import converted_width
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
from barnwright_resonances.lineshape import flux_factor, line, root

Array = NDArray[np.float64]

LEP = {"z_mass": 91.1875, "z_width": 2.4952, "electron_width": 0.083984, "hadron_width": 1.7444}
"""GeV, Phys. Rept. 427 (2006) 257, the fit with lepton universality (from memory)."""
LEP_SOURCE = "LEP and SLD electroweak groups, Phys. Rept. 427 (2006) 257, with lepton universality"


class ZLine(Parameters):
    """The pseudo-observables of the Z in hadrons."""

    z_mass: inputs.Positive = parameter(
        mass_of("Z0"),
        unit="GeV",
        meaning=f"mass of the Z, {inputs.OWN_FORM}; the published one, the default, belongs to the running form",
        source=table_source(),
    )
    z_width: inputs.Positive = parameter(
        width_of("Z0"),
        unit="GeV",
        meaning=f"total width of the Z, {inputs.OWN_FORM}",
        source=table_source(),
    )
    electron_width: inputs.NotNegative = parameter(
        LEP["electron_width"], unit="GeV", meaning="width of the Z into e- e+", source=LEP_SOURCE
    )
    hadron_width: inputs.NotNegative = parameter(
        LEP["hadron_width"], unit="GeV", meaning="width of the Z into hadrons", source=LEP_SOURCE
    )
    width_scheme: inputs.WidthScheme = inputs.width_scheme()


def cross_section(point: Point, parameters: ZLine) -> Array:
    """σ in GeV⁻², shape (point, 1)."""
    partial = root(parameters.electron_width, parameters.hadron_width)
    amplitude = line(point, parameters.z_mass, parameters.z_width, partial, parameters.width_scheme)
    return flux_factor(point, spin=1) * np.square(np.abs(amplitude))


def _in_form(scheme: str) -> dict[str, float | str]:
    """LEP's line in another form: masses and widths of the same pole, branching fractions kept."""
    shrunk = converted_width(LEP["z_mass"], LEP["z_width"], "running", scheme)[0] / LEP["z_mass"]
    return {**{name: value * shrunk for name, value in LEP.items()}, "width_scheme": scheme}


process = Process(
    name="z-hadrons",
    reaction="e- e+ -> X",
    summary="hadrons from e- e+ through the Z: the lineshape in pseudo-observables",
    references=(
        "ALEPH, DELPHI, L3, OPAL, SLD and the LEP electroweak working groups, Phys. Rept. 427 (2006) 257, section 1.5",
        inputs.SAME_LINE,
        inputs.BREIT_WIGNER,
    ),
    laws=(TotalCrossSection(cross_section),),
    parameters=ZLine,
    masses={"e-": 0.0},
    alternatives={"lep": LEP, "lep-fixed": _in_form("fixed"), "lep-complex-mass": _in_form("complex_mass")},
    claims=Claims(
        limits=("σ(M²) = 12π Γ_e Γ_had/(M² Γ²), 41.54 nb with LEP's own widths (Phys. Rept. 427 (2006) 257)",)
    ),
    valid=Validity(
        sqrt_s=(85.0, 97.0),
        text="the Z alone with radiation taken off; photon exchange and its interference with the Z are not in it",
    ),
    cautions=(
        "Radiated photons lower a measured peak to about 0.74 of this one and move it up by about 0.1 GeV.",
        "In the fixed form the mass of the same line is 34 MeV lower than the published one: give it with the scheme.",
        inputs.SAFETY,
    ),
)
