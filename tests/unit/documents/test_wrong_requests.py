"""Wrong requests: every one is answered by the field, the value, what was expected and the nearest valid choice."""

from __future__ import annotations

import re
from collections.abc import Callable
from typing import Any

import pytest
from pydantic import BaseModel, ConfigDict, ValidationError

from barnwright.documents import Request, merge, violations_of
from barnwright.errors import RequestError

Spoil = Callable[[dict[str, Any]], dict[str, Any]]


def _lines(request: Any) -> list[str]:
    with pytest.raises(RequestError, match="expected") as caught:
        Request.model_validate(request)
    return str(caught.value).splitlines()


_KINDS = "one of 'collider', 'fixed_target', 'decay'"
_COLLIDER = "one of the keys kind, sqrt_s, energies, crossing_angle, along_z, polarisation"
_POSITIVE = "a finite number greater than 0 (GeV)"
_CUT = {"observable": "x", "min": 0}

#: Override of a good request, and the findings.
WRONG: list[tuple[dict[str, Any], list[str]]] = [
    ({"process": None}, ["process: got nothing, expected exactly one of process, processes and formula"]),
    (
        {"processes": ["a/b"]},
        ["processes: got process and processes together, expected exactly one of process, processes and formula"],
    ),
    ({"process": 5}, ["process: got 5, expected a name of 1 to 100 printable characters"]),
    ({"process": ""}, ["process: got '', expected a name of 1 to 100 printable characters"]),
    ({"process": "a\nb"}, ["process: got 'a\\nb', expected a name of 1 to 100 printable characters"]),
    ({"procss": "a"}, ["procss: got 'a', expected one of the keys "]),
    ({"contributions": ["z", "z"]}, ["contributions[1]: got 'z', expected a name that contributions[0] does not have"]),
    ({"contributions": []}, ["contributions: got [], expected a list of names, at least one"]),
    ({"contributions": "z"}, ["contributions: got 'z', expected a list of names, at least one"]),
    ({"schema": "barnwright.request/2"}, ["schema: got 'barnwright.request/2', expected 'barnwright.request/1'; near"]),
    ({"unit": "pB"}, ["unit: got 'pB', expected a unit of a cross section, one of "]),
    ({"unit": "GeV"}, ["unit: got 'GeV', expected a unit of a cross section, one of "]),
    ({"unit": 3}, ["unit: got 3, expected a unit, as text"]),
    ({"seed": -1}, ["seed: got -1, expected a whole number from 0 to 2**64 - 1 (as text where it is above 2**53)"]),
    ({"seed": 2**64}, ["seed: got 18446744073709551616, expected a whole number from 0"]),
    ({"seed": str(2**64)}, ["seed: got '18446744073709551616', expected a whole number from 0"]),
    ({"seed": "abc"}, ["seed: got 'abc', expected a whole number from 0"]),
    ({"seed": True}, ["seed: got True, expected a whole number from 0"]),
    (
        {"seed": 1.0},
        ["seed: got 1.0, expected a whole number from 0 to 2**64 - 1 (as text where it is above 2**53); n"],
    ),
    ({"beams": None}, ["beams: got None, expected a table whose kind is 'collider', 'fixed_target' or 'decay'"]),
    ({"beams": 3}, ["beams: got 3, expected a table whose kind is 'collider', 'fixed_target' or 'decay'"]),
    ({"beams.kind": "colider"}, [f"beams.kind: got 'colider', expected {_KINDS}; nearest: collider"]),
    ({"beams.kind": ["collider"]}, [f"beams.kind: got ['collider'], expected {_KINDS}"]),
    ({"beams.sqrt_s": "91"}, [f"beams.sqrt_s: got '91', expected {_POSITIVE}"]),
    ({"beams.sqrt_s": True}, [f"beams.sqrt_s: got True, expected {_POSITIVE}"]),
    ({"beams.sqrt_s": 0}, [f"beams.sqrt_s: got 0, expected {_POSITIVE}"]),
    ({"beams.sqrt_s": float("nan")}, [f"beams.sqrt_s: got nan, expected {_POSITIVE}"]),
    ({"beams.sqrt_s": float("inf")}, [f"beams.sqrt_s: got inf, expected {_POSITIVE}"]),
    ({"beams.sqrts": 3}, [f"beams.sqrts: got 3, expected {_COLLIDER}; nearest: sqrt_s"]),
    ({"beams.sqrt_s": None}, ["beams.sqrt_s: got nothing, expected exactly one of sqrt_s and energies"]),
    (
        {"beams.energies": {"e-": 1, "e+": 2}},
        ["beams.energies: got sqrt_s and energies together, expected exactly one of sqrt_s and energies"],
    ),
    (
        {"beams": {"sqrt_s": None, "energies": {"e-": 1}}},
        ["beams.energies: got {'e-': 1}, expected a table of two beams"],
    ),
    (
        {"beams": {"sqrt_s": None, "energies": {"e-": 1, "e+": "2"}}},
        [f"beams.energies.e+: got '2', expected {_POSITIVE}"],
    ),
    (
        {"beams.crossing_angle": 0.1},
        ["beams.crossing_angle: got 0.1, expected no crossing_angle, unless the two energies are given"],
    ),
    (
        {"beams": {"sqrt_s": None, "energies": {"e-": 1, "e+": 2}, "crossing_angle": 3.2}},
        ["beams.crossing_angle: got 3.2, expected a number from 0 to less than pi (rad)"],
    ),
    ({"beams.polarisation": {"e-": -1.5}}, ["beams.polarisation.e-: got -1.5, expected a number from -1 to 1"]),
    ({"beams.along_z": 1}, ["beams.along_z: got 1, expected a name of 1 to 100 printable characters"]),
    ({"parameters": {"alpha": None}}, ["parameters.alpha: got None, expected a finite number, true, false or a word"]),
    ({"parameters": {"alpha": float("inf")}}, ["parameters.alpha: got inf, expected a finite number, true"]),
    ({"parameters": {"n": {}}}, ["parameters.n: got {}, expected a finite number, true"]),
    ({"parameters": [1]}, ["parameters: got [1], expected a table of parameters and values"]),
    (
        {"parameters": {3: 1.0}},
        ["parameters[3]: got 3, expected a key that is a name of 1 to 100 printable characters"],
    ),
    ({"masses": {"mu-": -1}}, ["masses.mu-: got -1, expected a finite number not less than 0 (GeV)"]),
    ({"cuts": {"min": 1}}, ["cuts: got {'min': 1}, expected a list of at most 1000 cuts"]),
    ({"cuts": [5]}, ["cuts[0]: got 5, expected a table with name, observable, min, max, outside"]),
    ({"cuts": [{"min": 1}]}, ["cuts[0].observable: got nothing, expected an observable, as a text of at most 10000"]),
    ({"cuts": [{"observable": "x"}]}, ["cuts[0].min: got nothing, expected at least one of min, max and outside"]),
    ({"cuts": [{**_CUT, "max": 0}]}, ["cuts[0].max: got 0.0, expected a number greater than min = 0.0"]),
    (
        {"cuts": [{"observable": "x", "outside": [2, 1]}]},
        ["cuts[0].outside: got [2.0, 1.0], expected two numbers, the lower first; nearest: [1.0, 2.0]"],
    ),
    ({"cuts": [{"observable": "x", "outside": [2]}]}, ["cuts[0].outside[1]: got nothing, expected a finite number"]),
    (
        {"cuts": [{**_CUT, "maximum": 1}]},
        ["cuts[0].maximum: got 1, expected one of the keys name, observable, min, max"],
    ),
    (
        {"cuts": [{**_CUT, "name": "a"}, {**_CUT, "name": "a"}]},
        ["cuts[1].name: got 'a', expected a name that cuts[0] does not have already"],
    ),
    ({"cuts": [_CUT] * 1001}, ["cuts: got [{'min': 0, 'observable': 'x'}"]),
    (
        {"histograms.angle.bins": {"count": 3}},
        ["histograms[0].bins: got {'count': 3}, expected a list of tables, each"],
    ),
    (
        {"histograms.angle.bins": [{"count": 3}]},
        ["histograms[0].bins[0].low: got nothing", "histograms[0].bins[0].high"],
    ),
    (
        {"histograms[0].bins[0].high": -2},
        ["histograms[0].bins[0].high: got -2.0, expected a number greater than low = -1"],
    ),
    (
        {"histograms[0].bins[0].spacing": "log"},
        ["histograms[0].bins[0].low: got -1.0, expected a number greater than 0, since the spacing is logarithmic"],
    ),
    (
        {"histograms[0].bins[0].spacing": "lin"},
        ["histograms[0].bins[0].spacing: got 'lin', expected one of 'linear', 'log'; nearest: linear"],
    ),
    (
        {"histograms[0].bins[0].count": 4.0},
        ["histograms[0].bins[0].count: got 4.0, expected a whole number from 1 to 10000, the bins; nearest: 4"],
    ),
    (
        {"histograms[0].bins": [{"edges": [0, 1, 1]}]},
        ["histograms[0].bins[0].edges[2]: got 1.0, expected a number greater than the edge before it, 1.0"],
    ),
    ({"histograms[0].bins": [{"edges": [0]}]}, ["histograms[0].bins[0].edges: got [0], expected a list of 2 to 10001"]),
    (
        {"histograms[0].bins": [{"edges": [0, 1], "count": 1}]},
        ["histograms[0].bins[0].count: got 1, expected no count where the edges are given"],
    ),
    ({"histograms[0].observables": ["x", "y"]}, ["histograms[0].bins: got 1 of them, expected as many bins as observ"]),
    ({"histograms[0].observables": "x"}, ["histograms[0].observables: got 'x', expected a list of one or two observ"]),
    (
        {"histograms[0].observables": ["x", "y"], "histograms[0].bins": [{"count": 101, "low": 0, "high": 1}] * 2},
        ["histograms[0].bins: got 10201 bins, expected at most 10000 bins"],
    ),
    ({"histograms[0].per": "rad"}, ["histograms[0].per: got 'rad', expected one of 'value', 'bin', 'solid_angle'"]),
    (
        {"histograms[0].observable": "x"},
        ["histograms[0].observable: got 'x', expected one of the keys name, observables"],
    ),
    (
        {"variations": [{"name": "a", "unit": "pb"}]},
        ["variations[0].unit: got 'pb', expected one of the keys name, par"],
    ),
    (
        {"variations": [{"name": "a", "beams": {"sqrt_s": 3}}]},
        ["variations[0].beams.sqrt_s: got 3, expected one of the keys polarisation"],
    ),
    (
        {"variations": [{"name": "a", "cuts": [{"name": "new", "min": 1}]}]},
        ["variations[0].cuts[0].observable: got nothing, expected an observable"],
    ),
    (
        {"cuts": [{**_CUT, "name": "c"}], "variations": [{"name": "a", "cuts": [{"name": "c", "max": -1}]}]},
        ["variations[0].cuts[0].max: got -1.0, expected a number greater than min = 0.0"],
    ),
    (
        {"derived": [{"name": "a", "kind": "asymetry"}]},
        ["derived[0].kind: got 'asymetry', expected one of 'asymmetry', 'r"],
    ),
    (
        {"derived": [{"name": "a", "kind": "asymmetry", "at": 0}]},
        ["derived[0].observable: got nothing, expected observable and at, or else between"],
    ),
    (
        {"variations": [{"name": "left"}], "derived": [{"name": "a", "kind": "ratio", "between": ["left", "lef"]}]},
        [
            (
                "derived[0].between[1]: got 'lef', expected the name of a variation (left), "
                "or nominal, the request itself; nearest: left"
            )
        ],
    ),
    (
        {"variations": [{"name": "a"}], "derived": [{"name": "a", "kind": "ratio", "between": ["a", "a"]}]},
        ["derived[0].between[1]: got 'a', expected a name that differs from the first"],
    ),
    ({"accuracy": {"relative": 0}}, ["accuracy.relative: got 0, expected a number greater than 0 and at most 1"]),
    ({"accuracy": {"rounds": 25}}, ["accuracy.rounds: got 25, expected a whole number from 1 to 24"]),
    (
        {"accuracy": {"max_evaluations": 2e7}},
        ["accuracy.max_evaluations: got 20000000.0, expected a whole number from 1"],
    ),
    (
        {"accuracy": {"method": "montecarlo"}},
        ["accuracy.method: got 'montecarlo', expected one of 'closed_form', 'quadra"],
    ),
    (
        {"accuracy": {"max_seconds": "1"}},
        ["accuracy.max_seconds: got '1', expected a finite number greater than 0 (sec"],
    ),
    (
        {"process": None, "formula": {"reaction": "a b -> c d", "squared_amplitude": "1", "spin_colour": "average"}},
        ["formula.spin_colour: got 'average', expected one of 'averaged', 'summed'; nearest: averaged"],
    ),
    (
        {"process": None, "formula": {"reaction": "a b -> c d", "spin_colour": "summed"}},
        ["formula.squared_amplitude: got nothing, expected a text of 1 to 10000 printable characters in one line"],
    ),
]


