"""Cuts in the limits of maps: no event outside, none without weight, and the volume that is left."""

from __future__ import annotations

from dataclasses import replace
from math import inf

import numpy as np
import pytest
from unit.phase_space.cases import CASES, Case, channels, events
from unit.phase_space.volumes import mean_and_error

from barnwright.peaks import Peak
from barnwright.phase_space import Limits, flat_channel

PAIR = Case("e- e+ -> mu- mu+", 3.0, (0.01, 0.01, 0.1, 0.1), (Peak("t", "power"),))
UNEVEN = Case("e- p -> e- p", 3.0, (0.01, 0.94, 0.01, 0.94), (Peak("t", "power", power=2.0),))
THREE = Case(
    "e- e+ -> mu- mu+ gamma",
    10.0,
    (0.01, 0.01, 0.3, 0.3, 0.0),
    (
        Peak("gamma", "soft"),
        Peak("gamma beam_a", "collinear"),
        Peak("gamma beam_b", "collinear"),
        Peak("mu- mu+", "power"),
        Peak("mu- mu+", "resonance", at=3.0, width=0.5),
    ),
)
EMITTED = replace(THREE, peaks=(Peak("gamma mu-", "collinear"), Peak("gamma", "soft"), Peak("gamma mu+", "collinear")))
FOUR = Case(
    "H0 -> e- e+ mu- mu+",
    125.0,
    (125.0, 0.0, 0.0, 0.1, 0.1),
    (Peak("e- e+", "resonance", at=91.0, width=20.0), Peak("mu- mu+", "resonance", at=91.0, width=20.0)),
)

BOUNDED = {
    "cosine of leg 1": replace(PAIR, limits=Limits(cosine={1: (-0.5, 0.9)})),
    "cosine of leg 2": replace(PAIR, limits=Limits(cosine={2: (-0.5, 0.9)})),
    "cosine of both": replace(PAIR, limits=Limits(cosine={1: (-0.5, 0.9), 2: (-0.7, 1.0)})),
    "pt": replace(PAIR, limits=Limits(pt={1: 0.7})),
    "pt and cosine": replace(PAIR, limits=Limits(pt={1: 0.7}, cosine={1: (-1.0, 0.5)})),
    "transfer from a": replace(UNEVEN, limits=Limits(transfer={(-1, 1): (-3.0, -0.2)})),
    "transfer from b": replace(UNEVEN, limits=Limits(transfer={(-2, 2): (-3.0, -0.2)})),
    "transfer across": replace(UNEVEN, limits=Limits(transfer={(-1, 2): (-4.0, -0.5)})),
    "energy of a photon": replace(THREE, limits=Limits(energy={3: (1.0, 4.0)})),
    "energy, cosine and mass": replace(
        THREE, limits=Limits(energy={3: (1.0, inf)}, cosine={3: (-0.9, 0.9)}, mass={(1, 2): (1.0, 7.0)})
    ),
    "energies of all": replace(THREE, limits=Limits(energy={1: (1.0, inf), 2: (1.0, inf), 3: (1.0, inf)})),
    "pt of a photon": replace(THREE, limits=Limits(pt={3: 1.5})),
    "transfer to a photon": replace(THREE, limits=Limits(transfer={(-1, 3): (-inf, -5.0)})),
    "energy of an emitted photon": replace(EMITTED, limits=Limits(energy={3: (0.5, inf)})),
    "energies of photon and emitter": replace(EMITTED, limits=Limits(energy={1: (1.0, inf), 3: (0.5, inf)})),
    "two masses": replace(FOUR, limits=Limits(mass={(1, 2): (40.0, 120.0), (3, 4): (12.0, 120.0)})),
    "energies of four": replace(FOUR, limits=Limits(energy=dict.fromkeys((1, 2, 3, 4), (10.0, inf)))),
}

EVERY = [(name, number) for name, case in BOUNDED.items() for number in range(len(case.channels))]
ALIGNED = [one for one in EVERY if one != ("two masses", 0)]
"""Channels whose own numbers all limits belong to; the flat tree has one of two pairs."""


