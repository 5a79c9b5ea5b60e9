"""Helicity amplitudes of the QED plugin against explicit Dirac matrices, and against the squared amplitudes."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import product
from typing import Any

import mpmath
import numpy as np
import pytest

from barnwright.kinematics import Collision
from barnwright.process import HelicityAmplitudes
from barnwright.testing import check_process

from .qed_diagrams import COMBINATIONS
from .qed_processes import CHARGE_SQUARED, COUPLING, ELECTRON, ENTRIES, ROUNDED, Entry, collision

COSINES = (-1 + 1e-9, -0.31, 1 - 1e-9)
FACTORS = (1 + 1e-8, 1.3, 300.0)
"""√s over the threshold."""

ALIKE = ("tau-pair", "breit-wheeler-muon", "breit-wheeler-tau")
"""Processes with the laws of others and other masses."""
DIFFERENT = [name for name in ENTRIES if name not in ALIKE]

every_entry = pytest.mark.parametrize("entry", ENTRIES.values(), ids=ENTRIES.keys())


@pytest.fixture(autouse=True)
def _digits() -> Iterator[None]:
    """Work in 50 digits, whatever another test asked for."""
    with mpmath.workdps(50):
        yield


def law_of(entry: Entry) -> HelicityAmplitudes:
    """The law of helicity amplitudes."""
    (law,) = (law for law in entry.laws if isinstance(law, HelicityAmplitudes))
    return law


def sizes(entry: Entry, event: Any, combinations: Any) -> Any:
    """|M| of the rows, (helicity, angle)."""
    return np.abs(law_of(entry).amplitudes(event, COUPLING, helicities=combinations))[:, 0, 0]


@pytest.mark.parametrize(("name", "factor"), [*product(DIFFERENT, FACTORS), *((name, 1.3) for name in ALIKE)])
def test_rows_are_the_diagrams_one_by_one(name: str, factor: float) -> None:
    """Each helicity agrees to 1e-12 of the largest with Dirac matrices, those left away vanish, |M|² is their sum."""
    entry = ENTRIES[name]
    rows = law_of(entry).combinations(entry.process.legs)
    found = collision(entry.threshold * mpmath.mpf(factor))
    event = entry.event(found, COSINES)
    law = dict(zip(rows, sizes(entry, event, rows), strict=True))
    squared = np.broadcast_to(entry.laws[0].squared(event, COUPLING), event.shape)[0]
    for node, cosine in enumerate(COSINES):
        momenta = entry.momenta(found, cosine)
        masses = list(map(mpmath.mpf, entry.masses))
        expected = {key: CHARGE_SQUARED * float(abs(entry.diagrams(momenta, key, masses))) for key in COMBINATIONS}
        largest = max(expected.values())
        for key, size in expected.items():
            got = law[key][node] if key in law else 0.0
            assert got == pytest.approx(size, rel=0, abs=1e-12 * largest)
        assert squared[node] == pytest.approx(sum(size**2 for size in expected.values()) / 4, rel=2e-14, abs=0)


POLES = 10.0 ** -np.arange(2, 13)
EVERYWHERE = np.concatenate([np.linspace(-0.99, 0.99, 41), 1 - POLES, POLES - 1])


@every_entry
@pytest.mark.parametrize("factor", FACTORS)
def test_averages_of_rows_are_the_squared_amplitude(entry: Entry, factor: float) -> None:
    """Unpolarised, both laws agree to 1e-12 from pole to pole, from the threshold to high energies."""
    event = entry.event(collision(mpmath.mpf(factor) * entry.threshold), EVERYWHERE)
    squared, summed = (law.squared(event, COUPLING) for law in entry.laws)
    assert np.broadcast_to(squared, event.shape) == pytest.approx(summed, rel=1e-12, abs=0)


@every_entry
@pytest.mark.parametrize("sqrt_s", [4.0, 90.0])
def test_laws_hold_without_masses(entry: Entry, sqrt_s: float) -> None:
    """With massless electrons, and with nothing but massless legs, both laws are finite and agree to 1e-12."""
    light = tuple(0.0 if mass in (ELECTRON, ROUNDED) else mass for mass in entry.masses)
    for masses in (light, (0.0,) * 4):
        event = entry._replace(masses=masses).event(collision(mpmath.mpf(sqrt_s)), EVERYWHERE)
        squared, summed = (law.squared(event, COUPLING) for law in entry.laws)
        assert np.all(np.isfinite(summed))
        assert np.broadcast_to(squared, event.shape) == pytest.approx(summed, rel=1e-12, abs=0)


def mirrored(key: Any) -> Any:
    """Space reflected: every helicity reversed."""
    return tuple(-helicity for helicity in key)


def conjugated(key: Any) -> Any:
    """C and P on a collision of particle and antiparticle: helicities reversed, and the legs of each side exchanged."""
    a, b, one, two = key
    return -b, -a, -two, -one


def reversed_in_time(key: Any) -> Any:
    """Before and after exchanged."""
    a, b, one, two = key
    return one, two, a, b


ELASTIC = ("bhabha", "moller", "electron-muon", "compton")
SELF_CONJUGATE = ("bhabha", "muon-pair", "photon-pair", "breit-wheeler")


@pytest.mark.parametrize(
    ("name", "turned"),
    [
        *((name, mirrored) for name in ENTRIES),
        *((name, conjugated) for name in SELF_CONJUGATE),
        *((name, reversed_in_time) for name in ELASTIC),
    ],
)
def test_symmetries_of_single_helicities(name: str, turned: Any) -> None:
    """P, CP and T leave every |M| as it is."""
    entry = ENTRIES[name]
    rows = law_of(entry).combinations(entry.process.legs)
    event = entry.event(collision(entry.threshold * mpmath.mpf(1.7)), (-0.6, 0.1, 0.8))
    assert set(map(turned, rows)) == set(rows)
    assert sizes(entry, event, rows) == pytest.approx(sizes(entry, event, [*map(turned, rows)]), rel=1e-14, abs=0)


def test_identical_electrons_may_be_exchanged() -> None:
    """Møller's |M| with the outgoing helicities exchanged is that at the opposite angle."""
    entry = ENTRIES["moller"]
    rows = law_of(entry).combinations(entry.process.legs)
    found = collision(entry.threshold * mpmath.mpf(1.7))
    here = sizes(entry, entry.event(found, (-0.6, 0.1, 0.8)), rows)
    there = sizes(entry, entry.event(found, (0.6, -0.1, -0.8)), [(a, b, two, one) for a, b, one, two in rows])
    assert here == pytest.approx(there, rel=1e-14, abs=0)


