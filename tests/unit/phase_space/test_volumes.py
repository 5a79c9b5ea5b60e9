"""Flat phase space: the volume of massless and massive bodies."""

from __future__ import annotations

import numpy as np
import pytest
from unit.phase_space.volumes import massive_volume, massless_volume, mean_and_error, products

from barnwright.phase_space import flat_channel

MASSES = (1.0, 0.2, 0.5, 0.1, 0.7, 0.3)
BEAMS = (0.000511, 0.000511)


@pytest.mark.parametrize("n", range(2, 9))
def test_massless_events_have_one_weight(n: int) -> None:
    """Every event weighs the volume in closed form, to 1e-12; n = 2 to 8."""
    channel = flat_channel((0.0, 0.0), (0.0,) * n)
    u = np.random.default_rng(n).random((channel.axes, 3000))
    _, density = channel.momenta(u, 10.0)
    np.testing.assert_allclose(1 / density, massless_volume(n, 100.0), rtol=1e-12)


@pytest.mark.parametrize("n", range(3, 7))
def test_massive_volume_agrees_with_recursion(n: int) -> None:
    """The mean weight of 3 to 6 massive bodies is their volume by quadrature, in pulls and to 1 %."""
    channel = flat_channel(BEAMS, MASSES[:n])
    _, density = channel.momenta(np.random.default_rng(n).random((channel.axes, 20_000)), 6.0)
    mean, error = mean_and_error(1 / density)
    exact = massive_volume(MASSES[:n], 6.0)
    assert abs(mean - exact) < 4 * error
    assert error < 0.01 * exact


def test_two_massive_bodies() -> None:
    """Two bodies have p*/4π√s."""
    channel = flat_channel((5.0,), (1.0, 2.0))
    _, density = channel.momenta(np.random.default_rng(1).random((2, 100)), 5.0)
    momentum = np.sqrt((25 - 9) * (25 - 1)) / 10
    np.testing.assert_allclose(1 / density, momentum / (4 * np.pi * 5), rtol=1e-13)


@pytest.mark.parametrize("n", [2, 3, 4, 8])
@pytest.mark.parametrize("masses", [(0.0,) * 8, (1.0, 0.0, 0.5, 0.1, 0.7, 0.0, 0.0, 0.3)], ids=["massless", "mixed"])
def test_momentum_is_conserved_and_legs_are_on_shell(n: int, masses: tuple[float, ...]) -> None:
    """Sums of momenta and squared masses are right to 1e-12 √s, for an energy of each event's own."""
    rng = np.random.default_rng(n)
    channel = flat_channel(BEAMS, masses[:n])
    energy = rng.uniform(5.0, 500.0, 2000)
    momenta, density = channel.momenta(rng.random((channel.axes, 2000)), energy)
    total = momenta.sum(axis=0)
    total[0] -= energy
    assert np.all(np.abs(total) < 1e-12 * energy)
    dot = products(momenta)
    for leg, mass in enumerate(masses[:n], 1):
        assert np.all(np.abs(dot(leg, leg) - mass**2) < 1e-12 * energy**2)
    np.testing.assert_allclose(channel.density(momenta, energy), density, rtol=1e-12)


def test_an_energy_of_each_event_is_the_same_as_one_for_all() -> None:
    """Whether √s is a number or an array of one value, the bits of the momenta are the same."""
    channel = flat_channel(BEAMS, MASSES[:4])
    u = np.random.default_rng(5).random((channel.axes, 500))
    one, many = channel.momenta(u, 8.0), channel.momenta(u, np.full(500, 8.0))
    np.testing.assert_array_equal(one[0], many[0])
    np.testing.assert_allclose(one[1], many[1], rtol=1e-14)


def test_just_above_the_threshold() -> None:
    """A millionth above the threshold the volume is that of slow bodies, T² √(m₁m₂m₃/(Σm)³)/64π², by both roads."""
    masses, excess = (1.0, 2.0, 3.0), 6e-6
    channel = flat_channel((0.0, 0.0), masses)
    _, density = channel.momenta(np.random.default_rng(2).random((channel.axes, 20_000)), sum(masses) + excess)
    mean, error = mean_and_error(1 / density)
    exact = excess**2 * np.sqrt(np.prod(masses) / sum(masses) ** 3) / (64 * np.pi**2)
    assert massive_volume(masses, sum(masses) + excess) == pytest.approx(exact, rel=1e-5)
    assert abs(mean - exact) < 4 * error
    assert error < 0.01 * exact
