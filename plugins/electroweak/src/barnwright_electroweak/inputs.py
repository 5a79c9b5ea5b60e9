"""The electroweak inputs: which numbers are given, and what the vertices make of them.

Rules of this file
------------------
- A parameter is spelled, explained and defaulted once, by a function here; processes take the ones they read. A scheme
  decides which of them are read, and a request that sets another one is refused.
- A fermion couples to the photon with e Q, and to the Z with g_Z (T₃ P_L − Q sin²θ_W), g_Z = e/(sin θ_W cos θ_W) at
  lowest order. Source: PDG Review 2024, "Electroweak model and constraints on new physics", section 10.1 (from memory).
- `alpha`:    e² = 4πα, g_Z² = 4πα/(sin²θ_W cos²θ_W).
- `fermi`:    e² = 4πα, g_Z² = 4√2 G_F M_Z²: the lowest-order relation at the scale of the Z.
- `on_shell`: sin²θ_W = 1 − M_W²/M_Z², α = √2 G_F M_W² sin²θ_W/π; then both forms of g_Z² are one.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import pi, sqrt
from typing import Annotated, Any, Literal

import scipy
from pydantic import Field, ValidationInfo, field_validator
from pydantic_core import PydanticCustomError
from scipy import constants

from barnwright.plugin import (
    Parameters,
    mass_of,
    parameter,
    table_source,
    width_of,
)

Scheme = Literal["alpha", "fermi", "on_shell"]
WidthScheme = Literal["running", "fixed", "complex_mass"]
Positive = Annotated[float, Field(gt=0)]
NotNegative = Annotated[float, Field(ge=0)]
Fraction = Annotated[float, Field(gt=0, lt=1)]

UsedWith = dict[str, tuple[Any, ...]] | None


def scheme(default: Scheme, *, photons: bool = True) -> Any:
    """Which electroweak numbers are inputs; type it `Scheme`. Without ``photons`` the fermi scheme reads no alpha."""
    beside = "; alpha for photons only" if photons else ""
    return parameter(
        default,
        meaning=f"inputs: alpha (alpha, sin2_theta_w, z_mass), fermi (fermi_constant, sin2_theta_w, z_mass{beside}) "
        "or on_shell (fermi_constant, w_mass, z_mass)",
        source="choice of this process",
    )


def alpha(used_with: UsedWith = None) -> Any:
    """The electromagnetic coupling near the Z; type it `Positive`."""
    return parameter(
        1 / 128,
        meaning="electromagnetic coupling, e²/4π, at the scale of the Z",
        source="common practice: the running coupling at M_Z is close to 1/128",
        used_with=used_with,
    )


def sin2_theta_w(used_with: UsedWith = None) -> Any:
    """The effective leptonic mixing angle; type it `Fraction`."""
    return parameter(
        0.2312,
        meaning="sine squared of the weak mixing angle, the effective leptonic one",
        source="measured at the Z: LEP and SLD electroweak groups, Phys. Rept. 427 (2006) 257, rounded",
        used_with=used_with,
    )


def fermi_constant(used_with: UsedWith = None) -> Any:
    """Fermi's constant in natural units; type it `Positive`."""
    return parameter(
        constants.value("Fermi coupling constant"),
        unit="GeV^-2",
        meaning="Fermi's constant G_F",
        source=f"CODATA through scipy.constants (scipy {scipy.__version__})",
        used_with=used_with,
    )


def z_mass(used_with: UsedWith = None) -> Any:
    """The mass of the Z; type it `Positive`."""
    meaning = "mass of the Z, in the form that width_scheme names; the published one belongs to the running form"
    return parameter(mass_of("Z0"), unit="GeV", meaning=meaning, source=table_source(), used_with=used_with)


def z_width(used_with: UsedWith = None) -> Any:
    """The width of the Z; type it `NotNegative`."""
    meaning = "total width of the Z, in the form that width_scheme names; the published one belongs to the running form"
    return parameter(width_of("Z0"), unit="GeV", meaning=meaning, source=table_source(), used_with=used_with)


