"""Edges: bins close to an extremum, beyond the kinematic limit, cuts that remove everything, thresholds."""

from __future__ import annotations

from typing import Any

import mpmath
import numpy as np
import pytest

import barnwright

MUON = 0.1056583755
ELECTRON = 0.00051099895


def predict(sqrt_s: float = 10.0, method: str | None = None, **more: Any) -> barnwright.Prediction:
    """e- e+ -> mu- mu+ at rest in the lab, pinned masses, nb."""
    return barnwright.predict(
        process="qed/muon-pair",
        beams={"kind": "collider", "sqrt_s": sqrt_s},
        unit="nb",
        masses={"mu-": MUON, "e-": ELECTRON},
        accuracy={"method": method} if method else {},
        **more,
    )


def pt_histogram(edges: list[float]) -> dict[str, Any]:
    """Contents of bins of pt."""
    return {"name": "pt", "observables": ["pt(mu-)"], "bins": [{"edges": edges}], "per": "bin"}


def content_below_maximum(share: float) -> mpmath.mpf:
    """The part of the total with pt above (1 − share) of its maximum: dσ/dc ∝ 1 + 4(m²+n²)/s + (β_eβ_μ)² c²."""
    mpmath.mp.dps = 40
    s, m, n = mpmath.mpf(100), mpmath.mpf(MUON) ** 2, mpmath.mpf(ELECTRON) ** 2
    slope = (1 - 4 * m / s) * (1 - 4 * n / s)
    flat = 1 + 4 * (m + n) / s
    c = mpmath.sqrt(1 - (1 - mpmath.mpf(share)) ** 2)
    return (flat * c + slope * c**3 / 3) / (flat + slope / 3)


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
@pytest.mark.parametrize("share", [1e-4, 1e-6, 1e-8, 1e-10, 1e-12])
def test_bin_that_ends_just_below_the_maximum(share: float, method: str) -> None:
    """The last sliver of pt agrees with 40-digit arithmetic within its error, which grows as rounding demands."""
    mpmath.mp.dps = 40
    top = float(mpmath.sqrt(25 - mpmath.mpf(MUON) ** 2))
    edge = top * (1 - share)
    p = predict(method=method, histograms=[pt_histogram([0.0, edge, 6.0])])
    true_share = 1 - mpmath.mpf(edge) / mpmath.sqrt(25 - mpmath.mpf(MUON) ** 2)
    expected = float(content_below_maximum(float(true_share))) * p.total.value
    sliver, error = p.histograms["pt"].values[1], p.histograms["pt"].errors[1]
    assert abs(sliver - expected) <= error
    assert error <= max(1e-10, 100 * 2.3e-16 / share) * expected
    assert sum(p.histograms["pt"].values) == pytest.approx(p.total.value, rel=1e-14)


def test_bin_beyond_the_kinematic_limit() -> None:
    """A bin that no event reaches is an exact 0, with an exact error."""
    histogram = predict(histograms=[pt_histogram([0.0, 5.0, 5.5, 6.0])]).histograms["pt"]
    assert list(histogram.values[1:]) == [0.0, 0.0]
    assert list(histogram.errors[1:]) == [0.0, 0.0]


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_cut_that_removes_everything(method: str) -> None:
    """A cut that nothing can pass gives 0 and a note that says so."""
    p = predict(method=method, cuts=[{"name": "hard", "observable": "pt(mu-)", "min": 5.5}])
    assert (p.total.value, p.total.error, p.status) == (0.0, 0.0, "converged")
    assert "cuts_exclude_everything" in [note.code for note in p.notes]


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_below_threshold(method: str) -> None:
    """Below the threshold of the final state the answer is 0 with a note that names the threshold."""
    p = predict(0.2, method)
    assert (p.total.value, p.total.error, p.status) == (0.0, 0.0, "converged")
    note = next(note for note in p.notes if note.code == "below_threshold")
    assert "0.2113" in note.text


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_exactly_at_threshold(method: str) -> None:
    """At the threshold there is no phase space: 0."""
    assert predict(2 * MUON, method).total.value == 0.0


