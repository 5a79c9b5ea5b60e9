"""Checks of a declaration: every mistake is told with its field, all at once."""

from __future__ import annotations

import pickle
import re
from typing import Any, Literal

import pytest

from barnwright.errors import PluginError
from barnwright.peaks import Peak
from barnwright.process import (
    Claims,
    ClosedForm,
    DeclarationError,
    Expression,
    Parameters,
    Process,
    SquaredAmplitude,
    Validity,
    parameter,
)


class Inputs(Parameters):
    """A float that a mass may be tied to, and a word that it may not."""

    muon_mass: float = parameter(0.1, unit="GeV")
    scheme: Literal["alpha", "fermi"] = parameter("alpha")


class Required(Parameters):
    """A parameter that a request must give."""

    width: float = parameter(unit="GeV")


class Listed(Parameters):
    """A parameter of a type that the wire does not carry."""

    values: list[float] = parameter([1.0])


def flat(event: Any, parameters: Any) -> float:
    """|M|² = 1."""
    return 1.0


def same(x: Any, point: Any, parameters: Any) -> Any:
    """The antiderivative of 1."""
    return x


LAW = SquaredAmplitude(flat)
COSINE = "cos_theta(1, frame=cm)"


def made(**fields: Any) -> Process:
    """A muon-pair process with some fields as given."""
    return Process(**{"name": "pair", "reaction": "e- e+ -> mu- mu+", "laws": (LAW,), "parameters": Inputs, **fields})


def form(observable: str, **more: Any) -> ClosedForm:
    """A closed form in an observable."""
    return ClosedForm(same, observable=observable, **more)


def test_a_process_needs_no_more_than_name_reaction_and_law() -> None:
    """All other fields have defaults, and the reaction is read."""
    process = Process(name="pair", reaction="e- e+ -> mu- mu+", laws=(LAW,))
    assert process.legs.outgoing == ("mu-", "mu+")
    assert (process.order, process.parameters, process.signed, process.needs) == (
        "tree",
        Parameters,
        False,
        frozenset(),
    )


def test_a_full_declaration_is_accepted() -> None:
    """Every field filled with something that fits passes."""
    process = made(
        masses={"e-": 0.0, "mu+": "muon_mass"},
        peaks=(Peak(of="t", shape="power", at="muon_mass"), Peak(of="u", shape="power", at="beam_b")),
        closed_forms=(form(COSINE, massless=("e-",)),),
        valid=Validity((0.0, 30.0), "photon alone"),
        claims=Claims(exchange=(("mu-", "mu+"), (1, 2)), gauge_legs=("beam_a",)),
        singular=("t", "u", "soft(mu-)", "collinear(mu-, mu+)"),
        alternatives={"other": {"scheme": "fermi"}},
        example={"muon_mass": 0.2},
    )
    assert process.mass_of(1) == process.mass_of(2) == "muon_mass"
    assert process.mass_of(-1) == process.mass_of(-2) == 0.0


def test_a_leg_not_declared_has_no_mass_of_its_own() -> None:
    """Its mass is that of the particle table."""
    assert made().mass_of(1) is None


@pytest.mark.parametrize(
    ("leg", "codes"), [("beam_a", (-1,)), ("beam_b", (-2,)), (2, (2,)), ("e+", (-1, -2)), ("mu-", (1, 2))]
)
def test_a_leg_is_a_slot_and_a_particle_a_species(leg: str | int, codes: tuple[int, ...]) -> None:
    """Beams and numbers name one leg; a particle names all legs of its species."""
    assert made().codes_of(leg) == codes


def test_an_unknown_leg_names_those_that_there_are() -> None:
    """The error lists particles and beams."""
    expected = "'tau-' is no leg of e- e+ -> mu- mu+, expected one of e-, e+, mu-, mu+, beam_a, beam_b"
    with pytest.raises(LookupError, match=re.escape(expected)):
        made().codes_of("tau-")


