"""Leptons on leptons: Møller, Bhabha and Mott, on a target at rest and in collisions, slow and fast."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from itertools import pairwise
from typing import Any

import mpmath
import numpy as np
import pytest

import barnwright
from barnwright.kinematics import Collision

from .qed_processes import ALPHA, COUPLING, ELECTRON, ENTRIES, MUON, TO_BARN

RADIUS_SQUARED = (ALPHA / ELECTRON) ** 2 * TO_BARN


@pytest.fixture(autouse=True)
def _digits() -> Iterator[None]:
    """Work in 40 digits, whatever another test asked for."""
    with mpmath.workdps(40):
        yield


def moller(epsilon: Any, gamma: Any) -> Any:
    """dσ/dε in b of electrons on electrons at rest, ε ≤ ½ the share of the kinetic energy that the slower one gets.

    2πr²/(β²(γ − 1)) [1/ε² + 1/(1 − ε)² + ((γ − 1)/γ)² − (2γ − 1)/γ² · 1/(ε(1 − ε))]: C. Møller, Ann. Phys. 14 (1932)
    531, as in ICRU Report 37 (1984), eq. (2.11); from memory.
    """
    beta_squared = 1 - 1 / gamma**2
    both = epsilon * (1 - epsilon)
    bracket = 1 / epsilon**2 + 1 / (1 - epsilon) ** 2 + ((gamma - 1) / gamma) ** 2 - (2 * gamma - 1) / gamma**2 / both
    return 2 * mpmath.pi * mpmath.mpf(RADIUS_SQUARED) / (beta_squared * (gamma - 1)) * bracket


def bhabha(epsilon: Any, gamma: Any) -> Any:
    """dσ/dε in b of positrons on electrons at rest, ε the share of the kinetic energy that the electron gets.

    2πr²/(γ − 1) [1/(β²ε²) − B₁/ε + B₂ − B₃ε + B₄ε²] with y = 1/(γ + 1), B₁ = 2 − y², B₂ = (1 − 2y)(3 + y²),
    B₃ = (1 − 2y)² + (1 − 2y)³, B₄ = (1 − 2y)³: H. J. Bhabha, Proc. R. Soc. Lond. A 154 (1936) 195, as in ICRU Report 37
    (1984), eq. (2.12); from memory.
    """
    y = 1 / (gamma + 1)
    z = 1 - 2 * y
    terms = 1 / ((1 - 1 / gamma**2) * epsilon**2) - (2 - y**2) / epsilon + z * (3 + y**2)
    bracket = terms - (z**2 + z**3) * epsilon + z**3 * epsilon**2
    return 2 * mpmath.pi * mpmath.mpf(RADIUS_SQUARED) / (gamma - 1) * bracket


ON_A_TARGET = [("moller", moller), ("bhabha", bhabha)]
KINETIC = [1e-9, 1e-6, 1e-4, 5e-4, 1e-3, 0.01, 1.0, 1e3]
"""GeV."""


def at_rest(kinetic: float, mass: float, target: float) -> Collision:
    """A projectile with this kinetic energy in GeV on a target at rest, √s in two floats."""
    total, excess = mass + target, 2 * kinetic * target
    sqrt_s = np.sqrt(total * total + excess)
    correction = excess / (sqrt_s + total) - (sqrt_s - total)
    return Collision(np.array([[sqrt_s]]), np.array([[correction]]), np.ones((1, 1)))


@pytest.mark.parametrize(("name", "published"), ON_A_TARGET)
@pytest.mark.parametrize("kinetic", KINETIC)
def test_published_spectra_point_by_point(name: str, published: Callable[..., Any], kinetic: float) -> None:
    """dσ/dε = |M|²/(32πm(T + 2m)) by both laws to 2e-13, from 1 eV to 1 TeV; ε is (1 − cos θ)/2 in the cm."""
    cosines = 1 - 2 * np.array([1e-6, 0.001, 0.1, 0.27, 0.4, 0.5])
    shares = (1 - cosines) / 2
    event = ENTRIES[name].event(at_rest(kinetic, ELECTRON, ELECTRON), cosines)
    gamma = 1 + mpmath.mpf(kinetic) / mpmath.mpf(ELECTRON)
    for law in ENTRIES[name].laws:
        found = law.squared(event, COUPLING)[0] / (32 * np.pi * ELECTRON * (kinetic + 2 * ELECTRON)) * TO_BARN
        for share, value in zip(shares, found, strict=True):
            assert value == pytest.approx(float(published(mpmath.mpf(float(share)), gamma)), rel=2e-13, abs=0)


def predict(process: str, beams: dict[str, Any], masses: dict[str, float], **more: Any) -> barnwright.Prediction:
    """The prediction in b with pinned inputs."""
    fields = {"unit": "b", "parameters": {"alpha": ALPHA}, **more}
    return barnwright.predict(process=f"qed/{process}", beams=beams, masses=masses, **fields)


@pytest.mark.parametrize("name", ["moller", "bhabha"])
def test_knocked_on_electrons_of_a_source(name: str) -> None:
    """Electrons above 100 keV from a 1.5 MeV beam, in bins of their energy, against an integral over ε, to 1e-10."""
    kinetic, edges = 1.5e-3, [1e-4, 2e-4, 4e-4, 7e-4]
    electron = 'leading(e-, by="energy", rank=2)' if name == "moller" else "e-"
    observable = f"kinetic_energy({electron})"
    beams = {"kind": "fixed_target", "kinetic_energy": kinetic, "target": "beam_a"}
    if name == "moller":
        beams["target"] = "beam_b"
    p = predict(
        name,
        beams,
        {"e-": ELECTRON},
        cuts=[{"name": "seen", "observable": observable, "min": edges[0]}],
        histograms=[{"name": "energy", "observables": [observable], "bins": [{"edges": edges}], "per": "bin"}],
    )
    gamma, published = 1 + mpmath.mpf(kinetic) / mpmath.mpf(ELECTRON), dict(ON_A_TARGET)[name]
    for low, high, content in zip(edges, edges[1:], p.histograms["energy"].values, strict=False):
        ends = [mpmath.mpf(edge) / mpmath.mpf(kinetic) for edge in (low, high)]
        expected = mpmath.quad(lambda share: published(share, gamma), ends)
        assert content == pytest.approx(float(expected), rel=1e-10, abs=0)


MASSLESS = {
    "moller": lambda c: 2 * (3 + c**2) ** 2 / (1 - c**2) ** 2,
    "bhabha": lambda c: (
        (1 + ((1 + c) / 2) ** 2) / ((1 - c) / 2) ** 2 - 2 * ((1 + c) / 2) ** 2 / ((1 - c) / 2) + (1 + c**2) / 2
    ),
}
"""dσ/dΩ over α²/2s far above the mass, either electron counted: Møller (1932); Bhabha (1936), Peskin and Schroeder,
problem 5.2; from memory."""


@pytest.mark.parametrize("name", ["moller", "bhabha"])
def test_massless_limit_in_collisions(name: str) -> None:
    """Massless at 10 GeV, bins of cos θ are integrals of the textbook forms to 1e-10; with the mass, to 1e-6."""
    edges = [-0.9, -0.2, 0.3, 0.8, 0.9]
    electron = "each(e-)" if name == "moller" else "e-"
    observable = f"cos_theta({electron}, frame=cm)"
    asked = {
        "cuts": [{"name": "acceptance", "observable": f"abs({observable})", "max": 0.9}],
        "histograms": [{"name": "angle", "observables": [observable], "bins": [{"edges": edges}], "per": "bin"}],
    }
    beams = {"kind": "collider", "sqrt_s": 10.0}
    massless = predict(name, beams, {"e-": 0.0}, **asked).histograms["angle"].values
    massive = predict(name, beams, {"e-": ELECTRON}, **asked).histograms["angle"].values
    scale = 2 * np.pi * ALPHA**2 / (2 * 100) * TO_BARN
    expected = [scale * float(mpmath.quad(MASSLESS[name], [a, b])) for a, b in pairwise(edges)]
    assert massless == pytest.approx(expected, rel=1e-10, abs=0)
    assert massive == pytest.approx(expected, rel=1e-6, abs=0)


@pytest.mark.parametrize("name", ["bhabha", "moller", "electron-muon"])
def test_open_poles_are_refused(name: str) -> None:
    """Without a cut the total diverges, and the error shows one that would do."""
    with pytest.raises(barnwright.RequestError, match="cuts: got 'none', expected a cut") as caught:
        predict(name, {"kind": "collider", "sqrt_s": 5.0}, {})
    assert caught.value.violations[0].nearest is not None


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_compton_without_a_mass(method: str) -> None:
    """Massless, with a cut on the electron: ∫ (πα²/s)(y + 1/y) dcos θ, y = (1 + cos θ)/2, to 1e-11; else refused."""
    beams, masses = {"kind": "collider", "sqrt_s": 2.0}, {"e-": 0.0}
    with pytest.raises(barnwright.RequestError, match="cuts: got 'none', expected a cut that keeps u"):
        predict("compton", beams, masses)
    cut = {"name": "seen", "observable": "cos_theta(e-, frame=cm)", "max": 0.9}
    found = predict("compton", beams, masses, cuts=[cut], accuracy={"method": method}).total
    low = 0.05
    expected = np.pi * ALPHA**2 / 4 * (1 - low**2 - 2 * np.log(low)) * TO_BARN
    assert found.value == pytest.approx(expected, rel=1e-11, abs=0)


HEAVY = 2.0**30
LIGHT = (ELECTRON + HEAVY) - HEAVY
"""GeV: a muon whose recoil is 1e-12 of the energy, and the electron's mass, rounded so that their sum is exact."""


