"""Cuts at their limits, and edges of bins."""

from __future__ import annotations

import math

import numpy as np
import pytest

from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.kinematics import TwoBody
from barnwright.observables import Cut, compile_observable, edges_of
from barnwright.reaction import parse_reaction

TWO = parse_reaction("e- e+ -> mu- mu+")
PHOTONS = parse_reaction("e- e+ -> gamma gamma")
COSINE = compile_observable("cos_theta(mu-)", TWO)
EACH = compile_observable("cos_theta(each(gamma))", PHOTONS)
ANY = compile_observable("cos_theta(any(gamma))", PHOTONS)
BELOW, ABOVE = np.nextafter(0.5, 0), np.nextafter(0.5, 1)


@pytest.mark.parametrize(
    ("limits", "passing", "failing"),
    [
        ({"min": 0.5}, (0.5, ABOVE, math.inf), (BELOW, -math.inf, math.nan)),
        ({"max": 0.5}, (0.5, BELOW, -math.inf), (ABOVE, math.inf, math.nan)),
        ({"min": -0.5, "max": 0.5}, (-0.5, 0.0, 0.5), (ABOVE, -ABOVE, math.nan)),
        ({"outside": (-0.5, 0.5)}, (-0.5, 0.5, ABOVE, math.inf, -math.inf), (BELOW, 0.0, -BELOW, math.nan)),
        ({"min": 0.0, "max": 0.9, "outside": (0.1, 0.5)}, (0.0, 0.1, 0.5, 0.9), (-0.1, 0.3, BELOW, 1.0)),
        ({"min": 0.5, "max": 0.5}, (0.5,), (BELOW, ABOVE)),
        ({}, (0.0, math.inf), ()),
    ],
)
def test_limits_pass(limits: dict[str, object], passing: tuple[float, ...], failing: tuple[float, ...]) -> None:
    """Limits and the ends of a crack pass; what has no value passes no limit."""
    cut = Cut("acceptance", COSINE, **limits)  # type: ignore[arg-type]
    assert cut.accepts(np.array(passing)).tolist() == [True] * len(passing)
    assert cut.accepts(np.array(failing)).tolist() == [False] * len(failing)


def test_all_of_each_and_one_of_any() -> None:
    """Entries come first: of each(…) all have to pass, of any(…) one."""
    values = np.array([[0.1, 0.1, 0.9, 0.9], [0.1, 0.9, 0.1, 0.9]])
    assert Cut("hard", EACH, min=0.5).accepts(values).tolist() == [False, False, False, True]
    assert Cut("hard", ANY, min=0.5).accepts(values).tolist() == [False, True, True, True]
    assert Cut("crack", EACH, outside=(0.0, 0.5)).accepts(values).tolist() == [False, False, False, True]
    assert Cut("crack", ANY, outside=(0.0, 0.5)).accepts(values).tolist() == [False, True, True, True]


def test_limits_on_both_sides_belong_to_one_particle() -> None:
    """A particle passes any(…) when it is within both limits itself, not when one is above and another below."""
    values = np.array([[0.1], [0.9]])
    assert Cut("band", ANY, min=0.4, max=0.6).accepts(values).tolist() == [False]
    assert Cut("band", ANY, min=0.05, max=0.6).accepts(values).tolist() == [True]


def test_cuts_of_events() -> None:
    """A cut asks the event for the observable."""
    collision = collide(BeamSettings("sqrt_s", (10.0,)), (0.0, 0.0))
    cosine = np.array([[-0.75, 0.25, 0.5, 0.75]])
    two_body = TwoBody(collision, (0.0, 0.0, 0.0, 0.0), 1 - cosine, 1 + cosine)
    assert Cut("c", COSINE, max=0.5).passes(Event(TWO, two_body)).tolist() == [[True, True, True, False]]
    assert Cut("c", EACH, max=0.5).passes(Event(PHOTONS, two_body)).tolist() == [[False, True, True, False]]


def test_linear_edges() -> None:
    """One more edge than bins, equally far apart, the ends to the bit."""
    edges = edges_of(20, -1.0, 1.0)
    assert edges.size == 21
    assert np.diff(edges) == pytest.approx(np.full(20, 0.1))
    assert (edges[0], edges[10], edges[-1]) == (-1.0, 0.0, 1.0)


def test_logarithmic_edges() -> None:
    """Each edge is the one before times the same number, the ends to the bit."""
    edges = edges_of(7, 0.3, 91.1876, "log")
    assert (edges[0], edges[-1]) == (0.3, 91.1876)
    assert edges[1:] / edges[:-1] == pytest.approx(np.full(7, (91.1876 / 0.3) ** (1 / 7)))


@pytest.mark.parametrize(
    ("count", "low", "high", "spacing", "message"),
    [
        (0, 0.0, 1.0, "linear", "count: got 0, expected a whole number from 1 to 10000"),
        (10_001, 0.0, 1.0, "linear", "count: got 10001"),
        (1, 1.0, 1.0, "linear", "expected two numbers, the second one greater"),
        (1, 1.0, 0.0, "linear", "low, high: got 1.0, 0.0"),
        (1, 0.0, math.inf, "linear", "low, high: got 0.0, inf"),
        (1, math.nan, 1.0, "linear", "low, high: got nan, 1.0"),
        (2, 0.0, 1.0, "log", "low: got 0.0, expected a number greater than 0 for logarithmic bins"),
        (2, -1.0, 1.0, "log", "low: got -1.0"),
        (10, 1.0, 1.0000000000000002, "linear", "count: got 10, expected fewer bins"),
        (10, 1.0, 1.0000000000000002, "log", "count: got 10, expected fewer bins"),
        (2, -1e308, 1e308, "linear", "count: got 2, expected fewer bins"),
    ],
)
def test_edges_that_are_none(count: int, low: float, high: float, spacing: str, message: str) -> None:
    """Too few, too many, backwards, infinite, or too close together to be told apart."""
    with pytest.raises(ValueError, match=message):
        edges_of(count, low, high, spacing)  # type: ignore[arg-type]
