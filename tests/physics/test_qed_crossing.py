"""Crossing, exchange and gauge: what the processes of the QED plugin claim about their amplitudes."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Any

import mpmath
import numpy as np
import pytest

from barnwright.event import Event

from . import qed_diagrams
from .qed_processes import COUPLING, ENTRIES, Entry, collision

COSINES = (-0.9, -0.35, 0.2, 0.85)
Moved = Mapping[str | int, tuple[str | int, int]]

FROM_COMPTON: dict[str, Moved] = {
    "photon-pair": {"beam_a": ("beam_b", 1), "beam_b": (2, -1), 1: ("beam_a", -1), 2: (1, 1)},
    "breit-wheeler": {"beam_a": ("beam_a", 1), "beam_b": (1, -1), 1: (2, 1), 2: ("beam_b", -1)},
}
SCATTERED: Moved = {"beam_a": ("beam_a", 1), "beam_b": (1, -1), 1: (2, 1), 2: ("beam_b", -1)}
"""A pair from a pair out of scattering."""
PAIRED: Moved = {"beam_a": ("beam_a", 1), "beam_b": (2, -1), 1: ("beam_b", -1), 2: (1, 1)}
"""Scattering out of a pair from a pair."""
OF_ONE_KIND: Moved = {"beam_a": ("beam_a", 1), "beam_b": (2, -1), 1: (1, 1), 2: ("beam_b", -1)}
"""Electron and positron out of two electrons."""


@pytest.fixture(autouse=True)
def _digits() -> Iterator[None]:
    """Work in 50 digits, whatever another test asked for."""
    with mpmath.workdps(50):
        yield


class Crossed:
    """An event whose legs are those of another one, with a sign where they changed sides."""

    def __init__(self, event: Event, moved: Moved) -> None:
        self.event, self.moved = event, moved

    def mass(self, leg: str | int) -> float:
        """The mass of a leg."""
        return self.event.mass(self.moved[leg][0])

    def dot(self, first: str | int, second: str | int) -> Any:
        """The four-product of two legs."""
        (x, sign), (y, other) = self.moved[first], self.moved[second]
        return sign * other * self.event.dot(x, y)

    def transfer(self, first: str | int, second: str | int) -> Any:
        """(p_first − p_second)²."""
        return self.mass(first) ** 2 + self.mass(second) ** 2 - 2 * self.dot(first, second)

    @property
    def s(self) -> Any:
        """(p_a + p_b)²."""
        return self.mass("beam_a") ** 2 + self.mass("beam_b") ** 2 + 2 * self.dot("beam_a", "beam_b")

    @property
    def t(self) -> Any:
        """(p_a − p_1)²."""
        return self.transfer("beam_a", 1)

    @property
    def u(self) -> Any:
        """(p_a − p_2)²."""
        return self.transfer("beam_a", 2)


def law(name: str, event: Any) -> Any:
    """|M|² of a process's squared amplitude."""
    return ENTRIES[name].laws[0].squared(event, COUPLING)


@pytest.mark.parametrize(
    ("origin", "name", "moved", "sign"),
    [
        ("compton", "photon-pair", FROM_COMPTON["photon-pair"], -1),
        ("compton", "breit-wheeler", FROM_COMPTON["breit-wheeler"], -1),
        (
            "photon-pair",
            "breit-wheeler",
            {"beam_a": (1, -1), "beam_b": (2, -1), 1: ("beam_b", -1), 2: ("beam_a", -1)},
            1,
        ),
        ("electron-muon", "muon-pair", SCATTERED, 1),
        ("muon-pair", "electron-muon", PAIRED, 1),
        ("moller", "bhabha", OF_ONE_KIND, 1),
        ("bhabha", "moller", OF_ONE_KIND, 1),
    ],
)
@pytest.mark.parametrize("factor", [1.2, 40.0])
def test_crossed_momenta_turn_one_law_into_another(
    origin: str, name: str, moved: Moved, sign: int, factor: float
) -> None:
    """At momenta moved to other sides a process's |M|² is that of the process it claims to cross to, up to the sign."""
    entry = ENTRIES[origin]
    event = entry.event(collision(entry.threshold * mpmath.mpf(factor)), COSINES)
    assert f"qed/{origin}" in ENTRIES[name].claims.crossing
    assert sign * law(name, Crossed(event, moved)) == pytest.approx(law(origin, event), rel=1e-11, abs=0)


