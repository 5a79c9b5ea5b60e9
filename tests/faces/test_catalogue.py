"""The list of processes, its filters and descriptions are the same from every face."""

from __future__ import annotations

import asyncio
import json
from typing import Any

import grpc
import pytest
from service.running import serving

import barnwright
from barnwright import RequestError
from barnwright.cli import main
from barnwright.documents import ProcessDescription, ProcessSummary
from barnwright.wire.v1 import service_pb2 as wire
from barnwright.wire.v1.service_pb2_grpc import CrossSectionServiceStub

CHOICES: list[dict[str, Any]] = [
    {},
    {"particle": "gamma"},
    {"particle": ["gamma", "e-"], "kind": "elastic"},
    {"plugin": "qed", "kind": "closed form"},
    {"kind": "decay"},
]
WRONG: dict[str, Any] = {"particle": ["mu-", "muon"], "plugin": "qd", "kind": "totl"}


async def asynchronously(address: str, choice: dict[str, Any]) -> list[ProcessSummary]:
    """The answer of the client for asyncio."""
    async with barnwright.connect_async(address) as client:
        return await client.processes(**choice)


def test_all_faces_list_the_same(capsys: pytest.CaptureFixture[str]) -> None:
    """Names, kinds and summaries of every choice, the same words where one means nothing, the same descriptions."""
    with serving() as server, server.client() as client:
        for choice in CHOICES:
            here = barnwright.processes(**choice)
            assert client.processes(**choice) == here
            assert asyncio.run(asynchronously(server.address, choice)) == here
        assert main(["processes", "--kind", "elastic", "--json", "--server", server.address]) == 0
        listed = [ProcessSummary.model_validate(entry) for entry in json.loads(capsys.readouterr().out)]
        assert listed == barnwright.processes(kind="elastic")
        for entry in barnwright.processes():
            assert client.describe(entry.name) == barnwright.describe(entry.name)

        with pytest.raises(RequestError, match="nearest: mu-") as local:
            barnwright.processes(**WRONG)
        with pytest.raises(RequestError, match="nearest: mu-") as remote:
            client.processes(**WRONG)
        assert str(remote.value) == str(local.value)
        assert len(local.value.violations) == 3

        with server.channel() as channel:
            stub = CrossSectionServiceStub(channel)  # type: ignore[no-untyped-call]
            with pytest.raises(grpc.RpcError, match=r"StatusCode\.INVALID_ARGUMENT"):
                stub.ListProcesses(wire.ListProcessesRequest(particles=["electron"] * 100_000))


def test_a_description_comes_back_whole() -> None:
    """With conditions, alternatives and everything else that is more than text."""
    for entry in barnwright.processes():
        described = barnwright.describe(entry.name)
        assert ProcessDescription.model_validate(json.loads(described.model_dump_json())) == described
