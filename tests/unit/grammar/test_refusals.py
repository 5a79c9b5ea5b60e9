"""What is no grammar: where, what was expected, and what is nearest."""

from __future__ import annotations

import tracemalloc

import pytest
from hypothesis import given
from hypothesis import strategies as st

from barnwright.grammar import DEEPEST, MOST_NODES, GrammarError, Language, Negation, Number, Signature, parse

LANGUAGE = Language(
    functions={
        "abs": Signature("expression"),
        "min": Signature("expression", 1, 100),
        "pt": Signature("selection", 1, 1, {"frame": "frame"}),
        "angle": Signature("selection", 2, 2, {"frame": "frame"}),
        "mass": Signature("selection", 1, 100),
        "inside": Signature("selection", 1, 1, {"of": "legs"}),
    },
    names=frozenset({"sqrt_s", "deg"}),
    selections=frozenset({"leading", "each"}),
)


def refused(text: str) -> GrammarError:
    """The error that refuses a text."""
    with pytest.raises(GrammarError, match="expected") as caught:
        parse(text, LANGUAGE)
    return caught.value


@pytest.mark.parametrize(
    ("text", "position", "expected", "near"),
    [
        ("", 0, "an expression", None),
        ("  ", 2, "an expression", None),
        ("1 +", 3, "a number, a name or a parenthesis", None),
        ("1 + * 2", 4, "a number, a name or a parenthesis, not '*'", None),
        ("* 2", 0, "a number, a name or a parenthesis", None),
        ("1 2", 2, "an operator or the end", None),
        ("2sqrt_s", 1, "an operator or the end", None),
        ("1 + 2)", 5, "an operator or the end", None),
        ("(1 + 2", 6, "a closing parenthesis", None),
        ("()", 1, "a number, a name or a parenthesis", None),
        ("1 // 2", 3, "a number, a name or a parenthesis", None),
        ("1 ^ 2", 2, "has no meaning here", "**"),
        ("1 % 2", 2, "has no meaning here", None),
        ("sqrt_s.real", 6, "has no meaning here", None),
        ("sqrt_s[0]", 6, "has no meaning here", None),
        ("pt(mu-) > 3", 8, "has no meaning here", None),
        ("1 == 1", 2, "an operator or the end", None),
        ("abs(1 == 1)", 6, "a comma or a closing parenthesis", None),
        ("abs(1 = 1)", 6, "a comma or a closing parenthesis", None),
        ("abs(sqrt_s == 1)", 11, "a comma or a closing parenthesis", None),
        ("sqrt_s and deg", 7, "an operator or the end", None),
        ("lambda: 1", 6, "has no meaning here", None),
        ("lambda", 0, "one of deg, sqrt_s", None),
        ("'abc'", 0, "has no meaning here", None),
        ('"abc"', 0, "has no meaning here", None),
        ("`1`", 0, "has no meaning here", None),
        ("1;2", 1, "has no meaning here", None),
        ("1\x002", 1, "has no meaning here", None),
        ("sqrt_S", 0, "one of deg, sqrt_s", "sqrt_s"),
        ("1 + dge", 4, "one of deg, sqrt_s", "deg"),
        ("pt", 0, "pt(…) with its arguments", None),
        ("deg(1)", 0, "deg by itself, without parentheses", "deg"),
        ("ptt(mu-)", 0, "one of the functions", "pt"),
        ("1 + anlge(mu-, mu+)", 4, "one of the functions", "angle"),
        ("__import__('os')", 0, "one of the functions", None),
        ("pt()", 0, "pt with 1 particle", None),
        ("pt(mu-, mu+)", 0, "pt with 1 particle", None),
        ("angle(mu-)", 0, "angle with 2 particles", None),
        ("1 + mass()", 4, "mass with at least 1 particle", None),
        ("abs(1, 2)", 0, "abs with 1 argument", None),
        ("pt(mu-", 6, "a comma or a closing parenthesis", None),
        ("pt(mu- mu+)", 7, "a comma or a closing parenthesis", None),
        ("pt(-mu)", 3, "a particle of the reaction", None),
        ("pt(mu-,)", 7, "a particle of the reaction", None),
        ("pt(mu- + mu+)", 7, "a comma or a closing parenthesis", None),
        ("pt(mu-, fram=cm)", 8, "pt with frame", "frame"),
        ("mass(mu-, frame=cm)", 10, "mass with no keywords", None),
        ("abs(x=1)", 4, "abs with no keywords", None),
        ("pt(mu-, frame=labb)", 14, "lab, cm or rest", "lab"),
        ("pt(mu-, frame=)", 14, "lab, cm or rest", None),
        ("pt(mu-, frame=cm, frame=lab)", 18, "frame once", None),
        ("pt(mu-, frame=rest)", 14, "rest(…) with the particles", None),
        ("pt(mu-, frame=rest())", 19, "a particle of the reaction", None),
        ("inside(mu-, of=mu-)", 15, "a parenthesis with particles", None),
        ("inside(mu-, of=(mu-", 19, "a comma or a closing parenthesis", None),
        ("pt(leading(gamma, by=pt))", 21, "a word in quotes", None),
        ('pt(leading(gamma, by="enregy"))', 21, '"energy" or "pt"', "energy"),
        ('pt(leading(gamma, by=""))', 21, '"energy" or "pt"', None),
        ("pt(leading(gamma, rank=0))", 23, "a whole number from 1", None),
        ("pt(leading(gamma, rank=1.5))", 23, "a whole number from 1", None),
        ("pt(leading(gamma, rank=1e0))", 23, "a whole number from 1", None),
        ("pt(leading(gamma, rank=-1))", 23, "a whole number from 1", None),
        ("pt(leading(gamma, rank=999))", 23, "a whole number from 1", None),
        ("pt(leading(gamma, rank=1, rank=2))", 26, "by and rank, each once", None),
        ("pt(leading(gamma, order=1))", 18, "leading with one particle and by and rank", None),
        ("pt(each(gamma, rank=1))", 15, "each with one particle and no keywords", None),
        ("pt(leading(gamma, 2))", 18, "leading with one particle", None),
        ("pt(leading(gamma)", 17, "a comma or a closing parenthesis", None),
        ("1e999", 0, "a number that is not infinite", None),
        ("1 + " + "9" * 400, 4, "a number that is not infinite", None),
        ("sqrt_s ** 101", 9, "an exponent of at most 100", None),
        ("sqrt_s ** -101", 9, "an exponent of at most 100", None),
        ("sqrt_s ** (50 + 51)", 9, "an exponent of at most 100", None),
        ("9**9**9", 3, "an exponent of at most 100", None),
        ("2**2**2**2**2", 3, "an exponent of at most 100", None),
        ("2**(1/0)", 3, "an exponent of at most 100", None),
        ("2**((-1)**0.5)", 3, "an exponent of at most 100", None),
    ],
)
def test_position_expectation_and_nearest(text: str, position: int, expected: str, near: str | None) -> None:
    """The column of the first thing that is no grammar, what was expected there, and the nearest word."""
    (finding,) = refused(text).findings
    assert (finding.position, finding.nearest) == (position, near)
    assert expected in finding.expected


