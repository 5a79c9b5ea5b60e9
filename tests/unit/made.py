"""Predictions made by hand, to be drawn."""

from __future__ import annotations

from typing import Any

import numpy as np

from barnwright.documents import (
    ByName,
    Derived,
    DerivedBins,
    Diagnostics,
    Histogram,
    Part,
    Prediction,
    Request,
    Run,
    Total,
)


def total(value: float | None, error: float | None = 0.1) -> Total:
    """A total in pb."""
    return Total.build(value=value, error=error, unit="pb", error_kind="statistical")


def histogram(values: Any, **changes: Any) -> Histogram:
    """A histogram of an angle without errors."""
    values = np.array(values, dtype=float)
    fields: dict[str, Any] = {
        "name": "angle",
        "observables": ("cos_theta(mu-)",),
        "axis_units": ("",),
        "edges": np.linspace(-1.0, 1.0, len(values) + 1),
        "values": values,
        "errors": np.full(values.shape, np.nan),
        "unit": "pb",
        "error_kind": "statistical",
        "underflow": 0.0,
        "overflow": 0.0,
    }
    return Histogram.build(**{**fields, **changes})


def part(name: str, values: Any) -> Part:
    """A part with one histogram."""
    return Part.build(name=name, total=total(1.0), histograms=ByName([histogram(values)]))


def bins(name: str, values: Any, **ends: Any) -> Derived:
    """A derived quantity of one histogram."""
    arrays = {key: np.array(entry, dtype=float) for key, entry in {"values": values, **ends}.items()}
    found = DerivedBins.build(name="angle", errors=np.full(len(arrays["values"]), 0.01), **arrays)
    return Derived.build(name=name, value=0.1, error=0.01, error_kind="statistical", histograms=ByName([found]))


def prediction(values: Any, request: dict[str, Any] | None = None, **changes: Any) -> Prediction:
    """A prediction with one histogram of these values."""
    asked = {"process": "electroweak/muon-pair", "beams": {"kind": "collider", "sqrt_s": 60.0}, **(request or {})}
    fields: dict[str, Any] = {
        "request": Request.model_validate(asked),
        "status": "converged",
        "method": "quadrature",
        "order": "tree",
        "total": total(84.321, 0.07),
        "histograms": ByName([histogram(values)]),
        "parameters": {},
        "masses": {},
        "constants": {},
        "sources": {},
        "versions": {},
        "source_digests": {},
        "environment": "",
        "diagnostics": Diagnostics.build(evaluations=400),
        "run": Run.build(seconds=0.1, executor="inline", computed_at="2026-01-01T00:00:00Z"),
    }
    return Prediction.build(**{**fields, **changes})
