"""Dirac matrices, slashed vectors, products and currents against their definitions with explicit matrices."""

from __future__ import annotations

import numpy as np
import pytest
from unit.amplitudes.momenta import ALL, MASSIVE, everywhere, heading, times

from barnwright.amplitudes import (
    GAMMA,
    GAMMA5,
    P_LEFT,
    P_RIGHT,
    adjoint,
    apply_slash,
    current,
    dot,
    polarisation_vector,
    pseudoscalar_current,
    scalar_current,
    slash,
    spinor_u,
    spinor_v,
)
from barnwright.amplitudes.arrays import Complex

METRIC = np.diag([1, -1, -1, -1])


def complex_components(seed: int) -> Complex:
    """Twenty complex vectors, or spinors."""
    random = np.random.default_rng(seed)
    return np.asarray(random.normal(size=(4, 20)) + 1j * random.normal(size=(4, 20)))


def test_clifford_algebra() -> None:
    """{γ^μ, γ^ν} = 2g^μν, γ⁵ = iγ⁰γ¹γ²γ³, the projectors project; nobody can write into them."""
    for mu in range(4):
        for nu in range(4):
            anticommutator = GAMMA[mu] @ GAMMA[nu] + GAMMA[nu] @ GAMMA[mu]
            np.testing.assert_array_equal(anticommutator, 2 * METRIC[mu, nu] * np.eye(4))
    np.testing.assert_array_equal(1j * GAMMA[0] @ GAMMA[1] @ GAMMA[2] @ GAMMA[3], GAMMA5)
    np.testing.assert_array_equal(P_LEFT, (np.eye(4) - GAMMA5) / 2)
    np.testing.assert_array_equal(P_RIGHT, (np.eye(4) + GAMMA5) / 2)
    assert not any(matrix.flags.writeable for matrix in (GAMMA, GAMMA5, P_LEFT, P_RIGHT))


def test_slash_is_the_sum_over_matrices() -> None:
    """a̸ = Σ γ^μ g_μμ a^μ for complex vectors, as matrices and on spinors."""
    vector, spinor = complex_components(1), complex_components(2)
    expected = np.einsum("mij,mn,n...->ij...", GAMMA, METRIC, vector)
    np.testing.assert_allclose(slash(vector), expected, atol=1e-15)
    np.testing.assert_allclose(apply_slash(vector, spinor), times(expected, spinor), atol=1e-14)


@pytest.mark.parametrize("name", ALL)
def test_a_four_vector_is_slashed_as_its_components(name: str) -> None:
    """A FourVector and its components give the same matrix, within the rounding of the components."""
    vector = ALL[name]
    np.testing.assert_allclose(slash(vector), slash(vector.components()), atol=4e-16 * float(np.max(vector.energy)))
    spinor = spinor_u(vector, 1)
    np.testing.assert_allclose(apply_slash(vector, spinor), times(slash(vector), spinor), rtol=1e-12, atol=1e-15)


def test_a_four_vector_keeps_its_small_component() -> None:
    """At m/E = 1e-12 along +z, the entry E − pz = m²/(E + pz) of p̸ has all its digits."""
    assert slash(heading(1.0, 0.0, 1.0, 0.0, 1e-12))[0, 2] == pytest.approx(5e-25, rel=1e-15, abs=0)


def test_dot() -> None:
    """a·b with the metric (+, −, −, −) and no conjugation, for components and for FourVectors."""
    first, second = complex_components(3), complex_components(4)
    expected = np.einsum("m...,mn,n...->...", first, METRIC, second)
    np.testing.assert_allclose(dot(first, second), expected, atol=1e-14)
    p, q = everywhere(1.3, 0.9), everywhere(2.0, 0.1)
    np.testing.assert_allclose(dot(p, second), dot(p.components(), second), atol=1e-14)
    np.testing.assert_allclose(dot(first, p), dot(first, p.components()), atol=1e-14)
    np.testing.assert_allclose(dot(p, q), dot(p.components(), q.components()), rtol=1e-14)
    assert not np.any(np.imag(dot(p, q)))


