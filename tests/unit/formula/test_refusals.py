"""What is no formula: everything at once, each with its place and what is nearest."""

from __future__ import annotations

import tracemalloc

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from barnwright.beams import BeamSettings, collide
from barnwright.errors import BarnwrightError
from barnwright.event import Event
from barnwright.formula import FormulaError, compile_formula
from barnwright.kinematics import TwoBody
from barnwright.reaction import parse_reaction

TWO = parse_reaction("e- e+ -> mu- mu+")
PHOTONS = parse_reaction("e- e+ -> gamma gamma")
THREE = parse_reaction("e- e+ -> mu- mu+ gamma")
NAMES = ("alpha", "z_mass")


def found(text: object, reaction: object = TWO, names: tuple[str, ...] = NAMES) -> list[tuple[int, str, str | None]]:
    """Position, expectation and nearest of every finding."""
    with pytest.raises(FormulaError, match="expected") as caught:
        compile_formula(text, reaction, names)  # type: ignore[arg-type]
    assert isinstance(caught.value, BarnwrightError)
    return [(f.position, f.expected, f.nearest) for f in caught.value.findings]


@pytest.mark.parametrize(
    ("text", "position", "expected", "near"),
    [
        ("alhpa*s", 0, "s, t, u, pi or a declared parameter (alpha, z_mass)", "alpha"),
        ("s + zmass", 4, "a declared parameter (alpha, z_mass)", "z_mass"),
        ("quux", 0, "a declared parameter", None),
        ("sqrt", 0, "sqrt(…) with its arguments", None),
        ("s*dot", 2, "dot(…) with its arguments", None),
        ("dto(mu-, mu+)", 0, "one of the functions dot, invariant_mass", "dot"),
        ("s(1)", 0, "one of the functions", None),
        ("dot(mu-)", 0, "dot with 2 particles", None),
        ("dot(mu-, mu)", 9, "a leg of e- e+ -> mu- mu+", "mu-"),
        ("dot(e-, mu-)", 4, "a leg of e- e+ -> mu- mu+", "beam_a"),
        ("rest_mass(3)", 10, "a leg of e- e+ -> mu- mu+", None),
        ("dot(" + "7" * 5000 + ", 1)", 4, "a leg of e- e+ -> mu- mu+", None),
        ("invariant_mass(mu-, 1)", 0, "invariant_mass of different particles", None),
        ("invariant_mass()", 0, "invariant_mass with at least 1 particle", None),
        ("dot(s + t, mu-)", 6, "a comma or a closing parenthesis", None),
        ("sqrt(s, t)", 0, "sqrt with 1 argument", None),
        ("sqrt(x=s)", 5, "sqrt with no keywords", None),
        ("min(s, t)", 0, "one of the functions", "sin"),
        ("deg", 0, "a declared parameter", None),
        ("s^2", 1, "has no meaning here", "**"),
        ("2s", 1, "an operator or the end", None),
        ("s**101", 3, "an exponent of at most 100", None),
        ("", 0, "an expression", None),
        ("s +", 3, "a number, a name or a parenthesis", None),
        ("s − t", 2, "U+2212", None),
    ],
)
def test_position_expectation_and_nearest(text: str, position: int, expected: str, near: str | None) -> None:
    """One mistake, one finding."""
    ((where, what, nearest),) = found(text)
    assert (where, nearest) == (position, near)
    assert expected in what


def test_everything_at_once() -> None:
    """Names and legs, from left to right."""
    findings = found("alhpa*s + dot(mu, tau-)/zmass + invariant_mass(1, 1)")
    assert [position for position, _, _ in findings] == [0, 14, 18, 24, 32]


def test_no_more_findings_than_somebody_reads() -> None:
    """A thousand unknown names are fifty findings."""
    assert len(found("+".join(f"x{k}" for k in range(900)))) == 50
    assert len(found("+".join(f"dot(x{k}, y{k})" for k in range(400)))) == 50


def test_without_parameters() -> None:
    """The message does not list what is not there."""
    assert found("alpha", names=()) == [(0, "s, t, u, pi or a declared parameter", None)]


@pytest.mark.parametrize("name", ["s", "t", "u", "pi", "dot", "sqrt", "rest_mass", "log"])
def test_parameters_that_hide_a_name_of_the_language(name: str) -> None:
    """A parameter is never called like an invariant, a constant or a function."""
    ((position, expected, _),) = found("1", names=("alpha", name))
    assert (position, expected) == (0, f"parameters of other names than {name}, which the language has already")


