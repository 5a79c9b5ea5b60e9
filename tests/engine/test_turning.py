"""Which questions depend on the azimuth, head on and where beams cross."""

from __future__ import annotations

import numpy as np
import pytest

from barnwright.engine.turning import tells_sides, turns, within_range
from barnwright.observables import compile_observable
from barnwright.reaction import parse_reaction

MUONS = parse_reaction("e- e+ -> mu- mu+")
PHOTONS = parse_reaction("e- e+ -> gamma gamma")


@pytest.mark.parametrize(
    ("text", "head_on", "crossed"),
    [
        ("cos_theta(mu-)", False, True),
        ("cos_theta(mu-, frame=cm)", False, False),
        ("phi(mu-, frame=cm)", True, True),
        ("energy(mu-, frame=rest(mu+))", False, False),
        ("q2(beam_a, mu-)", False, False),
        ("recoil_mass(mu-)", False, False),
        ("energy_fraction(mu-)", False, False),
        ("theta(mu-, frame=cm) + 0.1*pt(mu-)/MeV", False, True),
        ("acoplanarity(mu-, mu+)", False, True),
        ("sqrt_s", False, False),
        ("thrust", False, False),
    ],
)
def test_what_turns(text: str, head_on: bool, crossed: bool) -> None:
    """Only the azimuth itself turns head on; with a crossing angle everything of the lab does."""
    observable = compile_observable(text, MUONS)
    assert turns(observable, crossed=False) is head_on
    assert turns(observable, crossed=True) is crossed


def test_the_leading_one_is_of_the_lab() -> None:
    """Which photon leads is decided in the lab, whatever is asked of it."""
    assert turns(compile_observable("cos_theta(leading(gamma), frame=cm)", PHOTONS), crossed=True)
    assert not turns(compile_observable("cos_theta(each(gamma), frame=cm)", PHOTONS), crossed=True)


def test_left_and_right() -> None:
    """Azimuths and their differences tell the sides of the plane of the beams, sizes do not."""
    for text, sided in (("phi(mu-)", True), ("1 + abs(delta_phi(mu-, mu+))", True), ("acoplanarity(mu-, mu+)", False)):
        assert tells_sides(compile_observable(text, MUONS)) is sided


def test_levels_that_values_only_touch() -> None:
    """The ends of the natural range separate nothing."""
    cosine = compile_observable("cos_theta(mu-)", MUONS)
    assert within_range(cosine, np.array([-2.0, -1.0, -0.5, 0.0, 1.0])).tolist() == [-0.5, 0.0]
