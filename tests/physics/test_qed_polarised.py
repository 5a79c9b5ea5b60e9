"""Polarised beams through QED: circular photons, longitudinal leptons, against published asymmetries."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise, product
from typing import Any

import mpmath
import numpy as np
import pytest

import barnwright

from .qed_processes import ALPHA, ELECTRON, MUON, TO_BARN

RADIUS_SQUARED = (ALPHA / ELECTRON) ** 2 * TO_BARN
SIGNS = list(product((1.0, -1.0), repeat=2))


@pytest.fixture(autouse=True)
def _digits() -> Iterator[None]:
    """Work in 40 digits, whatever another test asked for."""
    with mpmath.workdps(40):
        yield


def predict(process: str, beams: dict[str, Any], polarisation: tuple[float, float], **more: Any) -> Any:
    """The prediction in b of beams a and b so polarised, with pinned inputs."""
    fields = {"unit": "b", "parameters": {"alpha": ALPHA}, "masses": {"e-": ELECTRON}, **more}
    first, second = polarisation
    polarised = {**beams, "polarisation": {"beam_a": first, "beam_b": second}}
    return barnwright.predict(process=f"qed/{process}", beams=polarised, **fields)


@pytest.mark.parametrize("process", ["muon-pair", "tau-pair"])
@pytest.mark.parametrize("polarisation", [(-0.8, 0.3), (0.8, -0.3), (1.0, -1.0), (1.0, 1.0)])
def test_pairs_scale_with_one_minus_the_product(process: str, polarisation: tuple[float, float]) -> None:
    """Massless beams: σ = σ₀(1 − P₋P₊) for one photon, 0 for equal helicities, bin by bin, to 1e-12."""
    edges = [-1.0, -0.4, 0.1, 1.0]
    lepton = {"muon-pair": "mu-", "tau-pair": "tau-"}[process]
    angle = {"name": "c", "observables": [f"cos_theta({lepton})"], "bins": [{"edges": edges}]}
    asked = {"masses": {"e-": 0.0}, "histograms": [angle]}
    beams = {"kind": "collider", "sqrt_s": 10.0}
    plain, polarised = (predict(process, beams, one, **asked) for one in ((0.0, 0.0), polarisation))
    factor = 1 - polarisation[0] * polarisation[1]
    assert polarised.total.value == pytest.approx(factor * plain.total.value, rel=1e-12, abs=0)
    found, expected = polarised.histograms["c"].values, factor * plain.histograms["c"].values
    assert found == pytest.approx(expected, rel=1e-12, abs=0)


@pytest.mark.parametrize("sqrt_s", [0.22, 3.0])
def test_equal_helicities_cost_the_mass(sqrt_s: float) -> None:
    """With the electron's mass, equal helicities have 2m²/s of the total of opposite ones, from the exact currents."""
    beams = {"kind": "collider", "sqrt_s": sqrt_s}
    equal, opposite = (predict("muon-pair", beams, one).total.value for one in ((1.0, 1.0), (1.0, -1.0)))
    assert equal / opposite == pytest.approx(2 * ELECTRON**2 / sqrt_s**2, rel=1e-11, abs=0)


def compton_at_rest(energy: float, cosine: Any, product_of_polarisations: float) -> Any:
    """dσ/dΩ in b/sr of circular photons on electrons at rest, polarised along the photon's direction.

    r²/2 (k'/k)² [k'/k + k/k' − sin²θ − P ζ·(k cos θ + k')(1 − cos θ)/m] with ζ along k: F. W. Lipps, H. A. Tolhoek,
    Physica 20 (1954) 85 and 395; from memory.
    """
    k = mpmath.mpf(energy) / mpmath.mpf(ELECTRON)
    scattered = k / (1 + k * (1 - cosine))
    ratio = scattered / k
    spin = product_of_polarisations * (1 - cosine) * cosine * (k + scattered)
    return mpmath.mpf(RADIUS_SQUARED) / 2 * ratio**2 * (ratio + 1 / ratio - (1 - cosine**2) - spin)


