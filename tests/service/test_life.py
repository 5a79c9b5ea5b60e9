"""From the first line to the last call: addresses, health, reflection, drain."""

from __future__ import annotations

import signal
import socket
import threading
from pathlib import Path
from typing import Any

import grpc
import pytest
from grpc_health.v1 import health_pb2, health_pb2_grpc
from grpc_reflection.v1alpha import reflection_pb2, reflection_pb2_grpc
from service.plugins import plugin
from service.running import SERVICE, Running, is_alive, serving, until

from barnwright.client import connect
from barnwright.errors import RequestError, ServerError
from barnwright.service import serve
from barnwright.service.address import read_address

BEAMS = {"kind": "collider", "sqrt_s": 10.0}
SERVING, NOT_SERVING, SERVICE_UNKNOWN = 1, 2, 3


def test_health_of_server_and_service(server: Running) -> None:
    """SERVING, once it has said that it listens; other services are not here."""
    assert server.health() == server.health(SERVICE) == SERVING
    with pytest.raises(grpc.RpcError, match="expected one of '', ") as caught:
        server.health("another.Service")
    assert caught.value.code() is grpc.StatusCode.NOT_FOUND


def test_reflection_tells_the_services(server: Running) -> None:
    """For tools that know no protos."""
    asked = reflection_pb2.ServerReflectionRequest(list_services="")
    with server.channel() as channel:
        (answer,) = reflection_pb2_grpc.ServerReflectionStub(channel).ServerReflectionInfo(iter([asked]))
    names = {service.name for service in answer.list_services_response.service}
    assert {SERVICE, "grpc.health.v1.Health"} <= names


@pytest.mark.parametrize("text", ["0.0.0.0:50551", "[::]:0", "192.168.1.7:1", "example.org:80"])
def test_addresses_of_other_machines_need_an_explicit_word(text: str) -> None:
    """The refusal says why, and how to do it all the same."""
    with pytest.raises(RequestError, match=r"^address: got .* there is no encryption yet.*--insecure listens"):
        serve(text)
    assert str(read_address(text, insecure=True)) == text


@pytest.mark.parametrize("text", ["", "50551", "localhost", "localhost:", ":1", "a:65536", "::1:5", "[::1]", "a:1x"])
def test_texts_that_are_no_address(text: str) -> None:
    """The refusal has the form and an example."""
    with pytest.raises(RequestError, match=r"^address: got .*, expected host:port with a port from 0 to 65535"):
        read_address(text, insecure=False)


@pytest.mark.parametrize("text", ["127.0.0.1:0", "localhost:1", "[::1]:65535", "127.1.2.3:5"])
def test_loopback_addresses(text: str) -> None:
    """Those that only this machine can reach."""
    assert str(read_address(text, insecure=False)) == text


def test_workers_are_at_least_one() -> None:
    """A server without any would never answer."""
    with pytest.raises(RequestError, match=r"^workers: got 0, expected a whole number of at least 1$"):
        serve("127.0.0.1:0", workers=0)


def test_a_port_that_is_taken_is_refused() -> None:
    """Two servers never share one."""
    with socket.socket() as taken:
        taken.bind(("127.0.0.1", 0))
        taken.listen()
        with pytest.raises(ServerError, match=r"^cannot listen on 127\.0\.0\.1:\d+: it is taken"):
            serve(f"127.0.0.1:{taken.getsockname()[1]}")


def test_a_server_that_is_not_there_is_said_in_time() -> None:
    """With what to do about it."""
    with socket.socket() as unused:
        unused.bind(("127.0.0.1", 0))
        address = f"127.0.0.1:{unused.getsockname()[1]}"
    expected = r"^no server answered at .* barnwright serve --address"
    with connect(address, patience=0.3) as client, pytest.raises(ServerError, match=expected) as caught:
        client.processes()
    assert caught.value.code == "UNAVAILABLE"


@pytest.mark.parametrize("text", ["", "127.0.0.1", "127.0.0.1:0", "127.0.0.1:70000", "x:99999999999"])
def test_the_client_refuses_what_is_no_address(text: str) -> None:
    """Before it tries."""
    with pytest.raises(RequestError, match=r"^address: got .*, expected host:port with a port from 1 to 65535"):
        connect(text)


@pytest.mark.parametrize("number", [signal.SIGTERM, signal.SIGINT], ids=["SIGTERM", "Ctrl-C"])
def test_an_idle_server_ends_at_once_and_well(number: int) -> None:
    """Exit code 0, nothing left."""
    with serving() as server:
        family = [pid for pids in server.family().values() for pid in pids]
        server.tell(number)
        assert server.process.wait() == 0
        until(lambda: not any(is_alive(pid) for pid in family))


def test_a_drain_ends_watches_and_finishes_calls(tmp_path: Path) -> None:
    """NOT_SERVING is told first; the call that runs is answered; then the server ends."""
    go, began = tmp_path / "go", tmp_path / "began"
    body = f"Path({str(began)!r}).touch()", f"while not os.path.exists({str(go)!r}): time.sleep(0.01)"
    with serving(plugin(tmp_path, "waits", *body)) as server, server.client() as client, server.channel() as channel:
        watch = health_pb2_grpc.HealthStub(channel).Watch(health_pb2.HealthCheckRequest(), wait_for_ready=True)
        assert next(watch).status == SERVING
        answers: list[Any] = []
        call = threading.Thread(target=lambda: answers.append(client.predict(process="waits/pair", beams=BEAMS)))
        call.start()
        until(began.exists)
        server.tell()
        assert [answer.status for answer in watch] == [NOT_SERVING]
        assert server.process.poll() is None
        go.touch()
        call.join()
        assert [answer.status for answer in answers] == ["converged"]
        assert server.process.wait() == 0


def test_the_grace_is_an_end(tmp_path: Path) -> None:
    """Calls that take longer are told that the server ends."""
    with serving("hangs_later", grace_seconds=0.5) as server, server.client() as client:
        _ends_while_a_call_runs(server, client, signals=1)


def test_a_second_signal_ends_everything_at_once() -> None:
    """Whatever the grace."""
    with serving("hangs_later", grace_seconds=600.0) as server, server.client() as client:
        _ends_while_a_call_runs(server, client, signals=2)


def _ends_while_a_call_runs(server: Running, client: Any, signals: int) -> None:
    raised: list[Exception] = []

    def ask() -> None:
        try:
            client.predict(process="hangs-later/pair", beams=BEAMS)
        except ServerError as error:
            raised.append(error)

    call = threading.Thread(target=ask)
    call.start()
    until(lambda: len(server.family()["workers"]) > 4)
    for _ in range(signals):
        server.tell()
        until(lambda: server.process.poll() is not None or not _listens(server))
    assert server.process.wait() == 0
    call.join()
    assert [error.code for error in raised] == ["UNAVAILABLE"]


def _listens(server: Running) -> bool:
    host, _, port = server.address.rpartition(":")
    with socket.socket() as probe:
        return probe.connect_ex((host, int(port))) == 0
