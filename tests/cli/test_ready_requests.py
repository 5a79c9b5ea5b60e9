"""Ready requests: what describe prints for any installed process runs as it stands."""

from __future__ import annotations

from typing import Any, Literal

import pytest

import barnwright
from barnwright.observables import compile_observable
from barnwright.peaks import Peak
from barnwright.process import (
    Claims,
    HelicityAmplitudes,
    Parameters,
    Process,
    SquaredAmplitude,
    TotalCrossSection,
    Validity,
    parameter,
)
from barnwright.registry import catalogue
from barnwright.run import statements
from barnwright.run.closing_cuts import closing_cuts
from barnwright.run.ready_request import ready_request
from barnwright.run.useful_observables import useful_observables

INSTALLED = catalogue().names()


@pytest.mark.parametrize("name", INSTALLED)
def test_the_ready_request_of_an_installed_process_runs(name: str) -> None:
    """It is answered with a total that is known, without a word that it lies where the process is not valid."""
    found = barnwright.predict(barnwright.Request.from_toml(barnwright.describe(name).request))
    assert found.status == "converged"
    assert found.total.value is not None
    assert found.total.value > 0
    assert not {note.code for note in found.notes} & {"outside_validity", "below_threshold", "law_is_zero"}


@pytest.mark.parametrize("name", INSTALLED)
def test_observables_of_an_installed_process_can_be_asked(name: str) -> None:
    """Every one that describe lists is one of its reaction."""
    process = catalogue().load(name).process
    texts = useful_observables(process)
    assert texts
    assert all(compile_observable(text, process.legs) for text in texts)


class Inputs(Parameters):
    """Parameters of every type without a default, and one that a word uses."""

    mass: float = parameter(unit="GeV", meaning="mass of the line")
    copies: int = parameter()
    on: bool = parameter()
    scheme: Literal["alpha", "fermi"] = parameter()
    alpha: float = parameter(0.1, used_with={"scheme": ("alpha", "fermi"), "copies": (1,)})


def one(*_arguments: Any, parts: Any = None) -> float:
    """A number."""
    return 1.0


def made(*laws: Any, **fields: Any) -> Process:
    """A muon-pair process."""
    defaults = {"name": "pair", "reaction": "e- e+ -> mu- mu+", "laws": laws or (SquaredAmplitude(one),)}
    return Process(**{**defaults, **fields})


def ready(**fields: Any) -> dict[str, Any]:
    """The ready request of a process as plain values."""
    return barnwright.Request.from_toml(ready_request("my/pair", made(**fields))).given()


def test_a_total_law_has_no_histogram() -> None:
    """What comes out cannot be asked about; only the energy can."""
    inclusive = made(TotalCrossSection(one), reaction="e- e+ -> X")
    pair = made(TotalCrossSection(one))
    for process in (inclusive, pair):
        request = barnwright.Request.from_toml(ready_request("my/pair", process)).given()
        assert "histograms" not in request
        assert useful_observables(process) == ("sqrt_s",)


def test_required_parameters_come_from_the_example() -> None:
    """Floats, whole numbers, truth values and words, as TOML writes them."""
    example = {"mass": 91.2, "copies": 2, "on": True, "scheme": "fermi"}
    assert ready(parameters=Inputs, example=example)["parameters"] == example


def test_contributions_stand_in_a_comment() -> None:
    """All count unless some are named, so naming them is left to the reader."""
    process = made(contributions={"photon": "a", "both": "a*b", "z": "b"})
    assert '# contributions = ["photon", "both", "z"]' in ready_request("my/pair", process)
    assert list(statements.signed_contributions(process)) == ["both"]


RESONANCE = Peak(of="mu- mu+", shape="resonance", at=91.2, width=2.5)
ENERGIES: list[tuple[dict[str, Any], float]] = [
    ({}, 10.0),
    ({"peaks": (RESONANCE,)}, 91.2),
    ({"peaks": (RESONANCE,), "valid": Validity((1.0, 30.0))}, 10.0),
    ({"valid": Validity((85.0, 97.0))}, 91.0),
    ({"reaction": "e- e+ -> tau- tau+", "valid": Validity((3.5, 4.5))}, 4.027),
    ({"reaction": "e- e+ -> t t~"}, 690.3),
]


@pytest.mark.parametrize(("fields", "sqrt_s"), ENERGIES)
def test_the_energy_is_where_the_process_is_interesting(fields: dict[str, Any], sqrt_s: float) -> None:
    """At a resonance, else at 10 GeV, if that is valid and above threshold."""
    assert ready(**fields)["beams"]["sqrt_s"] == pytest.approx(sqrt_s, rel=1e-2)


