"""Messages with fields that are not known here are refused as a whole."""

from __future__ import annotations

from typing import Any

import pytest

from barnwright.errors import RequestError
from barnwright.wire import parse
from barnwright.wire.v1 import request_pb2, service_pb2, values_pb2

UNKNOWN = b"\x82\x7d\x01x"  # field 2000, one byte


def with_unknown(message: Any) -> Any:
    """The same message with a field that nobody knows."""
    message.MergeFromString(UNKNOWN)
    return message


REQUESTS = {
    "message": with_unknown(service_pb2.PredictRequest()),
    "request": service_pb2.PredictRequest(request=with_unknown(request_pb2.Request())),
    "request.beams": service_pb2.PredictRequest(request={"beams": with_unknown(request_pb2.Beams())}),
    "request.cuts[1]": service_pb2.PredictRequest(
        request={"cuts": [request_pb2.Cut(), with_unknown(request_pb2.Cut())]}
    ),
    "request.histograms[0].bins[0]": service_pb2.PredictRequest(
        request={"histograms": [{"bins": [with_unknown(request_pb2.Bins())]}]}
    ),
    "request.parameters.alpha": service_pb2.PredictRequest(
        request={"parameters": {"alpha": with_unknown(values_pb2.ParameterValue(number=1.0))}}
    ),
}


@pytest.mark.parametrize("path", REQUESTS)
def test_an_unknown_field_is_found_however_deep_it_lies(path: str) -> None:
    """The violation has the path of its message and its number."""
    with pytest.raises(RequestError, match=r"field number 2000, expected only fields of barnwright\.wire") as caught:
        parse(REQUESTS[path].SerializeToString(), service_pb2.PredictRequest)
    assert [violation.field for violation in caught.value.violations] == [path]


def test_all_of_them_are_named_at_once() -> None:
    """One violation for every message that has some."""
    request = with_unknown(request_pb2.Request(beams=with_unknown(request_pb2.Beams())))
    with pytest.raises(RequestError, match="field number 2000") as caught:
        parse(request.SerializeToString(), request_pb2.Request)
    assert [violation.field for violation in caught.value.violations] == ["message", "beams"]