EXCHANGES = [(name, pair) for name, entry in ENTRIES.items() for pair in entry.claims.exchange]


@pytest.mark.parametrize(("name", "pair"), EXCHANGES)
def test_claimed_exchanges_leave_the_law_as_it_is(name: str, pair: tuple[Any, Any]) -> None:
    """|M|² stays the same when the two momenta of a claim are exchanged."""
    entry = ENTRIES[name]
    event = entry.event(collision(entry.threshold * mpmath.mpf(1.7)), COSINES)
    moved: dict[str | int, tuple[str | int, int]] = {leg: (leg, 1) for leg in ("beam_a", "beam_b", 1, 2)}
    moved[pair[0]], moved[pair[1]] = moved[pair[1]], moved[pair[0]]
    assert law(name, Crossed(event, moved)) == pytest.approx(law(name, event), rel=1e-12, abs=0)


GAUGE = [name for name, entry in ENTRIES.items() if entry.claims.gauge_legs]
CODES = {"beam_a": 0, "beam_b": 1, 1: 2, 2: 3}


def family(entry: Entry) -> str:
    """The name under which the diagrams know their photons."""
    return "breit-wheeler" if entry.process.name.startswith("breit") else entry.process.name


@pytest.mark.parametrize("name", GAUGE)
def test_a_polarisation_along_the_momentum_gives_nothing(name: str) -> None:
    """With its momentum in place of the polarisation vector of a claimed leg, the amplitude vanishes to 1e-40.

    The amplitudes of the plugin are tied to these diagrams, row by row, by test_qed_helicities.py.
    """
    entry = ENTRIES[name]
    momenta = entry.momenta(collision(entry.threshold * mpmath.mpf(1.7)), 0.3)
    masses = list(map(mpmath.mpf, entry.masses))
    legs = [CODES[leg] for leg in entry.claims.gauge_legs]
    for key in qed_diagrams.COMBINATIONS:
        vectors = qed_diagrams.photons_of(family(entry), momenta, key)
        for place in range(2):
            replaced = [momenta[legs[place]] if i == place else vectors[i] for i in range(2)]
            assert abs(entry.diagrams(momenta, key, masses, replaced)) < 1e-40


@pytest.mark.parametrize("name", GAUGE)
def test_sums_over_polarisations_do_not_depend_on_the_gauge(name: str) -> None:
    """Multiples of its momentum added to a polarisation vector change no amplitude."""
    entry = ENTRIES[name]
    momenta = entry.momenta(collision(entry.threshold * mpmath.mpf(1.7)), 0.3)
    masses = list(map(mpmath.mpf, entry.masses))
    legs = [CODES[leg] for leg in entry.claims.gauge_legs]
    key = (1, 1, 1, 1)
    vectors = qed_diagrams.photons_of(family(entry), momenta, key)
    shifted = [[e + 3 * p for e, p in zip(vectors[i], momenta[legs[i]], strict=True)] for i in range(2)]
    plain, moved = (entry.diagrams(momenta, key, masses, photons) for photons in (vectors, shifted))
    assert abs(plain - moved) < 1e-40
    assert abs(plain) > 1e-3


def test_every_leg_with_a_photon_is_claimed() -> None:
    """Gauge claims name the photons, and only these."""
    for entry in ENTRIES.values():
        reaction = entry.process.legs
        names = dict(zip(CODES, (*reaction.incoming, *reaction.outgoing), strict=True))
        photons = {leg for leg, particle in names.items() if particle == "gamma"}
        assert set(entry.claims.gauge_legs) == photons


def test_claims_of_crossing_are_mutual() -> None:
    """Whoever is named as crossed names the other."""
    for name, entry in ENTRIES.items():
        for other in entry.claims.crossing:
            back = ENTRIES[other.removeprefix("qed/")].claims.crossing
            assert f"qed/{name}" in back


def test_masses_are_those_of_the_event() -> None:
    """With the masses of both leptons equal, electron-muon is one of Møller's two diagrams: |M|² at small angles."""
    entry = ENTRIES["moller"]
    event = entry.event(collision(entry.threshold * 20), (1 - 1e-10,))
    equal = ENTRIES["electron-muon"]._replace(masses=entry.masses)
    other = equal.event(collision(entry.threshold * 20), (1 - 1e-10,))
    assert law("electron-muon", other) == pytest.approx(np.asarray(law("moller", event)), rel=1e-9, abs=0)