@pytest.mark.parametrize(
    ("reaction", "target"),
    [("gamma e- -> gamma e-", "e-"), ("e- p -> e- p", "p"), ("pi+ p -> pi+ p", "p"), ("nu(mu) e- -> mu- nu(e)", "e-")],
)
def test_what_lies_still_in_a_laboratory_is_a_target(reaction: str, target: str) -> None:
    """A nucleon, and what has mass where the other one has none."""
    beams = ready(reaction=reaction)["beams"]
    assert (beams["kind"], beams["target"]) == ("fixed_target", target)


POLES = Peak(of="t", shape="power", at=0.0), Peak(of="u", shape="power", at=0.0)
CUTS: list[tuple[dict[str, Any], list[tuple[str, str, float]]]] = [
    ({}, []),
    ({"singular": ("t",), "peaks": POLES[:1]}, [("cos_theta(mu-, frame=cm)", "max", 0.9)]),
    ({"singular": ("u",), "peaks": POLES[1:]}, [("cos_theta(mu-, frame=cm)", "min", -0.9)]),
    ({"singular": ("t", "u"), "peaks": POLES}, [("abs(cos_theta(mu-, frame=cm))", "max", 0.9)]),
    (
        {"reaction": "e- e- -> e- e-", "singular": ("t", "u"), "peaks": POLES, "masses": {"e-": 0.0}},
        [("abs(cos_theta(each(e-), frame=cm))", "max", 0.9)],
    ),
]


@pytest.mark.parametrize(("fields", "cuts"), CUTS)
def test_a_singular_process_gets_the_cut_that_closes_it(
    fields: dict[str, Any], cuts: list[tuple[str, str, float]]
) -> None:
    """Where the masses of the process leave the pole open."""
    asked = ready(**{"masses": {"e-": 0.0, "mu-": 0.0}, **fields}).get("cuts", [])
    assert [(cut["observable"], side, cut[side]) for cut in asked for side in ("min", "max") if side in cut] == cuts


def test_a_pole_that_the_masses_close_needs_no_cut() -> None:
    """The electron's mass keeps t away from its pole in the making of two photons."""
    peaks = (Peak(of="t", shape="power", at="e-"), Peak(of="u", shape="power", at="e-"))
    fields: dict[str, Any] = {"reaction": "e- e+ -> gamma gamma", "singular": ("t", "u"), "peaks": peaks}
    assert "cuts" not in ready(**fields)
    assert "cuts" in ready(**fields, masses={"e-": 0.0})


def test_soft_and_collinear_regions_have_cuts_too() -> None:
    """A least energy and a least angle, in the language of observables; beams by their names there."""
    regions = ("soft(gamma)", "collinear(gamma, mu-)", "collinear(gamma, e-)")
    process = made(reaction="e- e+ -> mu- mu+ gamma", singular=regions)
    cuts = closing_cuts(process)
    assert [str(cut) for cut in cuts] == [
        "soft(gamma): energy_fraction(gamma) with min = 0.01",
        "collinear(gamma, mu-): angle(gamma, mu-, frame=cm) with min = 0.1",
        "collinear(gamma, e-): angle(gamma, beam_a, frame=cm) with min = 0.1",
    ]
    assert all(compile_observable(cut.observable, process.legs) for cut in cuts)


def test_laws_say_which_beams_may_be_polarised() -> None:
    """And for which masses they hold."""
    process = made(SquaredAmplitude(one), HelicityAmplitudes(one, massless=("e-",)))
    assert list(statements.laws(process)) == [
        "squared amplitude",
        "helicity amplitudes (for massless e-; e- and e+ may be polarised)",
    ]


def test_claims_are_sentences() -> None:
    """Symmetries with the legs that they mean, processes, limits."""
    claims = Claims(
        exchange=((1, 2), ("beam_a", 1)), crossing=("qed/photon-pair",), gauge_legs=("beam_a",), limits=("σ → 0",)
    )
    process = made(reaction="gamma e- -> gamma e-", claims=claims)
    assert list(statements.claims(process)) == [
        "the same when gamma (leg 1) and e- (leg 2) are exchanged",
        "the same when gamma (beam_a) and gamma (leg 1) are exchanged",
        "qed/photon-pair with legs moved to the other side",
        "0 when the polarisation vector of gamma (beam_a) is replaced by its momentum",
        "σ → 0",
    ]


def test_parameters_say_when_they_are_used() -> None:
    """With which values of which others."""
    example = {"mass": 1.0, "copies": 1, "on": False, "scheme": "alpha"}
    *_, alpha = statements.parameters(made(parameters=Inputs, example=example))
    assert [str(condition) for condition in alpha.used_with] == ["scheme = alpha or fermi", "copies = 1"]
