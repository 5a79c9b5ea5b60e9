"""From text to tree: what binds to what, and what a leg is."""

from __future__ import annotations

import math
import pickle

import pytest

from barnwright.grammar import (
    Binary,
    Call,
    FrameName,
    GrammarError,
    Language,
    LegName,
    Name,
    Negation,
    Node,
    Number,
    Selection,
    Signature,
    constant_of,
    is_leg,
    is_word,
    parse,
)

LANGUAGE = Language(
    functions={
        "f": Signature("expression", 1, 2),
        "pt": Signature("selection", 1, 1, {"frame": "frame"}),
        "mass": Signature("selection", 1, 100),
        "inside": Signature("selection", 1, 1, {"of": "legs"}),
    },
    selections=frozenset({"leading", "each"}),
)


def written(node: Node) -> str:
    """A tree with every parenthesis."""
    match node:
        case Number(value=value):
            return f"{value:g}"
        case Name(name=name):
            return name
        case Negation(operand=operand):
            return f"(-{written(operand)})"
        case Binary(operator=operator, left=left, right=right):
            return f"({written(left)}{operator}{written(right)})"
        case Call(function=function, arguments=arguments):
            inside = (a.name if isinstance(a, LegName) else written(a) for a in arguments)  # type: ignore[arg-type]
            return f"{function}({','.join(inside)})"


@pytest.mark.parametrize(
    ("text", "tree"),
    [
        ("a + b * c", "(a+(b*c))"),
        ("a * b + c", "((a*b)+c)"),
        ("a - b - c", "((a-b)-c)"),
        ("a / b / c", "((a/b)/c)"),
        ("a / b * c", "((a/b)*c)"),
        ("a ** b ** c", "(a**(b**c))"),
        ("-t**2", "(-(t**2))"),
        ("(-t)**2", "((-t)**2)"),
        ("a ** -b", "(a**(-b))"),
        ("a ** -b ** c", "(a**(-(b**c)))"),
        ("2**-1*s", "((2**(-1))*s)"),
        ("-a * b", "((-a)*b)"),
        ("a * -b", "(a*(-b))"),
        ("a - -b", "(a-(-b))"),
        ("--a", "a"),
        ("+-+a", "(-a)"),
        ("(a + b) * c", "((a+b)*c)"),
        ("a - (b - c)", "(a-(b-c))"),
        ("((a))", "a"),
        ("f(a + b, c) ** 2", "(f((a+b),c)**2)"),
        ("1.5e3 + .5 + 2.", "((1500+0.5)+2)"),
        ("1e-3", "0.001"),
        (" a\n\t+ b ", "(a+b)"),
        ("2*s**2/t", "((2*(s**2))/t)"),
    ],
)
def test_what_binds_to_what(text: str, tree: str) -> None:
    """Powers bind tightest and to the right, then signs, then products, then sums; all these to the left."""
    assert written(parse(text, LANGUAGE)) == tree


@pytest.mark.parametrize("texts", [("-t**2", "-(t**2)"), ("a-b+c", "(a-b)+c"), ("2*-t", "2*(-t)")])
def test_parentheses_that_change_nothing(texts: tuple[str, str]) -> None:
    """A pair of texts that mean the same."""
    first, second = (written(parse(text, LANGUAGE)) for text in texts)
    assert first == second


@pytest.mark.parametrize(
    "name",
    [
        "mu-",
        "mu+",
        "e+",
        "nu(mu)~",
        "nu(e)",
        "K(S)0",
        "K*(892)0",
        "Delta(1232)++",
        "J/psi(1S)",
        "Z0",
        "s",
        "t",
        "u~",
        "b",
        "C12",
        "beam_a",
        "1",
        "12",
    ],
)
def test_a_leg_is_read_by_the_rules_of_particle_names(name: str) -> None:
    """In the place of a leg, signs, slashes, stars and parentheses belong to the name."""
    assert is_leg(name)
    second = 4 + len(name) + 3
    assert parse(f"pt({name}) - pt( {name} )", LANGUAGE) == Binary(
        "-",
        Call("pt", (LegName(name, 3),), position=0),
        Call("pt", (LegName(name, second + 4),), position=second),
        second - 2,
    )


