"""A point of a scan has the bits of a prediction asked for by itself, whatever its company."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

import barnwright

REQUESTS: dict[str, dict[str, Any]] = {
    "polar angle": {
        "process": "qed/muon-pair",
        "beams": {"kind": "collider", "sqrt_s": 10.0},
        "cuts": [{"observable": "abs(cos_theta(mu-))", "max": 0.9}],
        "histograms": [
            {"name": "c", "observables": ["cos_theta(mu-)"], "bins": [{"count": 9, "low": -1.0, "high": 1.0}]}
        ],
    },
    "searched edges": {
        "process": "qed/compton",
        "beams": {"kind": "fixed_target", "energy": 0.001},
        "unit": "mb",
        "histograms": [
            {"name": "e", "observables": ["energy(gamma)"], "bins": [{"count": 7, "low": 1e-5, "high": 0.002}]},
            {"name": "t", "observables": ["theta(e-)"], "bins": [{"count": 5, "low": 0.0, "high": 1.6}]},
        ],
        "derived": [{"name": "A", "kind": "asymmetry", "observable": "cos_theta(gamma)", "at": 0.0}],
    },
    "azimuth": {
        "process": "qed/muon-pair",
        "beams": {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}},
        "cuts": [{"observable": "phi(mu-) + theta(mu-)", "min": 0.5}],
    },
}
KEYS = {"polar angle": "beams.sqrt_s", "searched edges": "beams.energy", "azimuth": "beams.energies.e-"}
VALUES = {"polar angle": [0.2, 0.22, 5.0, 91.0], "searched edges": [1e-6, 0.001, 1.0, 50.0], "azimuth": [4.0, 7.0]}


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
@pytest.mark.parametrize("name", REQUESTS)
def test_a_point_keeps_its_bits(name: str, method: str) -> None:
    """Every point of a scan is the same document as the prediction of its request, notes and counts included."""
    request = {**REQUESTS[name], "accuracy": {"method": method}}
    sweep = barnwright.scan(request, over={KEYS[name]: VALUES[name]})
    for k, value in enumerate(VALUES[name]):
        alone = barnwright.predict(barnwright.Request.accept(request, **{KEYS[name]: value}))
        assert sweep[k].canonical_json() == alone.canonical_json()


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_many_points_keep_their_bits(method: str) -> None:
    """So do points of a scan that is large enough to be cut into blocks."""
    energies = np.geomspace(0.25, 300.0, 2500)
    request = {**REQUESTS["polar angle"], "accuracy": {"method": method}}
    sweep = barnwright.scan(request, over={"beams.sqrt_s": energies})
    assert len(list(sweep.answers.plan.ranges())) > 1
    for k in (0, 17, 2499):
        alone = barnwright.predict(request, **{"beams.sqrt_s": float(energies[k])})
        assert sweep[k].same_bits(alone)


def test_a_grid_has_the_first_key_slowest() -> None:
    """A grid over an energy and a parameter has the shape of its keys, and each point its own request."""
    over = {"parameters.alpha": [0.007, 0.008], "beams.sqrt_s": [1.0, 10.0, 100.0]}
    sweep = barnwright.scan(REQUESTS["polar angle"], over=over)
    assert sweep.values.shape == (2, 3)
    assert sweep.values[1] / sweep.values[0] == pytest.approx((0.008 / 0.007) ** 2, rel=1e-12)
    assert sweep[4].request.parameters == {"alpha": 0.008}
    assert sweep[4].request.beams.sqrt_s == 10.0
    assert sweep.points[4] == {"parameters.alpha": 0.008, "beams.sqrt_s": 10.0}