@pytest.mark.parametrize("kinetic", [1e-9, 1e-5, 1e-3, 0.02])
def test_mott_scattering_on_a_muon_that_does_not_recoil(kinetic: float) -> None:
    """dσ/dΩ = α²(1 − β² sin²(θ/2))/(4β²p² sin⁴(θ/2)) by both laws, to 1e-10 (N. F. Mott, 1929; from memory)."""
    cosines = np.array([-0.99, -0.5, 0.0, 0.6, 0.999])
    entry = ENTRIES["electron-muon"]._replace(masses=(LIGHT, HEAVY, LIGHT, HEAVY))
    event = entry.event(at_rest(kinetic, LIGHT, HEAVY), cosines)
    square, sines = kinetic * (kinetic + 2 * LIGHT), (1 - cosines) / 2
    beta_squared = square / (kinetic + LIGHT) ** 2
    expected = ALPHA**2 * (1 - beta_squared * sines) / (4 * beta_squared * square * sines**2)
    for law in entry.laws:
        found = law.squared(event, COUPLING)[0] / (64 * np.pi**2 * HEAVY**2)
        assert found == pytest.approx(expected, rel=1e-10, abs=0)


def test_rutherford_scattering_of_slow_electrons() -> None:
    """At 1 µeV, dσ/dΩ = α²/(16 T² sin⁴(θ/2)) to 1e-10 (E. Rutherford, Phil. Mag. 21 (1911) 669)."""
    kinetic, cosines = 1e-15, np.array([-1.0, -0.3, 0.5, 0.99])
    entry = ENTRIES["electron-muon"]._replace(masses=(LIGHT, HEAVY, LIGHT, HEAVY))
    event = entry.event(at_rest(kinetic, LIGHT, HEAVY), cosines)
    expected = ALPHA**2 / (16 * kinetic**2 * ((1 - cosines) / 2) ** 2)
    for law in entry.laws:
        assert law.squared(event, COUPLING)[0] / (64 * np.pi**2 * HEAVY**2) == pytest.approx(expected, rel=1e-10, abs=0)


