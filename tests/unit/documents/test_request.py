"""The request: what it is accepted from, what is filled in, and its one canonical form."""

from __future__ import annotations

import json
import pickle
from typing import Any

import numpy as np
import pytest

from barnwright.documents import DecayBeams, FixedTargetBeams, Request, merge
from barnwright.errors import RequestError


def test_every_road_gives_the_same_request(full_toml: str) -> None:
    """TOML, JSON, a dictionary, keyword fields and a request itself are one."""
    request = Request.from_toml(full_toml)
    fields = request.given()
    same = [
        Request.from_json(json.dumps(fields)),
        Request.model_validate(fields),
        Request(**fields),
        Request.accept(full_toml),
        Request.accept(json.dumps(fields)),
        Request.accept(fields),
        Request.accept(request),
        Request.accept(**fields),
        Request.model_validate(request.canonical()),
        pickle.loads(pickle.dumps(request)),  # noqa: S301 - our own bytes
    ]
    assert same == [request] * len(same)
    assert {one.digest() for one in same} == {request.digest()}


def test_defaults_are_filled_in(small: dict[str, Any]) -> None:
    """What was left out is there on the way back, with the defaults of the contract."""
    canonical = Request.model_validate(small).canonical()
    assert canonical["schema"] == "barnwright.request/1"
    assert (canonical["unit"], canonical["seed"]) == ("pb", 1)
    assert canonical["histograms"][0]["per"] == "value"
    assert canonical["histograms"][0]["bins"][0]["spacing"] == "linear"
    assert canonical["accuracy"] == {
        "relative": 1e-3,
        "absolute": None,
        "per_bin": None,
        "bin_floor": 1e-6,
        "max_evaluations": 20_000_000,
        "max_seconds": None,
        "rounds": None,
        "method": None,
    }


def test_schema_is_read_as_schema(small: dict[str, Any]) -> None:
    """The field has the name of the contract in Python too."""
    assert Request.model_validate(small).schema == "barnwright.request/1"


def test_a_width_is_in_gev(small: dict[str, Any]) -> None:
    """The unit of a decay is GeV unless another unit of energy is asked for."""
    decay = {"process": "electroweak/muon-decay", "beams": {"kind": "decay"}}
    assert Request.model_validate(decay).unit == "GeV"
    assert Request.model_validate({**decay, "unit": "MeV"}).unit == "MeV"


def test_polarisation_of_a_parent_is_a_number_or_a_table() -> None:
    """A plain number is the polarisation of the one parent, beam_a."""
    for given in (0.5, {"beam_a": 0.5}):
        beams = {"kind": "decay", "polarisation": given, "momentum": 2.0}
        assert Request(process="a/b", beams=beams).beams == DecayBeams(kind="decay", polarisation=given, momentum=2.0)
    variation = {"name": "up", "beams": {"polarisation": 1}}
    request = Request(process="a/b", beams={"kind": "decay"}, variations=[variation])
    assert request.varied(request.variations[0]).beams.polarisation == {"beam_a": 1.0}


def test_relative_gives_way_to_absolute(small: dict[str, Any]) -> None:
    """Who asks for an absolute accuracy alone gets it, not whichever of two is reached first."""
    assert Request.model_validate({**small, "accuracy": {"absolute": 0.1}}).accuracy.relative is None
    both = Request.model_validate({**small, "accuracy": {"absolute": 0.1, "relative": 0.5}}).accuracy
    assert (both.relative, both.absolute) == (0.5, 0.1)


def test_cuts_without_names_go_by_their_place(small: dict[str, Any]) -> None:
    """cut-1, cut-2, ...; a name that is taken already is passed over."""
    cuts = [
        {"observable": "a", "min": 1},
        {"observable": "b", "min": 1, "name": "cut-3"},
        {"observable": "c", "max": 1},
    ]
    request = Request.model_validate({**small, "cuts": cuts})
    assert [cut.name for cut in request.cuts] == ["cut-1", "cut-3", "cut-4"]
    assert "name" not in cuts[0]


def test_numpy_values_are_values(small: dict[str, Any]) -> None:
    """Numbers and arrays of numpy are accepted wherever numbers and lists are."""
    small["histograms"][0]["bins"] = [{"edges": np.linspace(0, 1, 3)}]
    small["beams"]["sqrt_s"] = np.float32(10)
    small["accuracy"] = {"max_evaluations": np.int64(1000)}
    request = Request.model_validate(small)
    assert request.histograms[0].bins[0].edges == (0.0, 0.5, 1.0)
    assert request.accuracy.max_evaluations == 1000
    assert request.canonical()["beams"]["sqrt_s"] == 10.0


def test_seeds_travel_whole(small: dict[str, Any]) -> None:
    """A seed above 2**53 is a text in JSON and comes back to the last digit."""
    seed = 2**64 - 1
    request = Request.model_validate({**small, "seed": seed})
    assert request.canonical()["seed"] == str(seed)
    assert Request.from_json(request.canonical_json()).seed == seed
    assert Request.model_validate({**small, "seed": 2**53}).canonical()["seed"] == 2**53


