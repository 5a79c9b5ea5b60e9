"""e- e+ -> e- e+ through photon and Z: both roads against spinors, electrodynamics and the published formula."""

from __future__ import annotations

from itertools import product
from typing import Any

import numpy as np
import pytest
from barnwright_electroweak.electron_pair import ROWS, process
from barnwright_qed import bhabha
from scipy import constants

import barnwright
from barnwright.amplitudes import current, dot, external_states, propagator, z_coupling
from barnwright.errors import RequestError
from barnwright.event import Event
from barnwright.kinematics import TwoBody
from barnwright.process import HelicityAmplitudes
from barnwright.testing import check_process

from .electroweak_pairs import ENERGIES, EVERYTHING, PINNED, POLARISED, charge_squared, collision, mixing, z_squared

COSINES = np.array([[-1.0, -1 + 1e-9, -0.71, 0.0, 0.3, 0.9, 0.999]])
SCHEMES: list[dict[str, Any]] = [{}, {"scheme": "fermi"}, {"scheme": "on_shell"}, {"width_scheme": "fixed"}]
CUT = {"name": "central", "observable": "cos_theta(1, frame=cm)", "min": -0.9, "max": 0.9}
SQUARED: Any = process.laws[0]
ROAD: Any = process.laws[1]


def inputs(**changes: Any) -> Any:
    """The pinned inputs with changes."""
    return process.parameters_of({**PINNED, **changes})


def event(cosines: Any = COSINES, orientation: int = 1) -> Event:
    """Events of massless electrons at ENERGIES."""
    turned = TwoBody(collision(ENERGIES, orientation), (0.0,) * 4, 1 - cosines, 1 + cosines, -1.1)
    return Event(process.legs, turned)


def diagrams(events: Event, parameters: Any, keyword: str) -> dict[tuple[int, ...], Any]:
    """Annihilation minus scattering (Fermi) by explicit spinors for every combination of helicities."""
    rows = tuple(product((-1, 1), repeat=4))
    electron, positron, one, two = external_states(events, rows)
    couplings = z_coupling("e-", mixing(parameters)) if keyword == "z" else (1.0, 1.0)
    strength = z_squared(parameters) if keyword == "z" else charge_squared(parameters)

    def exchanged(q2: Any) -> Any:
        line = parameters.z_mass, parameters.z_width, parameters.width_scheme
        return propagator(q2, *line) if keyword == "z" else 1 / q2

    annihilated = dot(current(positron, electron, *couplings), current(one, two, *couplings)) * exchanged(events.s)
    scattered = dot(current(one, electron, *couplings), current(positron, two, *couplings)) * exchanged(events.t)
    return dict(zip(rows, strength * (annihilated - scattered), strict=True))


@pytest.mark.parametrize("changes", SCHEMES, ids=str)
@pytest.mark.parametrize("orientation", [1, -1])
def test_rows_are_the_diagrams_of_explicit_spinors(changes: dict[str, Any], orientation: int) -> None:
    """Photon and Z, helicity by helicity, agree to 1e-12 of the largest with spinors; the rows left away vanish."""
    parameters, events = inputs(**changes), event(orientation=orientation)
    for keyword in ("photon", "z"):
        expected = diagrams(events, parameters, keyword)
        found = dict(zip(ROWS, ROAD.amplitudes(events, parameters, frozenset({keyword})), strict=True))
        largest = np.max([np.abs(row) for row in expected.values()], axis=0)
        for key, row in expected.items():
            got = np.abs(found[key][0]) if key in found else 0.0
            assert np.all(np.abs(got - np.abs(row)) < 1e-12 * largest)


@pytest.mark.parametrize("changes", SCHEMES, ids=str)
@pytest.mark.parametrize("polarised", POLARISED)
def test_squares_are_those_of_the_diagrams(changes: dict[str, Any], polarised: tuple[float, float]) -> None:
    """Both roads, part by part, polarised or not, agree to 1e-12 with the squares of the diagrams."""
    parameters, events = inputs(**changes), event()
    photon, z = (diagrams(events, parameters, keyword) for keyword in ("photon", "z"))
    total: dict[str, Any] = {"photon": 0.0, "z": 0.0, "photon*z": 0.0}
    for key, row in photon.items():
        weight = (1 + key[0] * polarised[0]) * (1 + key[1] * polarised[1]) / 4
        total["photon"] += weight * np.abs(row) ** 2
        total["z"] += weight * np.abs(z[key]) ** 2
        total["photon*z"] += weight * 2 * np.real(row * np.conj(z[key]))
    scale = total["photon"] + total["z"]
    for parts in (frozenset({"photon"}), frozenset({"z"}), frozenset({"photon*z"}), EVERYTHING):
        wanted = sum(total[part] for part in parts)
        found = [ROAD.squared(events, parameters, parts, polarised)]
        if polarised == (0.0, 0.0):
            found.append(SQUARED.squared(events, parameters, parts))
        for got in found:
            assert np.all(np.abs(got - wanted) < 1e-12 * scale)


