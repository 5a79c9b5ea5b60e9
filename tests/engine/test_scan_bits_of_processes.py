"""A point of a scan keeps its bits, bounds included: searched edges, crossings in the middle, peaks of every width."""

from __future__ import annotations

from typing import Any

import pytest

import barnwright

ENERGIES = [3.0, 11.0, 4.0, 40.0]
CUT = {"observable": "cos_theta(1, frame=cm)", "max": 0.99}


def bins(*observables: str, edges: list[float]) -> dict[str, Any]:
    """One histogram."""
    return {"name": observables[0], "observables": list(observables), "bins": [{"edges": edges} for _ in observables]}


CASES: dict[str, dict[str, Any]] = {
    "peaks whose width changes": {
        "process": "qed/electron-muon",
        "cuts": [CUT],
        "histograms": [bins("q2(beam_a, e-)", edges=[0.1, 1.0, 5.0])],
    },
    "peaks and nothing else": {"process": "qed/bhabha", "cuts": [{**CUT, "observable": "cos_theta(e-, frame=cm)"}]},
    "a crossing in the middle": {
        "process": "electroweak/muon-pair",
        "histograms": [bins("rapidity(mu-)", edges=[-1.0, 0.0, 0.7]), bins("pt(mu-)", edges=[0.0, 1.0, 2.0])],
        "derived": [{"name": "A", "kind": "asymmetry", "observable": "delta_eta(mu-, mu+)", "at": 0.0}],
    },
    "identical particles": {
        "process": "qed/photon-pair",
        "cuts": [{"observable": "abs(cos_theta(each(gamma), frame=cm))", "max": 0.97}],
        "histograms": [bins("pt(each(gamma))**2", edges=[0.2, 1.0, 1.9])],
    },
    "closed form with small bins": {
        "process": "qed/tau-pair",
        "histograms": [bins("energy(tau-) - energy(tau+)", edges=[-1.0, -1e-7, 0.0, 1e-5, 2.0])],
    },
    "a two-dimensional map": {
        "process": "qed/breit-wheeler",
        "histograms": [bins("pt(e-)", "theta(e-)", edges=[0.1, 0.7, 1.3])],
    },
}


@pytest.mark.parametrize("beams", ["sqrt_s", "energies"])
@pytest.mark.parametrize("case", CASES)
def test_a_point_keeps_its_bits(case: str, beams: str) -> None:
    """By whatever road, each of four points is its own prediction to the last bit."""
    asked = {**CASES[case], "beams": {"kind": "collider", "sqrt_s": 1.0}}
    key, values = "beams.sqrt_s", ENERGIES
    if beams == "energies":
        asked["beams"] = {"kind": "collider", "energies": {"beam_a": 7.0, "beam_b": 4.0}}
        key = "beams.energies.beam_b"
    sweep = barnwright.scan(asked, over={key: values})
    for value, point in zip(values, sweep, strict=True):
        assert point.same_bits(barnwright.predict(barnwright.Request.accept(asked).merged({key: value})))