WRONG: list[tuple[dict[str, Any], str]] = [
    ({"name": "Muon_Pair"}, "name: got 'Muon_Pair', expected lower case words and digits joined by hyphens"),
    ({"reaction": "e- e+ => mu- mu+"}, "reaction: got 'e- e+ => mu- mu+'"),
    ({"laws": ()}, "laws: got none, expected at least one law or closed form"),
    ({"laws": (Expression("g*t"),)}, "laws[0].squared_amplitude: got"),
    ({"laws": LAW}, "expected a tuple of SquaredAmplitude, HelicityAmplitudes, Expression"),
    ({"references": "a book"}, "references: got 'a book', expected a tuple of text"),
    (
        {"laws": (SquaredAmplitude(flat, massless="e-"),)},
        "laws[0].massless: got 'e-', expected a tuple of legs",
    ),
    (
        {"laws": (SquaredAmplitude(flat, massless=("tau-",)),)},
        "laws[0].massless: got 'tau-', expected one of e-, e+, mu-, mu+, beam_a, beam_b",
    ),
    ({"masses": {"mu": 0.1}}, "masses.mu: got 'mu', expected one of e-, e+, mu-, mu+, beam_a, beam_b; nearest: mu"),
    ({"masses": {"mu-": -0.1}}, "masses.mu-: got -0.1, expected a finite number of at least 0 (GeV), or the name of a"),
    (
        {"masses": {"mu-": "muon_mas"}},
        "masses.mu-: got 'muon_mas', expected a float parameter: muon_mass; nearest: muon_mass",
    ),
    ({"masses": {"mu-": "scheme"}}, "masses.mu-: got 'scheme', expected a float parameter: muon_mass"),
    ({"parameters": dict}, "expected a subclass of Parameters"),
    ({"parameters": Listed}, "parameter values is a"),
    (
        {"peaks": (Peak(of="t", shape="power", at="muon_mas"),)},
        "peaks[0].at: got 'muon_mas', expected one of muon_mass",
    ),
    ({"peaks": (Peak(of="v", shape="power"),)}, "peaks[0].of: got 'v', expected one of t, u, e-, e+, mu-, mu+, beam_a"),
    (
        {"peaks": (Peak(of="mu- mu+", shape="resonance", at="muon_mass", width="gamma"),)},
        "peaks[0].width: got 'gamma', expected a float parameter: muon_mass",
    ),
    ({"closed_forms": (form("cos_thta(1)"),)}, "closed_forms[0].observable: got 'cos_thta(1)'"),
    ({"closed_forms": (form(COSINE, massless=("X",)),)}, "closed_forms[0].massless: got 'X'"),
    ({"singular": ("v",)}, "singular[0]: got 'v', expected t, u, soft(leg) or collinear(leg, leg)"),
    ({"singular": ("soft(gamma)",)}, "singular[0]: got 'gamma', expected one of e-, e+, mu-, mu+"),
    ({"claims": Claims(exchange=(("mu-", "tau-"),))}, "claims.exchange: got 'tau-'"),
    ({"claims": Claims(gauge_legs=(3,))}, "claims.gauge_legs: got 3"),
    (
        {"valid": Validity((30.0, 2.0))},
        "valid.sqrt_s: got (30.0, 2.0), expected (low, high) in GeV with 0 <= low < high",
    ),
    ({"valid": "always"}, "valid: got 'always', expected Validity(...) or None"),
    ({"needs": {"x"}}, "needs: got {'x'}, expected a frozenset of names"),
    ({"parameters": Required}, "example.width: got nothing, expected a value, since this parameter has no default"),
    ({"alternatives": {"on": {"scheme": "mass"}}}, "alternatives.on.scheme: got 'mass', expected a value of this"),
]


@pytest.mark.parametrize(("fields", "message"), WRONG, ids=[m.partition(":")[0] for _, m in WRONG])
def test_a_wrong_declaration_names_process_and_field(fields: dict[str, Any], message: str) -> None:
    """The error is a PluginError that begins with the process and says field, value and what was expected."""
    name = fields.get("name", "pair")
    with pytest.raises(PluginError, match=f"^process {name}: .*{re.escape(message)}"):
        made(**fields)


def test_all_findings_come_at_once() -> None:
    """Three mistakes in three fields are three lines of one error."""
    with pytest.raises(PluginError, match=r"masses\.tau-") as caught:
        made(masses={"tau-": 1.0}, singular=("v",), valid=Validity((3.0, 1.0)))
    assert [line.partition(":")[0] for line in caught.value.cause.splitlines()] == [
        "valid.sqrt_s",
        "masses.tau-",
        "singular[0]",
    ]


def test_the_error_survives_a_journey_between_processes() -> None:
    """A worker hands it back by pickle, with its findings."""
    with pytest.raises(DeclarationError, match="singular") as caught:
        made(singular=("v",))
    back = pickle.loads(pickle.dumps(caught.value))  # noqa: S301 - our own bytes
    assert (str(back), back.violations) == (str(caught.value), caught.value.violations)


def test_a_process_is_frozen() -> None:
    """A declaration does not change after it was checked."""
    with pytest.raises(AttributeError, match="cannot assign to field 'name'"):
        made().name = "other"  # type: ignore[misc]


def test_an_expression_may_be_the_only_law() -> None:
    """A text is a law like any other."""
    assert made(laws=(Expression("1"),)).laws[0].kind == "expression"
