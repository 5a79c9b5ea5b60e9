"""Amplitudes written with the toolkit against trace formulas, Ward identities, parity and unitarity."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from barnwright_qed import bhabha, compton, moller, muon_pair, photon_pair
from barnwright_qed.coupling import Coupling
from unit.amplitudes import diagrams
from unit.amplitudes.momenta import ELECTRON, MUON, W_MASS, Z_MASS, random_events, two_bodies

from barnwright.amplitudes import current, dot, external_states, helicity_rows, propagator, quark_line, z_coupling
from barnwright.amplitudes.arrays import Complex
from barnwright.event import Event
from barnwright.process import Process

UNIT = 4 * np.pi * Coupling().alpha
"""e²."""
ELECTRONS = (ELECTRON,) * 4
PHOTON_ON_ELECTRON = (0.0, ELECTRON, 0.0, ELECTRON)
PAIR_TO_PHOTONS = (ELECTRON, ELECTRON, 0.0, 0.0)

CASES: list[tuple[Process, tuple[float, float, float, float], Callable[[Event], Complex]]] = [
    (muon_pair.process, (ELECTRON, ELECTRON, MUON, MUON), diagrams.lepton_pair),
    (bhabha.process, ELECTRONS, diagrams.bhabha),
    (moller.process, ELECTRONS, diagrams.moller),
    (compton.process, PHOTON_ON_ELECTRON, lambda event: np.sum(diagrams.compton(event), axis=0)),
    (photon_pair.process, PAIR_TO_PHOTONS, lambda event: np.sum(diagrams.pair_to_photons(event), axis=0)),
]


@pytest.mark.parametrize(("process", "masses", "amplitude"), CASES, ids=[case[0].name for case in CASES])
def test_squared_amplitudes_are_the_trace_formulas(
    process: Process, masses: tuple[float, float, float, float], amplitude: Callable[[Event], Complex]
) -> None:
    """Summed over helicities, |M|² is the law with masses at 200 random points, from threshold on, to 1e-12."""
    event = random_events(process.reaction, masses)
    rows = helicity_rows(event, UNIT * amplitude(event))
    assert rows.shape == (16, 1, 200, 1)
    law = process.laws[0].squared(event, Coupling())  # type: ignore[union-attr]
    np.testing.assert_allclose(np.sum(np.abs(rows) ** 2, axis=(0, 1)) / 4, law, rtol=1e-12)


def test_light_masses_far_below_the_energy() -> None:
    """At m/E = 1e-12 the pair law holds to 1e-12, and each suppressed amplitude is m/E times its own size."""
    event = two_bodies("e- e+ -> mu- mu+", 2.0, (1e-12, 1e-12, 1e-12, 1e-12), [[-1 + 1e-9, -0.3, 0.5, 1.0]])
    amplitude = diagrams.lepton_pair(event)
    law = muon_pair.process.laws[0].squared(event, Coupling())  # type: ignore[union-attr]
    np.testing.assert_allclose(UNIT**2 * np.sum(np.abs(amplitude) ** 2, axis=(0, 1, 2, 3)) / 4, law, rtol=1e-12)
    c = np.array([-1 + 1e-9, -0.3, 0.5, 1.0])
    np.testing.assert_allclose(np.abs(amplitude[0, 1, 0, 0, 0]), 1e-12 * np.sqrt((1 - c) * (1 + c)), rtol=1e-13)
    np.testing.assert_allclose(np.abs(amplitude[0, 0, 0, 0, 0]), 1e-24 * np.abs(c), rtol=1e-7)


def test_at_threshold_and_along_the_axis_nothing_is_undefined() -> None:
    """Muons at rest, and angles of exactly 0 and π, give finite amplitudes with the sum of the law."""
    for energy in (2 * MUON, 2 * MUON * (1 + 1e-15), 5.0):
        event = two_bodies("e- e+ -> mu- mu+", energy, (ELECTRON, ELECTRON, MUON, MUON), [[-1.0, 0.2, 1.0]])
        amplitude = UNIT * diagrams.lepton_pair(event)
        law = muon_pair.process.laws[0].squared(event, Coupling())  # type: ignore[union-attr]
        np.testing.assert_allclose(np.sum(np.abs(amplitude) ** 2, axis=(0, 1, 2, 3)) / 4, law, rtol=1e-14)


@pytest.mark.parametrize("kind", ["compton", "pair_to_photons"])
@pytest.mark.parametrize("replaced", [0, 1])
def test_ward_identity(kind: str, replaced: int) -> None:
    """With a photon's polarisation replaced by its momentum the diagrams cancel, none of them being 0 itself."""
    scattering = kind == "compton"
    text, masses = ("e- e+ -> gamma gamma", PAIR_TO_PHOTONS)
    if scattering:
        text, masses = ("gamma e- -> gamma e-", PHOTON_ON_ELECTRON)
    event = random_events(text, masses)
    states = external_states(event)
    waves = [states[0], states[2]] if scattering else [states[2], states[3]]
    leg = (("beam_a", 1) if scattering else (1, 2))[replaced]
    waves[replaced] = event.cm_vector(leg).components().reshape(4, 1, 1, 1, 1, 200, 1)
    first, second = getattr(diagrams, kind)(event, tuple(waves))
    size = np.max(np.abs(first), axis=(0, 1, 2, 3))
    assert np.all(size > 0)
    assert np.max(np.abs(first + second) / size) < 1e-12


@pytest.mark.parametrize(("process", "masses", "amplitude"), CASES, ids=[case[0].name for case in CASES])
def test_parity(
    process: Process, masses: tuple[float, float, float, float], amplitude: Callable[[Event], Complex]
) -> None:
    """In QED the modulus stays when all helicities are turned round."""
    event = random_events(process.reaction, masses)
    found = np.abs(amplitude(event))
    scale = np.max(found, axis=(0, 1, 2, 3))
    assert np.max(np.abs(found - found[::-1, ::-1, ::-1, ::-1]) / scale) < 1e-12


