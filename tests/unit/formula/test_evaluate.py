"""Values of formulas, against 40-digit arithmetic and explicit four-vectors."""

from __future__ import annotations

import pickle
from collections.abc import Callable

import mpmath
import numpy as np
import pytest
from mpmath import mp
from unit.observables.exact import Vector, added, dot, mass, two_to_two
from unit.observables.n_body import three_bodies

from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.formula import Formula, compile_formula
from barnwright.kinematics import TwoBody
from barnwright.reaction import parse_reaction

mpmath.mp.dps = 40

ELECTRON, MUON = 0.00051099895, 0.1056583755
MASSES = (ELECTRON, ELECTRON, MUON, MUON)
REACTION = parse_reaction("e- e+ -> mu- mu+")
COSINES = (-0.9, -0.2, 0.35, 0.97)
PARAMETERS = {"alpha": 0.0072973525643, "width": 2.4952, "n": 3.0}


@pytest.fixture(scope="module", name="event")
def _event() -> Event:
    """7 on 4 GeV, four angles."""
    collision = collide(BeamSettings("kinetic", (7.0,), (4.0,)), (ELECTRON, ELECTRON))
    cosine = np.array([COSINES])
    return Event(REACTION, TwoBody(collision, MASSES, 1 - cosine, 1 + cosine))


def invariants() -> list[tuple[mpmath.mpf, mpmath.mpf, mpmath.mpf]]:
    """s, t, u of the same events."""
    found = []
    for cosine in COSINES:
        lab = two_to_two((7.0, 4.0), MASSES, (cosine, 0.0)).lab
        differences = [added(lab[-1], tuple(-c for c in lab[k])) for k in (1, 2)]  # type: ignore[arg-type]
        total = added(lab[-1], lab[-2])
        found.append((dot(total, total), *(dot(d, d) for d in differences)))
    return found


ALPHA, WIDTH = (mp.mpf(PARAMETERS[name]) for name in ("alpha", "width"))
Exact = Callable[[mpmath.mpf, mpmath.mpf, mpmath.mpf], mpmath.mpf]


@pytest.mark.parametrize(
    ("text", "exact"),
    [
        ("s", lambda s, t, u: s),
        ("t", lambda s, t, u: t),
        ("u", lambda s, t, u: u),
        ("s + t + u", lambda s, t, u: 2 * mp.mpf(ELECTRON) ** 2 + 2 * mp.mpf(MUON) ** 2),
        ("-t**2", lambda s, t, u: -(t**2)),
        ("(-t)**2", lambda s, t, u: t**2),
        ("2**-1*s", lambda s, t, u: s / 2),
        ("s**2**3/s**7", lambda s, t, u: s),
        ("32*pi**2*alpha**2*(t**2 + u**2)/s**2", lambda s, t, u: 32 * mp.pi**2 * ALPHA**2 * (t**2 + u**2) / s**2),
        ("s/((s - 91.1876**2)**2 + s*width**2)", lambda s, t, u: s / ((s - mp.mpf(91.1876) ** 2) ** 2 + s * WIDTH**2)),
        ("t - u - s", lambda s, t, u: t - u - s),
        ("s/t/u", lambda s, t, u: s / t / u),
        ("s**n", lambda s, t, u: s**3),
        ("s**-n", lambda s, t, u: s**-3),
        ("s**0.5", lambda s, t, u: mp.sqrt(s)),
        ("s**(1/3)", lambda s, t, u: mp.cbrt(s)),
        ("s**9", lambda s, t, u: s**9),
        ("s**-12", lambda s, t, u: s**-12),
        ("s**0", lambda s, t, u: mp.mpf(1)),
        ("(t/s)**7", lambda s, t, u: (t / s) ** 7),
        ("alpha**(t/s)", lambda s, t, u: ALPHA ** (t / s)),
        ("exp(t/s)", lambda s, t, u: mp.exp(t / s)),
        ("log(-t/s)", lambda s, t, u: mp.log(-t / s)),
        ("sqrt(-t)", lambda s, t, u: mp.sqrt(-t)),
        ("abs(t)", lambda s, t, u: -t),
        ("sin(t) + cos(u) + tan(t/s)", lambda s, t, u: mp.sin(t) + mp.cos(u) + mp.tan(t / s)),
        ("asin(t/s) + acos(u/s) + atan(t)", lambda s, t, u: mp.asin(t / s) + mp.acos(u / s) + mp.atan(t)),
        ("sinh(t/s) + cosh(u/s) + tanh(t)", lambda s, t, u: mp.sinh(t / s) + mp.cosh(u / s) + mp.tanh(t)),
        ("9**99 - 9**99 + s", lambda s, t, u: s),
    ],
)
def test_values_of_invariants(event: Event, text: str, exact: Exact) -> None:
    """Operators, powers and elementary functions, to 1e-12."""
    formula = compile_formula(text, REACTION, tuple(PARAMETERS))
    found = np.broadcast_to(formula.evaluate(event, PARAMETERS), event.shape)[0]
    assert list(found) == pytest.approx([float(exact(*point)) for point in invariants()], rel=1e-12)


