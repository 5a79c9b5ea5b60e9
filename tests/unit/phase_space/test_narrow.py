"""Narrow resonances, Γ/M = 3e-5: never missed, whether or not they lie along an axis of the cube."""

from __future__ import annotations

import numpy as np
import pytest
from unit.phase_space.volumes import Array, mean_and_error, products, two_body

from barnwright.peaks import Peak
from barnwright.phase_space import Channel, channels_of, densities, flat_channel
from barnwright.phase_space.maps.resonance import line
from barnwright.reaction import parse_reaction

MASS, WIDTH, ENERGY = 3.0969, 9.3e-5, 10.0
MASSES = (0.0, 0.0, 0.1, 0.1, 0.0)
CENTRE, HALF = line(MASS, WIDTH, running=False)
PEAK = Peak("mu- mu+", "resonance", at=MASS, width=WIDTH)


def channels(*peaks: Peak) -> tuple[Channel, ...]:
    """The channels of a pair and a photon."""
    return channels_of(parse_reaction("e- e+ -> mu- mu+ gamma"), MASSES, peaks, running=False)


def squared(momenta: Array) -> Array:
    """The line of the pair, 1/((m² − M²)² + M²Γ²), GeV⁻⁴."""
    square = 2 * 0.1**2 + 2 * products(momenta)(1, 2)
    return 1 / ((square - CENTRE) ** 2 + HALF**2)


def exact() -> float:
    """∫ of it over phase space: ∫ dm²/2π Φ₂(s; m, 0) Φ₂(m²; μ, μ), even steps of the arctangent, 200 nodes."""
    nodes, weights = np.polynomial.legendre.leggauss(200)
    low, high = (np.arctan((x - CENTRE) / HALF) for x in (0.04, ENERGY**2))
    angle = low + 0.5 * (high - low) * (nodes + 1)
    square = CENTRE + HALF * np.tan(angle)
    volume = two_body(np.full(200, ENERGY**2), 0.0, np.sqrt(square)) * two_body(square, 0.1, 0.1)
    return float(0.5 * (high - low) / HALF * np.sum(weights * volume) / (2 * np.pi))


@pytest.mark.parametrize("seed", range(20))
def test_a_narrow_peak_is_sampled(seed: int) -> None:
    """A thousand events of its own channel give the integral to 2 %, in pulls, for every seed."""
    channel = channels(PEAK)[1]
    momenta, density = channel.momenta(np.random.default_rng(seed).random((5, 1000)), ENERGY)
    mean, error = mean_and_error(squared(momenta) / density)
    assert abs(mean - exact()) < 4 * error
    assert error < 0.02 * exact()


def test_a_flat_channel_misses_it() -> None:
    """What the map is for: a thousand flat events see less than a tenth of the peak, or nothing."""
    momenta, density = flat_channel((0.0, 0.0), MASSES[2:]).momenta(np.random.default_rng(1).random((5, 1000)), ENERGY)
    assert np.mean(squared(momenta) / density) < 0.1 * exact()


@pytest.mark.parametrize("seed", range(5))
def test_a_narrow_peak_across_the_axes_of_other_channels(seed: int) -> None:
    """With collinear channels, in whose trees the pair's mass is no axis, the sum over channels is right to 3 %."""
    chosen = channels(PEAK, Peak("gamma mu-", "collinear"), Peak("gamma mu+", "collinear"))
    assert len(chosen) == 4
    total, variance = 0.0, 0.0
    for number, channel in enumerate(chosen):
        u = np.random.default_rng((seed, number)).random((5, 2000))
        momenta, _ = channel.momenta(u, ENERGY)
        mean, error = mean_and_error(squared(momenta) / densities(chosen, momenta, ENERGY).sum(axis=0))
        total, variance = total + mean, variance + error**2
    assert abs(total - exact()) < 4 * variance**0.5
    assert variance**0.5 < 0.03 * exact()


def test_both_roads_agree_as_far_as_momenta_tell() -> None:
    """m² of momenta is known to some ε, which a line of this width turns into 1e-10 of the density."""
    channel = channels(PEAK)[1]
    momenta, density = channel.momenta(np.random.default_rng(3).random((5, 2000)), ENERGY)
    np.testing.assert_allclose(channel.density(momenta, ENERGY), density, rtol=1e-10)


def test_two_narrow_lines_below_their_threshold() -> None:
    """Two lines of Γ/M = 3e-5 that cannot both be met: 2000 untrained events give the integral to 10 %, in pulls."""
    reaction, energy, mass, width = parse_reaction("H0 -> e- e+ mu- mu+"), 125.0, 91.0, 0.00273
    peaks = [Peak(of, "resonance", at=mass, width=width) for of in ("e- e+", "mu- mu+")]
    _, channel = channels_of(reaction, (energy, 0.0, 0.0, 0.0, 0.0), peaks, running=False)
    momenta, density = channel.momenta(np.random.default_rng(5).random((8, 20_000)), energy)
    dot, (centre, half) = products(momenta), line(mass, width, running=False)

    def lines(x: Array, y: Array) -> Array:
        return 1 / ((x - centre) ** 2 + half**2) / ((y - centre) ** 2 + half**2)

    mean, error = mean_and_error(lines(2 * dot(1, 2), 2 * dot(3, 4)) / density)
    below = (energy - mass) ** 2
    nodes, weights = np.polynomial.legendre.leggauss(200)
    other = 0.5 * below * (nodes + 1) * (1 - 1e-9)
    volume = two_body(np.full(200, energy**2), mass, np.sqrt(other)) / (8 * np.pi) ** 2 / (2 * np.pi) ** 2
    narrow = 2 * np.pi / half * np.sum(0.5 * below * weights * volume / ((other - centre) ** 2 + half**2))
    assert abs(mean - narrow) < 4 * error + 0.01 * narrow
    assert error < 0.05 * narrow
