"""Load checks and the conformance kit for every kind of law, with and without contributions."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from barnwright.process import (
    AngularCrossSection,
    ClosedForm,
    HelicityAmplitudes,
    Process,
    SquaredAmplitude,
    TotalCrossSection,
)
from barnwright.registry.checks import findings_of
from barnwright.testing import findings_of_process

COSINE = "cos_theta(1, frame=cm)"
ROWS = ((-1, 1, -1, 1), (-1, 1, 1, -1), (1, -1, 1, -1), (1, -1, -1, 1))
PARTS = {"photon": "a", "other": "b", "interference": "a*b"}
STRENGTHS = {"a": 1.0, "b": -0.25}


def made(*laws: Any, **fields: Any) -> Process:
    """A massless muon-pair process with these laws."""
    defaults: dict[str, Any] = {"masses": {"e-": 0.0, "mu-": 0.0}}
    return Process(**{"name": "pair", "reaction": "e- e+ -> mu- mu+", "laws": laws, **defaults, **fields})


def strength(parts: Any) -> float:
    """What two amplitudes of fixed ratio give in these parts."""
    a, b = STRENGTHS["a"], STRENGTHS["b"]
    known = {"a": a * a, "b": b * b, "a*b": 2 * a * b}
    return sum(known[key] for key in parts) if parts is not None else (a + b) ** 2


def squared(event: Any, parameters: Any) -> Any:
    """(t² + u²)/s², massless."""
    return (event.t**2 + event.u**2) / event.s**2


def squared_parts(event: Any, parameters: Any, parts: Any) -> Any:
    """The same of the parts asked for."""
    return strength(parts) * squared(event, parameters)


def amplitudes(event: Any, parameters: Any, helicities: Any = ROWS) -> Any:
    """√2 u/s or √2 t/s: the muon along or against the electron of its own helicity."""
    found = {True: event.u / event.s, False: event.t / event.s}
    return np.sqrt(2) * np.stack([found[row[0] == row[2]] for row in helicities])[:, None]


def amplitude_parts(event: Any, parameters: Any, parts: Any, helicities: Any = ROWS) -> Any:
    """Those of one of two amplitudes."""
    (key,) = parts
    return STRENGTHS[key] * amplitudes(event, parameters, helicities)


def angular(point: Any, cos_theta: Any, parameters: Any) -> Any:
    """dσ/dΩ = |M|²/64π²s."""
    return (1 + cos_theta**2) / 2 / (64 * np.pi**2 * point.s)


def angular_parts(point: Any, cos_theta: Any, parameters: Any, parts: Any) -> Any:
    """The same of the parts asked for."""
    return strength(parts) * angular(point, cos_theta, parameters)


def exchanged(point: Any, cos_theta: Any, parameters: Any, parts: Any) -> Any:
    """The whole is right, the part b is missing half and the part a has it."""
    moved = {"a": 0.5, "b": -0.5}
    share = strength(parts) + STRENGTHS["b"] ** 2 * sum(moved[key] for key in parts)
    return share * angular(point, cos_theta, parameters)


def closed(x: Any, point: Any, parameters: Any) -> Any:
    """∫ (1 + c²)/2 dc/32πs."""
    return (x + x**3 / 3) / (64 * np.pi * point.s)


def closed_parts(x: Any, point: Any, parameters: Any, parts: Any) -> Any:
    """The same of the parts asked for."""
    return strength(parts) * closed(x, point, parameters)


def total(point: Any, parameters: Any) -> Any:
    """The closed form over all angles."""
    return closed(1.0, point, parameters) - closed(-1.0, point, parameters)


def total_parts(point: Any, parameters: Any, parts: Any) -> Any:
    """The same of the parts asked for."""
    return strength(parts) * total(point, parameters)


def test_five_roads_to_one_number_pass() -> None:
    """|M|², helicity amplitudes, dσ/dΩ, σ(s) and an antiderivative of one reaction agree."""
    laws = (SquaredAmplitude(squared), HelicityAmplitudes(amplitudes, helicities=ROWS))
    more = (AngularCrossSection(angular), TotalCrossSection(total))
    assert findings_of_process(made(*laws, *more, closed_forms=(ClosedForm(closed, COSINE),))) == []


def test_five_roads_pass_part_by_part() -> None:
    """So do their contributions, of which the interference is negative."""
    laws = (SquaredAmplitude(squared_parts), HelicityAmplitudes(amplitude_parts, helicities=ROWS))
    more = (AngularCrossSection(angular_parts), TotalCrossSection(total_parts))
    form = ClosedForm(closed_parts, COSINE)
    assert findings_of_process(made(*laws, *more, closed_forms=(form,), contributions=PARTS)) == []


FAULTS: dict[str, tuple[Any, dict[str, Any]]] = {
    "laws[0] (<lambda>): expected a function (event, parameters, parts), got <lambda>(event, parameters)": (
        SquaredAmplitude(lambda event, parameters: 1.0),
        {"contributions": PARTS},
    ),
    "laws[0] (<lambda>): expected a function (event, parameters), got <lambda>(event, parameters, parts)": (
        HelicityAmplitudes(lambda event, parameters, parts: 1.0),
        {},
    ),
    "laws[0] (<lambda>): expected a function (point, cos_theta, parameters), got <lambda>(point, parameters)": (
        AngularCrossSection(lambda point, parameters: 1.0),
        {},
    ),
    "laws[0] (<lambda>): expected a function (point, parameters), got <lambda>(event, cos_theta, parameters)": (
        TotalCrossSection(lambda event, cos_theta, parameters: 1.0),
        {},
    ),
    "amplitudes: got an array of shape (3, 4), expected (helicity, flow, …) with 4 helicities and 1 flows": (
        HelicityAmplitudes(lambda event, parameters: event.t, helicities=ROWS),
        {},
    ),
    "expected finite numbers, got inf at sqrt_s = 1.58489 GeV, cos_theta = -0.9; 12 of 12 points": (
        HelicityAmplitudes(lambda event, parameters: np.full((4, 1, 1, 1), np.inf), helicities=ROWS),
        {},
    ),
    "expected an array that broadcasts to (point, 1) = (3, 1), got shape (3,)": (
        TotalCrossSection(lambda point, parameters: point.s[:, 0]),
        {},
    ),
    "expected a cross section of at least 0 (or signed=True), got -2.51189 at sqrt_s = 1.58489 GeV; 3 of 3 points": (
        TotalCrossSection(lambda point, parameters: -point.s),
        {},
    ),
    "expected a cross section of at least 0 (or signed=True), got -0.9 at sqrt_s = 1.58489 GeV, cos_theta = -0.9; 6": (
        AngularCrossSection(lambda point, cos_theta, parameters: cos_theta),
        {},
    ),
    "laws[0] (<lambda>): with parts = {b}: expected |M|² of at least 0 (or signed=True), got -1": (
        SquaredAmplitude(lambda event, parameters, parts: -1.0 if "a" not in parts else 1.0),
        {"contributions": {"a": "a", "b": "b"}},
    ),
    "laws[0] (<lambda>): with parts = {a*b}: raised KeyError: 'a*b'": (
        TotalCrossSection(lambda point, parameters, parts: 1.0 if len(parts) > 1 else {"a": 1.0, "b": 1.0}[min(parts)]),
        {"contributions": PARTS},
    ),
}


@pytest.mark.parametrize("message", FAULTS)
def test_a_law_that_breaks_its_promise_is_told_how(message: str) -> None:
    """The finding names law and parts, the expectation and the offending values."""
    law, fields = FAULTS[message]
    (finding,) = findings_of(made(law, **fields))
    assert message in finding


def test_a_total_law_of_anything_is_tried() -> None:
    """Where no final state is named, the point has the beams' momentum and σ(s) is looked at."""
    good = TotalCrossSection(lambda point, parameters: 1 / point.s)
    bad = TotalCrossSection(lambda point, parameters: np.log(-point.sqrt_s))
    assert findings_of_process(made(good, reaction="e- e+ -> X", masses={})) == []
    (finding,) = findings_of(made(bad, reaction="e- e+ -> X", masses={}))
    assert "expected finite numbers, got nan at sqrt_s = 0.00178173 GeV; 3 of 3 points" in finding