THREE_MASSES = (0.2, 0.1, 0.0)


@pytest.mark.parametrize(
    ("text", "exact"),
    [
        ("dot(beam_a, mu-)", lambda p: dot(p[-1], p[1])),
        ("dot(gamma, 2)", lambda p: dot(p[3], p[2])),
        ("dot(beam_a, beam_b)", lambda p: dot(p[-1], p[-2])),
        ("dot(mu+, mu+)", lambda p: dot(p[2], p[2])),
        ("rest_mass(mu-)", lambda p: mp.mpf(0.2)),
        ("rest_mass(beam_a) + rest_mass(gamma)", lambda p: mp.mpf(0)),
        ("invariant_mass(mu-)", lambda p: mp.mpf(0.2)),
        ("invariant_mass(mu-, mu+)", lambda p: mass(added(p[1], p[2]))),
        ("invariant_mass(1, 2, 3)", lambda p: mass(added(p[1], p[2], p[3]))),
        ("invariant_mass(beam_a, beam_b)**2 - s", lambda p: mp.mpf(0)),
    ],
)
def test_functions_of_legs(text: str, exact: Callable[[dict[int, Vector]], mpmath.mpf]) -> None:
    """Four-products, masses of particles and of systems, for three bodies."""
    event, scenes = three_bodies("e- e+ -> mu- mu+ gamma", THREE_MASSES)
    found = compile_formula(text, event.reaction, ()).evaluate(event, {})
    wanted = [float(exact(scene.lab)) for scene in scenes]
    assert list(np.broadcast_to(found, event.shape)) == pytest.approx(wanted, rel=1e-9, abs=1e-12)


@pytest.mark.parametrize(
    ("reaction", "text", "legs"),
    [
        ("g g -> s t", "dot(beam_a, s) + dot(beam_b, t) + s + t", (1, 2)),
        ("g g -> t u", "dot(beam_a, t) + dot(beam_b, u) + s + t", (1, 2)),
        ("g g -> b t", "dot(beam_a, b) + dot(beam_b, t) + s + t", (1, 2)),
        ("g g -> nu(mu) nu(mu)~", "dot(beam_a, nu(mu)) + dot(beam_b, nu(mu)~) + s + t", (1, 2)),
        ("g g -> gamma gamma", "dot(beam_a, 1) + dot(beam_b, 2) + s + t", (1, 2)),
    ],
)
def test_quarks_where_a_leg_is_meant(reaction: str, text: str, legs: tuple[int, int]) -> None:
    """In the place of a leg s, t, u, b are particles, anywhere else s, t, u are invariants."""
    collision = collide(BeamSettings("sqrt_s", (10.0,)), (0.0, 0.0))
    cosine = np.array([COSINES])
    event = Event(parse_reaction(reaction), TwoBody(collision, (0.0,) * 4, 1 - cosine, 1 + cosine))  # type: ignore[arg-type]
    expected = event.dot("beam_a", legs[0]) + event.dot("beam_b", legs[1]) + event.s + event.t
    assert compile_formula(text, event.reaction, ()).evaluate(event, {}) == pytest.approx(expected)