@every_entry
def test_only_the_wanted_rows_come_back(entry: Entry) -> None:
    """Rows are those asked for, in that order."""
    rows = law_of(entry).combinations(entry.process.legs)
    event = entry.event(collision(entry.threshold * 2), (-0.6, 0.1, 0.8))
    everything = sizes(entry, event, rows)
    assert np.array_equal(sizes(entry, event, rows[5:1:-1]), everything[5:1:-1])


@every_entry
def test_orientation_of_the_collision_is_of_no_matter(entry: Entry) -> None:
    """With beam a along −z the angle is still that between beam a and leg 1."""
    found = collision(entry.threshold * 2)
    turned = Collision(found.sqrt_s, found.correction, found.stretch, -1)
    here, there = (law_of(entry).squared(entry.event(one, (-0.6, 0.8)), COUPLING) for one in (found, turned))
    assert here == pytest.approx(there, rel=1e-14, abs=0)


@every_entry
def test_every_process_passes_the_conformance_kit(entry: Entry) -> None:
    """Load checks, second roads and claimed exchanges hold."""
    check_process(entry.process)


@every_entry
def test_every_process_says_what_a_user_must_know(entry: Entry) -> None:
    """References, order, validity, the radiation caution, claims and alternatives are stated."""
    process = entry.process
    assert process.references
    assert process.order == "tree"
    assert process.valid is not None
    assert process.valid.text
    assert process.claims is not None
    assert process.claims.limits
    assert process.alternatives
    assert any("radiation-protection expert" in caution for caution in process.cautions)