CONTRADICTIONS: dict[str, dict[str, Any]] = {
    "laws[1]: expected the dσ/dcos θ of laws[0], ": {
        "laws": (SquaredAmplitude(squared), HelicityAmplitudes(lambda e, p: 2 * amplitudes(e, p), helicities=ROWS)),
    },
    "laws[2]: expected the dσ/dcos θ of laws[1], ": {
        "laws": (
            TotalCrossSection(total),
            SquaredAmplitude(squared),
            AngularCrossSection(lambda point, cos_theta, parameters: 2 * angular(point, cos_theta, parameters)),
        ),
    },
    "laws[1]: with parts = {b}: expected the dσ/dcos θ of laws[0], ": {
        "laws": (SquaredAmplitude(squared_parts), AngularCrossSection(exchanged)),
        "contributions": {"photon": "a", "other": "b"},
    },
    "laws[0]: expected the sum of its parts (a, b, a*b) where all are asked for at once": {
        "laws": (
            SquaredAmplitude(lambda event, parameters, parts: 1.5 if len(parts) > 1 else float("*" not in min(parts))),
        ),
        "contributions": PARTS,
    },
    "closed_forms[0]: expected over all angles the total of laws[0], ": {
        "laws": (TotalCrossSection(lambda point, parameters: 2 * total(point, parameters)),),
        "closed_forms": (ClosedForm(closed, COSINE),),
    },
    "laws[0]: asked for the helicities (1, -1, -1, 1), (-1, 1, 1, -1), … alone, expected the same rows as among all": {
        "laws": (
            HelicityAmplitudes(
                lambda event, parameters, helicities: amplitudes(event, parameters, ROWS[: len(helicities)]),
                helicities=ROWS,
            ),
        ),
    },
    "laws[0]: asked for 2 helicities ((1, -1, -1, 1), (-1, 1, 1, -1), …), got 4 rows": {
        "laws": (
            HelicityAmplitudes(lambda event, parameters, helicities: amplitudes(event, parameters), helicities=ROWS),
        ),
    },
}


