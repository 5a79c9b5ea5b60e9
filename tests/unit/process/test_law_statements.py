"""What a declaration says about its laws and parameters, beyond their types."""

from __future__ import annotations

import re
from typing import Any, Literal

import pytest

from barnwright.errors import PluginError
from barnwright.process import (
    AngularCrossSection,
    Claims,
    ClosedForm,
    Expression,
    HelicityAmplitudes,
    Parameters,
    Process,
    SquaredAmplitude,
    TotalCrossSection,
    parameter,
)


class Schemes(Parameters):
    """A coupling that one scheme uses, and a number of loops."""

    scheme: Literal["alpha", "fermi"] = parameter("alpha")
    alpha: float = parameter(0.007, used_with={"scheme": ("alpha",)})
    loops: int = parameter(0)


def flat(event: Any, parameters: Any, parts: Any = None) -> float:
    """|M|² = 1."""
    return 1.0


def same(x: Any, point: Any, parameters: Any) -> Any:
    """The antiderivative of 1."""
    return x


def used_with(conditions: dict[str, tuple[Any, ...]]) -> type[Parameters]:
    """Parameters of which one is used under these conditions."""

    class Conditional(Schemes):
        """With one more."""

        width: float = parameter(1.0, used_with=conditions)

    return Conditional


def made(**fields: Any) -> Process:
    """A muon-pair process with some fields as given."""
    return Process(**{"name": "pair", "reaction": "e- e+ -> mu- mu+", "laws": (SquaredAmplitude(flat),), **fields})


def amplitudes(**more: Any) -> dict[str, Any]:
    """The field for one law of helicity amplitudes."""
    return {"laws": (HelicityAmplitudes(flat, **more),)}


ACCEPTED: dict[str, dict[str, Any]] = {
    "two amplitudes and their interference": {"contributions": {"photon": "photon", "Z": "z", "both": "photon*z"}},
    "combinations": amplitudes(helicities=((-1, 1, -1, 1), (1, -1, 1, -1))),
    "helicities of each leg": amplitudes(helicities=((-1, 1), (1,), (-1, 1), (-1,))),
    "two flows": amplitudes(colour=((12.0, 1j), (-1j, 12.0))),
    "neutrinos": {**amplitudes(helicities=((-1, -1, -1, -1),)), "reaction": "nu(mu) e- -> nu(mu) e-"},
    "massive vectors": {
        **amplitudes(helicities=((1, -1, 0, 0), (1, -1, -1, 0))),
        "reaction": "e- e+ -> Z0 H0",
    },
    "anything": {"reaction": "e- e+ -> X", "laws": (TotalCrossSection(flat),)},
    "an angular law": {"laws": (AngularCrossSection(flat),)},
    "a parameter of one scheme": {"parameters": Schemes, "alternatives": {"other": {"scheme": "fermi"}}},
    "claims": {"claims": Claims(exchange=((1, 2), ("beam_a", 1)), crossing=("qed/electron-muon",), gauge_legs=())},
}


@pytest.mark.parametrize("name", ACCEPTED)
def test_what_holds_together_is_accepted(name: str) -> None:
    """Each of the forms that a declaration may take."""
    assert made(**ACCEPTED[name]).laws


