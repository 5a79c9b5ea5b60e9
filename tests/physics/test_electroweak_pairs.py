"""e- e+ -> f f~ by three roads and two second opinions, for every flavour from 10 to 250 GeV."""

from __future__ import annotations

from itertools import pairwise, product
from typing import Any

import numpy as np
import pytest

from barnwright.process import HelicityAmplitudes, Parts

from .electroweak_pairs import COSINES, ENERGIES, EVERYTHING, FLAVOURS, POLARISED, Flavour, Published, diagrams

every_flavour = pytest.mark.parametrize("flavour", FLAVOURS.values(), ids=FLAVOURS.keys())
SETS = [frozenset({"photon"}), frozenset({"z"}), frozenset({"photon*z"}), frozenset({"z", "photon*z"}), EVERYTHING]
SCHEMES: list[dict[str, Any]] = [{}, {"scheme": "fermi"}, {"scheme": "on_shell"}, {"width_scheme": "fixed"}]
NODES, WEIGHTS = np.polynomial.legendre.leggauss(3)
"""Exact for the cubic that a vector exchange gives."""


def whole(flavour: Flavour) -> Parts | None:
    """Everything that a process has, as the core asks for it."""
    return EVERYTHING if flavour.charged else None


def roads(flavour: Flavour, electron: float) -> list[HelicityAmplitudes]:
    """The laws of helicity amplitudes that hold for these masses."""
    massless = {"e-": electron == 0, flavour.name: flavour.mass == 0}
    laws = [law for law in flavour.process.laws if isinstance(law, HelicityAmplitudes)]
    return [law for law in laws if all(massless[leg] for leg in law.massless)]


def squares(flavour: Flavour, law: HelicityAmplitudes, event: Any, parameters: Any, keyword: str) -> Any:
    """|M|² of every combination of helicities, rising, (helicity, point, node); 0 where the law has no row."""
    parts = {"parts": frozenset({keyword})} if flavour.charged else {}
    rows = law.combinations(flavour.process.legs)
    after = [(-1, 1), (-1, 1)] if flavour.charged else [(-1,), (1,)]
    known = dict(zip(rows, law.amplitudes(event, parameters, helicities=rows, **parts), strict=True))
    nothing = np.zeros((1, *event.shape))
    return np.array([np.abs(known.get(key, nothing)[0]) ** 2 for key in product((-1, 1), (-1, 1), *after)])


@every_flavour
@pytest.mark.parametrize("electron", [0.0, 1.0], ids=["massless", "massive"])
@pytest.mark.parametrize("orientation", [1, -1])
def test_rows_are_the_diagrams_of_explicit_spinors(flavour: Flavour, electron: float, orientation: int) -> None:
    """Photon and Z, helicity by helicity, agree to 1e-13 of their sum with spinors, also with an electron of 1 GeV."""
    parameters = flavour.parameters()
    event = flavour.event(electron, orientation=orientation)
    for keyword in ("photon", "z") if flavour.charged else ("z",):
        expected = np.abs(diagrams(flavour, event, parameters, keyword)) ** 2
        for law in roads(flavour, electron):
            found = squares(flavour, law, event, parameters, keyword)
            assert np.all(np.abs(found - expected) < 1e-13 * expected.sum(axis=0))


@every_flavour
@pytest.mark.parametrize("electron", [0.0, 1.0], ids=["massless", "massive"])
@pytest.mark.parametrize("changes", SCHEMES, ids=str)
def test_squared_amplitude_is_the_sum_of_diagrams(flavour: Flavour, electron: float, changes: dict[str, Any]) -> None:
    """|M|² and each of its parts agree to 1e-13 with explicit spinors, in every scheme of couplings and width."""
    parameters, event = flavour.parameters(**changes), flavour.event(electron)
    known = {key: diagrams(flavour, event, parameters, key) for key in ("photon", "z")} if flavour.charged else {}
    z = known.get("z", diagrams(flavour, event, parameters, "z"))
    photon = known.get("photon", 0 * z)
    expected = {
        "photon": np.abs(photon) ** 2,
        "z": np.abs(z) ** 2,
        "photon*z": 2 * np.real(photon * np.conj(z)),
    }
    summed = {key: flavour.colours / 4 * rows.sum(axis=0) for key, rows in expected.items()}
    scale = summed["photon"] + summed["z"]
    for parts in SETS if flavour.charged else [None]:
        found = flavour.process.laws[0].squared(event, parameters, parts)  # type: ignore[union-attr]
        wanted = sum(summed[key] for key in parts or {"z"})
        assert np.all(np.abs(found - wanted) < 1e-13 * scale)


