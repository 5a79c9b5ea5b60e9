"""Laws: a function, or an expression that is averaged here when it is not yet."""

from __future__ import annotations

import numpy as np
import pytest

from barnwright.errors import RequestError
from barnwright.event import Event
from barnwright.kinematics import Collision, TwoBody
from barnwright.process import Expression, Parameters, SquaredAmplitude, parameters_model
from barnwright.process.laws import initial_states
from barnwright.reaction import parse_reaction

COSINES = np.array([[-0.5, 0.0, 0.8]])


def event(reaction: str) -> Event:
    """Massless events at √s = 10 GeV, shape (1, 3)."""
    one = np.ones((1, 1))
    found = Collision(10.0 * one, 0.0 * one, one)
    return Event(parse_reaction(reaction), TwoBody(found, (0.0, 0.0, 0.0, 0.0), 1 - COSINES, 1 + COSINES))


def test_a_function_is_handed_event_and_parameters() -> None:
    """A squared amplitude is what its function returns."""
    law = SquaredAmplitude(lambda event, parameters: parameters.model_dump() or event.t / event.s)
    assert law.squared(event("e- e+ -> mu- mu+"), Parameters()) == pytest.approx((COSINES - 1) / 2)


@pytest.mark.parametrize(("spin_colour", "factor"), [("averaged", 1.0), ("summed", 0.25)])
def test_a_summed_expression_is_averaged_here(spin_colour: str, factor: float) -> None:
    """Two spins of each beam: a sum is divided by four, an average is left alone."""
    parameters = parameters_model({"g": 2.0})()
    law = Expression("g*(t**2 + u**2)/s**2", spin_colour=spin_colour)  # type: ignore[arg-type]
    assert law.squared(event("e- e+ -> mu- mu+"), parameters) == pytest.approx(factor * (1 + COSINES**2))


def test_a_sympy_expression_is_a_law() -> None:
    """Symbols s, t, u and the parameters mean the same as in a text."""
    sympy = pytest.importorskip("sympy")
    s, t, u, g = sympy.symbols("s t u g")
    law = Expression(g * (t**2 + u**2) / s**2)
    found = law.squared(event("e- e+ -> mu- mu+"), parameters_model({"g": 2.0})())
    assert found == pytest.approx(1 + COSINES**2)


@pytest.mark.parametrize(
    ("reaction", "states"),
    [
        ("e- e+ -> mu- mu+", 4),
        ("nu(mu) e- -> nu(mu) e-", 2),
        ("gamma gamma -> e- e+", 4),
        ("u u~ -> g g", 36),
        ("g g -> u u~", 256),
        ("t -> b W+", 6),
    ],
)
def test_physical_initial_states(reaction: str, states: int) -> None:
    """One helicity for neutrinos, two for massless bosons, three colours of quarks and eight of gluons."""
    assert initial_states(parse_reaction(reaction)) == states


def test_a_particle_without_a_known_spin_cannot_be_averaged_over() -> None:
    """The table has no spin of nuclei: a sum is refused with what to do."""
    reaction = parse_reaction("e- Al27 -> e- Al27")
    expected = "formula.spin_colour: got 'summed', expected 'averaged', since the particle table does not know the spin"
    with pytest.raises(RequestError, match=expected):
        Expression("1", spin_colour="summed").compile(reaction, ())
