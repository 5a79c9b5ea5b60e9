"""Couplings of fermions to photon, Z, W and H against values worked out by hand."""

from __future__ import annotations

import numpy as np
import pytest

from barnwright.amplitudes import (
    electric_charge,
    from_vector_axial,
    higgs_coupling,
    photon_coupling,
    vacuum_value,
    w_coupling,
    weak_isospin,
    z_coupling,
)
from barnwright.particles import UnknownParticleError, find

FERMIONS = ["e-", "mu-", "tau-", "nu(e)", "nu(mu)", "nu(tau)", "u", "c", "t", "d", "s", "b"]


@pytest.mark.parametrize("name", FERMIONS)
def test_charges_are_those_of_the_table(name: str) -> None:
    """Q of the field is the particle's charge in the table of particles, and Q = T₃ + Y/2 with Y of the doublet."""
    assert electric_charge(name) == pytest.approx(find(name).charge, abs=1e-15)
    assert photon_coupling(name) == (electric_charge(name),) * 2
    hypercharge = 2 * (electric_charge(name) - weak_isospin(name))
    assert hypercharge == pytest.approx(1 / 3 if find(name).colour == 3 else -1)


@pytest.mark.parametrize("name", FERMIONS)
def test_antiparticles_have_the_couplings_of_the_field(name: str) -> None:
    """The name of the antiparticle gives the same couplings."""
    other = find(name).antiparticle
    assert (weak_isospin(other), electric_charge(other)) == (weak_isospin(name), electric_charge(name))
    assert z_coupling(other, 0.23) == z_coupling(name, 0.23)


@pytest.mark.parametrize(
    ("name", "left", "right"),
    [
        ("nu(mu)", 0.5, 0.0),
        ("e-", -0.27, 0.23),
        ("u", 0.5 - 0.46 / 3, -0.46 / 3),
        ("b", -0.5 + 0.23 / 3, 0.23 / 3),
    ],
)
def test_z_couplings_by_hand(name: str, left: float, right: float) -> None:
    """g_L = T₃ − Q s², g_R = −Q s² at s² = 0.23, worked out by hand."""
    assert z_coupling(name, 0.23) == pytest.approx((left, right), abs=1e-15)


def test_vector_and_axial() -> None:
    """g_V = g_L + g_R = T₃ − 2Qs² and g_A = g_L − g_R = T₃, and back."""
    left, right = z_coupling("mu-", 0.2315)
    assert (left + right, left - right) == pytest.approx((-0.5 + 2 * 0.2315, -0.5))
    assert from_vector_axial(left + right, left - right) == pytest.approx((left, right))


def test_anomalies_cancel() -> None:
    """Over one family, with colour, ΣQ = 0, ΣT₃Q² and the traces of the Z's couplings with two photons vanish."""
    family = [("nu(e)", 1), ("e-", 1), ("u", 3), ("d", 3)]
    assert sum(colours * electric_charge(name) for name, colours in family) == pytest.approx(0, abs=1e-15)
    axial = 0.0
    for name, colours in family:
        left, right = z_coupling(name, 0.3)
        axial += colours * (left - right) * electric_charge(name) ** 2
    assert axial == pytest.approx(0, abs=1e-15)


def test_mixing_angle_may_be_an_array_or_complex() -> None:
    """sin²θ of the complex-mass scheme, or one for each point."""
    assert z_coupling("e-", 0.23 + 0.001j) == pytest.approx((-0.27 + 0.001j, 0.23 + 0.001j))
    left, right = z_coupling("e-", np.array([0.2, 0.25]))
    np.testing.assert_allclose([left, right], [[-0.3, -0.25], [0.2, 0.25]])


def test_w_couplings() -> None:
    """1/√2 and left-handed only, for doublets of leptons and any up with any down quark, in any order and charge."""
    for pair in (("e-", "nu(e)"), ("nu(mu)~", "mu-"), ("u", "d"), ("t", "b~"), ("s", "u~")):
        assert w_coupling(*pair) == pytest.approx((0.5**0.5, 0.0))
    assert w_coupling("s", "u", 0.225) == pytest.approx((0.225 * 0.5**0.5, 0.0))


@pytest.mark.parametrize("pair", [("e-", "nu(mu)"), ("e-", "e+"), ("u", "c"), ("e-", "u"), ("nu(e)", "u"), ("s", "e-")])
def test_pairs_without_a_w_are_refused(pair: tuple[str, str]) -> None:
    """The message names both."""
    expected = rf"fermions of a W vertex: got {pair[0]} and {pair[1]}, expected two that a W joins"
    with pytest.raises(ValueError, match=expected.replace("(", r"\(").replace(")", r"\)").replace("+", r"\+")):
        w_coupling(*pair)


def test_higgs_couplings() -> None:
    """v = 246.22 GeV from G_F = 1.1663787e-5 GeV⁻² (Particle Data Group, from memory); −m/v and 2M²/v."""
    value = vacuum_value(1.1663787e-5)
    assert value == pytest.approx(246.22, abs=0.005)
    assert higgs_coupling("b~", 4.8, 246.0) == pytest.approx(-4.8 / 246)
    for name in ("Z0", "W+", "W-"):
        assert higgs_coupling(name, 90.0, 246.0) == pytest.approx(2 * 90**2 / 246)


def test_what_is_no_fermion_is_refused() -> None:
    """Bosons and hadrons have no such couplings; unknown names come with the nearest one."""
    for name in ("gamma", "W+", "p", "pi+"):
        message = "fermion: got '{}', expected a quark or a lepton".format(name.replace("+", r"\+"))
        with pytest.raises(ValueError, match=message):
            z_coupling(name, 0.23)
    with pytest.raises(ValueError, match="fermion: got 'gamma', expected a quark or a lepton"):
        higgs_coupling("gamma", 0.0, 246.0)
    with pytest.raises(UnknownParticleError, match=r"no particle is called 'mu', .*nearest: mu"):
        photon_coupling("mu")
