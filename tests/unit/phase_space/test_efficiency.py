"""What the channels are for: the share of events that count, without any training."""

from __future__ import annotations

from math import cos, pi, radians

import numpy as np
from unit.phase_space.cases import CASES, RADIATION
from unit.phase_space.volumes import Array, products

from barnwright.peaks import Peak
from barnwright.phase_space import Channel, channels_of, densities
from barnwright.reaction import parse_reaction

ENERGY, ALPHA = 10.0, 1 / 128.9
CASE = CASES["a photon and massless muons"]


def radiation(momenta: Array) -> Array:
    """dσ/dΦ in pb of e⁻e⁺ → μ⁻μ⁺γ, massless, one photon exchanged, inside the limits and 5° between photon and muons.

    |M|² = −e⁶ v² (t² + t'² + u² + u'²)/ss' with v the eikonal current. Source: F. A. Berends and R. Kleiss, Nucl. Phys.
    B 177 (1981) 237, from memory.
    """
    energies = np.full(momenta.shape[2], ENERGY / 2)
    beams = [np.array([energies, 0 * energies, 0 * energies, sign * energies]) for sign in (1, -1)]
    everything = np.concatenate([momenta, beams])  # μ⁻, μ⁺, γ, e⁻, e⁺
    dot = products(everything)
    minus, plus, photon, electron, positron = everything
    v = positron / dot(5, 3) - electron / dot(4, 3) - plus / dot(2, 3) + minus / dot(1, 3)
    eikonal = v[0] ** 2 - v[1] ** 2 - v[2] ** 2 - v[3] ** 2
    angles = 4 * (dot(4, 1) ** 2 + dot(5, 2) ** 2 + dot(4, 2) ** 2 + dot(5, 1) ** 2)
    squared = -((4 * pi * ALPHA) ** 3) * eikonal * angles / (ENERGY**2 * 2 * dot(1, 2))
    accepted = CASE.accepts(momenta)
    for leg in (1, 2):
        accepted &= 1 - dot(leg, 3) / (momenta[leg - 1, 0] * photon[0]) < cos(radians(5))
    return np.asarray(squared * accepted / (2 * ENERGY**2) * 0.3893793721e9)


def test_radiation_from_beams_and_muons() -> None:
    """The four channels of declared peaks together: 105.285 pb within its error, and 65 % of the events count."""
    channels = channels_of(parse_reaction(CASE.text), CASE.masses, RADIATION, CASE.limits)[1:]
    weights = [weight_of(channel, number, channels) for number, channel in enumerate(channels)]
    mean = np.mean([w.mean() for w in weights])
    error = np.sqrt(np.sum([w.var() / w.size for w in weights])) / len(weights)
    assert abs(mean - 105.285) < 3 * error
    assert error < 0.006 * mean
    assert mean**2 / np.mean([np.mean(w**2) for w in weights]) > 0.65


def weight_of(channel: Channel, seed: int, channels: tuple[Channel, ...]) -> Array:
    """Weights of a channel's events in an even mixture of all."""
    momenta, _ = channel.momenta(np.random.default_rng(seed).random((5, 6000)), ENERGY)
    return np.asarray(radiation(momenta) / densities(channels, momenta, ENERGY).mean(axis=0))


def test_two_resonances_without_room_for_both() -> None:
    """H → Z Z* at 125 GeV: more than 15 % of the events of the one channel count, above 2 M_Z more than 80 %."""
    for energy, least in ((125.0, 0.15), (200.0, 0.8)):
        peaks = [Peak(of, "resonance", at=91.1876, width=2.4952) for of in ("e- e+", "mu- mu+")]
        reaction = parse_reaction("H0 -> e- e+ mu- mu+")
        _, channel = channels_of(reaction, (energy, 0.0, 0.0, 0.0, 0.0), peaks)
        momenta, density = channel.momenta(np.random.default_rng(1).random((8, 40_000)), energy)
        dot = products(momenta)
        lines = [
            (2 * dot(i, j) - 91.1876**2) ** 2 + (2 * dot(i, j) * 2.4952 / 91.1876) ** 2 for i, j in ((1, 2), (3, 4))
        ]
        weights = (dot(1, 3) * dot(2, 4) + dot(1, 4) * dot(2, 3)) / (lines[0] * lines[1]) / density
        assert weights.mean() ** 2 / np.mean(weights**2) > least
