"""Spinors against what defines them: the Dirac equation, their norm, their sums and their helicity."""

from __future__ import annotations

import numpy as np
import pytest
from unit.amplitudes.momenta import ALL, MASSIVE, MASSLESS, everywhere, heading, outer, times

from barnwright.amplitudes import (
    GAMMA,
    P_LEFT,
    P_RIGHT,
    adjoint,
    apply_slash,
    current,
    scalar_current,
    slash,
    spinor_u,
    spinor_v,
)
from barnwright.kinematics import FourVector

HELICITIES = (-1, 1)


def scale(vector: FourVector) -> float:
    """The largest energy of a batch in GeV."""
    return float(np.max(vector.energy))


@pytest.mark.parametrize("name", ALL)
def test_completeness(name: str) -> None:
    """Σ u ū = p̸ + m and Σ v v̄ = p̸ − m, each entry to its own digits where m ≪ E and beside the axis."""
    vector = ALL[name]
    mass = vector.mass * np.eye(4).reshape(4, 4, *(1,) * vector.plus.ndim)
    tiny = 8 * np.finfo(float).eps * float(np.max(vector.mass))
    for spinor, sign in ((spinor_u, 1), (spinor_v, -1)):
        total = sum(outer(spinor(vector, h), adjoint(spinor(vector, h))) for h in HELICITIES)
        np.testing.assert_allclose(total, slash(vector) + sign * mass, rtol=1e-14, atol=tiny)


@pytest.mark.parametrize("name", ALL)
@pytest.mark.parametrize("helicity", HELICITIES)
def test_dirac_equation(name: str, helicity: int) -> None:
    """(p̸ − m) u = 0 and (p̸ + m) v = 0."""
    vector = ALL[name]
    u, v = spinor_u(vector, helicity), spinor_v(vector, helicity)
    size = 1e-15 * scale(vector) ** 1.5
    np.testing.assert_allclose(apply_slash(vector, u), vector.mass * u, rtol=0, atol=4 * size)
    np.testing.assert_allclose(apply_slash(vector, v), -vector.mass * v, rtol=0, atol=4 * size)


@pytest.mark.parametrize("name", ALL)
def test_norms(name: str) -> None:
    """ū u = 2m, v̄ v = −2m to a relative 1e-14; ū γ^μ u = v̄ γ^μ v = 2p^μ; other helicities and ū v give 0."""
    vector = ALL[name]
    expected = 2 * vector.components()
    for helicity in HELICITIES:
        u, v = spinor_u(vector, helicity), spinor_v(vector, helicity)
        np.testing.assert_allclose(scalar_current(adjoint(u), u), 2 * vector.mass, rtol=1e-14)
        np.testing.assert_allclose(scalar_current(adjoint(v), v), -2 * vector.mass, rtol=1e-14)
        for spinor in (u, v):
            np.testing.assert_allclose(current(adjoint(spinor), spinor), expected, atol=4e-15 * scale(vector))
        for other in (spinor_u(vector, -helicity), spinor_v(vector, helicity), spinor_v(vector, -helicity)):
            np.testing.assert_allclose(scalar_current(adjoint(u), other), 0, atol=4e-15 * scale(vector))


@pytest.mark.parametrize("helicity", HELICITIES)
def test_helicity_is_that_of_the_particle(helicity: int) -> None:
    """Σ·p̂ u = h u, and −h v for the antiparticle; Σ = γ⁵γ⁰γ."""
    vector = MASSIVE["ordinary"]
    spin = np.stack([np.kron(np.eye(2), pauli) for pauli in GAMMA[1:, :2, 2:]])
    towards = vector.components()[1:] / vector.momentum
    operator = np.sum(spin[..., None] * towards[:, None, None], axis=0)
    u, v = spinor_u(vector, helicity), spinor_v(vector, helicity)
    np.testing.assert_allclose(times(operator, u), helicity * u, atol=1e-15)
    np.testing.assert_allclose(times(operator, v), -helicity * v, atol=1e-15)


@pytest.mark.parametrize("name", ALL)
@pytest.mark.parametrize("helicity", HELICITIES)
def test_antiparticles_are_conjugates(name: str, helicity: int) -> None:
    """The spinor v is iγ²u*, to the bit."""
    u, v = spinor_u(ALL[name], helicity), spinor_v(ALL[name], helicity)
    np.testing.assert_array_equal(v, times(1j * GAMMA[2], np.conj(u)))


@pytest.mark.parametrize("name", MASSLESS)
@pytest.mark.parametrize("helicity", HELICITIES)
def test_massless_spinors_are_chiral(name: str, helicity: int) -> None:
    """Without mass a left-handed particle and a right-handed antiparticle have left components only, exactly."""
    chiral, other = (P_RIGHT, P_LEFT) if helicity > 0 else (P_LEFT, P_RIGHT)
    assert not np.any(times(other, spinor_u(MASSLESS[name], helicity)))
    assert not np.any(times(chiral, spinor_v(MASSLESS[name], helicity)))


def test_the_wrong_chirality_of_a_light_particle_keeps_its_digits() -> None:
    """At m/E = 1e-12 the suppressed components are m/√(E + p), to a relative 1e-15."""
    u = spinor_u(heading(1.0, 0.0, 1.0, 0.0, 1e-12), 1)
    np.testing.assert_allclose(u, [1e-12 / np.sqrt(2), 0, np.sqrt(2), 0], rtol=1e-15)


def test_the_axis() -> None:
    """Along +z the azimuth drops out, along −z it is the vector's: u₊ has (0, e^{iφ}) there."""
    for phi in (0.0, 0.7):
        root = np.sqrt(2.0)
        np.testing.assert_allclose(spinor_u(heading(1.0, 0.0, 1.0, phi, 0.0), 1), [0, 0, root, 0], atol=0)
        backward = spinor_u(heading(1.0, 1.0, 0.0, phi, 0.0), 1)
        np.testing.assert_allclose(backward, [0, 0, 0, root * np.exp(1j * phi)], rtol=1e-15, atol=0)


def test_at_rest_the_spin_is_along_z() -> None:
    """At rest u₊ is √m (1, 0, 1, 0) and u₋ is √m (0, 1, 0, 1), also where pz is a negative zero."""
    root = np.sqrt(0.9)
    for helicity, expected in ((1, [root, 0, root, 0]), (-1, [0, root, 0, root])):
        u = spinor_u(MASSIVE["rest"], helicity)
        np.testing.assert_allclose(u, np.stack([expected, expected], axis=1), rtol=1e-15, atol=0)


def test_shapes_broadcast() -> None:
    """A vector of shapes (point, 1) and (node,) gives (4, point, node)."""
    vector = heading(np.ones((3, 1)), np.full(5, 0.6), np.full(5, 0.8), 0.1, 0.2)
    assert spinor_u(vector, 1).shape == (4, 3, 5)
    assert spinor_v(vector, -1).dtype == np.complex128


@pytest.mark.parametrize("helicity", [0, 2, 0.5])
def test_other_helicities_are_refused(helicity: int) -> None:
    """A fermion has helicities −1 and +1, written as twice their value."""
    expected = rf"helicity: got {helicity}, expected -1 or 1 \(twice the helicity of a fermion\)"
    with pytest.raises(ValueError, match=expected):
        spinor_u(everywhere(1.0, 1.0), helicity)
    with pytest.raises(ValueError, match=expected):
        spinor_v(everywhere(1.0, 1.0), helicity)
