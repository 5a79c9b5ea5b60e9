"""Particles: names, masses, quantum numbers, and what may have been meant."""

from __future__ import annotations

import pickle
import subprocess
import sys

import pytest
from particle import Particle
from scipy import constants

from barnwright.particles import UnknownParticleError, find, names, table_version


def test_electron() -> None:
    """One particle in full."""
    electron = find("e-")
    assert (electron.name, electron.pdg_id, electron.antiparticle, electron.latex) == ("e-", 11, "e+", "e^{-}")
    assert (electron.charge, electron.spin_states, electron.colour, electron.width) == (-1.0, 2, 1, 0.0)
    assert (electron.baryon_number, electron.lepton_numbers) == (0.0, (1, 0, 0))
    assert electron.mass_known
    assert not electron.is_self_conjugate


@pytest.mark.parametrize(
    ("name", "codata", "relative"),
    [
        ("e-", "electron", 1e-7),
        ("mu-", "muon", 1e-7),
        ("p", "proton", 1e-7),
        ("n", "neutron", 1e-7),
        ("D2", "deuteron", 1e-8),
        ("T3", "triton", 1e-8),
        ("He3", "helion", 1e-8),
        ("He4", "alpha particle", 1e-8),
    ],
)
def test_masses_are_those_of_codata(name: str, codata: str, relative: float) -> None:
    """Masses in GeV agree with CODATA (scipy.constants); of nuclei, without the electrons of the atom."""
    expected = constants.value(f"{codata} mass energy equivalent in MeV") / 1000
    assert find(name).mass == pytest.approx(expected, rel=relative)


def test_masses_move_the_decimal_point_only() -> None:
    """GeV are the table's MeV with the point moved, not a neighbouring number."""
    for name in ("e-", "K(S)0", "Z0", "W+", "H0", "pi+"):
        mev = next(row.mass for row in Particle.all() if row.name == name)
        assert mev is not None
        assert find(name).mass == float(f"{mev!r}e-3")


@pytest.mark.parametrize(
    ("name", "charge", "spin_states", "colour", "baryon_number", "lepton_numbers"),
    [
        ("gamma", 0, 2, 1, 0, (0, 0, 0)),
        ("g", 0, 2, 8, 0, (0, 0, 0)),
        ("Z0", 0, 3, 1, 0, (0, 0, 0)),
        ("W-", -1, 3, 1, 0, (0, 0, 0)),
        ("H0", 0, 1, 1, 0, (0, 0, 0)),
        ("u", 2 / 3, 2, 3, 1 / 3, (0, 0, 0)),
        ("b~", 1 / 3, 2, 3, -1 / 3, (0, 0, 0)),
        ("(dd)(1)", -2 / 3, 3, 3, 2 / 3, (0, 0, 0)),
        ("nu(mu)~", 0, 1, 1, 0, (0, -1, 0)),
        ("nu(e)", 0, 1, 1, 0, (1, 0, 0)),
        ("tau+", 1, 2, 1, 0, (0, 0, -1)),
        ("p", 1, 2, 1, 1, (0, 0, 0)),
        ("n~", 0, 2, 1, -1, (0, 0, 0)),
        ("Delta(1232)++", 2, 4, 1, 1, (0, 0, 0)),
        ("K(S)0", 0, 1, 1, 0, (0, 0, 0)),
        ("pi+", 1, 1, 1, 0, (0, 0, 0)),
        ("C12", 6, None, 1, 12, (0, 0, 0)),
        ("C12~", -6, None, 1, -12, (0, 0, 0)),
    ],
)
def test_quantum_numbers(
    name: str,
    charge: float,
    spin_states: int | None,
    colour: int,
    baryon_number: float,
    lepton_numbers: tuple[int, int, int],
) -> None:
    """Charge, spin, colour, baryon and lepton numbers of every kind of particle (textbook values)."""
    found = find(name)
    assert found.charge == pytest.approx(charge, abs=1e-15)
    assert (found.spin_states, found.colour, found.lepton_numbers) == (spin_states, colour, lepton_numbers)
    assert found.baryon_number == pytest.approx(baryon_number, abs=1e-15)