def w_mass(used_with: UsedWith = None) -> Any:
    """The mass of the W; type it `Positive`."""
    meaning = "mass of the W, in the same form as z_mass"
    return parameter(mass_of("W+"), unit="GeV", meaning=meaning, source=table_source(), used_with=used_with)


def width_scheme(used_with: UsedWith = None) -> Any:
    """The form of the Z's propagator; type it `WidthScheme`."""
    return parameter(
        "running",
        meaning="form of the Z's propagator, to which its mass and width belong: running (width grows with s, none "
        "below 0), fixed (a constant one) or complex_mass (the complex pole; couplings stay real: the same line)",
        source="the form that the published mass and width of the Z belong to",
        used_with=used_with,
    )


def charm_mass() -> Any:
    """The kinematic mass of the charm quark; type it `NotNegative`."""
    meaning = "kinematic mass of the charm quark; the default is the running mass at itself"
    return parameter(mass_of("c"), unit="GeV", meaning=meaning, source=table_source())


def bottom_mass() -> Any:
    """The kinematic mass of the bottom quark; type it `NotNegative`."""
    meaning = "kinematic mass of the bottom quark; the default is the running mass at itself"
    return parameter(mass_of("b"), unit="GeV", meaning=meaning, source=table_source())


class ElectroweakInputs(Parameters):
    """Photon and Z: three of the numbers by scheme, and the line of the Z."""

    scheme: Scheme = scheme("alpha")
    alpha: Positive = alpha({"scheme": ("alpha", "fermi")})
    sin2_theta_w: Fraction = sin2_theta_w({"scheme": ("alpha", "fermi")})
    fermi_constant: Positive = fermi_constant({"scheme": ("fermi", "on_shell")})
    z_mass: Positive = z_mass()
    z_width: NotNegative = z_width()
    width_scheme: WidthScheme = width_scheme()
    w_mass: Positive = w_mass({"scheme": ("on_shell",)})

    @field_validator("w_mass")
    @classmethod
    def _lighter_than_the_z(cls, value: float, known: ValidationInfo) -> float:
        """On shell the masses give the mixing angle, so their order is not free."""
        heavier = known.data.get("z_mass")
        if known.data.get("scheme") == "on_shell" and heavier is not None and value >= heavier:
            raise PydanticCustomError(
                "mass_order",
                "a mass below z_mass ({z_mass} GeV), since sin2_theta_w = 1 - w_mass²/z_mass²",
                {"z_mass": heavier},
            )
        return value


@dataclass(frozen=True, slots=True)
class Couplings:
    """What vertices are made of: e², g_Z² and sin²θ_W, all dimensionless."""

    electric: float
    neutral: float
    sin2: float

    def left(self, charge: float, isospin: float) -> float:
        """The coupling of a left-handed fermion to the Z in units of g_Z: T₃ − Q sin²θ_W."""
        return isospin - charge * self.sin2

    def right(self, charge: float) -> float:
        """The coupling of a right-handed fermion to the Z in units of g_Z: −Q sin²θ_W."""
        return -charge * self.sin2


def couplings(given: ElectroweakInputs) -> Couplings:
    """The couplings that the scheme makes of the inputs."""
    if given.scheme == "on_shell":
        ratio = given.w_mass / given.z_mass
        sin2 = (1 - ratio) * (1 + ratio)
        electric = 4 * sqrt(2) * given.fermi_constant * given.w_mass**2 * sin2
        return Couplings(electric, electric / (sin2 * (1 - sin2)), sin2)
    electric = 4 * pi * given.alpha
    if given.scheme == "fermi":
        return Couplings(electric, 4 * sqrt(2) * given.fermi_constant * given.z_mass**2, given.sin2_theta_w)
    return Couplings(electric, electric / (given.sin2_theta_w * (1 - given.sin2_theta_w)), given.sin2_theta_w)
