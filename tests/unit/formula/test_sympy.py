"""Sympy expressions as formulas: each supported part, and what is refused."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
import sympy

from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.formula import FormulaError, compile_formula
from barnwright.kinematics import TwoBody
from barnwright.reaction import parse_reaction

REACTION = parse_reaction("e- e+ -> mu- mu+")
s, t, u, alpha = sympy.symbols("s t u alpha")
dot, invariant_mass, rest_mass = map(sympy.Function, ("dot", "invariant_mass", "rest_mass"))
muon, beam = sympy.Symbol("mu-"), sympy.Symbol("beam_a")


@pytest.fixture(scope="module", name="event")
def _event() -> Event:
    collision = collide(BeamSettings("sqrt_s", (10.0,)), (0.0, 0.0))
    cosine = np.array([[-0.6, 0.1, 0.7]])
    return Event(REACTION, TwoBody(collision, (0.0, 0.0, 0.0, 0.0), 1 - cosine, 1 + cosine))


ELEMENTARY = ("sqrt", "exp", "log", "sin", "cos", "tan", "asin", "acos", "atan", "sinh", "cosh", "tanh")
EXPRESSIONS: list[Any] = [
    s + t - u,
    -t,
    s * t / u,
    t**2 / s**2,
    sympy.sqrt(s),
    s ** sympy.Rational(1, 3),
    s ** sympy.Rational(-3, 2),
    (s + t) ** 2,
    (-t) ** alpha,
    2 ** (t / s),
    sympy.Rational(2, 7) * s,
    sympy.Rational(-2, 7) * s,
    sympy.Rational(10**20 + 1, 3 * 10**20) * s,
    sympy.Integer(-3) * s,
    sympy.Float(0.1, 30) * s,
    sympy.Float("1e-300") * s,
    sympy.pi * s,
    sympy.E * s,
    sympy.E ** (t / s),
    sympy.Abs(t),
    sympy.log(s, 2),
    32 * sympy.pi**2 * alpha**2 * (t**2 + u**2) / s**2,
    1 / (s - 3 * t) - 1 / (s - 3 * u),
    *(getattr(sympy, name)(-t / (2 * s)) for name in ELEMENTARY),
]


@pytest.mark.parametrize("expression", EXPRESSIONS, ids=str)
def test_every_part_means_the_same(event: Event, expression: Any) -> None:
    """A formula made from an expression has the values that sympy's own numbers have."""
    values = compile_formula(expression, REACTION, ("alpha",)).evaluate(event, {"alpha": 0.25})
    wanted = [
        float(expression.subs({s: float(event.s[0, 0]), t: float(a), u: float(b), alpha: 0.25}).evalf())
        for a, b in zip(event.t[0], event.u[0], strict=True)
    ]
    assert list(np.broadcast_to(values, event.shape)[0]) == pytest.approx(wanted, rel=1e-13)


@pytest.mark.parametrize(
    ("expression", "text"),
    [
        (dot(muon, sympy.Symbol("mu+")), "dot(mu-, mu+)"),
        (dot(1, 2), "dot(1, 2)"),
        (dot(beam, muon) ** 2 / s, "dot(beam_a, mu-)**2/s"),
        (invariant_mass(muon, sympy.Symbol("mu+")), "invariant_mass(mu-, mu+)"),
        (rest_mass(muon) + s, "rest_mass(mu-) + s"),
    ],
)
def test_functions_of_legs(event: Event, expression: Any, text: str) -> None:
    """Undefined functions of symbols named like legs, or of leg numbers."""
    found, wanted = (compile_formula(e, REACTION, ()).evaluate(event, {}) for e in (expression, text))
    assert np.broadcast_to(found, event.shape) == pytest.approx(np.broadcast_to(wanted, event.shape))


@pytest.mark.parametrize("number", [3, 2.5, np.float64(0.5), sympy.Integer(7)])
def test_a_number_is_a_formula(event: Event, number: Any) -> None:
    """Plain numbers, of Python, numpy or sympy."""
    assert float(compile_formula(number, REACTION, ()).evaluate(event, {})) == float(number)


@pytest.mark.parametrize(
    ("expression", "expected"),
    [
        (sympy.zeta(s), "the functions dot, invariant_mass, rest_mass, abs, sqrt"),
        (sympy.I * s, "numbers, symbols"),
        (sympy.oo, "numbers, symbols"),
        (sympy.zoo, "numbers, symbols"),
        (sympy.nan, "numbers, symbols"),
        (sympy.EulerGamma * s, "numbers, symbols"),
        (sympy.Integer(10) ** 400 * s, "numbers, symbols"),
        (sympy.Float("1e400") * s, "numbers, symbols"),
        (sympy.Piecewise((s, s > 0), (t, True)), "numbers, symbols"),
        (sympy.Max(s, t), "numbers, symbols"),
        (sympy.Integral(s, (s, 0, 1)), "numbers, symbols"),
        (sympy.conjugate(s), "numbers, symbols"),
        (sympy.Function("f")(s), "numbers, symbols"),
        (2 * sympy.Symbol("s + t"), "symbols whose names are single words"),
        (sympy.Symbol("__import__('os')"), "symbols whose names are single words"),
        (sympy.Symbol("alpha"), "s, t, u, pi or a declared parameter"),
        (dot(s + t, muon), "a symbol named like a leg"),
        (dot(sympy.Symbol("mu-, mu+) + dot(mu-"), muon), "a symbol named like a leg"),
        (dot(sympy.Integer(10) ** 5000, muon), "a symbol named like a leg"),
        (dot(muon), "dot with 2 particles"),
        (dot(muon, sympy.Symbol("tau-")), "a leg of e- e+ -> mu- mu+"),
        (s > t, "a text, a number or a sympy expression"),
        (sympy.Matrix([s]), "a text, a number or a sympy expression"),
        (sympy.true, "a text, a number or a sympy expression"),
        (["__import__('os').system('true')"], "a text, a number or a sympy expression"),
        ({"s": "t"}, "a text, a number or a sympy expression"),
        (None, "a text, a number or a sympy expression"),
        (1j, "a text, a number or a sympy expression"),
    ],
    ids=lambda value: type(value).__name__,
)
def test_what_is_refused(expression: Any, expected: str) -> None:
    """Functions and objects that the language does not have; nothing is read by sympy's own parser."""
    with pytest.raises(FormulaError, match="expected") as caught:
        compile_formula(expression, REACTION, ())
    assert expected in caught.value.findings[0].expected


def nested(function: Any, times: int) -> Any:
    """A function of itself, so often."""
    found: Any = s
    for _ in range(times):
        found = function(found)
    return found


@pytest.mark.parametrize(
    "expression",
    [
        pytest.param(nested(sympy.sin, 200), id="deep"),
        pytest.param(nested(lambda x: x + x**2 + 1, 60), id="as wide as 2^60"),
        pytest.param(sympy.Add(*(sympy.Symbol(f"x{k}") for k in range(3000))), id="long"),
    ],
)
def test_expressions_beyond_the_limits(expression: Any) -> None:
    """Too deep or too large, whole or unfolded: refused before it is written out."""
    with pytest.raises(FormulaError, match="a sympy expression of at most 2000 parts, 50 inside one another"):
        compile_formula(expression, REACTION, ())
