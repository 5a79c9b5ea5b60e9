"""e- e+ -> mu- mu+ against the published total, by two methods and 50-digit arithmetic."""

from __future__ import annotations

from typing import Any

import mpmath
import numpy as np
import pytest
from scipy import constants

import barnwright

MUON = 0.1056583755
ELECTRON = 0.00051099895
ALPHA = constants.fine_structure
TO_NANOBARN = 1e37 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2

MASSES = {"mu-": MUON, "e-": ELECTRON}


def predict(sqrt_s: float, method: str | None = None, **more: Any) -> barnwright.Prediction:
    """The prediction with pinned inputs, in nb."""
    fields: dict[str, Any] = {"masses": MASSES, "parameters": {"alpha": ALPHA}, **more}
    accuracy = {"method": method} if method else {}
    beams = {"kind": "collider", "sqrt_s": sqrt_s}
    return barnwright.predict(process="qed/muon-pair", unit="nb", beams=beams, accuracy=accuracy, **fields)


def published_total(sqrt_s: float, muon: float = MUON, electron: float = ELECTRON) -> float:
    """σ = 4πα²/3s · β_μ/β_e · (1 + 2m_μ²/s)(1 + 2m_e²/s) in nb, in 50 digits.

    Source: Peskin and Schroeder, An Introduction to Quantum Field Theory, eq. (5.13), with the electron's mass kept by
    the same argument for its current; from memory.
    """
    mpmath.mp.dps = 50
    s, m, n = mpmath.mpf(sqrt_s) ** 2, mpmath.mpf(muon) ** 2, mpmath.mpf(electron) ** 2
    beta = mpmath.sqrt(1 - 4 * m / s) / mpmath.sqrt(1 - 4 * n / s)
    total = 4 * mpmath.pi * mpmath.mpf(ALPHA) ** 2 / (3 * s) * beta * (1 + 2 * m / s) * (1 + 2 * n / s)
    return float(total * mpmath.mpf(TO_NANOBARN))


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
@pytest.mark.parametrize("sqrt_s", [2 * MUON * (1 + 1e-8), 0.22, 1.0, 10.0])
def test_total_by_two_methods(sqrt_s: float, method: str) -> None:
    """The total is the published one to 1e-10, and within its own error bound."""
    total = predict(sqrt_s, method).total
    assert total.value == pytest.approx(published_total(sqrt_s), rel=1e-10)
    assert total.error < 1e-10 * total.value
    assert predict(sqrt_s, method).method == method


def test_far_above_threshold() -> None:
    """Massless, σ·s is 4πα²/3, which the PDG Review's cross-section plots quote as 86.8 nb GeV² (from memory)."""
    total = predict(100.0, masses={"mu-": 0.0, "e-": 0.0}).total
    assert f"{total.value * 100.0**2:.4f}".startswith("86.8")
    assert total.value * 100.0**2 == pytest.approx(4 * np.pi * ALPHA**2 / 3 * TO_NANOBARN, rel=1e-13)


def test_angular_distribution() -> None:
    """Massless, dσ/dΩ = α²/4s (1 + cos²θ) (Peskin and Schroeder, eq. (5.15), from memory), bin by bin in nb/sr."""
    edges = np.linspace(-1, 1, 9)
    histogram = {
        "name": "angle",
        "observables": ["cos_theta(mu-, frame=cm)"],
        "bins": [{"edges": [float(e) for e in edges]}],
        "per": "solid_angle",
    }
    for method in ("closed_form", "quadrature"):
        p = predict(10.0, method, masses={"mu-": 0.0, "e-": 0.0}, histograms=[histogram])
        mean = 1 + np.diff(edges**3) / (3 * np.diff(edges))
        expected = ALPHA**2 / (4 * 100.0) * mean * TO_NANOBARN
        assert p.histograms["angle"].values == pytest.approx(expected, rel=1e-12)
        assert p.histograms["angle"].unit == "nb/sr"


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_bins_of_pt_by_another_variable(method: str) -> None:
    """Every bin of pt, with beams of 7 and 4 GeV and a cut in the lab, against an integral over pt itself."""
    beams = {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}}
    edges = [0.0, 0.5, 1.0, 2.0, 3.0, 4.0, 5.0, 5.2, 5.29]
    p = barnwright.predict(
        process="qed/muon-pair",
        beams=beams,
        unit="nb",
        masses=MASSES,
        parameters={"alpha": ALPHA},
        histograms=[{"name": "pt", "observables": ["pt(mu-)"], "bins": [{"edges": edges}], "per": "bin"}],
        accuracy={"method": method},
    )
    mpmath.mp.dps = 30
    mass_squared, electron_squared = mpmath.mpf(MUON) ** 2, mpmath.mpf(ELECTRON) ** 2
    p_a, p_b = (mpmath.sqrt(mpmath.mpf(e) ** 2 - electron_squared) for e in (7, 4))
    s = 2 * electron_squared + 2 * (28 + p_a * p_b)
    q = mpmath.sqrt(s / 4 - mass_squared)

    def density(pt: mpmath.mpf) -> mpmath.mpf:
        """dσ/dpt: both hemispheres of dσ/dcos θ times |dcos θ/dpt| (pt = q sin θ)."""
        sine = pt / q
        cosine_squared = 1 - sine**2
        beta_i, beta_f = mpmath.sqrt(1 - 4 * electron_squared / s), q / mpmath.sqrt(s / 4)
        shape = 1 + beta_i**2 * beta_f**2 * cosine_squared + 4 * (mass_squared + electron_squared) / s
        per_cosine = mpmath.pi * mpmath.mpf(ALPHA) ** 2 / (2 * s) * beta_f / beta_i * shape
        return 2 * per_cosine * sine / mpmath.sqrt(cosine_squared) / q

    for low, high, content in zip(edges, edges[1:], p.histograms["pt"].values, strict=False):
        expected = mpmath.quad(density, [low, high]) * mpmath.mpf(TO_NANOBARN)
        assert content == pytest.approx(float(expected), rel=1e-10)
