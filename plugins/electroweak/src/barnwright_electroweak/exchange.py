"""One photon or one Z between two fermion lines: how strong each pair of chiralities is.

Rules of this file
------------------
- Between a line of chirality τ and one of chirality ρ, M = G_τρ [ψ̄γ^μ P_τ ψ][χ̄γ_μ P_ρ χ] with
  G_τρ = e²QQ'/q² + g_Z² g_τ g'_ρ P(q²), P the Z's propagator. Source: PDG Review 2024, section 10 (from memory).
- What depends on the particles alone is a plain number, worked out first: the arrays that follow are few.
- A product Re G G* has three parts, which can be switched off: photon, Z, and their interference.
"""

from __future__ import annotations

from collections.abc import Iterable
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.amplitudes import propagator
from barnwright_electroweak.inputs import ElectroweakInputs, couplings

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]
Parts = frozenset[str]
Chiralities = tuple[int, int]

PHOTON, Z, INTERFERENCE = "photon", "z", "photon*z"
CONTRIBUTIONS = {"photon": PHOTON, "z": Z, "interference": INTERFERENCE}
EVERYTHING: Parts = frozenset(CONTRIBUTIONS.values())
LL, LR, RL, RR = (-1, -1), (-1, 1), (1, -1), (1, 1)
"""Chiralities of the first and the second line, −1 left and 1 right."""


class Fermion(NamedTuple):
    """Charge in units of e, T₃ of the left-handed field, and how many colours."""

    charge: float
    isospin: float
    colours: int = 1


ELECTRON = Fermion(-1.0, -0.5)


class Strengths(NamedTuple):
    """e²QQ', and g_Z² g g' by chirality."""

    photon: float
    z: dict[Chiralities, float]

    def parity(self, axial: int, other_axial: int) -> float:
        """g_Z² times the couplings of both lines, each to γ^μ (0) or to γ^μγ⁵ (1)."""
        signs = {(tau, rho): (tau if axial else 1) * (rho if other_axial else 1) for tau, rho in self.z}
        return sum(signs[chiralities] * strength for chiralities, strength in self.z.items()) / 4


class Rates(NamedTuple):
    """1/q⁴, Re P/q² and |P|² in GeV⁻⁴, each 0 where its part is switched off."""

    photon: Array | float
    mixed: Array | float
    z: Array | float


def strengths(first: Fermion, second: Fermion, parameters: ElectroweakInputs) -> Strengths:
    """What the vertices contribute."""
    known = couplings(parameters)
    one, other = ({-1: known.left(*line[:2]), 1: known.right(line.charge)} for line in (first, second))
    z = {(tau, rho): known.neutral * one[tau] * other[rho] for tau, rho in (LL, LR, RL, RR)}
    return Strengths(known.electric * first.charge * second.charge, z)


def z_propagator(q2: Array | float, parameters: ElectroweakInputs, energy: Array | None = None) -> Complex:
    """P(q²) in GeV⁻², ``energy`` √q² where it is known; mass and width are of the form that `width_scheme` names."""
    return propagator(q2, parameters.z_mass, parameters.z_width, parameters.width_scheme, energy)


def rates(photon: Array, z: Complex, parts: Parts) -> Rates:
    """The products of the two propagators, or of sums of propagators."""
    return Rates(
        np.square(photon) if PHOTON in parts else 0.0,
        photon * z.real if INTERFERENCE in parts else 0.0,
        np.square(z.real) + np.square(z.imag) if Z in parts else 0.0,
    )


def products(known: Strengths, pairs: Iterable[tuple[Chiralities, Chiralities]], at: Rates) -> Array:
    """Σ Re G_i G_j* over pairs of chiralities, in GeV⁻⁴."""
    listed = [(known.z[one], known.z[other]) for one, other in pairs]
    mixed = known.photon * sum(one + other for one, other in listed)
    z = sum(one * other for one, other in listed)
    return np.asarray(len(listed) * known.photon**2 * at.photon + mixed * at.mixed + z * at.z)


def amplitudes(known: Strengths, photon: Array, z: Complex, parts: Parts) -> dict[Chiralities, Complex]:
    """G by chirality in GeV⁻², from the two propagators and those of `photon` and `z` that are wanted."""
    charged = known.photon * photon if PHOTON in parts else np.zeros(1)
    neutral = z if Z in parts else np.zeros(1, dtype=complex)
    return {chiralities: charged + strength * neutral for chiralities, strength in known.z.items()}
