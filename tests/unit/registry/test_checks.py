"""Load checks: what they accept, and the sentence for each fault."""

from __future__ import annotations

import re
from typing import Any

import numpy as np
import pytest

from barnwright.errors import PluginError
from barnwright.process import Claims, ClosedForm, Parameters, Process, SquaredAmplitude, Validity, parameter
from barnwright.registry.check_points import CheckPoints
from barnwright.registry.checks import findings_of
from barnwright.testing import check_process, findings_of_process

COSINE = "cos_theta(1, frame=cm)"


class Required(Parameters):
    """A parameter without a default."""

    strength: float = parameter()


def photon(event: Any, parameters: Any) -> Any:
    """(t² + u²)/s², massless."""
    return (event.t**2 + event.u**2) / event.s**2


def made(law: Any = photon, **fields: Any) -> Process:
    """A massless muon-pair process with this law."""
    defaults: dict[str, Any] = {"laws": (SquaredAmplitude(law),), "masses": {"e-": 0.0, "mu-": 0.0}}
    return Process(**{"name": "pair", "reaction": "e- e+ -> mu- mu+", **defaults, **fields})


def photon_closed(x: Any, point: Any, parameters: Any) -> Any:
    """∫ (1 + c²)/2 dc/32πs."""
    return (x + x**3 / 3) / (64 * np.pi * point.s)


FAULTS = {
    "expected a function (event, parameters), got <lambda>(event)": lambda event: 1.0,
    "expected an array of real numbers, got 'one' of type <U3": lambda event, parameters: "one",
    "expected an array of real numbers": lambda event, parameters: event.s * 1j,
    "expected an array that broadcasts to (point, node) = (3, 4), got shape (3,)": lambda e, p: np.ones(len(e.s)),
    "raised ZeroDivisionError: division by zero": lambda event, parameters: 1 / 0,
    "raised SystemExit: 1": lambda event, parameters: exec("raise SystemExit(1)"),  # noqa: S102 - a plugin that leaves
    "expected finite numbers, got -inf at sqrt_s = ": lambda event, parameters: event.t / 0.0,
    "expected |M|² of at least 0 (or signed=True), got -0.": lambda event, parameters: event.t / event.s,
    "expected the same values for a point alone as in a batch of three": lambda e, p: e.s / np.max(e.s),
}


@pytest.mark.parametrize("message", FAULTS)
def test_a_law_that_breaks_its_promise_is_told_how(message: str) -> None:
    """The finding names the law, the expectation and the offending values."""
    (finding,) = findings_of(made(FAULTS[message]))
    assert finding.startswith("laws[0] (<lambda>): ")
    assert message in finding


def test_offending_values_come_with_their_place() -> None:
    """A negative |M|² is told with √s, the angle and how many points are like it."""
    (finding,) = findings_of(made(lambda event, parameters: event.t / event.s))
    assert re.search(r"got -0\.95 at sqrt_s = 1\.58489 GeV, cos_theta = -0\.9; 12 of 12 points$", finding)


def test_a_signed_law_may_be_negative() -> None:
    """An interference term declares it."""
    assert findings_of(made(lambda event, parameters: event.t / event.s, signed=True)) == []


def test_a_law_may_return_one_number() -> None:
    """What broadcasts to the batch is enough."""
    assert findings_of(made(lambda event, parameters: 1)) == []


def test_a_law_cannot_write_into_its_event() -> None:
    """The arrays of an event are read-only: writing is a finding, not silent damage."""

    def writes(event: Any, parameters: Any) -> Any:
        event.t[...] = 0
        return event.t

    assert findings_of(made(writes)) == ["laws[0] (writes): raised ValueError: assignment destination is read-only"]


def test_massless_legs_are_massless_when_their_law_is_tried() -> None:
    """A law that holds only without masses is not blamed for the default masses."""

    def needs_massless(event: Any, parameters: Any) -> Any:
        return np.where(event.mass("beam_a") + event.mass(1) > 0, np.nan, photon(event, parameters))

    law = SquaredAmplitude(needs_massless, massless=("e-", "mu-"))
    assert findings_of(made(laws=(law,), masses={})) == []


