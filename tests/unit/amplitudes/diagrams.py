"""Amplitudes of textbook processes, written with the toolkit alone; in units of e² (or g_s²)."""

from __future__ import annotations

from typing import Any

import numpy as np
from unit.amplitudes.momenta import W_MASS, Z_MASS

from barnwright.amplitudes import (
    apply_slash,
    current,
    dot,
    external_states,
    propagator,
    scalar_current,
    three_vector_vertex,
    z_coupling,
)
from barnwright.amplitudes.arrays import Complex
from barnwright.event import Event
from barnwright.kinematics import FourVector

SIN2 = 1 - (W_MASS / Z_MASS) ** 2


def lepton_pair(event: Event) -> Complex:
    """Two leptons to two others through one photon, one helicity axis a leg."""
    electron, positron, lepton, antilepton = external_states(event)
    return np.asarray(dot(current(positron, electron), current(lepton, antilepton)) / event.s)


def bhabha(event: Event) -> Complex:
    """Electrons on positrons: annihilation less scattering."""
    electron, positron, out, antiout = external_states(event)
    annihilation = dot(current(positron, electron), current(out, antiout)) / event.s
    return np.asarray(annihilation - dot(current(out, electron), current(positron, antiout)) / event.t)


def moller(event: Event) -> Complex:
    """Electrons on electrons: direct less exchanged."""
    one, two, out, other = external_states(event)
    direct = dot(current(out, one), current(other, two)) / event.t
    return np.asarray(direct - dot(current(other, one), current(out, two)) / event.u)


def two_photons(
    bar: Complex,
    spinor: Complex,
    waves: tuple[Any, Any],
    momenta: tuple[FourVector, FourVector, FourVector],
    mass: float,
) -> tuple[Complex, Complex]:
    """The two diagrams of a lepton line with an incoming photon (first) and an outgoing one (second).

    ū ε̸₂ (p̸ + k̸₁ + m) ε̸₁ u / 2p·k₁ and −ū ε̸₁ (p̸ − k̸₂ + m) ε̸₂ u / 2p·k₂.
    """
    p, first, second = momenta
    before = apply_slash(waves[0], spinor)
    before = apply_slash(p, before) + apply_slash(first, before) + mass * before
    after = apply_slash(waves[1], spinor)
    after = apply_slash(p, after) - apply_slash(second, after) + mass * after
    one = scalar_current(bar, apply_slash(waves[1], before)) / (2 * dot(p, first))
    other = scalar_current(bar, apply_slash(waves[0], after)) / (2 * dot(p, second))
    return np.asarray(one), np.asarray(-other)


def compton(event: Event, waves: tuple[Any, Any] | None = None) -> tuple[Complex, Complex]:
    """The diagrams of a photon on an electron; ``waves`` replaces those of the photons."""
    photon, electron, out, after = external_states(event)
    momenta = event.cm_vector("beam_b"), event.cm_vector("beam_a"), event.cm_vector(1)
    return two_photons(after, electron, waves or (photon, out), momenta, event.mass("beam_b"))


def pair_to_photons(event: Event, waves: tuple[Any, Any] | None = None) -> tuple[Complex, Complex]:
    """The diagrams of electron and positron to two photons, −v̄ ε̸₂ (p̸ − k̸₁ + m) ε̸₁ u / 2p·k₁ and exchanged."""
    electron, positron, one, other = external_states(event)
    p, mass = event.cm_vector("beam_a"), event.mass("beam_a")
    found = []
    polarised = waves or (one, other)
    for leg, (first, second) in ((1, polarised), (2, polarised[::-1])):
        line = apply_slash(first, electron)
        line = apply_slash(p, line) - apply_slash(event.cm_vector(leg), line) + mass * line
        found.append(-scalar_current(positron, apply_slash(second, line)) / (2 * event.dot("beam_a", leg)))
    return found[0], found[1]


def w_pair(event: Event) -> tuple[Complex, Complex, Complex]:
    """Massless electrons to W- W+: the neutrino's, the photon's and the Z's diagram."""
    electron, positron, minus, plus = external_states(event)
    p, total = event.cm_vector("beam_a"), event.cm_vector("beam_a") + event.cm_vector("beam_b")
    outwards = -event.cm_vector(2).components(), -event.cm_vector(1).components(), total
    line = apply_slash(minus, np.where(np.arange(4).reshape(4, *(1,) * (electron.ndim - 1)) < 2, electron, 0))
    line = apply_slash(p, line) - apply_slash(event.cm_vector(1), line)
    neutrino = -scalar_current(positron, apply_slash(plus, line)) / (2 * SIN2 * event.t)
    photon = three_vector_vertex((plus, minus, current(positron, electron, -1, -1)), outwards) / event.s
    z = three_vector_vertex((plus, minus, current(positron, electron, *z_coupling("e-", SIN2))), outwards)
    return np.asarray(neutrino), photon, z * propagator(event.s, Z_MASS) / SIN2


def quarks_to_gluons(event: Event, waves: tuple[Any, Any] | None = None) -> tuple[Complex, Complex]:
    """Massless quark and antiquark to two gluons: the flows T^a T^b and T^b T^a, a the first gluon's colour."""
    quark, antiquark, one, other = external_states(event)
    one, other = waves or (one, other)
    p, total = event.cm_vector("beam_a"), event.cm_vector("beam_a") + event.cm_vector("beam_b")
    outwards = -event.cm_vector(1).components(), -event.cm_vector(2).components(), total
    gluon = three_vector_vertex((one, other, current(antiquark, quark)), outwards) / event.s
    lines = []
    for leg, first, second, square in ((1, one, other, event.t), (2, other, one, event.u)):
        line = apply_slash(first, quark)
        line = apply_slash(p, line) - apply_slash(event.cm_vector(leg), line)
        lines.append(-scalar_current(antiquark, apply_slash(second, line)) / square)
    return lines[1] - gluon, lines[0] + gluon
