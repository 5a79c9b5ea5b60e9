"""The prediction: its JSON, its bits, its text, and how cheaply it is made."""

from __future__ import annotations

import json
import pickle
import time
from typing import Any

import numpy as np
import pytest

from barnwright.documents import ByName, Note, Prediction, Request, Run, Total
from barnwright.errors import RequestError

from .conftest import make_histogram, make_prediction


def test_json_comes_back_whole(prediction: Prediction) -> None:
    """A prediction read from its own JSON is equal, and writes the same bytes."""
    text = prediction.model_dump_json()
    again = Prediction.from_json(text)
    assert again == prediction
    assert again.model_dump_json() == text
    assert Prediction.model_validate(json.loads(text)) == prediction
    assert pickle.loads(pickle.dumps(prediction)) == prediction  # noqa: S301 - our own bytes


def test_json_is_that_of_the_contract(prediction: Prediction) -> None:
    """Edges are a list of axes, what is not known is null, named things are lists of objects with a name."""
    document = json.loads(prediction.model_dump_json())
    (histogram,) = document["histograms"]
    assert document["schema"] == "barnwright.prediction/1" == prediction.schema
    assert histogram["edges"] == [[-1.0, -0.5, 0.0, 0.5, 1.0]]
    assert histogram["errors"] == [0.4, 0.2, None, 0.4]
    assert (histogram["underflow"], histogram["overflow"]) == (0.0, 0.25)
    assert document["derived"][0]["name"] == "A_LR"
    assert document["derived"][0]["histograms"][0]["values"] == [0.1, 0.2, 0.3, 0.4]
    assert document["request"]["accuracy"]["bin_floor"] == 1e-6
    assert document["parameters"] == {"alpha": 0.0073, "scheme": "alpha", "loops": 0, "massive": True}
    assert document["variations"][0]["histograms"][0]["name"] == "angle"


def test_named_things_are_read_by_name_and_position(prediction: Prediction) -> None:
    """Histograms, derived quantities and variations."""
    assert prediction.histograms["angle"] is prediction.histograms[0]
    assert prediction.derived["A_LR"].value == 0.25
    assert prediction.variations["left"].histograms["angle"].values[0] == 4.0


def test_same_bits_leaves_out_run_alone(prediction: Prediction) -> None:
    """Another time and executor make no difference; another last bit does."""
    request = prediction.request
    run = Run.build(seconds=9.0, executor="server", computed_at="2027-01-01T00:00:00Z", from_cache=True)
    assert prediction.same_bits(make_prediction(request, run=run))
    total = Total.build(value=np.nextafter(6.0, 7.0).item(), error=0.5, unit="pb", error_kind="statistical")
    assert not prediction.same_bits(make_prediction(request, total=total))


def test_texts_show_the_status(prediction: Prediction) -> None:
    """A reader sees at once what was calculated and whether it is good."""
    assert repr(prediction).startswith("<Prediction electroweak/muon-pair: 6.0(5) pb, converged (monte_carlo)>")
    first, second, third = str(prediction).splitlines()
    assert first == "electroweak/muon-pair: 6.0(5) pb, converged (monte_carlo, order tree)"
    assert second == "  A_LR = 0.250(10)"
    assert third == "  note above_range: sqrt_s lies above the range of validity"
    assert repr(prediction.variations[0]) == "<Part 'left': 6.0(5) pb>"


@pytest.mark.parametrize(
    ("source", "title"),
    [
        ({"processes": ["a/b", "a/c"]}, "a/b + a/c"),
        ({"formula": {"reaction": "a b -> c d", "squared_amplitude": "1", "spin_colour": "summed"}}, "a b -> c d"),
    ],
)
def test_titles(source: dict[str, Any], title: str) -> None:
    """Sums and formulas have a title too."""
    request = Request.model_validate({**source, "beams": {"kind": "collider", "sqrt_s": 1}})
    assert make_prediction(request).title == title


def test_wrong_documents_have_findings(prediction: Prediction) -> None:
    """Every finding of a wrong prediction comes with its path."""
    document = json.loads(prediction.model_dump_json())
    document["total"]["value"] = True
    document["histograms"][0]["errors"] = [1.0]
    document["derived"] *= 2
    document["status"] = "convergd"
    document["colour"] = 1
    with pytest.raises(RequestError, match="expected") as caught:
        Prediction.from_json(json.dumps(document))
    lines = {violation.field: str(violation) for violation in caught.value.violations}
    assert lines["total.value"] == "total.value: got True, expected a finite number"
    assert lines["histograms[0].errors"] == "histograms[0].errors: got shape (1,), expected as many as bins, shape (4,)"
    assert "nearest: converged" in lines["status"]
    assert "the name 'A_LR' is there twice" in lines["derived"]
    assert "colour" in lines


def test_build_checks_the_names_of_fields() -> None:
    """Building leaves values unchecked, not names."""
    with pytest.raises(TypeError, match=r"^Note\.build: fields missing or unknown: text, txt$"):
        Note.build(code="a", txt="b")


def test_build_is_cheap(small: dict[str, Any]) -> None:
    """A prediction with a histogram of 100 bins is built in far less than a validation takes."""
    request = Request.model_validate(small)
    fields = {"values": np.ones(100), "errors": np.ones(100), "edges": np.arange(101.0)}

    def build() -> Prediction:
        return make_prediction(request, histograms=ByName([make_histogram(**fields)]), replicates=None)

    text = build().model_dump_json()

    def shortest(action: Any) -> float:
        times = []
        for _ in range(20):
            start = time.perf_counter()
            action()
            times.append(time.perf_counter() - start)
        return min(times)

    assert shortest(build) < shortest(lambda: Prediction.from_json(text))