def test_the_example_stands_in_for_required_parameters() -> None:
    """A parameter without a default has the example's value in the checks."""

    def scaled(event: Any, parameters: Required) -> Any:
        return parameters.strength * photon(event, parameters)

    assert findings_of(made(scaled, parameters=Required, example={"strength": 2.0})) == []
    (finding,) = findings_of(made(scaled, parameters=Required, example={"strength": -2.0}))
    assert "at least 0" in finding


def test_check_points_lie_between_threshold_and_validity() -> None:
    """Three energies, above threshold and inside the range of validity, also where that begins below threshold."""
    process = made(masses={}, valid=Validity((0.0, 0.3), "near threshold"))
    points = CheckPoints.of(process, (0.0, 0.0, 0.1, 0.1))
    assert points.sqrt_s.shape == (3,)
    assert np.all((points.sqrt_s > 0.2) & (points.sqrt_s < 0.3))
    assert points.event(slice(0, 2)).shape == (2, 4)


def test_a_validity_below_threshold_is_a_finding() -> None:
    """A process that is valid nowhere says so at load."""
    (finding,) = findings_of(made(masses={}, valid=Validity((0.0, 0.1), "nowhere")))
    assert "valid.sqrt_s: got an upper end of 0.1, expected more than the threshold, 0.211317 GeV" in finding


def closed(function: Any, **more: Any) -> Process:
    """A process with a closed form beside its law."""
    return made(closed_forms=(ClosedForm(function, observable=COSINE),), **more)


CLOSED_FAULTS = {
    "expected a function (x, point, parameters), got <lambda>(x, point)": lambda x, point: x,
    "expected finite numbers, got nan": lambda x, point, parameters: np.sqrt(x),
    "expected values that rise with cos_theta(1, frame=cm), got 0.9, 0.3, -0.2, -0.7 at -0.9, -0.3, 0.2, 0.7": (
        lambda x, point, parameters: -x
    ),
    "got shape (3, 5)": lambda x, point, parameters: np.ones((3, 5)),
}


@pytest.mark.parametrize("message", CLOSED_FAULTS)
def test_a_closed_form_that_breaks_its_promise_is_told_how(message: str) -> None:
    """The finding names the closed form, the expectation and the offending values."""
    (finding,) = findings_of(closed(CLOSED_FAULTS[message]))
    assert finding.startswith("closed_forms[0] (<lambda>): ")
    assert message in finding


def test_the_kit_compares_closed_form_and_law() -> None:
    """An antiderivative of the law passes; one with another factor is told both values."""
    check_process(closed(photon_closed, claims=Claims(exchange=((1, 2),))))
    twice = closed(lambda x, point, parameters: 2 * photon_closed(x, point, parameters))
    with pytest.raises(PluginError, match=r"^process pair: closed_forms\[0\]: expected the integral of laws\[0\], "):
        check_process(twice)


def test_the_kit_counts_identical_particles_once() -> None:
    """A closed form includes 1/k!, a law does not."""

    def halved(x: Any, point: Any, parameters: Any) -> Any:
        return x / (64 * np.pi * point.s)

    process = made(
        lambda event, parameters: 1.0,
        reaction="e- e+ -> gamma gamma",
        masses={"e-": 0.0},
        closed_forms=(ClosedForm(halved, observable=COSINE),),
    )
    assert findings_of_process(process) == []


def test_the_kit_tries_a_claimed_exchange() -> None:
    """A law that prefers forward angles is not symmetric, whatever it claims."""
    process = made(lambda event, parameters: (event.u / event.s) ** 2, claims=Claims(exchange=(("mu-", "mu+"),)))
    expected = "laws[0]: claims.exchange names legs 1 and 2, but |M|² differs at cos_theta and -cos_theta"
    assert findings_of_process(process) == [expected]


def test_other_reactions_have_their_signatures_checked() -> None:
    """Where there is no two-body phase space the law is not called."""
    process = made(lambda event: 1.0, reaction="mu- -> e- nu(e)~ nu(mu)", masses={})
    assert findings_of(process) == ["laws[0] (<lambda>): expected a function (event, parameters), got <lambda>(event)"]