def test_recoil_of_a_muon_at_rest() -> None:
    """Massless electrons of 2 GeV on muons at rest, mb/sr of the lab in bins of the angle, to 1e-10.

    α² cos²(θ/2)/(4E² sin⁴(θ/2)) · E'/E · [1 + Q²/2M² tan²(θ/2)], E' = E/(1 + (E/M)(1 − cos θ)), Q² = 4EE' sin²(θ/2): a
    point particle with the moment of Dirac (M. N. Rosenbluth, Phys. Rev. 79 (1950) 615; from memory).
    """
    energy, mass = mpmath.mpf(2), mpmath.mpf(MUON)
    edges = [0.1, 0.3, 0.8, 1.6, 2.5, 3.1]
    angle = {"name": "angle", "observables": ["theta(e-)"], "bins": [{"edges": edges}], "per": "solid_angle"}
    cut = {"name": "seen", "observable": "theta(e-)", "min": edges[0]}
    beams = {"kind": "fixed_target", "energy": 2.0}
    p = predict("electron-muon", beams, {"e-": 0.0, "mu-": MUON}, unit="mb", cuts=[cut], histograms=[angle])

    def density(cosine: Any) -> Any:
        sine, scattered = (1 - cosine) / 2, energy / (1 + energy / mass * (1 - cosine))
        transfer = 4 * energy * scattered * sine
        bracket = 1 - sine + transfer / (2 * mass**2) * sine
        return mpmath.mpf(ALPHA) ** 2 / (4 * energy**2 * sine**2) * scattered / energy * bracket

    for a, b, value in zip(edges, edges[1:], p.histograms["angle"].values, strict=False):
        top, bottom = mpmath.cos(mpmath.mpf(a)), mpmath.cos(mpmath.mpf(b))
        mean = mpmath.quad(density, [bottom, top]) / (top - bottom)
        assert value == pytest.approx(float(1000 * mean * mpmath.mpf(TO_BARN)), rel=1e-10, abs=0)
