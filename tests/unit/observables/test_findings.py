"""What is no observable of a reaction: everything at once, each with its place and what is nearest."""

from __future__ import annotations

import pickle

import pytest

from barnwright.errors import BarnwrightError
from barnwright.observables import ObservableError, compile_observable
from barnwright.reaction import parse_reaction

TWO = parse_reaction("e- e+ -> mu- mu+")
THREE = parse_reaction("e- e+ -> mu- mu+ gamma")
NEUTRINOS = parse_reaction("e- e+ -> nu(mu) nu(mu)~ gamma")


def found(text: str, reaction: object = TWO) -> list[tuple[int, str, str | None]]:
    """Position, expectation and nearest of every finding."""
    with pytest.raises(ObservableError, match="expected") as caught:
        compile_observable(text, reaction)  # type: ignore[arg-type]
    return [(f.position, f.expected, f.nearest) for f in caught.value.findings]


LEGS = "a leg of e- e+ -> mu- mu+: mu-, mu+, 1 to 2, beam_a, beam_b"


@pytest.mark.parametrize(
    ("text", "position", "expected", "near"),
    [
        ("pt(mu)", 3, LEGS, "mu-"),
        ("pt(e-)", 3, LEGS, "beam_a"),
        ("pt(beam_aa)", 3, LEGS, "beam_a"),
        ("pt(3)", 3, LEGS, None),
        ("pt(0)", 3, LEGS, None),
        ("pt(" + "1" * 5000 + ")", 3, LEGS, None),
        ("cos_thta(mu-)", 0, "one of the functions", "cos_theta"),
        ("costheta(mu-)", 0, "one of the functions", "cos_theta"),
        ("squrt_s", 0, "one of MeV, TeV, deg, eV, keV, pi, sqrt_s, thrust", "sqrt_s"),
        ("thrust(mu-)", 0, "thrust by itself", "thrust"),
        ("pt", 0, "pt(…) with its arguments", None),
        ("mass(mu-, mu-)", 0, "mass of different particles", None),
        ("mass(1, mu-)", 0, "mass of different particles", None),
        ("angle(mu-, mu-)", 0, "angle of different particles", None),
        ("mass(beam_a, mu-)", 0, "mass of outgoing particles", None),
        ("recoil_mass(beam_b)", 0, "recoil_mass of outgoing particles", None),
        ("transfer(mu-, mu+)", 0, "transfer(beam_a, x) or transfer(beam_b, x)", None),
        ("1 + q2(mu-, beam_a)", 4, "q2(beam_a, x) or q2(beam_b, x)", None),
        ("transfer(beam_a, beam_b)", 0, "transfer(beam_a, x)", None),
        ("phi(beam_a)", 0, "phi of outgoing particles; a beam has no azimuth", None),
        ("delta_phi(beam_a, mu-, frame=cm)", 0, "delta_phi of outgoing particles", None),
        ("delta_r(mu-, beam_b)", 0, "delta_r of outgoing particles", None),
        ("acoplanarity(mu-, beam_b)", 0, "acoplanarity of outgoing particles", None),
        ("energy(mu-, frame=rest(beam_a))", 23, "an outgoing particle, not beam_a", None),
        ("energy(mu-, frame=rest(mu-, mu-))", 28, "different particles; mu- is there already", None),
        ("energy(mu-, frame=rest(mu-, 1))", 28, "different particles; 1 is there already", None),
        ("energy(mu-, frame=rest(mu))", 23, LEGS, "mu-"),
        ("pt(each(mu-))", 3, "each(…) of identical particles; mu- is not one of several", "mu-"),
        ("min(pt(mu-))", 0, "min of at least two quantities, or identical particles", None),
        ("helicity_angle(mu-)", 0, "helicity_angle(x, of=(x, y)) with x among", None),
        ("helicity_angle(mu-, of=(mu-, mu+))", 0, "a system that flies", "cos_theta(…, frame=cm)"),
        ("+".join(["sqrt_s"] * 200), 0, "at most 100 operators after one another", None),
    ],
)
def test_position_expectation_and_nearest(text: str, position: int, expected: str, near: str | None) -> None:
    """One mistake, one finding."""
    ((where, what, nearest),) = found(text)
    assert (where, nearest) == (position, near)
    assert expected in what


