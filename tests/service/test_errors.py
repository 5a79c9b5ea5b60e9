"""What goes wrong arrives as what it is, with every finding."""

from __future__ import annotations

from typing import Any

import grpc
import pytest
from faces.wrong_requests import CASES, GOOD, Case
from google.rpc.error_details_pb2 import BadRequest, ErrorInfo
from google.rpc.status_pb2 import Status
from service.running import SERVICE, Running

import barnwright
from barnwright.client import Client
from barnwright.documents import Request
from barnwright.wire import decode, encode
from barnwright.wire.v1 import service_pb2


def on_the_wire(case: Case) -> Any:
    """The message of a case; None where none can hold it, or where it holds something that is right."""
    if case.name == "truth value as number":
        return None
    try:
        return encode({"request": case.request}, service_pb2.PredictRequest)
    except (ValueError, TypeError, AttributeError):
        return None


MESSAGES = {case.name: message for case in CASES if (message := on_the_wire(case)) is not None}
by_case = pytest.mark.parametrize("case", CASES, ids=lambda case: case.name)


def ask(server: Running, method: str, message: bytes, **options: Any) -> Any:
    """The failure of a bare call with these bytes."""
    with server.channel() as channel, pytest.raises(grpc.RpcError, match="StatusCode") as caught:
        channel.unary_unary(f"/{SERVICE}/{method}")(message, wait_for_ready=True, **options)
    return caught.value


def details(failure: Any) -> Status:
    """The google.rpc.Status of a failure."""
    trailers = dict(failure.trailing_metadata())
    return Status.FromString(trailers["grpc-status-details-bin"])


def unpacked(status: Status, kind: Any) -> list[Any]:
    """All details of a kind."""
    return [kind.FromString(detail.value) for detail in status.details if detail.Is(kind.DESCRIPTOR)]


def local_error(request: Any) -> barnwright.RequestError:
    """What Python says to a request."""
    with pytest.raises(barnwright.RequestError, match=r".") as caught:
        barnwright.predict(request)
    return caught.value


@by_case
def test_every_wrong_request_gets_the_same_error(bundled: Running, case: Case) -> None:
    """The same kind, the same violations, as in Python."""
    expected = local_error(case.request)
    with bundled.client() as client, pytest.raises(type(expected), match=r".") as caught:
        client.predict(case.request)
    assert type(caught.value) is type(expected)
    assert caught.value.violations == expected.violations


@pytest.mark.parametrize("name", MESSAGES)
def test_every_wrong_request_gets_a_bad_request(bundled: Running, name: str) -> None:
    """From any language, where a message can hold the request: all findings as sentences, and one ErrorInfo."""
    message = MESSAGES[name]
    expected = local_error(decode(message)["request"])
    failure = ask(bundled, "Predict", message.SerializeToString())
    unknown = isinstance(expected, barnwright.UnknownProcessError)
    assert failure.code() is (grpc.StatusCode.NOT_FOUND if unknown else grpc.StatusCode.INVALID_ARGUMENT)
    status = details(failure)
    (info,) = unpacked(status, ErrorInfo)
    assert (info.domain, info.reason) == ("barnwright", "PROCESS_UNKNOWN" if unknown else "REQUEST_INVALID")
    (bad,) = unpacked(status, BadRequest)
    assert [entry.description for entry in bad.field_violations] == [str(v) for v in expected.violations]
    assert [entry.field for entry in bad.field_violations] == [v.field for v in expected.violations]


def test_unknown_processes_are_named_with_the_nearest(server: Running) -> None:
    """In the metadata, for programs."""
    message = encode({"request": {**GOOD, "process": "qed/muon-pear"}}, service_pb2.PredictRequest)
    (info,) = unpacked(details(ask(server, "Predict", message.SerializeToString())), ErrorInfo)
    assert info.metadata["nearest"] == "qed/muon-pair"


def test_a_description_of_an_unknown_process_is_not_found(client: Client) -> None:
    """With the nearest name."""
    with pytest.raises(barnwright.UnknownProcessError, match="qed/compton"):
        client.describe("qed/comptom")


