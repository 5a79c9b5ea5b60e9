"""Propagators in three width schemes, and the conversion between them."""

from __future__ import annotations

from itertools import product

import numpy as np
import pytest

from barnwright.amplitudes import (
    GAMMA,
    WIDTH_SCHEMES,
    complex_pole,
    converted_width,
    dot,
    propagator,
    vector_exchange,
)

Z_MASS, Z_WIDTH = 91.1876, 2.4952
"""GeV, of the running form. Particle Data Group, Prog. Theor. Exp. Phys. 2022, 083C01; from memory."""
Q2 = np.concatenate([-(np.geomspace(1, 1e5, 7)), [0.0], np.geomspace(1, 1e6, 30), [Z_MASS**2]])


def test_each_scheme_is_its_formula() -> None:
    """1/(q² − M² + i …): q² Γ/M for q² > 0 only, M Γ everywhere, and the complex pole."""
    mass, width = Z_MASS, Z_WIDTH
    running = 1 / (Q2 - mass**2 + 1j * np.where(Q2 > 0, Q2, 0) * width / mass)
    np.testing.assert_allclose(propagator(Q2, mass, width, "running"), running, rtol=1e-14)
    fixed = 1 / (Q2 - mass**2 + 1j * mass * width)
    np.testing.assert_allclose(propagator(Q2, mass, width, "fixed"), fixed, rtol=1e-14)
    pole = 1 / (Q2 - complex_pole(mass, width))
    np.testing.assert_allclose(propagator(Q2, mass, width, "complex_mass"), pole, rtol=1e-12)


def test_the_photon() -> None:
    """Without mass and width it is 1/q²; a stable particle's has no imaginary part in any scheme."""
    np.testing.assert_array_equal(propagator(np.array([4.0, -2.0]), 0.0), [0.25, -0.5])
    for scheme in WIDTH_SCHEMES:
        assert propagator(10.0, 2.0, 0.0, scheme) == pytest.approx(1 / 6)
        assert propagator(np.array([3.0]), 0.0, 0.0, scheme) == pytest.approx(1 / 3)


def test_the_z_is_34_mev_lighter_with_a_fixed_width() -> None:
    """M − M_f = 34.1 MeV and Γ − Γ_f = 0.93 MeV for the published Z.

    Source: D. Bardin, A. Leike, T. Riemann, M. Sachwitz, Phys. Lett. B 206 (1988) 539: M is 34 MeV above; the digits
    are Γ²/2M = 34.14 MeV less 3Γ⁴/8M³ = 0.02 MeV, and Γ³/2M² = 0.934 MeV.
    """
    mass, width = converted_width(Z_MASS, Z_WIDTH, "running", "fixed")
    assert 1e3 * (Z_MASS - mass) == pytest.approx(34.12, abs=0.005)
    assert 1e3 * (Z_WIDTH - width) == pytest.approx(0.934, abs=0.001)
    assert width / mass == pytest.approx(Z_WIDTH / Z_MASS, rel=1e-15)


def test_running_and_fixed_are_one_line() -> None:
    """For q² > 0 the running form is the fixed form of the converted mass and width over 1 + iΓ/M."""
    timelike = Q2[Q2 > 0]
    mass, width = converted_width(Z_MASS, Z_WIDTH, "running", "fixed")
    expected = propagator(timelike, mass, width, "fixed") / (1 + 1j * Z_WIDTH / Z_MASS)
    np.testing.assert_allclose(propagator(timelike, Z_MASS, Z_WIDTH, "running"), expected, rtol=1e-13)


@pytest.mark.parametrize(("one", "other"), list(product(WIDTH_SCHEMES, WIDTH_SCHEMES)))
def test_conversion_keeps_the_pole(one: str, other: str) -> None:
    """Into another scheme and back gives the same numbers, and the pole is the same in all."""
    converted = converted_width(Z_MASS, Z_WIDTH, one, other)
    assert converted_width(*converted, other, one) == pytest.approx((Z_MASS, Z_WIDTH), rel=1e-15)
    assert complex_pole(*converted, other) == pytest.approx(complex_pole(Z_MASS, Z_WIDTH, one), rel=1e-14)
    if (one == "running") == (other == "running"):
        assert converted == (Z_MASS, Z_WIDTH)


def test_the_pole_is_where_the_denominator_vanishes() -> None:
    """At s₀ the running form's s − M² + isΓ/M is 0."""
    pole = complex_pole(Z_MASS, Z_WIDTH, "running")
    assert abs(pole - Z_MASS**2 + 1j * pole * Z_WIDTH / Z_MASS) < 1e-11


def test_arrays_of_masses_and_widths() -> None:
    """Mass, width and q² broadcast against one another."""
    masses = np.array([[80.0], [91.0]])
    assert propagator(Q2, masses, 2.0, "running").shape == (2, Q2.size)
    mass, width = converted_width(masses, 2.0, "fixed", "running")
    assert mass.shape == width.shape == masses.shape


def test_unknown_schemes_are_refused() -> None:
    """The message has the nearest scheme."""
    expected = "width scheme: got 'runing', expected one of running, fixed, complex_mass; nearest: running"
    with pytest.raises(ValueError, match=expected):
        propagator(1.0, 1.0, 1.0, "runing")
    for schemes in (("?", "fixed"), ("fixed", "?")):
        with pytest.raises(ValueError, match=r"width scheme: got '\?', expected one of running, fixed, complex_mass$"):
            converted_width(1.0, 1.0, *schemes)


def test_exchange_of_a_massive_vector() -> None:
    """−J·K + (J·q)(K·q)/M² is J_μ K_ν (−g^μν + q^μ q^ν/M²)."""
    random = np.random.default_rng(1)
    first, second = (random.normal(size=(4, 5)) + 1j * random.normal(size=(4, 5)) for _ in range(2))
    momentum, mass_squared = random.normal(size=(4, 5)), 2.0 - 0.3j
    metric = np.real(GAMMA[0] @ GAMMA[0]) * np.array([1, -1, -1, -1])
    numerator = momentum[:, None] * momentum[None] / mass_squared - metric[..., None]
    lowered = [metric @ wave for wave in (first, second)]
    expected = np.einsum("m...,mn...,n...->...", lowered[0], numerator, lowered[1])
    np.testing.assert_allclose(vector_exchange(first, second, momentum, mass_squared), expected, atol=1e-13)
    assert dot(momentum, momentum).shape == (5,)
