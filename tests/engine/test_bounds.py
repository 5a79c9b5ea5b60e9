"""Bounds that must cover: narrow bins far from a pole that is mapped, edges of identical particles near their pole."""

from __future__ import annotations

from typing import Any

import mpmath
import pytest

import barnwright

BEAMS = {"kind": "collider", "sqrt_s": 200.0}


def bins(low: float, width: float) -> dict[str, Any]:
    """One bin of the cosine in the cm, as content."""
    edges = [low, low + width]
    return {"name": f"{width:g}", "observables": ["cos_theta(e-, frame=cm)"], "bins": [{"edges": edges}], "per": "bin"}


def exchanged(cosine: mpmath.mpf) -> mpmath.mpf:
    """∫ (1 + u²/s²)/(t/s)² dc of e- mu- -> e- mu- without masses: with x = 1 − c, 2/x² · (4 + (2 − x)²) integrated."""
    x = 1 - cosine
    return 16 / x + 8 * mpmath.log(x) - 2 * x


@pytest.mark.parametrize("width", [1e-1, 1e-3, 1e-5, 1e-7, 1e-9])
@pytest.mark.parametrize("low", [-0.83, -0.4, 0.3, 0.4, 0.7, 0.85])
def test_a_narrow_bin_far_from_a_mapped_pole(low: float, width: float) -> None:
    """The content of a bin of any width is covered by its bound, and right to what its edges allow."""
    cut = {"observable": "cos_theta(e-, frame=cm)", "max": 0.999}
    found = barnwright.predict(
        process="qed/electron-muon",
        beams=BEAMS,
        masses={"e-": 0.0, "mu-": 0.0},
        parameters={"alpha": 0.0073},
        cuts=[cut],
        histograms=[bins(low, width)],
        unit="GeV^-2",
    ).histograms[0]
    with mpmath.workdps(40):
        edges = [mpmath.mpf(edge) for edge in found.edges]
        scale = mpmath.pi * mpmath.mpf(0.0073) ** 2 / 40000
        exact = scale * (exchanged(edges[1]) - exchanged(edges[0])) / 2
        off = abs(mpmath.mpf(float(found.values[0])) - exact)
    assert off <= found.errors[0]
    assert found.errors[0] < (2e-13 + 4e-15 / width) * found.values[0]


@pytest.mark.parametrize("distance", [1e-4, 1e-6, 1e-8, 1e-10])
def test_identical_particles_close_to_their_poles(distance: float) -> None:
    """Limits on each(...) keep the digits of the distance from the pole; with 1/t² + 1/u² the integral is known."""
    formula = {
        "reaction": "e- e- -> e- e-",
        "squared_amplitude": "s**2/t**2 + s**2/u**2",
        "spin_colour": "averaged",
    }
    cut = {"observable": "abs(cos_theta(each(e-), frame=cm))", "max": 1 - distance}
    found = barnwright.predict(formula=formula, masses={"e-": 0.0}, beams=BEAMS, cuts=[cut], unit="GeV^-2")
    with mpmath.workdps(40):
        edge = mpmath.mpf(1 - distance)
        primitive = 4 * (1 / (1 - edge) - 1 / (1 + edge))
        exact = 2 * primitive / (2 * 32 * mpmath.pi * 40000)
        off = abs(mpmath.mpf(found.total.value) - exact)
    assert off <= found.total.error
    assert found.total.error < 1e-12 * found.total.value


def test_an_interference_close_to_the_mass() -> None:
    """s − M² keeps its digits: at a millionth of a millionth of a GeV above M the interference is linear in √s − M."""
    mass = 91.1876
    offsets = [2.0**-43, 2.0**-38, 2.0**-33]
    totals = [
        barnwright.predict(
            process="electroweak/muon-pair",
            beams={"kind": "collider", "sqrt_s": mass + offset},
            parameters={"z_mass": mass},
            contributions=["interference"],
        ).total.value
        / ((mass + offset) - mass)
        for offset in offsets
    ]
    assert totals[0] == pytest.approx(totals[2], rel=1e-9)
    assert totals[1] == pytest.approx(totals[2], rel=1e-9)