def test_current_is_the_sandwich() -> None:
    """ψ̄ γ^μ (g_L P_L + g_R P_R) χ, also with couplings that differ from event to event."""
    adjoint_of, spinor = complex_components(5), complex_components(6)
    left, right = complex_components(7)[:2]
    for g_left, g_right in ((1.0, 1.0), (0.3, -0.8), (left, right)):
        chiral = g_left * times(P_LEFT, spinor) + g_right * times(P_RIGHT, spinor)
        expected = np.einsum("i...,mij,j...->m...", adjoint_of, GAMMA, chiral)
        np.testing.assert_allclose(current(adjoint_of, spinor, g_left, g_right), expected, atol=1e-13)
        expected = np.einsum("i...,i...->...", adjoint_of, chiral)
        np.testing.assert_allclose(scalar_current(adjoint_of, spinor, g_left, g_right), expected, atol=1e-13)
    expected = np.einsum("i...,ij,j...->...", adjoint_of, GAMMA5, spinor)
    np.testing.assert_allclose(pseudoscalar_current(adjoint_of, spinor), expected, atol=1e-13)
    axial = np.einsum("i...,mij,jk,k...->m...", adjoint_of, GAMMA, GAMMA5, spinor)
    np.testing.assert_allclose(current(adjoint_of, spinor, -1, 1), axial, atol=1e-13)


def test_adjoint() -> None:
    """ψ̄ = ψ†γ⁰."""
    spinor = complex_components(8)
    np.testing.assert_array_equal(adjoint(spinor), np.einsum("i...,ij->j...", np.conj(spinor), GAMMA[0]))


def test_vector_current_is_conserved() -> None:
    """q_μ ū(p') γ^μ u(p) = 0 for equal masses; the axial current gives 2m ū γ⁵ u."""
    before, after = MASSIVE["ordinary"], everywhere(2.7, 0.9)
    for helicity in (-1, 1):
        u, bar = spinor_u(before, 1), adjoint(spinor_u(after, helicity))
        vector, axial = current(bar, u), current(bar, u, -1, 1)
        np.testing.assert_allclose(dot(after, vector) - dot(before, vector), 0, atol=1e-14)
        divergence = dot(after, axial) - dot(before, axial)
        np.testing.assert_allclose(divergence, 2 * 0.9 * pseudoscalar_current(bar, u), atol=2e-14)


def test_gordon_identity() -> None:
    """2m ū γ^μ u = ū [(p + p')^μ + iσ^{μν}q_ν] u, with q = p' − p and iσ^{μν}q_ν = −[γ^μ, q̸]/2."""
    before, after = MASSIVE["ordinary"], everywhere(2.7, 0.9)
    u, bar = spinor_u(before, -1), adjoint(spinor_u(after, 1))
    total, change = after.components() + before.components(), after.components() - before.components()
    sigma = -0.5 * (
        np.einsum("mij,jk...->mik...", GAMMA, slash(change)) - np.einsum("ij...,mjk->mik...", slash(change), GAMMA)
    )
    spin = np.einsum("i...,mij...,j...->m...", bar, sigma, u)
    np.testing.assert_allclose(2 * 0.9 * current(bar, u), total * scalar_current(bar, u) + spin, atol=4e-14)


def test_fierz_identity() -> None:
    """Massless: [ū₁γ^μP_L u₂][ū₃γ_μP_L u₄] = −[ū₁γ^μP_L u₄][ū₃γ_μP_L u₂] for commuting spinors."""
    p = [everywhere(size, 0.0) for size in (1.0, 1.5, 0.7, 2.0)]
    bars = [adjoint(spinor_u(one, -1)) for one in (p[0], p[2])]
    spinors = [spinor_u(p[1], -1), spinor_v(p[3], 1)]
    direct = dot(current(bars[0], spinors[0], 1, 0), current(bars[1], spinors[1], 1, 0))
    crossed = dot(current(bars[0], spinors[1], 1, 0), current(bars[1], spinors[0], 1, 0))
    np.testing.assert_allclose(direct, -crossed, atol=1e-13)


def test_polarisation_on_a_spinor() -> None:
    """ε̸ ε̸* + ε̸* ε̸ = 2 ε·ε* = −2 on any spinor."""
    wave, spinor = polarisation_vector(everywhere(1.0, 0.0), 1), complex_components(9)
    both = apply_slash(wave, apply_slash(np.conj(wave), spinor)) + apply_slash(np.conj(wave), apply_slash(wave, spinor))
    np.testing.assert_allclose(both, -2 * spinor, atol=1e-14)