def test_masslessness_keeps_chirality() -> None:
    """Without masses only opposite helicities annihilate, into opposite ones: 4 of 16, the others exactly 0."""
    event = two_bodies("e- e+ -> mu- mu+", 10.0, (0.0, 0.0, 0.0, 0.0), np.linspace(-0.9, 0.9, 7), 0.3)
    found = np.abs(diagrams.lepton_pair(event))
    alive = [tuple(2 * index - 1) for index in np.argwhere(found.any(axis=(4, 5)))]
    assert alive == [(-1, 1, -1, 1), (-1, 1, 1, -1), (1, -1, -1, 1), (1, -1, 1, -1)]
    c = np.linspace(-0.9, 0.9, 7)
    np.testing.assert_allclose(found[0, 1, 0, 1, 0], 1 + c, rtol=1e-14)
    np.testing.assert_allclose(found[0, 1, 1, 0, 0], 1 - c, rtol=1e-14)


def test_photon_and_z_with_polarised_beams() -> None:
    """|M| = e² (1 ± cos θ) |QQ' + g g' s/((s − M² + iMΓ) s_W² c_W²)| for each helicity of massless fermions.

    Source: M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), problem 20.3, from memory.
    """
    c, energies, sin2 = np.array([-0.7, 0.1, 0.8]), np.array([10.0, 91.0, 200.0]), 0.23
    event = two_bodies("e- e+ -> u u~", energies, (0.0, 0.0, 0.0, 0.0), c)
    beam, quark = z_coupling("e-", sin2), z_coupling("u", sin2)
    line = propagator(event.s, Z_MASS, 2.495, "fixed") / (sin2 * (1 - sin2))
    electron, positron, up, antiup = external_states(event)
    photon = dot(current(positron, electron, -1, -1), current(up, antiup, 2 / 3, 2 / 3)) / event.s
    found = np.abs(photon + line * dot(current(positron, electron, *beam), current(up, antiup, *quark)))
    for i, j in ((0, 0), (0, 1), (1, 0), (1, 1)):
        expected = np.abs(-2 / 3 + beam[i] * quark[j] * line * event.s) * (1 + (1 if i == j else -1) * c)
        np.testing.assert_allclose(found[i, 1 - i, j, 1 - j], expected, rtol=1e-13)


def test_w_pairs_keep_unitarity() -> None:
    """For longitudinal W's each diagram grows with s, the sum does not: signs and sizes of all the vertices."""
    event = two_bodies("e- e+ -> W- W+", [500.0, 5000.0, 50000.0], (0.0, 0.0, W_MASS, W_MASS), [[-0.5, 0.3, 0.8]])
    parts = [part[:, :, 1, 1] for part in diagrams.w_pair(event)]
    total = np.abs(sum(parts))
    for i, j in ((0, 1), (1, 0)):
        assert np.all(np.abs(parts[1][i, j, 2]) > 5000 * np.abs(parts[1][i, j, 0]))
        np.testing.assert_allclose(total[i, j, 2], total[i, j, 1], rtol=1e-2)


def test_right_handed_w_pairs_at_high_energy() -> None:
    """Far above the masses e-_R e+_L makes longitudinal pairs as it makes scalars of hypercharge ½: e² sin θ/2c_W².

    Source: equivalence of longitudinal W and scalar, M. Peskin, D. Schroeder (1995), section 21.2: g'² Y Y' sin θ
    with Y = −1 and Y' = ½.
    """
    c = np.array([-0.5, 0.3, 0.8])
    event = two_bodies("e- e+ -> W- W+", 2e4, (0.0, 0.0, W_MASS, W_MASS), c)
    found = np.abs(sum(diagrams.w_pair(event)))[1, 0, 1, 1, 0]
    np.testing.assert_allclose(found, np.sqrt(1 - c * c) / (2 * (1 - diagrams.SIN2)), rtol=1e-4)


def test_quarks_to_gluons() -> None:
    """Averaged |M|² = g_s⁴ [32(t² + u²)/27tu − 8(t² + u²)/3s²], from two colour flows and the three-gluon vertex.

    Source: B. Combridge, J. Kripfganz, J. Ranft, Phys. Lett. B 70 (1977) 234.
    """
    event = two_bodies("u u~ -> g g", [1.0, 30.0], (0.0, 0.0, 0.0, 0.0), np.linspace(-0.95, 0.9, 6), 1.2)
    rows = helicity_rows(event, *diagrams.quarks_to_gluons(event))
    assert rows.shape == (16, 2, 2, 6)
    squares = np.einsum("hi...,ij,hj...->...", rows, np.array(quark_line(2)), np.conj(rows)).real / 36
    s, t, u = event.s, event.t, event.u
    expected = (t**2 + u**2) * (32 / (27 * t * u) - 8 / (3 * s**2))
    np.testing.assert_allclose(squares, expected, rtol=1e-12)


def test_ward_identity_of_each_flow() -> None:
    """With one gluon physical and the other replaced by its momentum both flows vanish."""
    event = two_bodies("u u~ -> g g", 30.0, (0.0, 0.0, 0.0, 0.0), np.linspace(-0.95, 0.9, 6), 1.2)
    states = external_states(event)
    momentum = event.cm_vector(2).components().reshape(4, 1, 1, 1, 1, 1, 6)
    for flow in diagrams.quarks_to_gluons(event, (states[2], momentum)):
        assert np.max(np.abs(flow)) < 1e-11
