"""The Python face: every way to hand in a request gives the same prediction, and the command line gives its bits."""

from __future__ import annotations

import io
import json
import sys
from collections.abc import Callable
from pathlib import Path
from typing import Any

import numpy as np
import pytest

import barnwright
from barnwright.cli import main
from barnwright.plugin import ClosedForm, Process

REQUEST: dict[str, Any] = {
    "process": "qed/muon-pair",
    "beams": {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}},
    "cuts": [{"name": "acceptance", "observable": "abs(cos_theta(mu-))", "max": 0.87}],
    "histograms": [{"name": "pt", "observables": ["pt(mu-)"], "bins": [{"count": 10, "low": 0.0, "high": 5.5}]}],
}


@pytest.fixture(scope="module")
def expected() -> barnwright.Prediction:
    """The prediction from a dict."""
    return barnwright.predict(REQUEST)


WAYS: dict[str, Callable[[Path], barnwright.Prediction]] = {
    "fields": lambda _: barnwright.predict(**REQUEST),
    "Request": lambda _: barnwright.predict(barnwright.Request.model_validate(REQUEST)),
    "path as text": lambda file: barnwright.predict(str(file)),
    "Path": barnwright.predict,
    "dict and fields": lambda _: barnwright.predict({**REQUEST, "cuts": []}, cuts=REQUEST["cuts"]),
}


@pytest.mark.parametrize("way", WAYS)
def test_every_way_to_ask_gives_the_same_bits(way: str, expected: barnwright.Prediction, tmp_path: Path) -> None:
    """A path, a dict, a Request and keyword fields are one request."""
    file = tmp_path / "request.json"
    file.write_text(json.dumps(REQUEST))
    assert WAYS[way](file).same_bits(expected)