@pytest.mark.parametrize(
    ("text", "position", "code"),
    [
        ("１ + 1", 0, "U+FF11"),  # a fullwidth digit one
        ("٣", 0, "U+0663"),  # an Arabic-Indic digit three
        ("sqrt_ѕ", 5, "U+0455"),  # a Cyrillic dze
        ("1 − 2", 2, "U+2212"),
        ("2·3", 1, "U+00B7"),
        ("1\u00a0+ 1", 1, "U+00A0"),
        ("pt(mu−)", 5, "U+2212"),
        ("pt(µ-)", 3, "U+00B5"),
        ("pt(1²)", 4, "U+00B2"),
        ("pt(mu-, frame=rest(mu-, µ+))", 24, "U+00B5"),
        ("pt(leading(gamma, rank=２))", 23, "U+FF12"),
        ("1\u200b", 1, "U+200B"),
        ("\ud800", 0, "U+D800"),
    ],
)
def test_letters_that_only_look_right(text: str, position: int, code: str) -> None:
    """Anything outside ASCII is refused where it stands, with its code."""
    (finding,) = refused(text).findings
    assert finding.position == position
    assert code in finding.expected


def test_a_violation_names_field_text_and_column() -> None:
    """The findings become lines of a request's answer, columns counted from 1."""
    (violation,) = refused("1 + dge").violations("cuts[0].observable")
    expected = "one of deg, sqrt_s, or a function with its arguments"
    assert str(violation) == f"cuts[0].observable: got '1 + dge' (at column 5), expected {expected}; nearest: deg"