@pytest.mark.parametrize(("override", "expected"), WRONG, ids=lambda value: str(value)[:60])
def test_findings(small: dict[str, Any], override: dict[str, Any], expected: list[str]) -> None:
    """One line for each finding and none besides, so that a mistake makes no noise elsewhere."""
    found = _lines(merge(small, override))
    assert len(found) == len(expected), found
    for line, start in zip(found, expected, strict=True):
        assert line.startswith(start)


def test_all_findings_come_at_once() -> None:
    """Findings of single fields do not hide those about how fields fit together, in any part of the request."""
    request = {
        "beams": {"kind": "collider", "sqrt_s": -1, "crossing_angle": 0.1, "sqrts": 3},
        "unit": "GeV",
        "cuts": [{"observable": "x"}, {"observable": 3, "min": 2, "max": 1}, {**_CUT, "name": "c", "colour": 1}],
        "histograms": [
            {"name": "h", "observables": ["x"], "bins": [{"count": "4", "low": 1, "high": 0}]},
            {"name": "h", "observables": ["x"], "bins": [{"edges": [0, 1], "low": 0}]},
        ],
        "variations": [{"name": "a", "unit": 1}, {"name": "a"}],
        "derived": [{"name": "r", "kind": "ratio", "between": ["a", "b"]}, {"name": "r", "kind": "rato"}],
        "accuracy": {"rounds": 0},
    }
    fields = {line.partition(": ")[0] for line in _lines(request)}
    assert fields == {
        "process",
        "unit",
        "beams.sqrt_s",
        "beams.sqrts",
        "beams.crossing_angle",
        "cuts[0].min",
        "cuts[1].observable",
        "cuts[1].max",
        "cuts[2].colour",
        "histograms[0].bins[0].count",
        "histograms[0].bins[0].high",
        "histograms[1].name",
        "histograms[1].bins[0].low",
        "variations[0].unit",
        "variations[1].name",
        "derived[0].between[1]",
        "derived[1].kind",
        "derived[1].name",
        "accuracy.rounds",
    }


