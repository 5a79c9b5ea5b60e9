"""Couplings of the standard model's fermions to photon, Z, W and H, read from the names of the particles.

Rules of this file
------------------
- A vertex is i g γ^μ (g_L P_L + g_R P_R) with the unit g said by each function; e > 0, Q(e−) = −1.
  Relative signs of photon and Z are those of D_μ = ∂_μ − i e Q A_μ − i g_Z (T₃ − Q sin²θ) Z_μ − i (g/√2)(T⁺W⁺ + h.c.).
  M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), eqs. 20.70–20.72.
- g = e/sin θ, g_Z = e/(sin θ cos θ).
- The couplings are the field's: an antiparticle's name gives those of its particle, since v̄ γ^μ u and ū γ^μ v have the
  same ones.
- sin²θ may be an array, or complex in the complex-mass scheme.
"""

from __future__ import annotations

from math import sqrt
from typing import Any

from barnwright.particles import ParticleData, find

_UP_TYPE, _DOWN_TYPE = (2, 4, 6), (1, 3, 5)
_MASSIVE_VECTORS = (23, 24)
_CHARGED_LEPTONS, _NEUTRINOS = (11, 13, 15), (12, 14, 16)
_ISOSPIN = dict.fromkeys(_UP_TYPE + _NEUTRINOS, 0.5) | dict.fromkeys(_DOWN_TYPE + _CHARGED_LEPTONS, -0.5)


def weak_isospin(name: str) -> float:
    """T₃ of the left-handed field, ½ or −½: ``weak_isospin("e-")`` and of ``"e+"`` are −½.

    Raises
    ------
    UnknownParticleError
        A LookupError; for a name that no particle has.
    ValueError
        For a particle that is no quark and no lepton.
    """
    return _ISOSPIN[_number(name)]


def electric_charge(name: str) -> float:
    """Q of the field in units of e: −1 for ``"e-"`` and ``"e+"``, 2/3 for ``"u"``; raises as `weak_isospin` does."""
    number = _number(name)
    if number in _CHARGED_LEPTONS + _NEUTRINOS:
        return _ISOSPIN[number] - 0.5
    return _ISOSPIN[number] + 1 / 6


def photon_coupling(name: str) -> tuple[float, float]:
    """(g_L, g_R) = (Q, Q) of a fermion to the photon, in units of e; raises as `weak_isospin` does."""
    charge = electric_charge(name)
    return charge, charge


def z_coupling(name: str, sin2_theta: Any) -> tuple[Any, Any]:
    """(g_L, g_R) = (T₃ − Q sin²θ, −Q sin²θ) of a fermion to the Z, in units of g_Z = e/(sin θ cos θ).

    Parameters
    ----------
    name : str
        A quark or a lepton.
    sin2_theta : number or array
        sin²θ_W, in whichever scheme the law declares.

    Raises
    ------
    UnknownParticleError, ValueError
        As `weak_isospin`.
    """
    right = -electric_charge(name) * sin2_theta
    return weak_isospin(name) + right, right


def w_coupling(first: str, second: str, mixing: complex = 1.0) -> tuple[complex, float]:
    """(g_L, g_R) = (V/√2, 0) of a pair of fermions to the W, in units of g = e/sin θ.

    Parameters
    ----------
    first, second : str
        The two fermions at the vertex, in any order.
    mixing : number
        V, the element of the mixing matrix of two quarks; 1 for leptons.

    Raises
    ------
    ValueError
        For two fermions that a W does not join.
    """
    numbers = sorted((_number(first), _number(second)))
    quarks = numbers[0] in _UP_TYPE + _DOWN_TYPE and numbers[1] in _UP_TYPE + _DOWN_TYPE
    same_doublet = numbers[0] in _CHARGED_LEPTONS and numbers[1] == numbers[0] + 1
    if not (same_doublet or (quarks and _ISOSPIN[numbers[0]] != _ISOSPIN[numbers[1]])):
        raise ValueError(f"fermions of a W vertex: got {first} and {second}, expected two that a W joins")
    return mixing * sqrt(0.5), 0.0


def higgs_coupling(name: str, mass: Any, vacuum_value: Any) -> Any:
    """g of a vertex with one H, in GeV^0 or GeV: −m/v of a fermion (i g), 2M²/v of W and Z (i g g^μν).

    Parameters
    ----------
    name : str
        A quark, a lepton, ``"W+"``, ``"W-"`` or ``"Z0"``.
    mass : number or array, GeV
        Of that particle.
    vacuum_value : number or array, GeV
        v = (√2 G_F)^(−1/2), as `vacuum_value` gives it.

    Raises
    ------
    UnknownParticleError, ValueError
        As `weak_isospin`.
    """
    if abs(find(name).pdg_id) in _MASSIVE_VECTORS:
        return 2 * mass * mass / vacuum_value
    _number(name)
    return -mass / vacuum_value


def vacuum_value(fermi_constant: Any) -> Any:
    """v = (√2 G_F)^(−1/2) in GeV, from G_F in GeV⁻²."""
    return (sqrt(2) * fermi_constant) ** -0.5


def from_vector_axial(vector: Any, axial: Any) -> tuple[Any, Any]:
    """(g_L, g_R) of γ^μ (g_V − g_A γ⁵)/2, the form in which effective couplings of the Z are published."""
    return (vector + axial) / 2, (vector - axial) / 2


def _number(name: str) -> int:
    found: ParticleData = find(name)
    number = abs(found.pdg_id)
    if number not in _ISOSPIN:
        raise ValueError(f"fermion: got {name!r}, expected a quark or a lepton")
    return number
