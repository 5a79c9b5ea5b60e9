"""gamma e- -> gamma e- against Klein and Nishina, in the target's rest frame and in the lab of a laser on a beam."""

from __future__ import annotations

from typing import Any

import mpmath
import numpy as np
import pytest
import xraylib
from scipy import constants

import barnwright

ELECTRON = constants.value("electron mass energy equivalent in MeV") * 1e-3
ALPHA = constants.fine_structure
TO_BARN = 1e28 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2
RADIUS_SQUARED = (ALPHA / ELECTRON) ** 2 * TO_BARN
PHOTON = 0.001275


def predict(energy: float, method: str | None = None, **more: Any) -> barnwright.Prediction:
    """The prediction for a photon of ``energy`` GeV on an electron at rest, in b."""
    return barnwright.predict(
        process="qed/compton",
        beams={"kind": "fixed_target", "energy": energy},
        unit=more.pop("unit", "b"),
        masses={"e-": ELECTRON},
        parameters={"alpha": ALPHA},
        accuracy={"method": method} if method else {},
        **more,
    )


def klein_nishina(energy: float) -> float:
    """The total in b, 60 digits. O. Klein and Y. Nishina, Z. Phys. 52 (1929) 853, as in Heitler; from memory."""
    mpmath.mp.dps = 60
    k = mpmath.mpf(energy) / mpmath.mpf(ELECTRON)
    log = mpmath.log(1 + 2 * k)
    bracket = (1 + k) / k**2 * (2 * (1 + k) / (1 + 2 * k) - log / k) + log / (2 * k) - (1 + 3 * k) / (1 + 2 * k) ** 2
    return float(2 * mpmath.pi * mpmath.mpf(RADIUS_SQUARED) * bracket)


def per_solid_angle(cosine: mpmath.mpf, energy: float = PHOTON) -> mpmath.mpf:
    """dσ/dΩ in b/sr in the rest frame of the electron: r²/2 (k'/k)² (k'/k + k/k' − sin²θ)."""
    k = mpmath.mpf(energy) / mpmath.mpf(ELECTRON)
    ratio = 1 / (1 + k * (1 - cosine))
    return mpmath.mpf(RADIUS_SQUARED) / 2 * ratio**2 * (ratio + 1 / ratio - (1 - cosine**2))


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
@pytest.mark.parametrize("exponent", range(-9, 5))
def test_total_from_1_ev_to_10_tev(exponent: int, method: str) -> None:
    """The total of Klein and Nishina to 1e-10, over thirteen decades, within its own error bound of 1e-10."""
    total = predict(10.0**exponent, method).total
    assert total.value == pytest.approx(klein_nishina(10.0**exponent), rel=1e-10)
    assert total.error < 1e-10 * total.value


@pytest.mark.parametrize("kev", [1.0, 10.0, 100.0, 511.0, 1275.0, 10000.0])
def test_total_against_xraylib(kev: float) -> None:
    """xraylib's own Klein–Nishina total, to 1e-7: its constants are older than CODATA 2022."""
    assert predict(kev * 1e-6).total.value == pytest.approx(xraylib.CS_KN(kev), rel=1e-7)


def test_thomson_limit() -> None:
    """At 1 eV the total is Thomson's 0.6652 b (CODATA, through scipy.constants) times 1 − 2k/m."""
    thomson = constants.value("Thomson cross section") * 1e28
    expected = thomson * (1 - 2e-9 / ELECTRON)
    assert predict(1e-9).total.value == pytest.approx(expected, rel=1e-9)


