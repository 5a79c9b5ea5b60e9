"""Documents that several tests of this folder use."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from barnwright.documents import (
    ByName,
    Derived,
    DerivedBins,
    Diagnostics,
    Histogram,
    Note,
    Part,
    Prediction,
    Request,
    Run,
    Total,
)

FULL = """
schema = "barnwright.request/1"
process = "electroweak/muon-pair"
contributions = ["photon", "z", "interference"]
unit = "pb"
seed = 1
[beams]
kind = "collider"
sqrt_s = 91.1876
along_z = "e-"
polarisation = { "e-" = -0.8, "e+" = 0.3 }
[parameters]
z_mass = 91.1876
[masses]
"mu-" = 0.0
[[cuts]]
name = "acceptance"
observable = "abs(cos_theta(mu-, frame=cm))"
max = 0.95
[[histograms]]
name = "angle"
observables = ["cos_theta(mu-, frame=cm)"]
bins = [{ count = 20, low = -1.0, high = 1.0 }]
per = "value"
[[variations]]
name = "left"
beams.polarisation = { "e-" = -1.0 }
[[variations]]
name = "right"
beams.polarisation = { "e-" = 1.0 }
[[derived]]
name = "A_FB"
kind = "asymmetry"
observable = "cos_theta(mu-, frame=cm)"
at = 0.0
[[derived]]
name = "A_LR"
kind = "asymmetry"
between = ["left", "right"]
[accuracy]
relative = 1e-3
per_bin = 0.01
bin_floor = 1e-6
max_evaluations = 20_000_000
max_seconds = 120
rounds = 12
method = "quadrature"
"""


@pytest.fixture
def full_toml() -> str:
    """The request of the contract, as TOML."""
    return FULL


@pytest.fixture
def small() -> dict[str, Any]:
    """A small good request, to be spoiled."""
    return {
        "process": "qed/muon-pair",
        "beams": {"kind": "collider", "sqrt_s": 10.0},
        "histograms": [
            {"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 4, "low": -1, "high": 1}]}
        ],
    }


def make_histogram(**changes: Any) -> Histogram:
    """A histogram with four bins per value, of which one has no error."""
    fields: dict[str, Any] = {
        "name": "angle",
        "observables": ("cos_theta(mu-)",),
        "edges": np.array([-1.0, -0.5, 0.0, 0.5, 1.0]),
        "values": np.array([4.0, 2.0, 2.0, 4.0]),
        "errors": np.array([0.4, 0.2, np.nan, 0.4]),
        "unit": "pb",
        "error_kind": "statistical",
        "underflow": 0.0,
        "overflow": 0.25,
    }
    return Histogram.build(**{**fields, **changes})


def make_prediction(request: Request, **changes: Any) -> Prediction:
    """A prediction with one of everything."""
    total = Total.build(value=6.0, error=0.5, unit="pb", error_kind="statistical", degrees_of_freedom=15)
    histograms = ByName([make_histogram()])
    bins = DerivedBins.build(name="angle", values=np.array([0.1, 0.2, 0.3, 0.4]), errors=np.full(4, np.nan))
    derived = Derived.build(name="A_LR", value=0.25, error=0.01, error_kind="statistical", histograms=ByName([bins]))
    fields: dict[str, Any] = {
        "request": request,
        "status": "converged",
        "method": "monte_carlo",
        "order": "tree",
        "notes": (Note.build(code="above_range", text="sqrt_s lies above the range of validity"),),
        "total": total,
        "histograms": histograms,
        "derived": ByName([derived]),
        "variations": ByName([Part.build(name="left", total=total, histograms=histograms, parameters={"z": 91.0})]),
        "parameters": {"alpha": 0.0073, "scheme": "alpha", "loops": 0, "massive": True},
        "masses": {"mu-": 0.1056583755},
        "constants": {"hbarc2": 3.89379372e8},
        "sources": {"alpha": "CODATA 2022"},
        "versions": {"barnwright": "0.1.0"},
        "source_digests": {"barnwright-qed": "0" * 64},
        "environment": "numpy 2.4, x86-64-v4",
        "replicates": np.random.default_rng(3).normal(1.0, 0.1, (16, 9)),
        "diagnostics": Diagnostics.build(evaluations=400, largest_bin_shares={"angle": np.full(4, 0.01)}),
        "run": Run.build(seconds=0.1, executor="inline", computed_at="2026-01-01T00:00:00Z"),
    }
    return Prediction.build(**{**fields, **changes})


@pytest.fixture
def prediction(full_toml: str) -> Prediction:
    """A prediction with one of everything."""
    return make_prediction(Request.from_toml(full_toml))
