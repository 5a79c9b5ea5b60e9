"""Declared divergences: refused with an example of a cut, accepted with any cut that closes them."""

from __future__ import annotations

from typing import Any

import pytest
from engine.laws import exchange

import barnwright
from barnwright.errors import RequestError
from barnwright.plugin import Peak, Process, SquaredAmplitude

BEAMS = {"kind": "collider", "energies": {"e-": 10.0, "mu-": 5.0}}
CLOSING: list[dict[str, Any]] = [
    {"observable": "cos_theta(e-, frame=cm)", "max": 0.99},
    {"observable": "theta(e-)", "min": 0.01},
    {"observable": "abs(pseudorapidity(mu-))", "max": 2.5},
    {"observable": "pt(e-)", "min": 0.1},
    {"observable": "energy(e-)", "max": 9.5},
    {"observable": "q2(beam_a, e-)", "min": 0.5},
    {"observable": "cos_theta(e-)", "outside": [0.9, 1.1]},
]
USELESS: list[dict[str, Any]] = [
    {"observable": "cos_theta(e-, frame=cm)", "max": 1.0},
    {"observable": "cos_theta(e-, frame=cm)", "min": -0.9},
    {"observable": "pt(e-)", "max": 2.0},
    {"observable": "pt(e-)", "min": 0.0},
    {"observable": "energy(e-)", "min": 9.5},
]


@pytest.mark.parametrize("cut", CLOSING, ids=lambda cut: cut["observable"])
def test_a_cut_in_any_observable_closes_it(cut: dict[str, Any]) -> None:
    """Angle, transverse momentum, energy and transfer, in the lab and in the cm."""
    found = barnwright.predict(process=exchange, beams=BEAMS, cuts=[cut])
    assert found.status == "converged"
    assert found.total.error < 1e-10 * found.total.value


@pytest.mark.parametrize("cut", USELESS, ids=str)
def test_a_cut_that_leaves_it_open_is_not_enough(cut: dict[str, Any]) -> None:
    """The message names the cut that is there, and one that would do."""
    text = r"cuts: got 'cut-1', expected a cut that keeps t = \(p_a - p_1\)\^2 away from 0, where the cross section"
    with pytest.raises(RequestError, match=text):
        barnwright.predict(process=exchange, beams=BEAMS, cuts=[cut])


def test_the_example_of_the_message_works() -> None:
    """The nearest choice can be put into the request as it stands."""
    with pytest.raises(RequestError, match="cuts: got 'none'") as caught:
        barnwright.predict(process=exchange, beams=BEAMS)
    nearest = caught.value.violations[0].nearest
    assert nearest == '{ observable = "cos_theta(e-, frame=cm)", max = 0.95 }'
    request = barnwright.Request.from_toml(
        f'process = "x/exchange"\ncuts = [{nearest}]\n[beams]\nkind = "collider"\nsqrt_s = 10.0'
    )
    assert barnwright.predict(request.merged({"process": "exchange"}), process=exchange).status == "converged"


def test_a_variation_that_opens_it_is_named() -> None:
    """The path of the variation stands before the field."""
    cut = {"name": "angle", "observable": "cos_theta(e-, frame=cm)", "max": 0.99}
    wide = {"name": "wide", "cuts": [{"name": "angle", "max": 1.0}]}
    with pytest.raises(RequestError, match=r"variations\[0\]\.cuts: got 'angle'"):
        barnwright.predict(process=exchange, beams=BEAMS, cuts=[cut], variations=[wide])


def test_a_pole_that_masses_keep_away_is_none() -> None:
    """An exchanged mass that t never reaches needs no cut; with the mass set to 0 it does."""

    def photons(event: Any, parameters: Any) -> Any:
        return event.dot("beam_a", 1) ** -2 + event.dot("beam_a", 2) ** -2

    process = Process(
        name="two-photons",
        reaction="e- e+ -> gamma gamma",
        laws=(SquaredAmplitude(photons),),
        singular=("t", "u"),
        peaks=(Peak(of="t", shape="power", at="e-"), Peak(of="u", shape="power", at="e-")),
    )
    beams = {"kind": "collider", "sqrt_s": 1.0}
    assert barnwright.predict(process=process, beams=beams).status == "converged"
    with pytest.raises(RequestError, match="where the cross section diverges") as caught:
        barnwright.predict(process=process, beams=beams, masses={"e-": 0.0})
    assert len(caught.value.violations) == 2
    cut = {"observable": "abs(cos_theta(each(gamma), frame=cm))", "max": 0.95}
    assert barnwright.predict(process=process, beams=beams, masses={"e-": 0.0}, cuts=[cut]).status == "converged"
