"""qed/compton: gamma e- -> gamma e-, the electron's mass exact, from the Thomson limit to any energy.

Source: O. Klein, Y. Nishina, Z. Phys. 52 (1929) 853; |M|² in the invariant form of Peskin and Schroeder (1995),
eq. 5.87.

Rules of this file
------------------
- a = p·k and b = p·k' (p the electron before, k and k' the photons); a − b = k·k' holds exactly, so 1/a − 1/b is
  taken as −k·k'/ab and never as a difference.
- In the cm, with v = 1 − cos θ: y = b/a = 1 − z, z = v (s − m²)/2s, w = v m²/s, and
  dσ/dv = (πα²/s) [y + 1/y − 2w/y + w²/y²]. s − m² is 2√s p; y is summed from positive terms, since at high energies the
  backward photons live where y is tiny.
- The antiderivative needs −ln(1 − z), and what is left of it when its first terms are taken away. With r = z/(1 + y),
  −ln(1 − z) = 2 artanh r = 2r (1 + r² h), h = 1/3 + r²/5 + r⁴/7 + …, and every power of z that would cancel is gone.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Claims, ClosedForm, Event, Peak, Point, Process, SquaredAmplitude, Validity
from barnwright_qed.coupling import RADIATION_CAUTION, Coupling

Array = NDArray[np.float64]

SERIES_BELOW = 1 / 3
"""r above which h is taken from the logarithm, where that loses less than two digits (r = 1/3 is z = 1/2)."""
SERIES = 1 / np.arange(37, 2, -2)
"""Coefficients of h, the highest first; at r² = 1/9 the first one left away is 2e-19 of the sum."""


def squared(event: Event, parameters: Coupling) -> Array:
    """|M|², dimensionless: 2e⁴ [1 + (1 − x)² + (k·k')²/ab] with x = m² k·k'/ab."""
    before, after = event.dot("beam_b", "beam_a"), event.dot("beam_b", 1)
    product, between = before * after, event.dot("beam_a", 1)
    x = event.mass("beam_b") ** 2 * between / product
    bracket = 1 + np.square(1 - x) + np.square(between) / product
    return np.asarray(2 * (4 * np.pi * parameters.alpha) ** 2 * bracket)


def cumulative(x: Array, point: Point, parameters: Coupling) -> Array:
    """∫ dσ/dcos θ from the forward pole (cos θ = 1) to x in GeV⁻²; never positive."""
    s, mass_squared = point.s, point.mass("beam_b") ** 2
    gap = 2 * point.sqrt_s * point.momentum
    v = 1 - x
    z, w = v * gap / (2 * s), v * mass_squared / s
    y = (2 * mass_squared + gap * (1 + x)) / (2 * s)
    r = z / (1 + y)
    rest, up = _artanh_rest(r, y), 1 + r
    mean = (
        (1 + y) / 2
        + up * (1 + r * r * rest)
        - w * up * (1 + r * up * rest)
        + np.square(w * up) / 2 * ((1 + y) / (2 * y) - up * rest)
    )
    return np.asarray(-np.pi * parameters.alpha**2 / s * v * mean)


def _artanh_rest(r: Array, y: Array) -> Array:
    """(artanh(r)/r − 1)/r² = 1/3 + r²/5 + r⁴/7 + … for 0 ≤ r < 1, with y = (1 − r)/(1 + r) known to all its digits."""
    small = np.minimum(r, SERIES_BELOW)
    large = np.maximum(r, SERIES_BELOW)
    series = np.polyval(SERIES, np.square(small))
    return np.where(r < SERIES_BELOW, series, (-np.log(y) / (2 * large) - 1) / np.square(large))


process = Process(
    name="compton",
    reaction="gamma e- -> gamma e-",
    summary="scattering of a photon on a free electron, the electron's mass exact",
    references=(
        "O. Klein, Y. Nishina, Z. Phys. 52 (1929) 853",
        "M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), section 5.5",
    ),
    laws=(SquaredAmplitude(squared, massless=("gamma",)),),
    closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)", massless=("gamma",)),),
    parameters=Coupling,
    peaks=(Peak(of="u", shape="power", at="e-"),),
    claims=Claims(gauge_legs=("beam_a", 1), limits=("σ → 8πα²/3m² (Thomson) for photon energies far below m",)),
    valid=Validity(
        text="lowest order in alpha on free electrons; bound electrons scatter otherwise below about 100 keV"
    ),
    cautions=(
        "Electrons in matter are bound: incoherent scattering in a material needs its scattering function besides.",
        RADIATION_CAUTION,
    ),
)