@every_flavour
@pytest.mark.parametrize("electron", [0.0, 0.2], ids=["massless", "massive"])
def test_three_roads_agree(flavour: Flavour, electron: float) -> None:
    """Helicity amplitudes, squared amplitude and the bins of the closed form agree to 1e-12, contribution by
    contribution."""
    parameters = flavour.parameters()
    edges = np.array([[-1.0, -0.6, 0.1, 0.75, 1.0]])
    middle, half = (edges[:, 1:] + edges[:, :-1]) / 2, np.diff(edges) / 2
    cosines = (middle[..., None] + half[..., None] * NODES).reshape(1, -1)
    event = flavour.event(electron, cosines=cosines)
    beta = np.sqrt((ENERGIES**2 - 4 * flavour.mass**2) / (ENERGIES**2 - 4 * electron**2))
    factor = beta / (32 * np.pi * ENERGIES**2)
    scale = np.abs(np.diff(flavour.heights(parameters, electron, cosines=edges)))
    for parts in SETS if flavour.charged else [None]:
        closed = np.diff(flavour.heights(parameters, electron, parts or EVERYTHING, edges))
        for law in (flavour.process.laws[0], *roads(flavour, electron)):
            density = np.broadcast_to(law.squared(event, parameters, parts), event.shape)  # type: ignore[union-attr]
            integral = (density.reshape(len(ENERGIES), -1, 3) * WEIGHTS).sum(axis=-1) * half * factor
            assert np.all(np.abs(integral - closed) < 1e-12 * scale.max(axis=1, keepdims=True))


@every_flavour
@pytest.mark.parametrize("polarised", POLARISED)
@pytest.mark.parametrize("changes", SCHEMES, ids=str)
def test_polarised_rows_integrate_to_the_published_cross_section(
    flavour: Flavour, polarised: tuple[float, float], changes: dict[str, Any]
) -> None:
    """Both hemispheres agree to 1e-12 with the published formula in vector and axial couplings, beams polarised."""
    parameters, edges = flavour.parameters(**changes), (-1.0, 0.0, 1.0)
    cosines = np.concatenate([(NODES - 1) / 2, (NODES + 1) / 2])[None, :]
    event = flavour.event(cosines=cosines)
    factor = np.sqrt(1 - 4 * flavour.mass**2 / ENERGIES**2) / (64 * np.pi * ENERGIES**2)
    for law in roads(flavour, 0.0):
        density = law.squared(event, parameters, whole(flavour), polarised).reshape(len(ENERGIES), 2, 3)
        found = (density * WEIGHTS).sum(axis=-1) * factor
        for energy, halves in zip(ENERGIES[:, 0], found, strict=True):
            published = Published(flavour, energy, parameters, flavour.charged)
            expected = [float(published.integral(*ends, polarised)) for ends in pairwise(edges)]
            assert halves == pytest.approx(expected, rel=1e-12, abs=0)


@every_flavour
def test_beams_of_equal_helicity_do_nothing(flavour: Flavour) -> None:
    """With massless electrons and (P-, P+) = (1, 1) or (−1, −1), |M|² is 0 exactly."""
    event, parameters = flavour.event(), flavour.parameters()
    for law in roads(flavour, 0.0):
        for both in (1.0, -1.0):
            assert not np.any(law.squared(event, parameters, whole(flavour), (both, both)))


@every_flavour
def test_cp_holds_helicity_by_helicity(flavour: Flavour) -> None:
    """CP exchanges particle and antiparticle and reverses helicities: |M|² at the same angle stays, masses exact."""
    event, parameters = flavour.event(1.0), flavour.parameters()
    law = roads(flavour, 1.0)[-1]
    rows = law.combinations(flavour.process.legs)
    parts = {"parts": frozenset({"photon", "z"})} if flavour.charged else {}
    found = dict(zip(rows, np.abs(law.amplitudes(event, parameters, helicities=rows, **parts)), strict=True))
    scale = max(float(np.max(size)) for size in found.values())
    for (a, b, one, two), size in found.items():
        assert size == pytest.approx(found[-b, -a, -two, -one], rel=1e-12, abs=1e-13 * scale)


@every_flavour
def test_both_directions_reversed_is_a_rotation(flavour: Flavour) -> None:
    """Both beams exchanged, or beam a along −z: |M|² depends on the angle between beam a and leg 1 alone."""
    parameters = flavour.parameters()
    for law in flavour.process.laws[:2]:
        ahead, back = (law.squared(flavour.event(orientation=way), parameters, whole(flavour)) for way in (1, -1))
        assert np.broadcast_to(ahead, (len(ENERGIES), COSINES.size)) == pytest.approx(back, rel=1e-12, abs=0)
