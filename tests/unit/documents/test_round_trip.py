"""Any request and any prediction come back from their JSON as they were."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st

from barnwright.documents import ByName, Prediction, Request, Total, merge
from barnwright.errors import RequestError, Violation

from .conftest import FULL, make_histogram, make_prediction

SETTINGS = settings(derandomize=True, deadline=None, max_examples=60)

names = st.text(st.characters(codec="utf-8", exclude_categories=["Cc", "Cs"]), min_size=1, max_size=20)
numbers = st.floats(allow_nan=False, allow_infinity=False)
positive = st.floats(min_value=0, exclude_min=True, allow_infinity=False)
polarisations = st.dictionaries(names, st.floats(-1, 1), max_size=2)
values = st.booleans() | st.integers(-(2**53), 2**53) | numbers | names


@st.composite
def limits(draw: Any) -> dict[str, Any]:
    """A lower and an upper limit, or one of them."""
    low, high = sorted(draw(st.tuples(numbers, numbers)))
    if low == high:
        return {"min": low}
    return draw(st.sampled_from([{"min": low, "max": high}, {"max": high}, {"outside": [low, high]}]))


@st.composite
def axes(draw: Any) -> dict[str, Any]:
    """The bins of one axis."""
    edges = sorted(set(draw(st.lists(numbers, min_size=2, max_size=8))))
    if len(edges) < 2 or draw(st.booleans()):
        return {
            "count": draw(st.integers(1, 100)),
            "low": 1,
            "high": 2.5,
            "spacing": draw(st.sampled_from(["linear", "log"])),
        }
    return {"edges": edges}


beams = st.one_of(
    st.builds(lambda e, p: {"kind": "collider", "sqrt_s": e, "polarisation": p}, positive, polarisations),
    st.builds(lambda a, b: {"kind": "collider", "energies": {"e-": a, "e+": b}}, positive, positive),
    st.builds(lambda e, t: {"kind": "fixed_target", "momentum": e, "target": t}, positive, names),
    st.builds(lambda p: {"kind": "decay", "polarisation": p}, st.floats(-1, 1)),
)


@st.composite
def requests(draw: Any) -> dict[str, Any]:
    """A good request."""
    cuts = [{"observable": "x", **draw(limits())} for _ in range(draw(st.integers(0, 3)))]
    histograms = []
    for name in draw(st.lists(names, unique=True, max_size=3)):
        count = draw(st.integers(1, 2))
        histograms.append(
            {"name": name, "observables": ["x", "y"][:count], "bins": [draw(axes()) for _ in range(count)]}
        )
    return {
        "process": draw(names),
        "beams": draw(beams),
        "seed": draw(st.integers(0, 2**64 - 1)),
        "parameters": draw(st.dictionaries(names, values, max_size=4)),
        "masses": draw(st.dictionaries(names, st.floats(0, 1e6), max_size=3)),
        "cuts": cuts,
        "histograms": histograms,
        "variations": [
            {"name": name, "parameters": {"a": 1}} for name in draw(st.lists(names, unique=True, max_size=2))
        ],
    }


@SETTINGS
@given(requests())
def test_requests_come_back(data: dict[str, Any]) -> None:
    """A request, its canonical JSON and its digest mean the same, whatever road they take."""
    request = Request.model_validate(data)
    text = request.canonical_json()
    again = Request.from_json(text)
    assert again == request
    assert again.canonical_json() == text
    assert again.digest() == request.digest()
    assert Request.model_validate(request.given()) == request
    assert Request.from_json(request.model_dump_json()) == request
    assert request.merged({}) == request


@SETTINGS
@given(st.lists(st.none() | numbers, min_size=1, max_size=30), numbers, st.none() | positive)
def test_predictions_come_back(errors: list[float | None], value: float, error: float | None) -> None:
    """Every float has the same bits after its JSON, and None stays None."""
    known = np.array([np.nan if entry is None else abs(entry) for entry in errors])
    count = len(known)
    histogram = make_histogram(edges=np.arange(count + 1.0), values=np.full(count, value), errors=known)
    total = Total.build(value=value, error=error, unit="pb", error_kind="numerical_bound")
    made = make_prediction(Request.from_toml(FULL), total=total, histograms=ByName([histogram]), replicates=None)
    text = made.model_dump_json()
    again = Prediction.from_json(text)
    assert again == made
    assert again.same_bits(made)
    assert again.model_dump_json() == text
    assert again.total.value is not None
    assert math.copysign(1, again.total.value) == math.copysign(1, value)


anything = st.recursive(
    st.none() | st.booleans() | st.integers() | st.floats() | st.text(max_size=5),
    lambda inner: st.lists(inner, max_size=3) | st.dictionaries(st.text(max_size=5), inner, max_size=3),
    max_leaves=10,
)
PATHS = """
process processes formula contributions schema unit seed parameters masses accuracy accuracy.rounds
beams beams.kind beams.sqrt_s beams.polarisation cuts cuts[0] cuts[0].max
histograms histograms[0].bins histograms[0].bins[0].low
variations variations[0] variations[0].beams variations[1].name derived derived[0] derived[0].kind derived[1].between
"""
paths = st.sampled_from(PATHS.split())


@settings(SETTINGS, max_examples=300)
@given(st.dictionaries(paths, anything, max_size=4))
def test_nothing_but_findings(override: dict[str, Any]) -> None:
    """Whatever stands in a request, it is accepted or answered by findings, and an accepted one has its JSON."""
    request, violations = _examined(override)
    if request is not None:
        assert Request.from_json(request.canonical_json()) == request
        return
    fields = [violation.field for violation in violations]
    assert fields
    assert len(set(fields)) == len(fields)


def _examined(override: dict[str, Any]) -> tuple[Request | None, tuple[Violation, ...]]:
    try:
        return Request.model_validate(merge(Request.from_toml(FULL).given(), override)), ()
    except RequestError as error:
        return None, error.violations


def test_a_variation_of_a_cut_comes_back(small: dict[str, Any]) -> None:
    """What it leaves to the cut of its name is left in the canonical form too."""
    cut = {"name": "angle", "observable": "cos_theta(mu-)", "min": -0.5}
    varied = {"name": "wide", "cuts": [{"name": "angle", "max": 0.9}]}
    request = Request.model_validate({**small, "cuts": [cut], "variations": [varied]})
    again = Request.from_json(request.canonical_json())
    assert again.canonical_json() == request.canonical_json()
    (found,) = again.varied(again.variations[0]).cuts
    assert (found.observable, found.min, found.max) == ("cos_theta(mu-)", -0.5, 0.9)
