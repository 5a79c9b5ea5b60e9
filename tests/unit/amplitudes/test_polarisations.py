"""Polarisation vectors against what defines them: transversality, norm and sums."""

from __future__ import annotations

import numpy as np
import pytest
from unit.amplitudes.momenta import ALL, MASSIVE, MASSLESS, along_the_axis, everywhere, outer

from barnwright.amplitudes import dot, polarisation_vector
from barnwright.amplitudes.arrays import Array
from barnwright.kinematics import FourVector

METRIC = np.diag([1.0, -1.0, -1.0, -1.0])
HEAVY = [name for name in MASSIVE if not name.startswith("light")]


def spread(matrix: Array, vector: FourVector) -> Array:
    """A constant matrix with the axes of a batch."""
    return matrix.reshape(4, 4, *(1,) * vector.plus.ndim)


@pytest.mark.parametrize("name", ALL)
@pytest.mark.parametrize("helicity", [-1, 1])
def test_transverse(name: str, helicity: int) -> None:
    """k·ε = 0, ε⁰ = 0, ε·ε* = −1, ε(+)·ε(−)* = 0 and ε(−h) = −ε(h)*, along ±z and at rest too."""
    vector = ALL[name]
    wave, other = polarisation_vector(vector, helicity), polarisation_vector(vector, -helicity)
    np.testing.assert_allclose(dot(vector, wave) / np.max(vector.energy), 0, atol=4e-16)
    np.testing.assert_allclose(dot(wave, np.conj(wave)), -1, rtol=1e-15)
    np.testing.assert_allclose(dot(wave, np.conj(other)), 0, atol=1e-15)
    np.testing.assert_array_equal(other, -np.conj(wave))
    assert not np.any(wave[0])


@pytest.mark.parametrize("name", HEAVY)
def test_massive_sum(name: str) -> None:
    """Σ ε^μ ε^ν* over three helicities is −g^μν + k^μ k^ν/M²."""
    vector = MASSIVE[name]
    total = sum(outer(wave, np.conj(wave)) for wave in (polarisation_vector(vector, h) for h in (-1, 0, 1)))
    momentum = vector.components()
    expected = outer(momentum, momentum) / vector.mass**2 - spread(METRIC, vector)
    np.testing.assert_allclose(total, expected, atol=8e-15)


@pytest.mark.parametrize("name", MASSLESS)
def test_massless_sum(name: str) -> None:
    """Over two helicities it is −g^μν + (k^μ n^ν + n^μ k^ν)/k·n with n the momentum of the opposite direction."""
    vector = MASSLESS[name]
    total = sum(outer(wave, np.conj(wave)) for wave in (polarisation_vector(vector, h) for h in (-1, 1)))
    k = vector.components()
    n = k * np.array([1, -1, -1, -1])[:, None]
    expected = (outer(k, n) + outer(n, k)) / dot(k, n) - spread(METRIC, vector)
    np.testing.assert_allclose(total, expected, atol=1e-15)


@pytest.mark.parametrize("name", HEAVY)
def test_longitudinal(name: str) -> None:
    """ε(0) is real, k·ε = 0, ε·ε = −1; at rest it is (0, 0, 0, 1)."""
    vector = MASSIVE[name]
    wave = polarisation_vector(vector, 0)
    assert not np.any(wave.imag)
    np.testing.assert_allclose(dot(vector, wave), 0, atol=4e-15)
    np.testing.assert_allclose(dot(wave, wave), -1, rtol=1e-14)
    rest = polarisation_vector(MASSIVE["rest"], 0)
    np.testing.assert_array_equal(rest, np.array([[0, 0, 0, 1]] * 2).T)


def test_along_z() -> None:
    """Along +z ε(±) is (0, ∓1, −i, 0)/√2; along −z, at azimuth φ, the same turned by π, and the phases are e^{±iφ}."""
    plus = polarisation_vector(along_the_axis(1.0, 0.0), 1)
    np.testing.assert_allclose(plus[:, 0] * np.sqrt(2), [0, -1, -1j, 0], rtol=1e-15)
    turned = np.array([0, 1, -1j, 0]) * np.exp(0.8j)
    np.testing.assert_allclose(plus[:, 1] * np.sqrt(2), turned, rtol=1e-14, atol=1e-15)


def test_refusals() -> None:
    """A massless boson has no helicity 0, and no boson has 2."""
    message = "helicity: got 0, expected -1 or 1, the only ones of a massless vector boson"
    with pytest.raises(ValueError, match=message):
        polarisation_vector(everywhere(1.0, 0.0), 0)
    with pytest.raises(ValueError, match=r"helicity: got 2, expected -1, 0 or 1 \(of a vector boson\)"):
        polarisation_vector(everywhere(1.0, 1.0), 2)