def test_identical_particles_are_taken_by_number() -> None:
    """A law knows them by slot; their name alone is refused with the numbers."""
    ((position, expected, near),) = found("dot(beam_a, gamma)", PHOTONS)
    assert (position, expected, near) == (12, "the number of one of the 2 gamma: 1 or 2", "1")
    compile_formula("dot(beam_a, 1)*dot(beam_a, 2)", PHOTONS, ())


@pytest.mark.parametrize("name", ["t", "u"])
def test_t_and_u_belong_to_two_bodies(name: str) -> None:
    """With three outgoing particles they have no meaning, s has."""
    compile_formula("s", THREE, ())
    ((position, expected, near),) = found(f"s + {name}", THREE)
    assert (position, near) == (4, "dot(beam_a, 1)")
    assert expected == f"four-products: {name} belongs to two outgoing particles"


HOSTILE = {
    "attributes": "s.__class__",
    "dunder": "().__class__.__bases__",
    "subscript": "s[0]",
    "import": "__import__('os').system('true')",
    "lambda": "(lambda: 1)()",
    "comprehension": "[x for x in (1,)]",
    "comparison": "s > 1",
    "equality": "s == 1",
    "string": "'a' * 10",
    "statement": "s; t",
    "NUL": "s\x00",
    "huge power": "9**999999999",
    "tower": "9**9**9**9",
    "tower of invariants": "s**" * 60 + "2",
    "tower below the limit": "2**" * 2_000 + "1",
    "long exponent": "s**(" + "9*" * 1_500 + "9)",
    "parentheses": "(" * 100_000,
    "calls": "sqrt(" * 2_000,
    "sum of thousands": "+".join(["s"] * 2_000),
    "1 MB": "s+" * 500_000,
    "look-alike": "ѕ + t",
    "other digits": "s + ٣",
    "long name": "m" * 9_000,
}


@pytest.mark.parametrize("text", HOSTILE.values(), ids=HOSTILE.keys())
def test_hostile_texts_are_refused_and_nothing_grows(text: str) -> None:
    """Code in other languages, deep, long and endless texts: a position, and little memory."""
    tracemalloc.start()
    try:
        findings = found(text)
        _, peak = tracemalloc.get_traced_memory()
    finally:
        tracemalloc.stop()
    assert all(0 <= position <= len(text) for position, _, _ in findings)
    assert peak < 5_000_000


WORDS = (
    "s t u pi alpha beta dot( rest_mass( invariant_mass( sqrt( log( exp( abs( mu- mu+ gamma beam_a 1 2 0.5 1e300 "
    "( ) ) ) , + - * / ** ^ = é"
)
TERMS = "s t u pi alpha 2 0.5 1e200 dot(1,2) dot(beam_a,1) rest_mass(2) invariant_mass(1,2) beta"
PIECES = st.sampled_from([*WORDS.split(" "), " "])
TERM = st.sampled_from(TERMS.split(" "))
EXPRESSION = st.recursive(
    TERM,
    lambda inner: st.one_of(
        st.tuples(inner, st.sampled_from(["+", "-", "*", "/", "**"]), inner).map(lambda t: f"({t[0]}{t[1]}{t[2]})"),
        st.tuples(st.sampled_from(["abs", "sqrt", "exp", "log", "tan"]), inner).map(lambda t: f"{t[0]}({t[1]})"),
        inner.map(lambda text: f"-{text}"),
    ),
    max_leaves=12,
)


@given(st.one_of(st.text(max_size=40), st.lists(PIECES, max_size=20).map("".join), EXPRESSION))
def test_any_text_compiles_or_is_refused_with_positions(text: str) -> None:
    """What compiles has a value that broadcasts; what does not says where, inside the text."""
    try:
        formula = compile_formula(text, TWO, ("alpha",))
    except FormulaError as caught:
        error = caught
    else:
        collision = collide(BeamSettings("kinetic", (7.0,), (4.0,)), (0.0, 0.0))
        ends = np.array([[0.3, 1.2]]), np.array([[1.7, 0.8]])
        event = Event(TWO, TwoBody(collision, (0.0, 0.0, 0.0, 0.0), *ends))
        assert np.broadcast_shapes(formula.evaluate(event, {"alpha": 0.1}).shape, (1, 2)) == (1, 2)
        return
    assert error.findings
    assert all(0 <= finding.position <= len(text) and finding.expected for finding in error.findings)