KEYWORD = "expected a word of letters, digits, - and _, or the interference of two, as in photon*z"
MOMENTA = "expected a law of momenta, since mu- -> e- nu(e)~ nu(mu) is no 2 -> 2 reaction"
WRONG: list[tuple[dict[str, Any], str]] = [
    ({"contributions": {"z": 1}}, "contributions.z: got 1, expected a keyword, as text, by a name"),
    ({"contributions": {"z": "the z"}}, f"contributions.z: got 'the z', {KEYWORD}"),
    ({"contributions": {"a": "a", "b": "b", "ab": "a * b"}}, f"contributions.ab: got 'a * b', {KEYWORD}"),
    (
        {"contributions": {"a": "a", "b": "a"}},
        "contributions.b: got 'a', expected a keyword that no other",
    ),
    (
        {"contributions": {"a": "a", "b": "b", "ab": "a*b", "ba": "b*a"}},
        "contributions.ba: got 'b*a', expected a keyword that no other contribution has",
    ),
    ({"contributions": {"a": "a", "aa": "a*a"}}, "contributions.aa: got 'a*a', expected the interference of two diff"),
    (
        {"contributions": {"photon": "photon", "mixed": "photon*zed", "zet": "zet"}},
        "contributions.mixed: got 'zed', expected the interference of declared keywords: photon, zet; nearest: zet",
    ),
    (
        {"laws": (Expression("1"),), "contributions": {"a": "a"}},
        "laws[0]: got Expression, expected a function that takes parts, since an expression has no contributions",
    ),
    (amplitudes(helicities=[[1, 1]]), "laws[0].helicities: got [[1, 1]], expected a tuple of tuples of whole numbers"),
    (amplitudes(helicities=()), "laws[0].helicities: got none, expected at least one combination that does not vanish"),
    (
        amplitudes(helicities=((1, -1, 1),)),
        "laws[0].helicities: got (1, -1, 1), expected combinations of 4 helicities, in the order e- e+ mu- mu+",
    ),
    (
        amplitudes(helicities=((1, -1, 0, 1),)),
        "laws[0].helicities: got 0, expected a helicity of mu- in (1, -1, 0, 1): -1, 1 (twice the value for fermions)",
    ),
    (
        amplitudes(helicities=((1, -1, 1, 1), (1, -1, 1, 1))),
        "laws[0].helicities: got (1, -1, 1, 1), expected each combination once",
    ),
    (
        {**amplitudes(helicities=((1, 1, -1, 1),)), "reaction": "nu(mu) e- -> nu(mu) e-"},
        "laws[0].helicities: got 1, expected a helicity of nu(mu) in (1, 1, -1, 1): -1",
    ),
    ({**amplitudes(), "reaction": "e- Al27 -> e- Al27"}, "expected a particle whose spin the table knows, not Al27"),
    (amplitudes(colour=((1.0, 0.0),)), "laws[0].colour: got ((1.0, 0.0),), expected a square matrix, a row and a colu"),
    (amplitudes(colour=((1.0, 2.0), (3.0, 1.0))), "expected a Hermitian matrix of finite numbers, or |M|² is not real"),
    (amplitudes(colour=((float("inf"),),)), "expected a Hermitian matrix of finite numbers"),
    (amplitudes(colour=1.0), "laws[0].colour: got 1.0, expected a tuple of tuples of numbers"),
    (
        {"reaction": "e- e+ -> X"},
        "laws[0]: got SquaredAmplitude, expected TotalCrossSection, the only law of a final state X",
    ),
    (
        {"reaction": "e- e+ -> X", "laws": (TotalCrossSection(flat),), "closed_forms": (ClosedForm(same, "sqrt_s"),)},
        "closed_forms: got 1 closed forms, expected none, since a final state X has no observable to integrate over",
    ),
    (
        {"reaction": "e- e+ -> X", "laws": (TotalCrossSection(flat),), "singular": ("t",)},
        "singular: got ('t',), expected nothing, since no cut can be made on a final state X",
    ),
    (
        {"reaction": "e- e+ -> X", "laws": (TotalCrossSection(flat),), "masses": {"X": 1.0}},
        "masses.X: got 'X', expected one of e-, e+, beam_a, beam_b",
    ),
    ({"reaction": "mu- -> e- nu(e)~ nu(mu)", "laws": (AngularCrossSection(flat),)}, MOMENTA),
    (
        {"reaction": "H0 -> mu- mu+", "laws": (TotalCrossSection(flat),)},
        "laws[0]: got TotalCrossSection, expected a law of momenta, since H0 -> mu- mu+ has no cross section",
    ),
    (
        {"parameters": used_with({"schme": ("alpha",)})},
        "parameters.width.used_with: got 'schme', expected another parameter: scheme, alpha, loops; nearest: scheme",
    ),
    (
        {"parameters": used_with({"width": (1.0,)})},
        "parameters.width.used_with: got 'width', expected another",
    ),
    (
        {"parameters": used_with({"scheme": ("alpa",)})},
        "parameters.width.used_with.scheme: got 'alpa', expected a value of scheme: alpha, fermi; nearest: alpha",
    ),
    (
        {"parameters": used_with({"loops": (True,)})},
        "parameters.width.used_with.loops: got True, expected a value of loops: a value of type int",
    ),
    ({"parameters": used_with({"loops": ()})}, "parameters.width.used_with.loops: got nothing, expected the values of"),
    ({"claims": Claims(exchange=(1, 2))}, "claims.exchange: got (1, 2), expected a tuple of pairs of legs"),  # type: ignore[arg-type]
    ({"claims": Claims(exchange=((1, 1),))}, "claims.exchange: got (1, 1), expected two different legs"),
    (
        {"claims": Claims(crossing=("compton",))},
        "claims.crossing: got 'compton', expected the name of a process",
    ),
]


@pytest.mark.parametrize(("fields", "message"), WRONG, ids=[m.partition(",")[0] for _, m in WRONG])
def test_what_does_not_fit_is_named(fields: dict[str, Any], message: str) -> None:
    """The error says field, value and what was expected."""
    with pytest.raises(PluginError, match=re.escape(message)):
        made(**fields)
