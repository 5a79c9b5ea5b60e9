"""The calls of the service, through our clients."""

from __future__ import annotations

import asyncio
from typing import Any

import numpy as np
import pytest
from service.running import Running

import barnwright
from barnwright.client import Client
from barnwright.documents import Request

REQUEST: dict[str, Any] = {
    "process": "qed/muon-pair",
    "beams": {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}},
    "cuts": [{"observable": "abs(cos_theta(mu-))", "max": 0.87}],
    "histograms": [{"name": "pt", "observables": ["pt(mu-)"], "bins": [{"count": 10, "low": 0.0, "high": 5.5}]}],
    "variations": [{"name": "heavy", "masses": {"mu-": 0.2}}],
    "derived": [
        {"name": "A_FB", "kind": "asymmetry", "observable": "cos_theta(mu-, frame=cm)", "at": 0.0},
    ],
}
CONSTANT = {"process": "healthy/pair", "beams": {"kind": "collider", "sqrt_s": 10.0}}


def test_a_prediction_has_the_bits_of_a_local_one(client: Client) -> None:
    """Everything but the part that says how it ran."""
    local, remote = barnwright.predict(REQUEST), client.predict(REQUEST)
    assert remote.canonical_json() == local.canonical_json()
    assert remote == local.model_copy(update={"run": remote.run})
    assert remote.run.executor == "server"


def test_requests_come_as_dicts_documents_files_and_fields(client: Client, tmp_path: Any) -> None:
    """Whatever the Python functions take."""
    file = tmp_path / "request.json"
    file.write_text(Request.model_validate(REQUEST).canonical_json())
    expected = client.predict(REQUEST).total
    assert client.predict(Request.model_validate(REQUEST)).total == expected
    assert client.predict(file).total == expected
    assert client.predict(**REQUEST).total == expected
    assert client.predict(REQUEST, unit="nb").total.unit == "nb"


def test_a_scan_has_the_bits_of_a_local_one(client: Client) -> None:
    """Every point of a grid, in order, in more messages than one."""
    over = {"beams.sqrt_s": list(np.linspace(0.3, 20.0, 25)), "parameters.alpha": [0.007, 0.008]}
    request = {key: value for key, value in REQUEST.items() if key != "beams"}
    request["beams"] = {"kind": "collider", "sqrt_s": 10.0}
    local, remote = barnwright.scan(request, over=over), client.scan(request, over=over)
    assert remote.shape == local.shape == (25, 2)
    assert np.array_equal(remote.values, local.values)
    assert np.array_equal(remote.errors, local.errors)
    assert (remote.unit, remote.status, remote.points) == (local.unit, local.status, local.points)
    for point in (0, 17, 49):
        assert remote[point].same_bits(local[point])
    assert [p.total for p in remote[2:4]] == [p.total for p in local[2:4]]


def test_the_list_has_the_broken_processes_too(client: Client) -> None:
    """Healthy ones with their reaction, broken ones with the cause."""
    found = {summary.name: summary for summary in client.processes()}
    assert list(found) == sorted(found)
    assert found["qed/muon-pair"].reaction == "e- e+ -> mu- mu+"
    assert found["qed/muon-pair"].broken is None
    assert "raises-on-import/pair" in found
    assert found["raises-on-import/pair"].broken
    local = {summary.name: summary for summary in barnwright.processes()}
    assert found["qed/compton"] == local["qed/compton"]


def test_a_description_is_that_of_the_library(client: Client) -> None:
    """Field by field."""
    assert client.describe("qed/compton") == barnwright.describe("qed/compton")


def test_validation_fills_in_defaults_and_says_the_cost(client: Client) -> None:
    """Nothing is computed."""
    found = client.validate(REQUEST)
    assert found.is_valid
    assert found.request is not None
    assert found.cost is not None
    assert found.request.canonical() == client.predict(REQUEST).request.canonical()
    assert (found.cost.points, found.cost.blocks) == (1, 1)
    assert found.cost.components > 20


def test_validation_answers_with_what_is_wrong(client: Client) -> None:
    """The findings that a prediction would be refused for."""
    wrong = {**REQUEST, "histograms": [{**REQUEST["histograms"][0], "observables": ["pq(mu-)"]}]}
    with pytest.raises(barnwright.RequestError, match="pq") as caught:
        client.predict(wrong)
    found = client.validate(wrong)
    assert not found.is_valid
    assert found.violations == caught.value.violations


def test_the_async_client_has_the_same_answers(client: Client, server: Running) -> None:
    """Predictions side by side, a scan, lists, descriptions, validation."""

    async def ask() -> list[Any]:
        async with barnwright.connect_async(server.address) as asynchronous:
            calls = (
                asynchronous.predict(REQUEST),
                asynchronous.predict(CONSTANT),
                asynchronous.scan(CONSTANT, over={"beams.sqrt_s": [10.0, 20.0]}),
                asynchronous.processes(),
                asynchronous.describe("qed/compton"),
                asynchronous.validate(CONSTANT),
            )
            return list(await asyncio.gather(*calls))

    one, two, sweep, processes, description, validation = asyncio.run(ask())
    assert one.same_bits(client.predict(REQUEST))
    assert two.same_bits(client.predict(CONSTANT))
    assert np.array_equal(sweep.values, client.scan(CONSTANT, over={"beams.sqrt_s": [10.0, 20.0]}).values)
    assert processes == client.processes()
    assert description == client.describe("qed/compton")
    assert validation == client.validate(CONSTANT)


def test_an_async_client_can_be_awaited(server: Running) -> None:
    """That waits for the server."""

    async def ask() -> Any:
        asynchronous = await barnwright.connect_async(server.address)
        try:
            return await asynchronous.predict(CONSTANT)
        finally:
            await asynchronous.close()

    assert asyncio.run(ask()).status == "converged"