HOSTILE = {
    "parentheses": "(" * 5_000,
    "closed parentheses": "(" * 4_000 + "1" + ")" * 4_000,
    "calls": "abs(" * 2_000,
    "signs and powers": "2**-" * 2_000 + "1",
    "tower": "9**" * 3_000 + "9",
    "sum": "1+" * 4_999 + "1",
    "exponent": "2**(" + "0+" * 4_900 + "1)",
    "minima": "min(" + "1," * 4_900 + "1)",
    "legs": "mass(" + "a," * 4_900 + "a)",
    "leg with parentheses": "pt(" + "a(" * 4_900,
    "one word": "a" * 9_999,
    "digits": "1" * 9_999,
    "quotes": "pt(leading(gamma, by=" + '"' * 9_000,
    "spaces": " " * 9_999,
    "keywords": "pt(" + "frame=cm," * 1_000,
}


@pytest.mark.parametrize("text", HOSTILE.values(), ids=HOSTILE.keys())
def test_hostile_texts_are_refused(text: str) -> None:
    """Everything that is too deep, too long or never ends is refused, with a position inside the text."""
    (finding,) = refused(text).findings
    assert 0 <= finding.position <= len(text)


@pytest.mark.parametrize("text", ["(" * 100_000, "1+" * 500_000, "é" * 1_000_000], ids=["deep", "sum", "foreign"])
def test_a_long_text_is_refused_by_its_length(text: str) -> None:
    """Before it is looked at: nothing is allocated in proportion to it."""
    tracemalloc.start()
    try:
        (finding,) = refused(text).findings
        _, peak = tracemalloc.get_traced_memory()
    finally:
        tracemalloc.stop()
    assert finding.expected == f"a text of at most 10000 characters, not {len(text)}"
    assert finding.position == 10_000
    assert peak < 200_000


def test_many_signs_are_no_depth() -> None:
    """Nine thousand signs are one sign."""
    assert parse("-" * 9_001 + "1", LANGUAGE) == Negation(Number(1.0, 9_001), 0)


def test_the_limits_are_reached() -> None:
    """As many parentheses and as many terms as are allowed do compile."""
    parse("(" * (DEEPEST - 1) + "1" + ")" * (DEEPEST - 1), LANGUAGE)
    parse("+".join(["1"] * (MOST_NODES // 2)), LANGUAGE)
    assert "inside one another" in refused("(" * DEEPEST + "1" + ")" * DEEPEST).findings[0].expected
    assert "at most 2000" in refused("+".join(["1"] * (MOST_NODES // 2 + 1))).findings[0].expected


PIECES = (
    "1 2.5 1e3 sqrt_s deg abs( min( pt( angle( mass( inside( leading( each( mu- nu(mu)~ gamma frame= cm rest( of=( by= "
    '"pt" rank= ( ) , = == + - * / ** ^ é \x00 \' [ . lambda 0x1'
)
WORDS = st.sampled_from([*PIECES.split(" "), " ", "\n"])


@given(st.one_of(st.text(max_size=60), st.lists(WORDS, max_size=25).map("".join)))
def test_any_text_parses_or_is_refused_with_a_position(text: str) -> None:
    """Nothing but a tree or a GrammarError comes of any text, and its position lies inside."""
    try:
        parse(text, LANGUAGE)
        return
    except GrammarError as caught:
        error = caught
    assert error.text == text
    assert all(0 <= finding.position <= len(text) and finding.expected for finding in error.findings)
    assert str(error).startswith("text: got ")