def test_what_is_no_leg_and_no_word() -> None:
    """Names with spaces, commas, quotes or letters of other alphabets."""
    assert not any(is_leg(text) for text in ("", "mu -", "a,b", "(a)", "µ-", "mu−", 'a"', "a=b", "-mu"))
    assert not any(is_word(text) for text in ("", "a b", "a+b", "é", "1a", "a-"))
    assert is_word("z_mass2")


@pytest.mark.parametrize(("name", "key"), [("1", 1), ("08", 8), ("mu-", "mu-"), ("111", "111"), ("1a", "1a")])
def test_the_key_of_a_leg(name: str, key: str | int) -> None:
    """One or two digits are a leg's number, anything else a name."""
    assert LegName(name).key == key


def test_frames_and_systems() -> None:
    """The keywords take a frame, or particles in parentheses."""
    assert parse("pt(mu-, frame = cm)", LANGUAGE).frame == FrameName("cm", (), 16)  # type: ignore[union-attr]
    rest = parse("pt(mu-, frame=rest(mu-, mu+))", LANGUAGE)
    assert rest.frame == FrameName("rest", (LegName("mu-", 19), LegName("mu+", 24)), 14)  # type: ignore[union-attr]
    inside = parse("inside(mu-, of=(mu-, mu+))", LANGUAGE)
    assert [leg.name for leg in inside.of] == ["mu-", "mu+"]  # type: ignore[union-attr]


@pytest.mark.parametrize(
    ("text", "selection"),
    [
        ("pt(leading(gamma))", Selection("leading", LegName("gamma", 11), "energy", 1, 3)),
        ('pt(leading(gamma, by="pt", rank=2))', Selection("leading", LegName("gamma", 11), "pt", 2, 3)),
        ("pt(leading(gamma, rank=2, by='energy'))", Selection("leading", LegName("gamma", 11), "energy", 2, 3)),
        ("pt(each(gamma))", Selection("each", LegName("gamma", 8), position=3)),
    ],
)
def test_selections(text: str, selection: Selection) -> None:
    """One of identical particles by its order, or all of them."""
    assert parse(text, LANGUAGE).arguments == (selection,)  # type: ignore[union-attr]


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("3", 3.0),
        ("-3", -3.0),
        ("1/2", 0.5),
        ("2*3-1", 5.0),
        ("1+1+1", 3.0),
        ("2**-1", 0.5),
        ("1/0", math.inf),
        ("9e99**9", math.inf),
        ("1e308+1e308", math.inf),
        ("x", None),
        ("1+x", None),
        ("f(1)", None),
    ],
)
def test_the_value_of_numbers_alone(text: str, value: float | None) -> None:
    """Infinite where it overflows, None where anything but numbers takes part."""
    assert constant_of(parse(text, LANGUAGE)) == value


def test_a_root_of_a_negative_number_has_no_value() -> None:
    """It is not real, so it is not a number."""
    value = constant_of(parse("(-1)**0.5", LANGUAGE))
    assert value is not None
    assert math.isnan(value)


def test_a_long_constant_needs_no_deep_stack() -> None:
    """The value of a thousand terms is worked out without recursion."""
    assert constant_of(parse("+".join(["1"] * 990), LANGUAGE)) == 990.0


def test_an_error_survives_pickling() -> None:
    """Errors travel between processes, with text and findings."""
    with pytest.raises(GrammarError, match="an operator or the end") as caught:
        parse("a b", LANGUAGE)
    again = pickle.loads(pickle.dumps(caught.value))  # noqa: S301
    assert (again.text, again.findings, str(again)) == ("a b", caught.value.findings, str(caught.value))
