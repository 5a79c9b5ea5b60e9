"""Every channel by itself, and all of a reaction together."""

from __future__ import annotations

import pickle
from functools import lru_cache

import numpy as np
import pytest
from unit.phase_space.cases import CASES, EVERY, Array, channels, events
from unit.phase_space.volumes import mean_and_error, products

from barnwright.phase_space import Channel, densities, flat_channel

each_channel = pytest.mark.parametrize(("name", "number"), EVERY, ids=str)


@each_channel
def test_both_roads_to_the_density_agree(name: str, number: int) -> None:
    """The density made with the momenta and that told of them agree to 1e-12."""
    channel = channels(name)[number]
    momenta, density = events(channel, name, 1000)
    alive = np.isfinite(density)
    told = channel.density(momenta, CASES[name].energy)
    np.testing.assert_allclose(told[alive], density[alive], rtol=1e-12)


@each_channel
def test_momentum_is_conserved_and_legs_are_on_shell(name: str, number: int) -> None:
    """Sums of momenta are right to 1e-12 √s, the squared mass of a leg to 1e-13 of its own E², however soft it is."""
    channel, energy = channels(name)[number], CASES[name].energy
    momenta, _ = events(channel, name, 1000)
    total = momenta.sum(axis=0)
    total[0] -= energy
    assert np.max(np.abs(total)) < 1e-12 * energy
    dot = products(momenta)
    for leg, mass in enumerate(channel.masses, 1):
        assert np.all(np.abs(dot(leg, leg) - mass**2) < 1e-13 * momenta[leg - 1, 0] ** 2)


@lru_cache
def shares_of_flat_events(name: str) -> Array:
    """g_c/Σg over g_flat of 20 000 flat events without limits, for every channel of a case; shape (channel, event)."""
    case, chosen = CASES[name], channels(name)
    flat = flat_channel(case.incoming, case.outgoing)
    momenta, density = events(flat, name, 20_000, seed=3)
    told = densities((*chosen, flat), momenta, case.energy)
    return np.asarray(told / told.sum(axis=0) / density)


@each_channel
def test_a_channel_alone_against_the_flat_one(name: str, number: int) -> None:
    """∫ g_c/Σg dΦ by the channel's own events and by flat ones without limits, in pulls and to 10 %."""
    case, chosen = CASES[name], channels(name)
    momenta, density = events(chosen[number], name, 4000, seed=2)
    everything = (*chosen, flat_channel(case.incoming, case.outgoing))
    total = densities(everything, momenta, case.energy).sum(axis=0)
    own, own_error = mean_and_error(np.where(np.isfinite(density), 1 / total, 0.0))
    mean, error = mean_and_error(shares_of_flat_events(name)[number])
    assert abs(own - mean) < 4 * np.hypot(own_error, error)
    assert own_error < 0.1 * own


@pytest.mark.parametrize("name", CASES)
def test_no_accepted_event_is_out_of_reach(name: str) -> None:
    """Every flat event inside the limits has a density above 0 in every channel."""
    case = CASES[name]
    momenta, _ = events(flat_channel(case.incoming, case.outgoing), name, 8000, seed=4)
    momenta = momenta[:, :, case.accepts(momenta)]
    assert momenta.shape[2] > 100
    assert np.all(densities(channels(name), momenta, case.energy) > 0)


@pytest.mark.parametrize("name", ["two bodies, t and u", "a photon and massless muons", "two exchanges", "Z Z* below"])
def test_the_density_is_the_inverse_jacobian(name: str) -> None:
    """dΦ/du by numerical differentiation of the momenta, in every channel."""
    for channel in channels(name):
        u = np.random.default_rng(6).uniform(0.1, 0.9, (channel.axes, 4))
        _, density = channel.momenta(u, CASES[name].energy)
        np.testing.assert_allclose(jacobian(channel, u, CASES[name].energy) * density, 1.0, rtol=2e-6)


def jacobian(channel: Channel, u: Array, energy: float) -> Array:
    """dΦ_n/du from the definition: d³p/2E of all legs but two, and the direction of the last but one."""
    step, columns = 1e-5, []
    for axis in range(channel.axes):
        ends = []
        for sign in (-2, -1, 1, 2):
            moved = u.copy()
            moved[axis] += sign * step
            ends.append(coordinates(channel.momenta(moved, energy)[0]))
        columns.append((ends[0] - 8 * ends[1] + 8 * ends[2] - ends[3]) / (12 * step))
    determinant = np.abs(np.linalg.det(np.moveaxis(np.array(columns), 2, 0)))
    momenta, _ = channel.momenta(u, energy)
    free, last = momenta[:-2], momenta[-2:]
    p = np.sqrt(np.sum(np.square(last[0, 1:]), axis=0))
    along = np.sum(last[0, 1:] * np.sum(free[:, 1:], axis=0), axis=0) / p
    slope = p / last[0, 0] + (p + along) / last[1, 0]
    n = momenta.shape[0]
    weight = p**2 / (4 * last[0, 0] * last[1, 0] * slope) / np.prod(2 * free[:, 0], axis=0)
    return np.asarray((2 * np.pi) ** (4 - 3 * n) * weight * determinant)


def coordinates(momenta: Array) -> Array:
    """px, py, pz of all legs but two, cosine and azimuth of the last but one; shape (axis, event)."""
    free, one = momenta[:-2, 1:], momenta[-2]
    p = np.sqrt(np.sum(np.square(one[1:]), axis=0))
    rows = free.reshape(-1, momenta.shape[2])
    return np.concatenate([rows, (one[3] / p)[None], np.arctan2(one[2], one[1])[None]])


@pytest.mark.parametrize("name", CASES)
def test_a_channel_is_plain_data(name: str) -> None:
    """Channels are equal to their copies through pickle, hashable, and all different."""
    found = channels(name)
    assert pickle.loads(pickle.dumps(found)) == found  # noqa: S301
    assert len(set(found)) == len(found)


@each_channel
def test_corners_of_the_cube(name: str, number: int) -> None:
    """Numbers within 1e-15 of 0 and 1 give finite momenta and a density that is a number above 0."""
    channel = channels(name)[number]
    u = np.random.default_rng(8).choice([1e-15, 0.3, 1 - 1e-15], (channel.axes, 300))
    momenta, density = channel.momenta(u, CASES[name].energy)
    assert np.all(np.isfinite(momenta))
    assert np.all(density > 0)


def test_densities_do_not_depend_on_who_asked_first() -> None:
    """Sums shared between channels leave no trace: the same bits in any order of the channels."""
    chosen = channels("two photons")
    momenta, _ = events(chosen[3], "two photons", 500)
    forward, backward = densities(chosen, momenta, 10.0), densities(chosen[::-1], momenta, 10.0)
    np.testing.assert_array_equal(forward, backward[::-1])
