"""Propagators of unstable particles in three width schemes, and the one conversion between them.

Rules of this file
------------------
- ``"running"``: 1/(q² − M² + i q² Γ/M) for q² > 0, no width for q² ≤ 0. The published mass and width of the Z belong to
  this form.
- ``"fixed"``: 1/(q² − M² + i M Γ).
- ``"complex_mass"``: 1/(q² − μ²) with μ² = M² − i M Γ, the complex pole; as a propagator the same as "fixed". What
  differs are the couplings, made of complex masses: cos²θ_W = μ_W²/μ_Z². A. Denner, S. Dittmaier, M. Roth and
  D. Wackeroth, Nucl. Phys. B 560 (1999) 33, from memory.
- All three have a pole at s₀ = M_f² − i M_f Γ_f. The running form is 1/(1 + iγ) · 1/(q² − s₀) with γ = Γ/M,
  M_f = M/√(1 + γ²) and Γ_f = Γ/√(1 + γ²): for the Z 34 MeV below M. D. Bardin, A. Leike, T. Riemann, M. Sachwitz,
  Phys. Lett. B 206 (1988) 539.
"""

from __future__ import annotations

from typing import Any, Literal, get_args

import numpy as np

from barnwright.amplitudes.arrays import Complex
from barnwright.amplitudes.dirac import Vector, dot
from barnwright.errors import nearest

WidthScheme = Literal["running", "fixed", "complex_mass"]
WIDTH_SCHEMES: tuple[str, ...] = get_args(WidthScheme)


def propagator(q2: Any, mass: Any, width: Any = 0.0, scheme: str = "fixed", energy: Any = None) -> Complex:
    """The scalar part of a propagator, 1/(q² − M² + i …) in GeV⁻², complex; the shape of the arguments together.

    Parameters
    ----------
    q2 : number or array, GeV²
        Squared momentum, negative for a transfer.
    mass, width : numbers or arrays, GeV
        In the scheme's own form; `converted_width` changes it.
    scheme : "running", "fixed" or "complex_mass"
    energy : number or array, GeV, optional
        √q² where that is what is known: close to the mass q² − M² then keeps its digits, as (√q² − M)(√q² + M).

    Raises
    ------
    ValueError
        For an unknown scheme.
    """
    _check(scheme)
    imaginary = np.maximum(q2, 0.0) * (width / mass) if scheme == "running" and np.any(width) else mass * width
    real = q2 - mass * mass if energy is None else (energy - mass) * (energy + mass)
    return np.asarray(1 / (real + 1j * imaginary))


def converted_width(mass: Any, width: Any, from_scheme: str, to_scheme: str) -> tuple[Any, Any]:
    """Mass and width in GeV of the same pole in another scheme.

    Γ/M stays; from "running" to "fixed" both shrink by √(1 + Γ²/M²). The normalisation changes too:
    propagator(running) = propagator(fixed)/(1 + iΓ/M). "fixed" and "complex_mass" share mass and width.

    Raises
    ------
    ValueError
        For an unknown scheme.
    """
    _check(from_scheme)
    _check(to_scheme)
    power = (to_scheme == "running") - (from_scheme == "running")
    factor = np.hypot(1.0, width / mass) ** power
    return mass * factor, width * factor


def complex_pole(mass: Any, width: Any, scheme: str = "complex_mass") -> Any:
    """The pole s₀ = μ² = M_f² − i M_f Γ_f of a propagator in GeV², complex, with M_f and Γ_f in the "fixed" form."""
    own_mass, own_width = converted_width(mass, width, scheme, "complex_mass")
    return own_mass * (own_mass - 1j * own_width)


def vector_exchange(first: Complex, second: Complex, momentum: Vector, mass_squared: Any) -> Complex:
    """J_μ (−g^{μν} + q^μ q^ν/M²) K_ν, shape (…): what stands over `propagator` for a massive vector boson.

    Parameters
    ----------
    first, second : arrays, (4, …)
        The currents J and K, contravariant.
    momentum : FourVector, or array of shape (4, …), GeV
        q; its sign does not matter.
    mass_squared : number or array, GeV²
        M², or μ² from `complex_pole`. Between conserved currents the second term vanishes and ``-dot(J, K)`` is enough.
    """
    return np.asarray(dot(first, momentum) * dot(second, momentum) / mass_squared - dot(first, second))


def _check(scheme: str) -> None:
    if scheme not in WIDTH_SCHEMES:
        near = nearest(str(scheme), WIDTH_SCHEMES)
        hint = "" if near is None else f"; nearest: {near}"
        raise ValueError(f"width scheme: got {scheme!r}, expected one of {', '.join(WIDTH_SCHEMES)}{hint}")