@pytest.mark.parametrize("energy", [5e-5, 1.275e-3, 0.05])
@pytest.mark.parametrize("polarisation", [(1.0, 1.0), (1.0, -1.0), (-0.7, 0.4)])
def test_circular_photons_on_polarised_electrons(energy: float, polarisation: tuple[float, float]) -> None:
    """Bins of the photon's angle in the lab to 1e-10; helicity +1 of a target at rest is a spin against the photon."""
    edges = [0.0, 0.4, 1.2, 2.0, np.pi]
    angle = {"name": "angle", "observables": ["theta(gamma)"], "bins": [{"edges": edges}], "per": "bin"}
    beams = {"kind": "fixed_target", "energy": energy}
    found = predict("compton", beams, polarisation, histograms=[angle]).histograms["angle"].values
    both = -polarisation[0] * polarisation[1]
    for a, b, value in zip(edges, edges[1:], found, strict=False):
        ends = [mpmath.cos(mpmath.mpf(b)), mpmath.cos(mpmath.mpf(a))]
        expected = 2 * mpmath.pi * mpmath.quad(lambda c: compton_at_rest(energy, c, both), ends)
        assert value == pytest.approx(float(expected), rel=1e-10, abs=0)


def test_backscattering_of_a_circular_laser() -> None:
    """The polarised total of 1.165 eV photons on 250 GeV electrons to 1e-9, with x = 4 p·k/m².

    σ = 2πα²/(xm²) {(1 − 4/x − 8/x²) ln(1 + x) + 1/2 + 8/x − 1/(2(1 + x)²)
    + P_e P_γ [(1 + 2/x) ln(1 + x) − 5/2 + 1/(1 + x) − 1/(2(1 + x)²)]}:
    I. F. Ginzburg et al., Nucl. Instrum. Meth. 219 (1984) 5; from memory.
    """
    energy, photon, mass = mpmath.mpf(250), mpmath.mpf("1.165e-9"), mpmath.mpf(ELECTRON)
    x = 2 * photon * (energy + mpmath.sqrt(energy**2 - mass**2)) / mass**2
    log = mpmath.log(1 + x)
    plain = (1 - 4 / x - 8 / x**2) * log + mpmath.mpf(1) / 2 + 8 / x - 1 / (2 * (1 + x) ** 2)
    spin = (1 + 2 / x) * log - mpmath.mpf(5) / 2 + 1 / (1 + x) - 1 / (2 * (1 + x) ** 2)
    beams = {"kind": "collider", "energies": {"e-": 250.0, "gamma": 1.165e-9}, "along_z": "e-"}
    for first, second in ((0.0, 0.0), (1.0, 0.85), (1.0, -0.85)):
        expected = 2 * mpmath.pi * mpmath.mpf(ALPHA) ** 2 / (x * mass**2) * (plain + first * second * spin)
        total = predict("compton", beams, (first, second)).total.value
        assert total == pytest.approx(float(expected * mpmath.mpf(TO_BARN)), rel=1e-9, abs=0)


@pytest.mark.parametrize(("process", "electron"), [("moller", "each(e-)"), ("bhabha", "e-")])
def test_analysing_power_of_a_polarimeter(process: str, electron: str) -> None:
    """(σ₊₊ − σ₊₋)/(σ₊₊ + σ₊₋) = sin²θ(7 + cos²θ)/(3 + cos²θ)², 7/9 at 90°, massless, bin by bin to 1e-10.

    A. M. Bincer, Phys. Rev. 107 (1957) 1434; from memory.
    """
    observable, edges = f"cos_theta({electron}, frame=cm)", [-0.6, -0.1, 0.1, 0.5, 0.6]
    asked = {
        "masses": {"e-": 0.0},
        "cuts": [{"name": "seen", "observable": f"abs({observable})", "max": 0.6}],
        "histograms": [{"name": "c", "observables": [observable], "bins": [{"edges": edges}], "per": "bin"}],
    }
    beams = {"kind": "collider", "sqrt_s": 2.0}
    equal, opposite = (predict(process, beams, (1.0, p), **asked).histograms["c"].values for p in (1.0, -1.0))
    power = (equal - opposite) / (equal + opposite)

    def shape(c: Any) -> Any:
        return (3 + c**2) ** 2 / ((1 - c**2) ** 2 if process == "moller" else (1 - c) ** 2)

    def analysed(c: Any) -> Any:
        return shape(c) * (1 - c**2) * (7 + c**2) / (3 + c**2) ** 2

    for (a, b), value in zip(pairwise(edges), power, strict=True):
        expected = mpmath.quad(analysed, [a, b]) / mpmath.quad(shape, [a, b])
        assert value == pytest.approx(float(expected), rel=1e-10, abs=0)


