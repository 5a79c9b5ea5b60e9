"""Hostile texts: an observable or an error with a position comes of any of them, and nothing grows."""

from __future__ import annotations

import tracemalloc

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.kinematics import TwoBody
from barnwright.observables import ObservableError, compile_observable, table
from barnwright.reaction import parse_reaction

TWO = parse_reaction("e- e+ -> mu- mu+")
PHOTONS = parse_reaction("e- e+ -> gamma gamma")

HOSTILE = {
    "attributes": "sqrt_s.__class__",
    "dunder": "().__class__.__bases__",
    "subscript": "sqrt_s[0]",
    "import": "__import__('os').system('true')",
    "lambda": "(lambda: 1)()",
    "comprehension": "[x for x in (1,)]",
    "comparison": "pt(mu-) > 1",
    "string": "'a' * 10",
    "format": "f'{1}'",
    "walrus": "(x := 1)",
    "NUL": "pt(mu-)\x00",
    "huge power": "9**999999999",
    "tower": "9**9**9**9",
    "tower of observables": "sqrt_s**" * 60 + "2",
    "parentheses": "(" * 100_000,
    "minima": "min(" * 3_000,
    "sum of thousands": "+".join(["sqrt_s"] * 1_300),
    "1 MB": "pt(mu-)+" * 125_000,
    "look-alike": "ｐｔ(mu-)",
    "other digits": "pt(١)",
    "long leg": "pt(" + "m" * 9_000 + ")",
    "deep leg": "pt(" + "m(" * 4_000 + ")",
}


@pytest.mark.parametrize("text", HOSTILE.values(), ids=HOSTILE.keys())
def test_hostile_texts_are_refused_and_nothing_grows(text: str) -> None:
    """Code in other languages, deep, long and endless texts: a position, and little memory."""
    tracemalloc.start()
    try:
        with pytest.raises(ObservableError, match="expected") as caught:
            compile_observable(text, TWO)
        _, peak = tracemalloc.get_traced_memory()
    finally:
        tracemalloc.stop()
    assert all(0 <= finding.position <= len(text) for finding in caught.value.findings)
    assert peak < 5_000_000


def test_the_longest_sum_has_a_value() -> None:
    """A hundred operators in a row, and fifty parentheses, need no deep stack."""
    collision = collide(BeamSettings("sqrt_s", (10.0,)), (0.0, 0.0))
    event = Event(TWO, TwoBody(collision, (0.0, 0.0, 0.0, 0.0), np.ones((1, 1)), np.ones((1, 1))))
    assert compile_observable("+".join(["sqrt_s"] * 100), TWO).values(event) == pytest.approx(1000.0)
    assert compile_observable("(" * 49 + "sqrt_s" + ")" * 49, TWO).values(event) == pytest.approx(10.0)
    assert compile_observable("abs(" * 49 + "sqrt_s" + ")" * 49, TWO).values(event) == pytest.approx(10.0)


WORDS = (
    "sqrt_s thrust deg pi abs( sqrt( min( max( leading( each( any( mu- mu+ gamma beam_a 1 2 3 0.5 1e9 frame=cm "
    "frame=lab frame=rest( of=( by= 'pt' \"energy\" rank= ( ) ) ) , , + - * / ** ^ = é"
)
TERMS = "sqrt_s thrust pi deg 2 0.5 -3 pt(mu) pt(gamma) pt(each(gamma)) energy(leading(gamma))"
ARGUMENTS = {"one": "1", "pair": "1, 2", "several": "1", "transfer": "beam_a, 1"}

PIECES = st.sampled_from([*(f"{row.name}(" for row in table()), *WORDS.split(" "), " "])
TERM = st.sampled_from(
    [*(f"{row.name}({ARGUMENTS[row.shape]})" for row in table() if row.shape in ARGUMENTS), *TERMS.split(" ")]
)
EXPRESSION = st.recursive(
    TERM,
    lambda inner: st.one_of(
        st.tuples(inner, st.sampled_from(["+", "-", "*", "/", "**"]), inner).map(lambda t: f"({t[0]}{t[1]}{t[2]})"),
        st.tuples(st.sampled_from(["abs", "sqrt", "min", "max"]), inner).map(lambda t: f"{t[0]}({t[1]})"),
        inner.map(lambda text: f"-{text}"),
    ),
    max_leaves=12,
)


@given(
    st.one_of(st.text(max_size=40), st.lists(PIECES, max_size=20).map("".join), EXPRESSION),
    st.sampled_from([TWO, PHOTONS]),
)
def test_any_text_compiles_or_is_refused_with_positions(text: str, reaction: object) -> None:
    """What compiles has values that broadcast; what does not says where, inside the text."""
    try:
        observable = compile_observable(text, reaction)  # type: ignore[arg-type]
    except ObservableError as caught:
        error = caught
    else:
        collision = collide(BeamSettings("kinetic", (7.0,), (4.0,)), (0.0, 0.0))
        ends = np.array([[0.3, 1.2]]), np.array([[1.7, 0.8]])
        event = Event(reaction, TwoBody(collision, (0.0, 0.0, 0.0, 0.0), *ends))  # type: ignore[arg-type]
        values = observable.values(event)
        assert np.broadcast_shapes(values.shape[observable.quantifier is not None :], (1, 2)) == (1, 2)
        return
    assert error.findings
    assert all(0 <= finding.position <= len(text) and finding.expected for finding in error.findings)
