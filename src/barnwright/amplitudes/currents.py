"""Bilinears of two spinors: vector, scalar and pseudoscalar currents with chiral couplings.

The adjoint comes first and is an adjoint already (``adjoint(u)``): ψ̄ Γ χ. Couplings are numbers or arrays that
broadcast; everything broadcasts behind the component axis.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from barnwright.amplitudes.arrays import Complex, filled


def current(left_adjoint: Complex, spinor: Complex, g_left: Any = 1.0, g_right: Any = 1.0) -> Complex:
    """ψ̄ γ^μ (g_L P_L + g_R P_R) χ, contravariant, shape (4, …), in GeV for two external spinors.

    Parameters
    ----------
    left_adjoint : array, (4, …)
        ψ̄, from `adjoint`.
    spinor : array, (4, …)
    g_left, g_right : numbers or arrays
        Couplings of the left- and right-handed fermion; both 1 give ψ̄ γ^μ χ, −1 and 1 give ψ̄ γ^μ γ⁵ χ.
    """
    a, b, c, d = left_adjoint
    one, two, three, four = spinor
    left_up, left_down = g_left * one, g_left * two
    right_up, right_down = g_right * three, g_right * four
    right = (a * right_up, b * right_down, a * right_down, b * right_up)
    left = (c * left_up, d * left_down, c * left_down, d * left_up)
    return filled(
        right[0] + right[1] + left[0] + left[1],
        right[2] + right[3] - left[2] - left[3],
        1j * (right[3] - right[2] + left[2] - left[3]),
        right[0] - right[1] - left[0] + left[1],
    )


def scalar_current(left_adjoint: Complex, spinor: Complex, g_left: Any = 1.0, g_right: Any = 1.0) -> Complex:
    """ψ̄ (g_L P_L + g_R P_R) χ, shape (…), in GeV for two external spinors; both couplings 1 give ψ̄ χ."""
    a, b, c, d = left_adjoint
    one, two, three, four = spinor
    return np.asarray(g_left * (a * one + b * two) + g_right * (c * three + d * four))


def pseudoscalar_current(left_adjoint: Complex, spinor: Complex) -> Complex:
    """ψ̄ γ⁵ χ, shape (…), in GeV for two external spinors."""
    return scalar_current(left_adjoint, spinor, -1.0, 1.0)