@pytest.mark.parametrize("sqrt_s", [0.23, 0.5, 20.0])
@pytest.mark.parametrize("polarisation", [*SIGNS, (0.5, 0.9)])
def test_pairs_from_circular_photons(sqrt_s: float, polarisation: tuple[float, float]) -> None:
    """J_z = 0 and 2 apart: dσ/dc ∝ 1 − β⁴ and β²(1 − c²)(2 − β²(1 − c²)), over (1 − β²c²)², to 1e-10.

    D. L. Borden, D. A. Bauer, D. O. Caldwell, Phys. Rev. D 50 (1994) 4499; from memory.
    """
    share = (2 * mpmath.mpf(MUON) / mpmath.mpf(sqrt_s)) ** 2
    square = 1 - share
    edges = [-1.0, 0.2, 0.9]

    def density(c: Any, product_of_polarisations: float) -> Any:
        sine = (1 - c) * (1 + c)
        shapes = (1 - square**2, square * sine * (2 - square * sine))
        weights = (1 + product_of_polarisations, 1 - product_of_polarisations)
        numerator = sum(weight * shape for weight, shape in zip(weights, shapes, strict=True))
        scale = 2 * mpmath.pi * mpmath.mpf(ALPHA) ** 2 * mpmath.sqrt(square) / mpmath.mpf(sqrt_s) ** 2
        return scale * numerator / (share + square * sine) ** 2

    p = predict(
        "breit-wheeler-muon",
        {"kind": "collider", "sqrt_s": sqrt_s},
        polarisation,
        masses={"mu-": MUON},
        histograms=[{"name": "c", "observables": ["cos_theta(mu-)"], "bins": [{"edges": edges}], "per": "bin"}],
    )
    both = polarisation[0] * polarisation[1]
    for (a, b), value in zip(pairwise(edges), p.histograms["c"].values, strict=True):
        ends = [a, *(c for c in (-0.999, -0.99, -0.9, 0.0) if a < c < b), b]
        expected = mpmath.quad(lambda c: density(c, both), ends) * mpmath.mpf(TO_BARN)
        assert value == pytest.approx(float(expected), rel=1e-10, abs=0)


def test_annihilation_of_equal_helicities_far_above_the_mass() -> None:
    """Chirality: massless, electrons and positrons of equal helicities do not annihilate into photons."""
    asked = {
        "masses": {"e-": 0.0},
        "cuts": [{"name": "seen", "observable": "abs(cos_theta(each(gamma), frame=cm))", "max": 0.8}],
    }
    beams = {"kind": "collider", "sqrt_s": 2.0}
    plain, opposite, equal = (
        predict("photon-pair", beams, one, **asked).total.value for one in ((0.0, 0.0), (1.0, -1.0), (1.0, 1.0))
    )
    assert opposite == pytest.approx(2 * plain, rel=1e-12, abs=0)
    assert equal == 0.0


def test_slow_pairs_annihilate_in_the_singlet() -> None:
    """At rest only the singlet gives two photons: equal helicities (a singlet along the axis) have all of it."""
    beams = {"kind": "fixed_target", "kinetic_energy": 1e-13, "target": "e-"}
    plain, equal, opposite = (
        predict("photon-pair", beams, one).total.value for one in ((0.0, 0.0), (1.0, 1.0), (1.0, -1.0))
    )
    assert equal == pytest.approx(2 * plain, rel=1e-8, abs=0)
    assert opposite < 1e-8 * plain


def test_left_and_right_muons_scatter_as_parity_wants() -> None:
    """Electron-muon: both helicities reversed change nothing; equal ones scatter more at large angles."""
    beams = {"kind": "fixed_target", "energy": 3.0}
    cut = [{"name": "hard", "observable": "kinetic_energy(mu-)", "min": 1.0}]
    totals = {one: predict("electron-muon", beams, one, cuts=cut).total.value for one in SIGNS}
    assert totals[1.0, 1.0] == pytest.approx(totals[-1.0, -1.0], rel=1e-13, abs=0)
    assert totals[1.0, -1.0] == pytest.approx(totals[-1.0, 1.0], rel=1e-13, abs=0)
    plain = predict("electron-muon", beams, (0.0, 0.0), cuts=cut).total.value
    assert sum(totals.values()) / 4 == pytest.approx(plain, rel=1e-12, abs=0)
    assert totals[1.0, 1.0] > totals[1.0, -1.0]