@pytest.mark.parametrize("name", ["raises-on-import/pair", "wrong-shape/pair", "not-a-number/pair"])
def test_a_broken_plugin_is_told_with_its_cause(server: Running, client: Client, name: str) -> None:
    """FAILED_PRECONDITION; our client makes the error of it that Python raises."""
    message = encode({"request": {**GOOD, "process": name}}, service_pb2.PredictRequest)
    failure = ask(server, "Predict", message.SerializeToString())
    assert failure.code() is grpc.StatusCode.FAILED_PRECONDITION
    (info,) = unpacked(details(failure), ErrorInfo)
    assert info.reason == "PLUGIN_BROKEN"
    with pytest.raises(barnwright.PluginError, match=name) as caught:
        client.predict({**GOOD, "process": name})
    assert caught.value.process == name
    assert caught.value.cause.startswith(info.metadata["cause"].rstrip("…"))


@pytest.mark.parametrize(
    ("method", "message", "line"),
    [
        ("Predict", b"", "request: got nothing, expected a request"),
        ("Predict", b"\xff", "message: got 1 bytes, expected a message barnwright.wire.v1.PredictRequest"),
        ("GetProcess", b"", "name: got nothing, expected the name of a process, plugin/name"),
        ("ListProcesses", b"\x82\x7d\x01x", "message: got field number 2000, expected only fields of "),
        ("Predict", b"\x82\x7d\x01x", "message: got field number 2000, expected only fields of "),
    ],
)
def test_wrong_messages_are_violations(server: Running, method: str, message: bytes, line: str) -> None:
    """Missing parts, no messages at all, and fields of a later version."""
    failure = ask(server, method, message)
    assert failure.code() is grpc.StatusCode.INVALID_ARGUMENT
    (bad,) = unpacked(details(failure), BadRequest)
    assert bad.field_violations[0].description.startswith(line)


def test_a_call_that_does_not_exist_is_unimplemented(server: Running) -> None:
    """As gRPC has it."""
    assert ask(server, "Guess", b"").code() is grpc.StatusCode.UNIMPLEMENTED


def test_a_scan_needs_keys_and_each_once(server: Running, client: Client) -> None:
    """No key, a key twice, and values of no kind."""
    with pytest.raises(barnwright.RequestError, match=r"^over: got {}, expected lists of values by key"):
        client.scan(GOOD, over={})
    message = encode({"request": GOOD}, service_pb2.ScanRequest)
    with server.channel() as channel, pytest.raises(grpc.RpcError, match=r"over: got {}, expected lists of values"):
        list(channel.unary_stream(f"/{SERVICE}/Scan")(message.SerializeToString(), wait_for_ready=True))
    axis = {"key": "beams.sqrt_s", "values": [1.0]}
    message = encode({"request": GOOD, "over": [axis, axis]}, service_pb2.ScanRequest)
    with server.channel() as channel, pytest.raises(grpc.RpcError, match=r"over\[1\]\.key"):
        list(channel.unary_stream(f"/{SERVICE}/Scan")(message.SerializeToString(), wait_for_ready=True))
    with pytest.raises(barnwright.RequestError, match=r"^over\.beams\.sqrt_s\[1\]: got None, expected a number"):
        client.scan(GOOD, over={"beams.sqrt_s": [1.0, None]})


def test_many_violations_fit_what_clients_take(server: Running, client: Client) -> None:
    """Everything for our client; for others as many as fit, and how many there are."""
    cuts = [{"name": f"cut {number}", "observable": f"nonsense_{number}(mu-)", "max": 1.0} for number in range(300)]
    request = Request.model_validate({**GOOD, "cuts": cuts})
    with pytest.raises(barnwright.RequestError, match="nonsense_299") as caught:
        client.predict(request)
    assert caught.value.violations == local_error(request).violations
    message = encode({"request": request.given()}, service_pb2.PredictRequest).SerializeToString()
    with grpc.insecure_channel(server.address) as channel, pytest.raises(grpc.RpcError, match="nonsense_0") as bare:
        channel.unary_unary(f"/{SERVICE}/Predict")(message, wait_for_ready=True)
    status = details(bare.value)
    (info,) = unpacked(status, ErrorInfo)
    assert info.metadata["violations"] == "300"
    assert 3 < len(unpacked(status, BadRequest)[0].field_violations) < 300


def test_a_process_object_cannot_be_sent(client: Client) -> None:
    """The message says where it can run."""
    from barnwright.plugin import Process, SquaredAmplitude

    process = Process(name="pair", reaction="e- e+ -> mu- mu+", laws=(SquaredAmplitude(lambda event, parameters: 1.0),))
    with pytest.raises(barnwright.RequestError, match=r"an object stays in this process, see barnwright\.predict"):
        client.predict(process=process, beams={"kind": "collider", "sqrt_s": 10.0})