def test_a_constant_formula_is_a_scalar_that_broadcasts(event: Event) -> None:
    """The value of a number has no shape of its own."""
    found = compile_formula("2*pi", REACTION, ()).evaluate(event, {})
    assert np.broadcast_shapes(found.shape, event.shape) == event.shape
    assert float(found) == pytest.approx(2 * np.pi)


@pytest.mark.parametrize(
    ("text", "value"), [("1/0", np.inf), ("-1/0", -np.inf), ("9e99**9", np.inf), ("log(0)", -np.inf)]
)
def test_overflow_is_infinite_and_no_warning(event: Event, text: str, value: float) -> None:
    """Whoever integrates decides what to do about it."""
    assert float(compile_formula(text, REACTION, ()).evaluate(event, {})) == value


def test_no_value_and_no_warning(event: Event) -> None:
    """The root of a negative number is not a number."""
    assert np.all(np.isnan(compile_formula("sqrt(t) + 0/0", REACTION, ()).evaluate(event, {})))


def test_common_parts_are_worked_out_once(event: Event) -> None:
    """The same part of a text is one step, wherever it stands."""
    formula = compile_formula(
        "(t**2 + u**2)/s**2 + (t**2 + u**2)*alpha + dot(1, 2)*dot(mu-, mu+)", REACTION, ("alpha",)
    )
    assert len(set(formula.program)) == len(formula.program)
    operations = [operation for operation, _ in formula.program]
    assert operations.count("**") == 3
    assert operations.count("dot") == 1
    once = compile_formula("(t**2 + u**2)*(1/s**2 + alpha)", REACTION, ("alpha",)).evaluate(event, {"alpha": 0.5})
    product = event.dot(1, 2) ** 2
    assert formula.evaluate(event, {"alpha": 0.5}) - product == pytest.approx(once)


def test_spent_values_are_let_go() -> None:
    """Every step that another one uses is spent exactly once, at its last use."""
    formula = compile_formula("+".join(f"t**{k}*u" for k in range(1, 60)), REACTION, ())
    spent = [earlier for step in formula.spent for earlier in step]
    assert sorted(spent) == list(range(len(formula.program) - 1))
    for number, (operation, arguments) in enumerate(formula.program):
        if operation in ("+", "*", "**"):
            assert all(earlier < number for earlier in arguments)
    alive = most = 0
    for step in formula.spent:
        alive += 1
        most = max(most, alive)
        alive -= len(step)
    assert most < 10


def test_the_longest_sum_has_a_value(event: Event) -> None:
    """A thousand terms are no deeper than one."""
    formula = compile_formula("+".join(["s"] * 1000), REACTION, ())
    assert formula.evaluate(event, {}) == pytest.approx(1000 * event.s, rel=1e-12)
    assert compile_formula("+".join([f"{k}*s" for k in range(500)]), REACTION, ()).evaluate(event, {}) == pytest.approx(
        124750 * event.s, rel=1e-12
    )


def test_pickling(event: Event) -> None:
    """A formula travels to another process and gives the same bits there."""
    formula = compile_formula("log(s)*t/u - alpha*" + "+".join(["s"] * 900), REACTION, ("alpha",))
    again = pickle.loads(pickle.dumps(formula))  # noqa: S301 - our own bytes
    assert isinstance(again, Formula)
    assert again == formula
    assert np.array_equal(again.evaluate(event, PARAMETERS), formula.evaluate(event, PARAMETERS))


def test_a_text_is_compiled_once() -> None:
    """For one reaction and one list of parameters."""
    assert compile_formula("s*alpha", REACTION, ("alpha",)) is compile_formula("s*alpha", REACTION, ("alpha",))