@pytest.mark.parametrize("message", CONTRADICTIONS)
def test_the_kit_finds_contradictions(message: str) -> None:
    """Laws that differ, parts that do not add up, and rows in another order are told with the law's number."""
    fields = dict(CONTRADICTIONS[message])
    found = findings_of_process(made(*fields.pop("laws"), **fields))
    assert found
    assert any(text.startswith(message) for text in found), found


def test_laws_are_compared_where_both_hold() -> None:
    """A law for massless electrons is compared with a general one at no mass."""

    def general(event: Any, parameters: Any) -> Any:
        return squared(event, parameters) + event.mass("beam_a")

    laws = (SquaredAmplitude(squared, massless=("e-", "mu-")), SquaredAmplitude(general))
    assert findings_of_process(made(*laws, masses={})) == []


def test_an_angular_law_counts_identical_particles_once() -> None:
    """The core divides by k!, a closed form has done so already."""

    def isotropic(point: Any, cos_theta: Any, parameters: Any) -> Any:
        return 1 / (64 * np.pi**2 * point.s) + 0 * cos_theta

    def halved(x: Any, point: Any, parameters: Any) -> Any:
        return x / (64 * np.pi * point.s)

    laws = (SquaredAmplitude(lambda event, parameters: 1.0), AngularCrossSection(isotropic))
    process = made(
        *laws, reaction="e- e+ -> gamma gamma", masses={"e-": 0.0}, closed_forms=(ClosedForm(halved, COSINE),)
    )
    assert findings_of_process(process) == []
