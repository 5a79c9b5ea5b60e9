"""The proton's form factors: a Dirac particle, or the dipole.

Rules of this file
------------------
- τ = Q²/4M², Q² = −t. F₁ = (G_E + τ G_M)/(1 + τ), F₂ = (G_M − G_E)/(1 + τ); the vertex is
  Γ^μ = F₁ γ^μ + i σ^{μν} q_ν F₂/2M = G_M γ^μ − F₂ (p + p')^μ/2M between spinors (Gordon).
- point: G_E = G_M = 1, so F₁ = 1 and F₂ = 0. dipole: G_E = (1 + Q²/Λ²)⁻², G_M = μ_p G_E.
"""

from __future__ import annotations

from typing import Annotated, Literal, NamedTuple

import numpy as np
import scipy
from numpy.typing import NDArray
from pydantic import Field
from scipy import constants

from barnwright.plugin import Parameters, parameter

Array = NDArray[np.float64]

Positive = Annotated[float, Field(gt=0)]


class ElasticInputs(Parameters):
    """The coupling, and what the proton is made like."""

    alpha: Positive = parameter(
        constants.fine_structure,
        meaning="electromagnetic coupling, e²/4π, at zero momentum transfer",
        source=f"CODATA through scipy.constants (scipy {scipy.__version__})",
    )
    form_factors: Literal["point", "dipole"] = parameter(
        "dipole",
        meaning="the proton: point (a Dirac particle, g = 2 exactly, no structure) or dipole (G_E = (1 + Q²/Λ²)^-2, "
        "G_M = proton_moment G_E)",
        source="choice of this process",
    )
    dipole_scale: Positive = parameter(
        0.71,
        unit="GeV^2",
        meaning="Λ² of the dipole",
        source="L. Hand, D. Miller, R. Wilson, Rev. Mod. Phys. 35 (1963) 335",
        used_with={"form_factors": ("dipole",)},
    )
    proton_moment: float = parameter(
        constants.value("proton mag. mom. to nuclear magneton ratio"),
        meaning="magnetic moment of the proton in nuclear magnetons",
        source=f"CODATA through scipy.constants (scipy {scipy.__version__})",
        used_with={"form_factors": ("dipole",)},
    )


class Sachs(NamedTuple):
    """G_E and G_M at some Q², and what differs from a point: G_E² − G_M² and G_M − G_E."""

    electric: Array | float
    magnetic: Array | float

    def mean_squared(self, tau: Array) -> Array:
        """(G_E² + τ G_M²)/(1 + τ) = F₁² + τ F₂²."""
        return np.asarray((np.square(self.electric) + tau * np.square(self.magnetic)) / (1 + tau))

    def pauli(self, tau: Array) -> Array:
        """F₂ = (G_M − G_E)/(1 + τ)."""
        return np.asarray((self.magnetic - self.electric) / (1 + tau))


def sachs(q2: Array, parameters: ElasticInputs) -> Sachs:
    """The form factors of the proton at Q² = −t in GeV²."""
    if parameters.form_factors == "point":
        return Sachs(1.0, 1.0)
    dipole = 1 / np.square(1 + q2 / parameters.dipole_scale)
    return Sachs(dipole, parameters.proton_moment * dipole)
