"""Calls that their callers leave."""

from __future__ import annotations

import os
import signal
import subprocess
import sys
from pathlib import Path

import grpc
import pytest
from service.plugins import plugin
from service.running import SERVICE, Running, serving, until

from barnwright.client import Client
from barnwright.errors import ServerError
from barnwright.wire import encode
from barnwright.wire.v1 import service_pb2

BEAMS = {"kind": "collider", "sqrt_s": 10.0}
SLOW = {"process": "slow/pair", "beams": BEAMS}


def notes_itself(folder: Path) -> Path:
    """A plugin whose law leaves the number of its process in a file, then works for a minute."""
    body = f"Path({str(folder)!r}, str(os.getpid())).touch(); time.sleep(60)"
    return plugin(folder / "plugins", "slow", body)


def workers_at_it(folder: Path) -> list[int]:
    """Workers that began."""
    return [int(file.name) for file in folder.iterdir() if file.is_file()]


def are_freed(server: Running, folder: Path) -> bool:
    """Whether the workers that began have been ended, and others stand in their place."""
    workers = server.family()["workers"]
    return len(workers) == 4 and not set(workers) & set(workers_at_it(folder))


def good(client: Client) -> str:
    """A prediction of somebody else."""
    return client.predict(process="healthy/pair", beams=BEAMS).canonical_json()


def test_a_deadline_frees_the_worker(tmp_path: Path) -> None:
    """The caller gets DEADLINE_EXCEEDED, the worker another task."""
    with serving("healthy", notes_itself(tmp_path)) as server, server.client() as client:
        expected = good(client)
        with pytest.raises(ServerError, match="did not answer within the timeout of the call") as caught:
            client.predict(SLOW, timeout=2.0)
        assert caught.value.code == "DEADLINE_EXCEEDED"
        assert workers_at_it(tmp_path)
        until(lambda: are_freed(server, tmp_path))
        assert good(client) == expected


def test_a_cancel_frees_the_worker(tmp_path: Path) -> None:
    """Others' answers stay the same to the bit."""
    message = encode({"request": SLOW}, service_pb2.PredictRequest).SerializeToString()
    with serving("healthy", notes_itself(tmp_path)) as server, server.client() as client, server.channel() as channel:
        expected = good(client)
        call = channel.unary_unary(f"/{SERVICE}/Predict").future(message, wait_for_ready=True)
        until(lambda: workers_at_it(tmp_path))
        assert good(client) == expected
        call.cancel()
        until(lambda: are_freed(server, tmp_path))
        assert good(client) == expected


def test_a_stream_can_be_cancelled_in_its_middle(tmp_path: Path) -> None:
    """The rest is not sent, and the server goes on."""
    axis = {"key": "beams.sqrt_s", "values": [1.0 + point / 100 for point in range(400)]}
    request = {"process": "healthy/pair", "beams": BEAMS}
    message = encode({"request": request, "over": [axis]}, service_pb2.ScanRequest).SerializeToString()
    with serving("healthy") as server, server.client() as client, server.channel() as channel:
        call = channel.unary_stream(f"/{SERVICE}/Scan")(message, wait_for_ready=True)
        next(call)
        call.cancel()
        with pytest.raises(grpc.RpcError, match="cancel") as caught:
            list(call)
        assert caught.value.code() is grpc.StatusCode.CANCELLED
        assert len(client.scan(request, over={"beams.sqrt_s": axis["values"]})) == 400


@pytest.mark.parametrize("number", [signal.SIGINT, signal.SIGKILL], ids=["Ctrl-C", "SIGKILL"])
def test_a_client_that_goes_away_frees_the_worker(tmp_path: Path, number: int) -> None:
    """By Ctrl-C, or without a word."""
    code = f"import barnwright, sys; barnwright.connect(sys.argv[1]).predict({SLOW!r})"
    with serving("healthy", notes_itself(tmp_path)) as server, server.client() as client:
        expected = good(client)
        caller = subprocess.Popen([sys.executable, "-c", code, server.address], stderr=subprocess.PIPE)
        until(lambda: workers_at_it(tmp_path))
        os.kill(caller.pid, number)
        _, said = caller.communicate()
        assert (number == signal.SIGKILL) or b"KeyboardInterrupt" in said
        until(lambda: are_freed(server, tmp_path))
        assert good(client) == expected


def test_more_calls_than_the_server_takes_are_refused_with_a_time(tmp_path: Path) -> None:
    """RESOURCE_EXHAUSTED, RetryInfo and pushback, while health still answers; afterwards there is room again."""
    message = encode({"request": SLOW}, service_pb2.PredictRequest).SerializeToString()
    with serving("healthy", notes_itself(tmp_path), calls=1) as server, server.channel() as channel:
        predict = channel.unary_unary(f"/{SERVICE}/Predict")
        call = predict.future(message, wait_for_ready=True)
        until(lambda: workers_at_it(tmp_path))
        with pytest.raises(grpc.RpcError, match="1 calls are there already, as many as the server takes") as caught:
            predict(message)
        assert caught.value.code() is grpc.StatusCode.RESOURCE_EXHAUSTED
        assert dict(caught.value.trailing_metadata())["grpc-retry-pushback-ms"] == "500"
        assert server.health() == 1
        with server.client() as client:
            with pytest.raises(ServerError, match="1 calls are there already") as refused:
                client.predict(process="healthy/pair", beams=BEAMS, timeout=30.0)
            assert (refused.value.code, refused.value.retry_after) == ("RESOURCE_EXHAUSTED", 0.5)
            call.cancel()
            assert client.predict(process="healthy/pair", beams=BEAMS).status == "converged"
