"""Envelopes as documents: which variations they name, and the ends that they carry."""

from __future__ import annotations

import json
from typing import Any

import numpy as np
import pytest

from barnwright.documents import ByName, Derived, DerivedBins, Prediction, Request, violations_of
from barnwright.errors import RequestError
from barnwright.wire import decode, encode
from barnwright.wire.v1 import prediction_pb2, request_pb2

VARIATIONS = [{"name": "up", "parameters": {"alpha": 0.0074}}, {"name": "down", "parameters": {"alpha": 0.0072}}]


def asked(small: dict[str, Any], **fields: Any) -> Request:
    """A request for an envelope of two variations."""
    envelope = {"name": "scale", "kind": "envelope", **fields}
    return Request.model_validate({**small, "variations": VARIATIONS, "derived": [envelope]})


def bins(**changes: Any) -> DerivedBins:
    """An envelope of a histogram with two bins, one of them unknown."""
    numbers = {"values": [2.0, 3.0], "errors": [0.1, 0.1], "low": [1.0, None], "high": [3.0, None]}
    return DerivedBins.model_validate({"name": "angle", **numbers, **changes})


def envelope(**changes: Any) -> Derived:
    """An envelope with a histogram."""
    fields: dict[str, Any] = {"name": "scale", "value": 84.321, "error": 0.07, "unit": "pb", "low": 82.04, "high": 86.6}
    return Derived.build(**{"error_kind": "statistical", "histograms": ByName([bins()]), **fields, **changes})


def test_an_envelope_comes_back_as_it_was_asked(small: dict[str, Any]) -> None:
    """From its own canonical form, and from the wire."""
    request = asked(small, of=["up", "down"])
    sent = encode(request.canonical(), request_pb2.Request).SerializeToString()
    received = decode(request_pb2.Request.FromString(sent))
    assert Request.model_validate(received).canonical_json() == request.canonical_json()
    assert request.canonical()["derived"] == [{"name": "scale", "kind": "envelope", "of": ["up", "down"]}]


WRONG: list[tuple[dict[str, Any], str]] = [
    ({}, "derived[0].of: got nothing, expected a list of 1 to 1000 names of variations"),
    ({"of": []}, "derived[0].of: got [], expected a list of 1 to 1000 names of variations"),
    ({"of": "up"}, "derived[0].of: got 'up', expected a list of 1 to 1000 names of variations"),
    ({"of": ["up", "up"]}, "derived[0].of[1]: got 'up', expected a name that of[0] does not have already"),
    (
        {"of": ["up", "doun"]},
        "derived[0].of[1]: got 'doun', expected the name of a variation (up, down); nearest: down",
    ),
    ({"of": ["up"], "at": 0.0}, "derived[0].at: got 0.0, expected one of the keys name, kind, of"),
    ({"between": ["up", "down"]}, "derived[0].between: got ['up', 'down'], expected one of the keys name, kind, of"),
    (
        {"kind": "envelop", "of": ["up"]},
        "derived[0].kind: got 'envelop', expected one of 'asymmetry', 'ratio', 'envelope'; nearest: envelope",
    ),
]


@pytest.mark.parametrize(("fields", "message"), WRONG)
def test_a_wrong_envelope_is_named(small: dict[str, Any], fields: dict[str, Any], message: str) -> None:
    """Field, value, what was expected and the nearest choice."""
    with pytest.raises(RequestError, match=r"derived\[0\]") as caught:
        asked(small, **fields)
    assert message in str(caught.value)


def test_ends_come_back_from_json_and_from_the_wire(prediction: Prediction) -> None:
    """Total and bins, with None where a bin's end is not known, to the last bit."""
    whole = Prediction.build(**{**dict(prediction), "derived": ByName([envelope()])})
    from_json = Prediction.from_json(whole.model_dump_json())
    message = encode(json.loads(whole.model_dump_json()), prediction_pb2.Prediction)
    from_wire = Prediction.model_validate(decode(prediction_pb2.Prediction.FromString(message.SerializeToString())))
    for found in (from_json, from_wire):
        assert found.same_bits(whole)
        scale = found.derived["scale"]
        assert (scale.low, scale.high) == (82.04, 86.6)
        low = scale.histograms["angle"].low
        assert low is not None
        assert np.array_equal(low, [1.0, np.nan], equal_nan=True)


def test_other_derived_quantities_have_no_ends(prediction: Prediction) -> None:
    """The fields are there and say nothing."""
    document = json.loads(prediction.model_dump_json())["derived"][0]
    assert (document["low"], document["high"], document["histograms"][0]["low"]) == (None, None, None)


@pytest.mark.parametrize(
    ("changes", "text"),
    [
        ({}, "scale = 84.32(7) pb, 82.04 to 86.6 pb"),
        ({"low": 84.3209, "high": 84.3211}, "scale = 84.32(7) pb, 84.3209 to 84.3211 pb"),
        ({"low": 84.321, "high": 84.321}, "scale = 84.32(7) pb, 84.321 to 84.321 pb"),
        ({"low": -1.0, "high": 2.0, "unit": ""}, "scale = 84.32(7), -1 to 2"),
        ({"low": None, "high": None}, "scale = 84.32(7) pb"),
    ],
)
def test_ends_are_told_as_text(changes: dict[str, Any], text: str) -> None:
    """With as many digits as tell the ends apart."""
    assert str(envelope(**changes)) == text


def test_ends_have_the_shape_of_the_values() -> None:
    """An array of another length is a finding."""
    from pydantic import ValidationError

    with pytest.raises(ValidationError, match="fields that do not fit together") as caught:
        bins(low=[1.0])
    (violation,) = violations_of(caught.value, DerivedBins)
    assert str(violation) == "low: got shape (1,), expected the shape of values, (2,)"