@pytest.mark.parametrize(
    ("text", "position", "expected"),
    [
        ("helicity_angle(gamma, of=(mu-, mu+))", 0, "with x among the particles of the system"),
        ("helicity_angle(mu-, of=(mu-))", 0, "with x among the particles of the system"),
        ("helicity_angle(mu-, of=(mu-, mu+, mu+))", 34, "different particles; mu+ is there already"),
        ("helicity_angle(mu-, of=(mu-, mu+, gamma))", 0, "a system that flies"),
        ("energy(mu-, frame=rest(gamma))", 23, "particles that can be at rest; gamma has no mass"),
    ],
)
def test_systems_of_three_bodies(text: str, position: int, expected: str) -> None:
    """A system is two particles or more, each once, and not all of them."""
    ((where, what, _),) = found(text, THREE)
    assert where == position
    assert expected in what


def test_a_neutrino_is_never_at_rest() -> None:
    """Particles of mass 0 have no rest frame, alone; with another one they do."""
    ((position, expected, _),) = found("energy(gamma, frame=rest(nu(mu)~))", NEUTRINOS)
    assert (position, expected) == (25, "particles that can be at rest; nu(mu)~ has no mass")
    assert compile_observable("energy(gamma, frame=rest(nu(mu), nu(mu)~))", NEUTRINOS).unit == "GeV"


def test_everything_at_once_and_in_order() -> None:
    """Legs, systems and units of all parts, from left to right."""
    text = "pt(mu) + angle(mu-, tau+, frame=rest(e-)) + q2(mu-, mu+)"
    assert [position for position, _, _ in found(text)] == [3, 7, 20, 37, 42, 44]


def test_no_more_findings_than_somebody_reads() -> None:
    """A thousand unknown particles are fifty findings, and no thousand searches for what is nearest."""
    text = "+".join(f"mass({', '.join(f'x{n}{k}' for k in range(100))})" for n in range(10))
    assert len(found(text)) == 50


def test_errors_are_barnwright_s_and_travel() -> None:
    """They are errors of this package and ValueErrors, and survive pickling."""
    with pytest.raises(ObservableError, match="cos_theta") as caught:
        compile_observable("cos_thta(mu-)", TWO)
    assert isinstance(caught.value, BarnwrightError)
    assert isinstance(caught.value, ValueError)
    again = pickle.loads(pickle.dumps(caught.value))  # noqa: S301 - our own bytes
    assert (type(again), again.findings) == (ObservableError, caught.value.findings)


@pytest.mark.parametrize(
    ("reaction", "legs"),
    [
        ("e- e+ -> s s~", ("s", "s~")),
        ("g g -> t u", ("t", "u")),
        ("u b -> u b", ("u", "b")),
        ("e- e+ -> nu(mu) nu(mu)~", ("nu(mu)", "nu(mu)~")),
        ("pi- p -> K(S)0 Lambda", ("K(S)0", "Lambda")),
        ("pi+ p -> Delta(1232)++ pi0", ("Delta(1232)++", "pi0")),
        ("e- e+ -> J/psi(1S) gamma", ("J/psi(1S)", "gamma")),
        ("e- e+ -> mu- mu+", ("mu-", "mu+")),
    ],
)
def test_names_that_look_like_something_else(reaction: str, legs: tuple[str, str]) -> None:
    """Quarks called s, t, u, b, charges that look like signs, parentheses, slashes: a leg is read as a name."""
    legs_of = parse_reaction(reaction)
    text = f"mass({legs[0]}, {legs[1]}) - energy({legs[1]}) - pt({legs[0]}, frame=cm)"
    numbered = "mass(1, 2) - energy(2) - pt(1, frame=cm)"
    assert compile_observable(text, legs_of).trees == compile_observable(numbered, legs_of).trees
