"""Breit-Wigner lines: amplitudes of a resonance in a beam of given spins.

Source: PDG Review, "Cross-section formulae for specific processes" and "Resonances"; the width schemes as in D. Bardin
et al., Phys. Lett. B 206 (1988) 539.

Rules of this file
------------------
- σ = g (4π/k²) |T|², g = (2J + 1)/((2s₁ + 1)(2s₂ + 1)), k the momentum in the cm, exact in both masses.
- T = (s/M) √(Γ_i Γ_f) / (M² − s − i A): T = i √(Γ_i Γ_f)/Γ at s = M² in every scheme, its phase rises from 0 far below
  M to π far above.
- A = s Γ/M (running), M Γ (fixed, complex_mass: the squared mass is M² − i M Γ). The numerator is that of constant
  couplings, the partial widths growing with √s as those of massless particles do, in every scheme; so the running form
  with M and Γ is, but for a constant factor, the fixed form with M and Γ divided by √(1 + Γ²/M²).
- M² − s is taken as (M − √s)(M + √s): next to a narrow resonance the difference of squares loses digits.
"""

from __future__ import annotations

from math import sqrt

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Point

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]

ELECTRON_SPINS = 4
"""(2s₁ + 1)(2s₂ + 1) of an electron and a positron."""


def line(point: Point, mass: float, width: float, partial: float, scheme: str) -> Complex:
    """T of one resonance, dimensionless, shape (point, 1).

    Parameters
    ----------
    point : Point
    mass, width : float, GeV
        In the scheme's own form.
    partial : float, GeV
        √(Γ_i Γ_f), the widths into the initial and the final state.
    scheme : "running", "fixed" or "complex_mass"
    """
    above = (point.sqrt_s - mass) * (point.sqrt_s + mass)
    absorbed = point.s * (width / mass) if scheme == "running" else mass * width
    return np.asarray(point.s * (partial / mass) / (-above - 1j * absorbed))


def flux_factor(point: Point, spin: float) -> Array:
    """g (4π/k²) of an electron and a positron in GeV⁻², shape (point, 1)."""
    return np.asarray(4 * np.pi * (2 * spin + 1) / ELECTRON_SPINS / np.square(point.momentum))


def interfering(first: Complex, second: Complex, names: tuple[str, str], parts: frozenset[str]) -> Array:
    """The wanted parts of |A + B|²: |A|² and |B|² by their names, 2 Re A B* as ``first*second``.

    All of them together are the square of the sum, which loses no digits where the two cancel.
    """
    cross = "*".join(names)
    if parts >= {*names, cross}:
        return np.square(np.abs(first + second))
    terms: dict[str, Array] = {
        names[0]: np.square(np.abs(first)),
        names[1]: np.square(np.abs(second)),
        cross: 2 * np.real(first * np.conj(second)),
    }
    return np.asarray(sum(terms[part] for part in sorted(parts)))


def root(first: float, second: float) -> float:
    """√(Γ_i Γ_f) in GeV; of the roots, so that tiny widths do not underflow."""
    return sqrt(first) * sqrt(second)