def test_missing_kind_is_guessed_from_the_keys(small: dict[str, Any]) -> None:
    """The nearest kind is the one that knows the keys that are there."""
    small["beams"] = {"kinetic_energy": 3, "target": "p"}
    assert _lines(small) == [f"beams.kind: got nothing, expected {_KINDS}; nearest: fixed_target"]


@pytest.mark.parametrize("request_", [None, 5, [], "text"])
def test_no_table_at_all(request_: Any) -> None:
    """What is no table is answered too."""
    (line,) = _lines(request_)
    assert line.startswith(f"request: got {request_!r}, expected a table with schema, process, ")


def test_many_findings_are_cut_short(small: dict[str, Any]) -> None:
    """A thousand mistakes are answered by a hundred findings and their number, in a moment."""
    lines = _lines({**small, **{f"key{number}": 1 for number in range(5000)}})
    assert len(lines) == 101
    assert re.match(
        "request: got [0-9]{3,4} findings or more, expected a request of which the first 100 are", lines[-1]
    )


def test_deep_nests_are_refused(small: dict[str, Any]) -> None:
    """A nest deeper than Python's stack is a finding, not a crash."""
    nest: dict[str, Any] = {}
    for _ in range(100_000):
        nest = {"a": nest}
    assert _lines({**small, "parameters": nest})[0].startswith("parameters.a: got {'a': {'a'")


def test_the_wrong_request_is_left_as_it_was(small: dict[str, Any]) -> None:
    """Looking for all findings does not change the dictionary that was handed in."""
    small["cuts"] = [{"observable": "x"}]
    _lines(small)
    assert small["cuts"] == [{"observable": "x"}]


def test_models_of_others_have_findings_too() -> None:
    """Models that say nothing of what they expect are quoted with pydantic's own words."""

    class Weinberg(BaseModel):
        """Parameters of some process."""

        model_config = ConfigDict(extra="forbid")
        z_mass: float

    with pytest.raises(ValidationError, match="2 validation errors") as caught:
        Weinberg.model_validate({"z_mass": "x", "z_maas": 1})
    first, second = violations_of(caught.value, Weinberg)
    assert (first.field, first.value) == ("z_mass", "'x'")
    assert str(second) == "z_maas: got 1, expected one of the keys z_mass; nearest: z_mass"