def test_edge_equal_to_a_cut() -> None:
    """A bin edge at a cut's threshold: the bins on the cut's side hold the total, the others are exact zeros."""
    histogram = {
        "name": "angle",
        "observables": ["cos_theta(mu-)"],
        "bins": [{"edges": [-1.0, -0.95, 0.0, 0.95, 1.0]}],
        "per": "bin",
    }
    cut = {"name": "acceptance", "observable": "abs(cos_theta(mu-))", "max": 0.95}
    p = predict(cuts=[cut], histograms=[histogram])
    values = p.histograms["angle"].values
    assert values[0] == values[3] == 0.0
    assert values[1] + values[2] == pytest.approx(p.total.value, rel=1e-14)


def test_crack() -> None:
    """A crack takes out exactly what a histogram has between its ends."""
    edges = [-1.0, 0.2, 0.3, 1.0]
    histogram = {"name": "c", "observables": ["cos_theta(mu-)"], "bins": [{"edges": edges}], "per": "bin"}
    whole = predict(histograms=[histogram])
    cut = {"name": "crack", "observable": "cos_theta(mu-)", "outside": [0.2, 0.3]}
    cracked = predict(cuts=[cut])
    assert cracked.total.value == pytest.approx(whole.total.value - whole.histograms["c"].values[1], rel=1e-13)


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_azimuth(method: str) -> None:
    """Bins of the azimuth share the total evenly; a sector times a polar range factorises; mixed cuts meet 1e-6."""
    sector: dict[str, Any] = {"name": "phi", "observables": ["phi(mu-)"], "per": "bin"}
    sector["bins"] = [{"edges": [-3.0, -1.0, 0.0, 0.5, 3.0]}]
    plane = {
        "name": "plane",
        "observables": ["phi(mu-)", "cos_theta(mu-)"],
        "bins": [{"edges": [0.0, 1.0, 2.0]}, {"edges": [-1.0, 0.0, 0.5]}],
        "per": "bin",
    }
    polar = {"name": "c", "observables": ["cos_theta(mu-)"], "bins": [{"edges": [-1.0, 0.0, 0.5]}], "per": "bin"}
    p = predict(method=method, histograms=[sector, plane, polar])
    total = p.total.value
    assert p.histograms["phi"].values == pytest.approx(np.array([2.0, 1.0, 0.5, 2.5]) / (2 * np.pi) * total, rel=1e-12)
    assert p.histograms["plane"].values == pytest.approx(
        np.outer([1.0, 1.0], p.histograms["c"].values) / (2 * np.pi), rel=1e-11
    )


def test_azimuth_and_polar_angle_in_one_cut() -> None:
    """theta + phi above 1: each polar angle keeps the share of azimuths that the cut leaves, to 1e-6."""
    p = predict(cuts=[{"name": "slanted", "observable": "theta(mu-) + phi(mu-)", "min": 1.0}])
    whole = predict().total.value
    mpmath.mp.dps = 20
    s, m, n = mpmath.mpf(100), mpmath.mpf(MUON) ** 2, mpmath.mpf(ELECTRON) ** 2
    slope, flat = (1 - 4 * m / s) * (1 - 4 * n / s), 1 + 4 * (m + n) / s

    def density(theta: mpmath.mpf) -> mpmath.mpf:
        share = (mpmath.pi - max(1 - theta, -mpmath.pi)) / (2 * mpmath.pi)
        return (flat + slope * mpmath.cos(theta) ** 2) * mpmath.sin(theta) * share

    expected = mpmath.quad(density, [0, mpmath.pi]) / (2 * flat + 2 * slope / 3) * whole
    assert p.total.value == pytest.approx(float(expected), rel=1e-6)
    assert abs(p.total.value - float(expected)) <= p.total.error + 1e-12 * whole
