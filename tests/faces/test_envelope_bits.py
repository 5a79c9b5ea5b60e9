"""An envelope has the same bits through Python, the command line and gRPC."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

import pytest
from service.running import serving

import barnwright
from barnwright import Prediction
from barnwright.cli import main

REQUEST: dict[str, Any] = {
    "process": "qed/muon-pair",
    "beams": {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}},
    "cuts": [{"name": "acceptance", "observable": "abs(cos_theta(mu-))", "max": 0.87}],
    "histograms": [{"name": "pt", "observables": ["pt(mu-)"], "bins": [{"count": 10, "low": 0.0, "high": 5.5}]}],
    "variations": [
        {"name": "wide", "cuts": [{"name": "acceptance", "max": 0.9}]},
        {"name": "strong", "parameters": {"alpha": 0.0078}},
        {"name": "open", "cuts": [{"name": "acceptance", "min": 0.5, "max": None}]},
        {"name": "nothing", "parameters": {"alpha": 0.0}},
    ],
    "derived": [
        {"name": "spread", "kind": "envelope", "of": ["wide", "strong", "open"]},
        {"name": "R", "kind": "ratio", "between": ["wide", "nothing"]},
    ],
}


def test_all_faces_give_the_same_ends(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    """Ends of the total and of every bin, a limit that is taken away, and the note on what cannot be divided."""
    file = tmp_path / "request.json"
    file.write_text(json.dumps(REQUEST))
    here = barnwright.predict(REQUEST)
    spread = here.derived["spread"]
    assert here.total.value is not None
    assert spread.low is not None
    assert spread.high is not None
    assert spread.low <= here.total.value < spread.high
    assert main(["predict", str(file), "--json"]) == 0
    command = Prediction.from_json(capsys.readouterr().out)
    with serving() as server, server.client() as client:
        remote = client.predict(REQUEST)
    assert command.same_bits(here)
    assert remote.same_bits(here)
    assert [note.code for note in here.notes] == ["undefined_ratio"]
