"""One request gives the same bits through Python, the command line, the command line with a server, and gRPC."""

from __future__ import annotations

import asyncio
import json
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest
from service.running import serving

import barnwright
from barnwright import Prediction

REQUEST: dict[str, Any] = {
    "process": "qed/muon-pair",
    "beams": {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}},
    "cuts": [{"name": "acceptance", "observable": "abs(cos_theta(mu-, frame=lab))", "max": 0.87}],
    "histograms": [
        {"name": "pt", "observables": ["pt(mu-)"], "bins": [{"count": 10, "low": 0.0, "high": 5.5}], "per": "value"}
    ],
    "derived": [{"name": "A_FB", "kind": "asymmetry", "observable": "cos_theta(mu-)", "at": 0.0}],
}


def on_the_command_line(file: Path, *options: str) -> Prediction:
    """The document that ``barnwright predict --json`` prints, from a process of its own."""
    command = [sys.executable, "-m", "barnwright", "predict", str(file), "--json", *options]
    done = subprocess.run(command, capture_output=True, text=True, check=True)
    return Prediction.from_json(done.stdout)


async def asynchronously(address: str, request: dict[str, Any]) -> Prediction:
    """The answer of the client for asyncio."""
    async with barnwright.connect_async(address) as client:
        return await client.predict(request)


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_all_faces_give_the_same_bits(method: str, tmp_path: Path) -> None:
    """Every face answers with the same document, ``run`` apart."""
    request = {**REQUEST, "accuracy": {"method": method}}
    file = tmp_path / "request.json"
    file.write_text(json.dumps(request))
    here = barnwright.predict(request)
    with serving() as server, server.client() as client:
        others = {
            "file": barnwright.predict(file),
            "command line": on_the_command_line(file),
            "command line with a server": on_the_command_line(file, "--server", server.address),
            "gRPC": client.predict(request),
            "gRPC, asyncio": asyncio.run(asynchronously(server.address, request)),
            "a point of a scan": client.scan(request, over={"beams.energies.e+": [3.0, 4.0]})[1],
        }
    bits = here.canonical_json()
    assert here.total.value
    assert [name for name, other in others.items() if other.canonical_json() != bits] == []
