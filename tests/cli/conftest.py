"""A request, the prediction that answers it, and a face that hands it out without calculating."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from barnwright import Prediction, Request, api
from barnwright.documents import ByName, Diagnostics, Histogram, Note, Run, Total

TOML = """
process = "qed/muon-pair"
[beams]
kind = "collider"
sqrt_s = 10.0
[[cuts]]
name = "acceptance"
observable = "abs(cos_theta(mu-, frame=cm))"
max = 0.95
[[histograms]]
name = "angle"
observables = ["cos_theta(mu-, frame=cm)"]
bins = [{ count = 2, low = -1.0, high = 1.0 }]
"""


def answer(request: Request, **changes: Any) -> Prediction:
    """A prediction with one histogram of two bins, of which one has no error."""
    histogram = Histogram.build(
        name="angle",
        observables=("cos_theta(mu-, frame=cm)",),
        axis_units=("",),
        edges=np.array([-1.0, 0.0, 1.0]),
        values=np.array([42.0, 42.5]),
        errors=np.array([0.3, np.nan]),
        unit="pb",
        error_kind="statistical",
        underflow=0.0,
        overflow=0.25,
        overflow_error=0.01,
    )
    fields: dict[str, Any] = {
        "request": request,
        "status": "converged",
        "method": "quadrature",
        "order": "tree",
        "notes": (Note.build(code="above_range", text="sqrt_s lies above the range of validity"),),
        "total": Total.build(value=84.321, error=0.07, unit="pb", error_kind="statistical"),
        "histograms": ByName([histogram]),
        "parameters": {"alpha": 0.0073},
        "masses": {"mu-": 0.1056583755},
        "constants": {},
        "sources": {},
        "versions": {"barnwright": "0.1.0"},
        "source_digests": {},
        "environment": "0" * 16,
        "diagnostics": Diagnostics.build(evaluations=400),
        "run": Run.build(seconds=0.1, executor="inline", computed_at="2026-01-01T00:00:00Z"),
    }
    return Prediction.build(**{**fields, **changes})


@pytest.fixture
def request_file(tmp_path: Path) -> str:
    """The path of a request in TOML."""
    file = tmp_path / "request.toml"
    file.write_text(TOML)
    return str(file)


@pytest.fixture
def answering(monkeypatch: pytest.MonkeyPatch) -> Callable[..., None]:
    """Let `predict` answer at once; keywords change the prediction, an exception is raised instead."""

    def install(error: BaseException | None = None, **changes: Any) -> None:
        def predict(fields: dict[str, Any]) -> Prediction:
            if error is not None:
                raise error
            return answer(Request.model_validate(fields), **changes)

        monkeypatch.setattr(api, "predict", predict)

    return install