def test_canonical_text_depends_on_the_meaning_alone(small: dict[str, Any]) -> None:
    """The order of keys, white space and defaults that are spelled out make no difference; values do."""
    turned = dict(reversed(list(small.items())))
    spelled = {**small, "unit": "pb", "seed": "1", "accuracy": {"relative": 0.001}}
    texts = {Request.model_validate(one).canonical_json() for one in (small, turned, spelled)}
    assert len(texts) == 1
    assert " " not in next(iter(texts)).replace("e- e+", "")
    assert Request.model_validate({**small, "seed": 2}).digest() != Request.model_validate(small).digest()


def test_requests_are_frozen(small: dict[str, Any]) -> None:
    """A request cannot be changed; merged makes a new one."""
    request = Request.model_validate(small)
    with pytest.raises(ValueError, match="Instance is frozen"):
        request.seed = 2
    assert request.merged({"seed": 2}).seed == 2
    assert request.seed == 1


def test_merged_requests_are_checked(small: dict[str, Any]) -> None:
    """An override that does not fit is answered like any wrong request."""
    with pytest.raises(RequestError, match=r"^beams\.sqrt_s: got -1, expected a finite number greater than 0 \(GeV\)$"):
        Request.model_validate(small).merged({"beams.sqrt_s": -1})


def test_accept_merges_fields(small: dict[str, Any]) -> None:
    """Fields beside a source are merged key by key into it."""
    request = Request.accept(small, beams={"sqrt_s": 20.0}, unit="nb")
    assert (request.canonical()["beams"]["sqrt_s"], request.unit) == (20.0, "nb")
    assert request == Request.accept(Request.model_validate(small), beams={"sqrt_s": 20.0}, unit="nb")
    with pytest.raises(RequestError, match=r"^request: got 5, expected a request: a Request, a dictionary, TOML text"):
        Request.accept(5)


def test_varied_is_the_request_with_a_variation_merged(full_toml: str) -> None:
    """A variation changes what it names and keeps the rest."""
    request = Request.from_toml(full_toml)
    varied = request.varied(request.variations[0])
    assert varied.beams.polarisation == {"e-": -1.0, "e+": 0.3}
    assert varied.variations == ()
    base = {key: value for key, value in request.given().items() if key not in ("variations", "derived")}
    assert varied == Request.model_validate(merge(base, request.variations[0].change()))


def test_a_variation_changes_cuts_by_name(small: dict[str, Any]) -> None:
    """A cut of the same name is changed, a null takes a limit away, a new name adds a cut."""
    small["cuts"] = [{"name": "a", "observable": "x", "min": 1, "max": 2}]
    cuts = [{"name": "a", "max": None}, {"name": "b", "observable": "y", "min": 0}]
    request = Request.model_validate({**small, "variations": [{"name": "wide", "cuts": cuts}]})
    found = request.varied(request.variations[0]).cuts
    assert [(cut.name, cut.min, cut.max) for cut in found] == [("a", 1.0, None), ("b", 0.0, None)]


def test_fixed_target_and_formula() -> None:
    """The other kinds of beams, and a formula in place of a process."""
    formula = {
        "reaction": "e- e+ -> mu- mu+",
        "squared_amplitude": "32*pi**2*alpha**2*(t**2 + u**2)/s**2",
        "spin_colour": "averaged",
        "parameters": {"alpha": 0.0072973525643},
        "peaks": [{"of": "t", "shape": "power", "at": 0.5}, {"of": "u", "shape": "power", "at": "alpha"}],
    }
    request = Request(formula=formula, beams={"kind": "fixed_target", "kinetic_energy": 1, "target": "p"})
    assert request.beams == FixedTargetBeams(kind="fixed_target", kinetic_energy=1.0, target="p")
    assert request.formula is not None
    assert [peak.at for peak in request.formula.peaks] == [0.5, "alpha"]
    assert Request.from_json(request.canonical_json()) == request


def test_limits_hold_at_the_edge(small: dict[str, Any]) -> None:
    """10 000 bins a histogram and 100 000 components a request are accepted, one more is refused."""

    def histograms(*counts: int) -> list[dict[str, Any]]:
        bins = [[{"count": count, "low": 0, "high": 1}] for count in counts]
        return [{"name": f"h{i}", "observables": ["x"], "bins": one} for i, one in enumerate(bins)]

    accepted = Request.model_validate({**small, "histograms": histograms(*[10_000] * 9, 9_999)})
    assert sum(histogram.number for histogram in accepted.histograms) == 99_999
    with pytest.raises(RequestError, match=r"^histograms: got 100001 components, expected at most 100000 components"):
        Request.model_validate({**small, "histograms": histograms(*[10_000] * 10)})
    with pytest.raises(RequestError, match=r"^histograms\[0\]\.bins\[0\]\.count: got 10001, expected a whole number"):
        Request.model_validate({**small, "histograms": histograms(10_001)})