def made(name: str, number: int, count: int) -> tuple[np.ndarray, np.ndarray]:
    """Events of a channel."""
    channel, case = BOUNDED[name].channels[number], BOUNDED[name]
    return channel.momenta(np.random.default_rng(number).random((channel.axes, count)), case.energy)


@pytest.mark.parametrize(("name", "number"), ALIGNED, ids=str)
def test_no_volume_is_dead(name: str, number: int) -> None:
    """Every point becomes an event inside the limits (to 1e-9), and every event has a weight."""
    momenta, density = made(name, number, 4000)
    assert np.all(np.isfinite(density))
    assert np.all(BOUNDED[name].accepts(momenta, slack=1e-9))


@pytest.mark.parametrize(("name", "number"), EVERY, ids=str)
def test_the_volume_inside_is_right(name: str, number: int) -> None:
    """∫ g_c/(g_c + g_flat) dΦ inside the limits: the channel's events against flat ones that are cut, in pulls."""
    case = BOUNDED[name]
    channel, flat = case.channels[number], flat_channel(case.incoming, case.outgoing)
    momenta, density = made(name, number, 8000)
    own = np.where(
        np.isfinite(density), 1 / (channel.density(momenta, case.energy) + flat.density(momenta, case.energy)), 0
    )
    own *= case.accepts(momenta, slack=1e-9)
    found, error = mean_and_error(own)
    momenta, density = flat.momenta(np.random.default_rng(9).random((flat.axes, 30_000)), case.energy)
    told = channel.density(momenta, case.energy)
    mean, other = mean_and_error(told / (told + density) / density * case.accepts(momenta))
    assert abs(found - mean) < 4 * np.hypot(error, other)
    assert error < 0.03 * found


def test_the_flat_channel_keeps_one_weight_inside_limits() -> None:
    """Massless bodies with bounds on the first leg to leave still weigh the same: the volume that is left."""
    limits = Limits(cosine={2: (-0.5, 0.5)})
    channel = flat_channel((0.0, 0.0), (0.0,) * 4, limits)
    _, density = channel.momenta(np.random.default_rng(1).random((8, 1000)), 10.0)
    _, free = flat_channel((0.0, 0.0), (0.0,) * 4).momenta(np.full((8, 1), 0.5), 10.0)
    np.testing.assert_allclose(1 / density, 0.5 / free[0], rtol=1e-12)


def test_limits_that_exclude_everything() -> None:
    """Where a window is empty the density is infinite, momenta are finite, and events of other channels have none."""
    limits = Limits(energy={3: (6.0, inf)})
    case = replace(THREE, limits=limits)
    other, _ = events(channels("a photon and massive muons")[0], "a photon and massive muons", 100)
    for channel in case.channels:
        momenta, density = channel.momenta(np.random.default_rng(1).random((5, 100)), 10.0)
        assert np.all(np.isinf(density))
        assert np.all(np.isfinite(momenta))
        assert np.all(channel.density(other, 10.0) == 0)


def test_a_density_outside_the_limits_is_zero() -> None:
    """Flat events that break a limit have no density in a channel that keeps it, those inside have one."""
    case = BOUNDED["energy, cosine and mass"]
    momenta, _ = flat_channel(case.incoming, case.outgoing).momenta(np.random.default_rng(2).random((5, 4000)), 10.0)
    inside = case.accepts(momenta)
    assert 100 < inside.sum() < 3900
    for channel in case.channels:
        np.testing.assert_array_equal(channel.density(momenta, 10.0) > 0, inside)


def test_what_is_bounded_leaves_first() -> None:
    """A leg with bounds on its direction leaves the whole first, legs with a bound mass stay together."""
    limits = Limits(cosine={3: (-0.9, 0.9)}, mass={(1, 4): (2.0, inf)}, energy={5: (1.0, inf)})
    channel = flat_channel((0.0, 0.0), (0.0,) * 5, limits)
    assert [splitting.first.legs for splitting in channel.splittings] == [(3,), (5,), (2,), (1,)]


def test_cases_meet_their_limits() -> None:
    """The cases of the other tests keep some events and lose some."""
    for name, case in CASES.items():
        if case.limits != Limits():
            momenta, _ = events(flat_channel(case.incoming, case.outgoing), name, 3000)
            assert 0 < case.accepts(momenta).sum() < 3000
