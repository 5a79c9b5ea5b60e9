"""Documents become messages and come back, bit by bit."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from barnwright.documents import Request
from barnwright.errors import RequestError
from barnwright.wire import decode, encode, parse
from barnwright.wire.numbers import pack, unpack
from barnwright.wire.v1 import prediction_pb2, request_pb2, service_pb2, values_pb2

REQUEST = """
process = "qed/muon-pair"
seed = 18446744073709551615
[beams]
kind = "collider"
energies = { "e-" = 7.0, "e+" = 4.0 }
[parameters]
alpha = 0.1
count = 3
word = "running"
flag = false
[masses]
"mu-" = 0.0
[[cuts]]
observable = "abs(cos_theta(mu-))"
max = 0.87
outside = [0.1, 0.30000000000000004]
[[histograms]]
name = "pt"
observables = ["pt(mu-)"]
bins = [{ edges = [0.0, 0.1, 5.0] }]
[[variations]]
name = "left"
beams.polarisation = { "e-" = -1.0 }
cuts = [{ name = "cut-1", max = 0.5 }]
[[derived]]
name = "A"
kind = "asymmetry"
observable = "cos_theta(mu-)"
at = 0.0
"""
FORMULA = """
[formula]
reaction = "e- e+ -> mu- mu+"
squared_amplitude = "a*t**2/s**2"
spin_colour = "averaged"
parameters = { a = 1.5 }
peaks = [{ of = "mu- mu+", shape = "resonance", at = "a", width = 2.5 }]
[beams]
kind = "collider"
sqrt_s = 10.0
"""


@pytest.mark.parametrize("text", [REQUEST, FORMULA], ids=["process", "formula"])
@pytest.mark.parametrize("form", ["given", "canonical"])
def test_a_request_comes_back_as_it_was(text: str, form: str) -> None:
    """As it was given, and with every default filled in."""
    request = Request.from_toml(text)
    sent = encode(getattr(request, form)(), request_pb2.Request).SerializeToString()
    found = Request.model_validate(decode(parse(sent, request_pb2.Request)))
    assert found.canonical_json() == request.canonical_json()


def test_a_limit_that_a_variation_takes_away_is_taken_away() -> None:
    """Null differs from not saying; an unknown name is refused like an unknown key, one that is set as well."""
    varied = {"name": "wide", "cuts": [{"name": "cut-1", "max": None, "outside": None, "min": 0.5}]}
    request = Request.model_validate({**Request.from_toml(REQUEST).given(), "variations": [varied]})
    for document in (request.given(), request.canonical()):
        sent = encode(document, request_pb2.Request).SerializeToString()
        found = Request.model_validate(decode(parse(sent, request_pb2.Request)))
        assert found.canonical_json() == request.canonical_json()
        (cut,) = found.varied(found.variations[0]).cuts
        assert (cut.min, cut.max, cut.outside) == (0.5, None, None)
    odd = decode(request_pb2.Cut(name="c", absent=["colour"]))
    assert odd == {"name": "c", "colour": None}
    with pytest.raises(RequestError, match=r"^absent: got 'min', expected the name of a field that is not set$"):
        decode(request_pb2.Cut(min=1.0, absent=["min"]))


def test_kinds_of_parameter_values_are_kept() -> None:
    """A whole number stays one, a float with a whole value stays a float, and false is not 0."""
    values: dict[str, Any] = {"a": 1, "b": 1.0, "c": False, "d": "word"}
    found = decode(encode({"parameters": values}, request_pb2.Request))["parameters"]
    assert {name: (type(value), value) for name, value in found.items()} == {
        name: (type(value), value) for name, value in values.items()
    }


def test_what_is_not_set_is_left_out_of_requests_and_none_in_answers() -> None:
    """Defaults of a request are filled in by the document; an answer says that it does not know."""
    assert decode(request_pb2.Request()) == {}
    note = decode(prediction_pb2.Note(code="x"))
    assert note == {"code": "x", "text": None}
    assert decode(prediction_pb2.Part())["histograms"] == []


def test_no_table_differs_from_an_empty_one() -> None:
    """A part without parameters of its own, and one whose process has none."""
    assert decode(encode({"parameters": {}}, prediction_pb2.Part))["parameters"] == {}
    assert decode(encode({"parameters": None}, prediction_pb2.Part))["parameters"] is None


doubles = st.floats(allow_nan=False, allow_infinity=False)
rows = st.integers(1, 4).flatmap(
    lambda width: st.lists(st.lists(st.none() | doubles, min_size=width, max_size=width), min_size=1, max_size=4)
)


@given(st.lists(st.none() | doubles) | rows)
def test_arrays_come_back_with_every_bit(numbers: list[Any]) -> None:
    """Lists and lists of lists, unknown entries and signed zeros too."""
    message = values_pb2.Numbers(**pack(numbers))
    found = unpack(values_pb2.Numbers.FromString(message.SerializeToString()), "")
    assert repr(found) == repr(numbers)


def test_arrays_are_packed() -> None:
    """A hundred numbers take eight bytes each and a few for the frame."""
    sent = values_pb2.Numbers(**pack([math.pi] * 100)).SerializeToString()
    assert len(sent) <= 100 * 8 + 10


@pytest.mark.parametrize(
    ("message", "expected"),
    [
        (values_pb2.Numbers(values=[1.0], known=[True, False]), r"^known: got 2, expected as many .* values has, 1$"),
        (values_pb2.Numbers(values=[1.0], shape=[2, 2]), r"^shape: got 4, expected as many .* values has, 1$"),
        (values_pb2.Numbers(values=[1.0], shape=[-1, -1]), r"^shape: got -1, expected as many .* values has, 1$"),
    ],
    ids=["known", "shape", "negative"],
)
def test_arrays_that_contradict_themselves_are_refused(message: Any, expected: str) -> None:
    """Lengths that do not agree are violations, not crashes."""
    with pytest.raises(RequestError, match=expected):
        unpack(message, "")


def test_a_value_of_no_kind_is_refused() -> None:
    """The message is there, and nothing is in it."""
    message = request_pb2.Request(parameters={"alpha": values_pb2.ParameterValue()})
    expected = r"^parameters\.alpha: got nothing, expected a value: one of number, integer, boolean, word$"
    with pytest.raises(RequestError, match=expected):
        decode(message)


@pytest.mark.parametrize(
    ("document", "expected"),
    [
        ({"colour": 1}, r"^colour: the message has no such field$"),
        ({"cuts": [{"minimum": 1}]}, r"^cuts\[0\]\.minimum: the message has no such field$"),
        ({"parameters": {"a": [1]}}, r"^parameters\.a: the message cannot carry \[1\]$"),
    ],
)
def test_what_a_message_cannot_hold_is_named(document: dict[str, Any], expected: str) -> None:
    """A slip of ours shows at once."""
    with pytest.raises(ValueError, match=expected):
        encode(document, request_pb2.Request)


def test_bytes_that_are_no_message_are_refused() -> None:
    """The finding names the message that was expected."""
    expected = r"^message: got 3 bytes, expected a message barnwright\.wire\.v1\.PredictRequest$"
    with pytest.raises(RequestError, match=expected):
        parse(b"\xff\xff\xff", service_pb2.PredictRequest)