def test_command_line_gives_the_same_bits(
    expected: barnwright.Prediction, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    """`predict --json` prints the document that Python returns, `run` apart."""
    monkeypatch.setattr(sys, "stdin", io.StringIO(json.dumps(REQUEST)))
    assert main(["predict", "-", "--json"]) == 0
    assert barnwright.Prediction.from_json(capsys.readouterr().out).same_bits(expected)


def test_fields_beside_a_request_are_merged() -> None:
    """Keyword fields change a request key by key."""
    changed = barnwright.predict(REQUEST, unit="nb", beams={"energies": {"e-": 8.0}})
    assert changed.request.beams.energies == {"e-": 8.0, "e+": 4.0}
    assert changed.total.unit == "nb"


def test_process_object_of_a_notebook() -> None:
    """A Process object is calculated as it is; its closed form gives the total."""
    flat = Process(
        name="flat",
        reaction="e- e+ -> mu- mu+",
        closed_forms=(ClosedForm(lambda x, point, _: x * 1e-6 + 0 * point.s, observable="cos_theta(1, frame=cm)"),),
    )
    beams = {"kind": "collider", "sqrt_s": 10.0}
    total = barnwright.predict(process=flat, beams=beams, unit="GeV^-2").total
    assert total.value == pytest.approx(2e-6, rel=1e-14)
    sweep = barnwright.scan(process=flat, beams=beams, unit="GeV^-2", over={"beams.sqrt_s": [10.0, 20.0]})
    assert sweep.values == pytest.approx([2e-6, 2e-6], rel=1e-14)


def test_scan_has_arrays_and_makes_predictions_on_demand() -> None:
    """A sweep's arrays have one axis a key; a point is the prediction that was asked for alone."""
    over = {"beams.energies.e-": [7.0, 8.0, 9.0], "parameters.alpha": np.array([0.0073, 0.0078])}
    sweep = barnwright.scan(REQUEST, over=over)
    assert (sweep.values.shape, sweep.errors.shape, len(sweep)) == ((3, 2), (3, 2), 6)
    alone = barnwright.predict(REQUEST, beams={"energies": {"e-": 8.0}}, parameters={"alpha": 0.0078})
    assert sweep[3].total.value == sweep.values[1, 1]
    assert sweep[3].request == alone.request
    np.testing.assert_allclose(sweep[3].histograms["pt"].values, alone.histograms["pt"].values, rtol=1e-12)


@pytest.mark.parametrize(
    ("source", "message"),
    [
        ("request.yaml", "request: got 'request.yaml', expected a dict, a Request, or the path of a file that ends in"),
        ("nowhere.toml", "request: got 'nowhere.toml', expected a file that exists"),
    ],
)
def test_wrong_paths(source: str, message: str) -> None:
    """A text that is no request file says what is expected."""
    with pytest.raises(barnwright.RequestError, match=message):
        barnwright.predict(source)


def test_unknown_process_names_the_nearest() -> None:
    """A process that is not installed is answered with the nearest one, in predict and in describe."""
    message = "process: got 'qed/compto', expected one of .*nearest: qed/compton"
    with pytest.raises(barnwright.UnknownProcessError, match=message):
        barnwright.predict(process="qed/compto", beams=REQUEST["beams"])
    with pytest.raises(barnwright.UnknownProcessError, match=message):
        barnwright.describe("qed/compto")


def test_processes_are_listed_with_what_they_are() -> None:
    """The list has each process's reaction and where it comes from."""
    found = {summary.name: summary for summary in barnwright.processes()}
    assert list(found) == sorted(found)
    assert found["qed/compton"].reaction == "gamma e- -> gamma e-"
    assert found["qed/compton"].distribution == "barnwright-qed"


@pytest.mark.parametrize("name", ["qed/muon-pair", "qed/tau-pair", "qed/compton"])
def test_described_request_runs(name: str) -> None:
    """The ready request of a description runs as it stands, and every observable it lists can be used in it."""
    description = barnwright.describe(name)
    request = barnwright.Request.from_toml(description.request)
    prediction = barnwright.predict(request)
    assert prediction.status == "converged"
    assert prediction.total.value is not None
    assert prediction.total.value > 0
    names = [f"h{number}" for number in range(len(description.observables))]
    bins = [{"count": 2, "low": 0.1, "high": 0.9}]
    histograms = [
        {"name": name, "observables": [text], "bins": bins}
        for name, text in zip(names, description.observables, strict=True)
    ]
    assert barnwright.predict(request, histograms=histograms).histograms.names[-len(names) :] == tuple(names)


def test_description_has_what_a_user_needs() -> None:
    """Parameters with units, defaults and sources, masses, validity, cautions and references are there."""
    description = barnwright.describe("qed/muon-pair")
    alpha = description.parameters["alpha"]
    assert (alpha.type, alpha.required) == ("float", False)
    assert alpha.meaning
    assert alpha.source
    assert description.masses["mu-"] == pytest.approx(0.10566, abs=1e-5)
    assert (description.sqrt_s_min, description.sqrt_s_max) == (0.0, 30.0)
    form, squared, helicity = description.laws
    assert (form, squared) == ("closed form in cos_theta(1, frame=cm)", "squared amplitude")
    assert helicity == "helicity amplitudes (e- and e+ may be polarised)"
    assert description.polarised_beams == ("e-", "e+")
    assert description.cautions
    assert description.references


def test_extra_service_is_named_where_it_is_missing(monkeypatch: pytest.MonkeyPatch) -> None:
    """Without grpc the error says which extra brings it."""
    for name in [name for name in sys.modules if name.startswith(("barnwright.client", "barnwright.wire"))]:
        monkeypatch.delitem(sys.modules, name)
    monkeypatch.setitem(sys.modules, "grpc", None)
    with pytest.raises(
        barnwright.BarnwrightError, match="a client needs grpc: install barnwright with its extra 'service'"
    ):
        barnwright.connect("127.0.0.1:1")


def test_unknown_name_is_an_attribute_error() -> None:
    """The package has no other names than those it lists."""
    with pytest.raises(AttributeError, match="module 'barnwright' has no attribute 'predikt'"):
        barnwright.predikt  # noqa: B018
    assert list(barnwright.__all__) == sorted(barnwright.__all__)
