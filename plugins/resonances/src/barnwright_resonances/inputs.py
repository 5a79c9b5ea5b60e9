"""What several resonances share: kinds of numbers, the width scheme, cautions, references."""

from __future__ import annotations

from typing import Annotated, Any, Literal

from pydantic import Field

from barnwright.plugin import parameter

WidthScheme = Literal["running", "fixed", "complex_mass"]
Positive = Annotated[float, Field(gt=0)]
NotNegative = Annotated[float, Field(ge=0)]
Spin = Annotated[int, Field(ge=0)]

OWN_FORM = "in the form that width_scheme names"
"""A mass or a width is that of the scheme's own propagator; nothing is converted behind the user's back."""

BREIT_WIGNER = "G. Breit, E. Wigner, Phys. Rev. 49 (1936) 519"
PDG_FORMULAE = "PDG Review, 'Cross-section formulae for specific processes', section 'Resonances in e+ e- annihilation'"
PDG_RESONANCES = "PDG Review, 'Resonances'"
SAME_LINE = "D. Bardin, A. Leike, T. Riemann, M. Sachwitz, Phys. Lett. B 206 (1988) 539"

RADIATION = (
    "Initial-state radiation and the spread of the beams' energy are left out; they lower, widen and shift a line, and "
    "change a narrow one by large factors."
)
NO_THRESHOLDS = (
    "In the running form a width grows with s, as for decays to massless particles; near a threshold of its decays, as "
    "in rho -> pi pi, it follows other laws."
)
SAFETY = (
    "Cross sections feed shielding, dose and beam-safety estimates: this one holds at lowest order within its range of "
    "validity; work that can hurt someone follows local rules and a qualified radiation-protection expert."
)


def width_scheme() -> Any:
    """The form of the propagator; type it `WidthScheme`."""
    return parameter(
        "running",
        meaning="form of the propagator, to which the masses and widths belong: running (width grows with s), fixed "
        "(a constant one) or complex_mass (the complex pole; as a line the same as fixed)",
        source="the form that the published mass and width of the Z belong to",
    )


def spin() -> Any:
    """The spin of a resonance; type it `Spin`."""
    return parameter(1, meaning="spin J, a whole number", source="a photon makes vectors in e- e+ annihilation")