def test_compton_edge() -> None:
    """No electron recoils above 2k²/(m + 2k): the bin beyond is an exact 0, the one below is not."""
    edge = 2 * PHOTON**2 / (ELECTRON + 2 * PHOTON)
    edges = [0.0, 1e-4, 0.999 * edge, edge * (1 + 1e-9), 1.5e-3]
    histogram = {"name": "recoil", "observables": ["kinetic_energy(e-)"], "bins": [{"edges": edges}], "per": "bin"}
    recoil = predict(PHOTON, histograms=[histogram]).histograms["recoil"]
    assert recoil.values[-1] == 0.0
    assert recoil.errors[-1] == 0.0
    assert recoil.values[-2] > 0.0
    assert recoil.overflow == 0.0


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_photon_spectrum(method: str) -> None:
    """Bins of the scattered photon's energy against an integral over that energy (dΩ = 2π m dk'/k'²)."""
    mpmath.mp.dps = 30
    low = PHOTON / (1 + 2 * PHOTON / ELECTRON)
    edges = [float(e) for e in np.linspace(low * 0.9, PHOTON * 1.02, 12)]
    histogram = {"name": "energy", "observables": ["energy(gamma)"], "bins": [{"edges": edges}], "per": "bin"}
    p = predict(PHOTON, method, histograms=[histogram])

    def density(energy: mpmath.mpf) -> mpmath.mpf:
        cosine = 1 - mpmath.mpf(ELECTRON) * (1 / energy - 1 / mpmath.mpf(PHOTON))
        return per_solid_angle(cosine) * 2 * mpmath.pi * mpmath.mpf(ELECTRON) / energy**2

    lowest = mpmath.mpf(PHOTON) / (1 + 2 * mpmath.mpf(PHOTON) / mpmath.mpf(ELECTRON))
    for a, b, content in zip(edges, edges[1:], p.histograms["energy"].values, strict=False):
        ends = [max(mpmath.mpf(a), lowest), min(mpmath.mpf(b), mpmath.mpf(PHOTON))]
        assert content == pytest.approx(float(mpmath.quad(density, ends)), rel=1e-10)


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_lab_angle_in_mb_per_steradian(method: str) -> None:
    """dσ/dΩ of the photon in the lab, mb/sr, in bins of the polar angle, against an integral over the lab cosine."""
    mpmath.mp.dps = 30
    edges = [0.0, 0.1, 0.5, 1.0, 2.0, 3.0, np.pi]
    histogram = {
        "name": "angle",
        "observables": ["theta(gamma)"],
        "bins": [{"edges": edges}],
        "per": "solid_angle",
    }
    found = predict(PHOTON, method, unit="mb", histograms=[histogram]).histograms["angle"]
    assert found.unit == "mb/sr"
    for a, b, value in zip(edges, edges[1:], found.values, strict=False):
        top, bottom = mpmath.cos(mpmath.mpf(a)), mpmath.cos(mpmath.mpf(b))
        mean = mpmath.quad(per_solid_angle, [bottom, top]) / (top - bottom)
        assert value == pytest.approx(float(1000 * mean), rel=1e-10)


def test_backscattered_laser_light() -> None:
    """1.165 eV photons head on 5 GeV electrons: photons up to k(E + p)/(E − p + 2k), and the spectrum below the edge.

    The spectrum is checked by an integral over y = 1 − p·k'/p·k, in which the law is
    dσ/dy = 2πr²/x [1/(1 − y) + 1 − y − 4r(1 − r)], r = y/(x(1 − y)), x = 2 p·k/m²
    (I. F. Ginzburg et al., Nucl. Instrum. Meth. 205 (1983) 47, from memory).
    """
    mpmath.mp.dps = 40
    energy, photon, mass = mpmath.mpf(5), mpmath.mpf("1.165e-9"), mpmath.mpf(ELECTRON)
    momentum = mpmath.sqrt(energy**2 - mass**2)
    edge = photon * (energy + momentum) / (energy - momentum + 2 * photon)
    edges = [0.001, 0.01, 0.05, 0.07, float(edge) * (1 - 1e-6), float(edge) * (1 + 1e-9), 1.0]
    p = barnwright.predict(
        process="qed/compton",
        beams={"kind": "collider", "energies": {"e-": 5.0, "gamma": 1.165e-9}, "along_z": "e-"},
        unit="b",
        masses={"e-": ELECTRON},
        parameters={"alpha": ALPHA},
        histograms=[{"name": "photon", "observables": ["energy(gamma)"], "bins": [{"edges": edges}], "per": "bin"}],
    )
    spectrum = p.histograms["photon"]
    assert spectrum.values[-1] == 0.0
    assert spectrum.overflow == 0.0
    product = photon * (energy + momentum)
    x = 2 * product / mass**2

    def density(y: mpmath.mpf) -> mpmath.mpf:
        r = y / (x * (1 - y))
        bracket = 1 / (1 - y) + 1 - y - 4 * r * (1 - r)
        return 2 * mpmath.pi * mpmath.mpf(RADIUS_SQUARED) / x * bracket

    def share(photon_energy: float) -> mpmath.mpf:
        """y of a photon energy in the lab: linear between k (y = 0) and the edge (y = x/(1 + x))."""
        fraction = (min(mpmath.mpf(photon_energy), edge) - photon) / (edge - photon)
        return fraction * x / (1 + x)

    for a, b, content in zip(edges[:-2], edges[1:-1], spectrum.values[:-1], strict=True):
        assert content == pytest.approx(float(mpmath.quad(density, [share(a), share(b)])), rel=1e-9)