def test_neutrino_mass_is_not_known() -> None:
    """A mass that the table lacks is 0 in kinematics and says so."""
    assert (find("nu(e)").mass, find("nu(e)").mass_known) == (0.0, False)
    assert (find("gamma").mass, find("gamma").mass_known) == (0.0, True)


def test_nucleons_are_not_nuclei() -> None:
    """Nuclei also answer to p and n: the nucleons are meant."""
    assert (find("p").pdg_id, find("n").pdg_id) == (2212, 2112)


def test_higgs_boson_has_two_spellings() -> None:
    """H0 and H are the Higgs boson, under one name."""
    assert find("H") == find("H0")
    assert find("H0").pdg_id == 25


def test_every_name_finds_itself_and_its_antiparticle() -> None:
    """Every name of the table leads to the particle of this name, and its antiparticle's antiparticle is itself."""
    for name in names():
        found = find(name)
        assert found.name == name
        assert find(found.antiparticle).antiparticle == name
        assert (found.antiparticle == name) == found.is_self_conjugate
        assert find(found.antiparticle).charge == -found.charge or found.is_self_conjugate


def test_shared_name_means_the_particle_with_a_mass() -> None:
    """Two rows of the table are called psi(4160); the measured one is found."""
    assert find("psi(4160)").mass == pytest.approx(4.191, abs=0.05)  # Review of Particle Physics, psi(4160)


def test_names_and_table_are_those_of_the_package() -> None:
    """The table read is the one that the package reads by default, all of it but the nuclei."""
    files = [name.rpartition("/")[2] for name in Particle.table_names() or ()]
    assert f"particle{table_version()[-4:]}.csv" in files
    assert set(names()) == {row.name for row in Particle.all() if not row.pdgid.is_nucleus or row.name in "pn p~ n~"}


def test_table_version() -> None:
    """The version names package and edition."""
    package, edition = table_version().split(", ")
    assert package.startswith("particle ")
    assert edition.startswith("PDG table 20")


@pytest.mark.parametrize(
    ("wrong", "meant"),
    [
        ("electron", "e-"),
        ("e", "e-, e+"),
        ("mu", "mu-, mu+"),
        ("E-", "e-, e+"),
        ("photon", "gamma"),
        ("γ", "gamma"),
        ("μ-", "mu-"),
        ("e−", "e-"),
        ("Z", "Z0"),
        ("W", "W+, W-"),
        ("nu_mu", "nu(mu)"),
        ("numubar", "nu(mu)~"),
        ("nu_e~", "nu(e)~"),
        ("ubar", "u~"),
        ("antiproton", "p~"),
        ("pbar", "p~"),
        ("anti-muon", "mu+"),
        ("pi", "pi0, pi+, pi-"),
        ("J/psi", "J/psi(1S)"),
        ("gama", "gamma"),
        ("higgs", "H0"),
        ("xyzzy", None),
        ("bar", None),
        ("--", None),
        ("", None),
        ("C999", None),
    ],
)
def test_what_was_meant(wrong: str, meant: str | None) -> None:
    """Everyday words, other notations and typing errors are met with the name of the PDG."""
    with pytest.raises(
        LookupError, match=r"^no particle is called '.*', expected a name as the PDG spells it"
    ) as caught:
        find(wrong)
    assert isinstance(caught.value, UnknownParticleError)
    assert caught.value.nearest == meant


def test_long_names_are_refused_quickly() -> None:
    """A name of a megabyte is shown short and searched for nowhere."""
    with pytest.raises(
        UnknownParticleError, match=r"^no particle is called 'e{78}…, expected a name as the PDG spells it$"
    ):
        find("e" * 10**6)


def test_error_crosses_processes() -> None:
    """The error survives pickling."""
    error = UnknownParticleError("mu", "mu-, mu+")
    back = pickle.loads(pickle.dumps(error))  # noqa: S301
    assert (str(back), back.name, back.nearest) == (str(error), "mu", "mu-, mu+")


def test_table_is_read_when_asked_for() -> None:
    """Importing the room reads no table; finding one leaves the package's own table unread."""
    code = (
        "import sys, barnwright.particles as room\n"
        "print('particle' in sys.modules)\n"
        "room.find('e-')\n"
        "import particle; print(particle.Particle.table_loaded())"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.split() == ["False", "False"]
