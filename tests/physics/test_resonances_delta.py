"""pi+ p -> pi+ p through the Delta(1232)++: unitarity, the formula in many digits, angles and the data's size."""

from __future__ import annotations

from typing import Any

import mpmath
import numpy as np
import pytest
from barnwright_resonances.delta import process
from scipy import constants

import barnwright
from barnwright.testing import check_process

PION, PROTON = 0.13957039, 0.93827209
MASSES = {"pi+": PION, "p": PROTON}
TO_MILLIBARN = 1e31 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2
DELTA = {"mass": 1.232, "width": 0.117, "range": 5.0677}


def predict(beams: dict[str, Any], method: str | None = None, **more: Any) -> barnwright.Prediction:
    """The prediction with pinned numbers in mb."""
    parameters = {**DELTA, **more.pop("parameters", {})}
    accuracy = {"method": method} if method else {}
    return barnwright.predict(
        process="resonances/delta",
        unit="mb",
        beams=beams,
        masses=MASSES,
        parameters=parameters,
        accuracy=accuracy,
        **more,
    )


def at(sqrt_s: float) -> dict[str, Any]:
    """Beams with this energy in the cm."""
    return {"kind": "collider", "sqrt_s": sqrt_s}


def momentum(energy: Any) -> Any:
    """k in the cm in GeV."""
    s, first, second = mpmath.mpf(energy) ** 2, mpmath.mpf(PION), mpmath.mpf(PROTON)
    return mpmath.sqrt((s - (first + second) ** 2) * (s - (first - second) ** 2) / (4 * s))


def wave(energy: float) -> Any:
    """T = M Γ(s)/(M² − s − i M Γ(s)) with the barrier of Blatt and Weisskopf for l = 1.

    Source: PDG Review, "Resonances": M Γ(s) ∝ ρ n², ρ = 2k/√s, n² = k²/(1 + R²k²); from memory.
    """
    mass, width, reach = (mpmath.mpf(value) for value in DELTA.values())
    s = mpmath.mpf(energy) ** 2

    def share(at_energy: Any) -> Any:
        k = momentum(at_energy)
        return 2 * k / at_energy * k**2 / (1 + (reach * k) ** 2)

    absorbed = mass * width * share(mpmath.mpf(energy)) / share(mass)
    return absorbed / mpmath.mpc(mass**2 - s, -absorbed)


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
@pytest.mark.parametrize("sqrt_s", [1.0781, 1.10, 1.20, 1.2319, 1.232, 1.26, 1.35])
def test_total_is_the_optical_theorem(sqrt_s: float, method: str) -> None:
    """σ = (4π/k) Im f(0), f(0) = 2T/k for J = 3/2 and l = 1, by both methods and in 40 digits to 1e-12."""
    with mpmath.workdps(40):
        forward = 2 * wave(sqrt_s) / momentum(sqrt_s)
        expected = float(4 * mpmath.pi / momentum(sqrt_s) * mpmath.im(forward) * mpmath.mpf(TO_MILLIBARN))
    assert predict(at(sqrt_s), method).total.value == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize("reach", [0.0, 5.0, 20.0])
@pytest.mark.parametrize(("mass", "width"), [(1.232, 0.117), (1.21, 0.08), (1.3, 0.2)])
def test_unitarity_at_the_peak(mass: float, width: float, reach: float) -> None:
    """At √s = M the total is 8π/k², the most that a wave of J = 3/2 can give, whatever width and range are."""
    total = predict(at(mass), parameters={"mass": mass, "width": width, "range": reach}).total
    assert total.value == pytest.approx(float(8 * mpmath.pi / momentum(mass) ** 2) * TO_MILLIBARN, rel=1e-13)


def test_angles() -> None:
    """dσ/dΩ in the cm is σ (1 + 3 cos²θ)/8π: bin averages are those of the polynomial to 1e-12, by both methods."""
    edges = np.array([-1.0, -0.6, -0.1, 0.1, 0.5, 1.0])
    histogram = {
        "name": "a",
        "observables": ["cos_theta(pi+, frame=cm)"],
        "bins": [{"edges": edges.tolist()}],
        "per": "solid_angle",
    }
    averages = np.diff(edges + edges**3) / np.diff(edges)
    for method in ("closed_form", "quadrature"):
        p = predict(at(1.22), method, histograms=[histogram])
        np.testing.assert_allclose(p.histograms["a"].values, p.total.value / (8 * np.pi) * averages, rtol=1e-12)


def test_size_of_the_measured_peak() -> None:
    """Pions of 190 MeV on protons at rest: 8π/k² is about 190 mb, where measurements peak at some 200 mb.

    Source: PDG Review, plots of cross sections, pi+ p total near 1.23 GeV (200 to 210 mb); from memory.
    """
    totals = [
        predict({"kind": "fixed_target", "kinetic_energy": energy}).total.value for energy in (0.1, 0.18, 0.19, 0.3)
    ]
    assert max(totals) in totals[1:3]
    assert 185 < totals[2] < 215
    assert totals[0] < 0.5 * totals[2]
    assert totals[3] < 0.6 * totals[2]


def test_p_wave_at_threshold() -> None:
    """Towards threshold σ falls as k⁴."""
    threshold = PION + PROTON
    near = [threshold * (1 + share) for share in (1e-9, 4e-9)]
    first, second = (predict(at(energy)).total.value for energy in near)
    growth = float((momentum(near[1]) / momentum(near[0])) ** 4)
    assert second / first == pytest.approx(growth, rel=1e-7)


def test_lab_angle_of_the_proton() -> None:
    """A cut in the lab on the recoil proton is answered too, by quadrature, with a share between 0 and 1."""
    beams = {"kind": "fixed_target", "kinetic_energy": 0.19}
    cut = {"name": "seen", "observable": "theta(p)", "max": 0.5}
    p = predict(beams, cuts=[cut])
    assert 0 < p.total.value < predict(beams).total.value
    assert p.total.error < 1e-9 * p.total.value


def test_mass_below_threshold_is_refused() -> None:
    """A Delta that cannot decay to pi+ p has no momentum at its peak: an error that names the mass."""
    with pytest.raises(barnwright.RequestError, match=r"^parameters\.mass: got 1\.0, expected .*greater than 1\.08"):
        predict(at(1.2), parameters={"mass": 1.0})


def test_it_keeps_the_contract_and_says_what_a_user_must_know() -> None:
    """Load checks pass, the closed form against the law among them; references, validity and cautions are stated."""
    check_process(process)
    assert process.references
    assert process.order == "tree"
    assert process.valid is not None
    assert any("radiation-protection expert" in caution for caution in process.cautions)
