"""The digest of a process made in a notebook: other numbers have another digest, the same ones the same."""

from __future__ import annotations

import subprocess
import sys
from functools import lru_cache, partial
from typing import Any

import numpy as np
import pytest

from barnwright.process import (
    AngularCrossSection,
    ClosedForm,
    Expression,
    HelicityAmplitudes,
    Parameters,
    Process,
    SquaredAmplitude,
    TotalCrossSection,
    parameter,
)
from barnwright.run.object_digest import object_digest

CHARGE = 2.0
TABLE = np.array([1.0, 2.0])


def helper(event: Any) -> Any:
    """A function that a law calls."""
    return CHARGE * event.t


def calls(event: Any, parameters: Any) -> Any:
    """A law that names a function of its module, which names a number of it."""
    return helper(event)


def scaled(scale: Any) -> Any:
    """A law that closes over its factor."""
    return lambda event, parameters: scale * event.s


def made(law: Any, **fields: Any) -> str:
    """The digest of a process with this law."""
    fields = {"name": "pair", "reaction": "e- e+ -> mu- mu+", **fields}
    laws = (law if hasattr(law, "kind") else SquaredAmplitude(law),)
    return object_digest(Process(laws=laws, **fields))


class One(Parameters):
    """A parameter."""

    g: float = parameter(1.0)


class Two(Parameters):
    """The same with another default."""

    g: float = parameter(2.0)


class Callable:
    """An object that is a law."""

    def __init__(self, scale: float) -> None:
        self.scale = scale

    def __call__(self, *_: Any) -> Any:
        """A number."""
        return self.scale


def power(event: Any, parameters: Any, exponent: float = 2.0, *, sign: int = 1) -> Any:
    """A law with defaults."""
    return sign * event.s**exponent


def other_default(event: Any, parameters: Any, exponent: float = 3.0, *, sign: int = 1) -> Any:
    """Another default."""
    return sign * event.s**exponent


def other_keyword(event: Any, parameters: Any, exponent: float = 2.0, *, sign: int = -1) -> Any:
    """Another default of a keyword."""
    return sign * event.s**exponent


ROWS = ((-1, 1, -1, 1),)
TOTAL = {"reaction": "e- e+ -> X"}
DIFFERENT: dict[str, tuple[str, ...]] = {
    "constants": (made(lambda e, p: 1.0), made(lambda e, p: 2.0)),
    "names": (made(lambda e, p: e.s), made(lambda e, p: e.t)),
    "what is called": (made(lambda e, p: np.sin(e.s)), made(lambda e, p: np.cos(e.s))),
    "nested functions": (made(lambda e, p: sum(x + 1 for x in e)), made(lambda e, p: sum(x + 2 for x in e))),
    "closures": tuple(made(scaled(value)) for value in (1.0, 2.0, "1.0", TABLE, TABLE[::-1], [1.0, 2.0])),
    "closures over functions": (made(scaled(scaled(1.0))), made(scaled(scaled(2.0)))),
    "defaults": (made(power), made(other_default), made(other_keyword)),
    "partial functions": (made(partial(power, exponent=1.0)), made(partial(power, exponent=2.0))),
    "objects": (made(Callable(1.0)), made(Callable(2.0))),
    "wrapped functions": (made(lru_cache(scaled(1.0))), made(lru_cache(scaled(2.0)))),
    "kinds of law": (made(AngularCrossSection(power)), made(SquaredAmplitude(power))),
    "amplitudes": tuple(made(HelicityAmplitudes(scaled(value), helicities=ROWS)) for value in (1.0, 2.0)),
    "colours": tuple(made(HelicityAmplitudes(power, colour=((value,),))) for value in (1.0, 2.0)),
    "total laws": tuple(made(TotalCrossSection(scaled(value)), **TOTAL) for value in (1.0, 2.0)),
    "closed forms": tuple(
        made(power, closed_forms=(ClosedForm(lambda x, point, parameters: x, observable=text),))
        for text in ("cos_theta(1, frame=cm)", "cos_theta(2, frame=cm)")
    ),
    "expressions": (made(Expression("t/s")), made(Expression("u/s"))),
    "massless legs": (made(SquaredAmplitude(power)), made(SquaredAmplitude(power, massless=("e-",)))),
    "masses": (made(power), made(power, masses={"e-": 0.0}), made(power, masses={"e-": 1.0})),
    "parameters": (made(power), made(power, parameters=One), made(power, parameters=Two)),
}


@pytest.mark.parametrize("what", DIFFERENT)
def test_other_numbers_have_another_digest(what: str) -> None:
    """Whatever the numbers come from is in the digest."""
    digests = DIFFERENT[what]
    assert len(set(digests)) == len(digests)


def test_the_same_numbers_have_the_same_digest() -> None:
    """Made anew, from the same code, it is the same process."""
    assert made(scaled(TABLE)) == made(scaled(TABLE.copy()))
    assert made(calls) == made(calls)


def test_what_a_law_names_counts_as_it_is_now(monkeypatch: pytest.MonkeyPatch) -> None:
    """A number of the notebook that was changed, and a function that was defined anew, change the digest."""
    first = made(calls)
    monkeypatch.setattr(sys.modules[__name__], "CHARGE", 3.0)
    second = made(calls)
    monkeypatch.setattr(sys.modules[__name__], "helper", lambda event: event.u)
    assert len({first, second, made(calls)}) == 3


CODE = """
from barnwright.process import Process, SquaredAmplitude
from barnwright.run.object_digest import object_digest
TABLE = {"a": {1, 2, 3}, "b": frozenset(("x", "y", "z"))}
def inner(x): return x in {"p", "q", "r"}
def law(event, parameters): return inner(TABLE)
print(object_digest(Process(name="pair", reaction="e- e+ -> mu- mu+", laws=(SquaredAmplitude(law),))))
"""


def test_another_run_of_the_program_has_the_same_digest() -> None:
    """Neither addresses nor the order of sets get in."""
    runs = [
        subprocess.run(
            [sys.executable, "-c", CODE], capture_output=True, text=True, check=True, env={"PYTHONHASHSEED": seed}
        )
        for seed in ("1", "2")
    ]
    assert runs[0].stdout == runs[1].stdout
    assert len(runs[0].stdout) == 65


def test_an_expression_of_sympy_is_what_it_prints() -> None:
    """Two expressions that print alike are one."""
    sympy = pytest.importorskip("sympy")
    s, t = sympy.symbols("s t")
    assert made(Expression(t / s)) == made(Expression(t / s)) != made(Expression(t / s + 1))