def test_photon_alone_is_bhabha_of_electrodynamics() -> None:
    """With the Z switched off and one α the law is that of qed/bhabha for massless electrons, to 1e-12."""
    other: Any = bhabha.process.laws[0]
    turned = TwoBody(collision(ENERGIES), (0.0,) * 4, 1 - COSINES, 1 + COSINES)
    theirs = Event(bhabha.process.legs, turned)
    expected = other.squared(theirs, bhabha.process.parameters(alpha=constants.fine_structure))
    found = SQUARED.squared(event(), inputs(alpha=constants.fine_structure), frozenset({"photon"}))
    assert found == pytest.approx(expected, rel=1e-12, abs=0)


def test_published_formula_of_photon_and_z() -> None:
    """|M|² agrees to 1e-12 with the published form in vector and axial couplings.

    With χ(q²) = g_Z² q² P(q²)/4e² and v = −½ + 2 sin²θ_W, a = −½, it is e⁴/4 times the sum over both signs of
    (1 + c)² |1 + s/t + (v ± a)² (χ(s) + (s/t) χ(t))|² + (1 − c)² |1 + (v² − a²) χ(s)|² + (2s/t)² |1 + (v² − a²) χ(t)|².
    Source: R. Budny, Phys. Lett. B 55 (1975) 227 (from memory).
    """
    parameters, events = inputs(), event()
    vector, axial = -0.5 + 2 * parameters.sin2_theta_w, -0.5
    s, t, c = events.s, events.t, COSINES
    unit = z_squared(parameters) / (4 * charge_squared(parameters))
    line = parameters.z_mass, parameters.z_width, parameters.width_scheme
    chi_s, chi_t = unit * s * propagator(s, *line), unit * t * propagator(t, *line)
    total: Any = 0.0
    for sign in (-1, 1):
        square = (vector + sign * axial) ** 2
        total = total + (1 + c) ** 2 * np.abs(1 + s / t + square * (chi_s + s / t * chi_t)) ** 2
        mixed = vector**2 - axial**2
        total = (
            total + (1 - c) ** 2 * np.abs(1 + mixed * chi_s) ** 2 + 4 * (s / t) ** 2 * np.abs(1 + mixed * chi_t) ** 2
        )
    expected = charge_squared(parameters) ** 2 * total / 4
    assert SQUARED.squared(events, parameters) == pytest.approx(expected, rel=1e-12, abs=1e-16)


def test_process_conforms() -> None:
    """The process passes the conformance kit."""
    check_process(process)
    assert isinstance(process.laws[1], HelicityAmplitudes)


def test_forward_pole_must_be_cut_away() -> None:
    """Without a cut the request is refused, and t is named; with one it is answered."""
    beams = {"kind": "collider", "sqrt_s": 91.1876}
    with pytest.raises(RequestError, match="cuts: "):
        barnwright.predict(process="electroweak/electron-pair", beams=beams)
    found = barnwright.predict(
        process="electroweak/electron-pair", beams=beams, parameters={"z_mass": 91.1876}, cuts=[CUT], unit="nb"
    )
    assert found.status == "converged"
    assert found.method == "quadrature"
    assert found.total.value > 0


def test_photon_dominates_at_small_angles() -> None:
    """dσ/dΩ approaches that of the photon as t → 0, polarised or not; the Z's share is of order t/M_Z²."""
    events, parameters = event(np.array([[1 - 1e-6]])), inputs()
    for polarised in POLARISED[:3]:
        whole = ROAD.squared(events, parameters, EVERYTHING, polarised)
        photon = ROAD.squared(events, parameters, frozenset({"photon"}), polarised)
        assert whole == pytest.approx(photon, rel=1e-4)
