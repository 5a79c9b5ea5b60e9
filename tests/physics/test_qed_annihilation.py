"""Two photons from a pair, and a pair from two photons: Dirac, Breit and Wheeler, from rest to high energies."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import mpmath
import numpy as np
import pytest
from scipy import constants

import barnwright

from .qed_processes import ALPHA, COUPLING, ELECTRON, ENTRIES, MUON, TAU, TO_BARN, collision

RADIUS_SQUARED = (ALPHA / ELECTRON) ** 2 * TO_BARN


@pytest.fixture(autouse=True)
def _digits() -> Iterator[None]:
    """Work in 50 digits, whatever another test asked for."""
    with mpmath.workdps(50):
        yield


def predict(process: str, beams: dict[str, Any], method: str | None = None, **more: Any) -> barnwright.Prediction:
    """The prediction in b with pinned inputs."""
    fields: dict[str, Any] = {
        "masses": {"e-": ELECTRON} if "e-" in ENTRIES[process].process.reaction else {},
        "parameters": {"alpha": ALPHA},
        "accuracy": {"method": method} if method else {},
        **more,
    }
    return barnwright.predict(process=f"qed/{process}", beams=beams, unit="b", **fields)


def dirac(kinetic: float) -> Any:
    """σ in b for a positron of ``kinetic`` GeV on an electron at rest, γ in units of m.

    πr²/(γ + 1) [(γ² + 4γ + 1)/(γ² − 1) ln(γ + √(γ² − 1)) − (γ + 3)/√(γ² − 1)]: P. A. M. Dirac, Proc. Camb. Phil. Soc.
    26 (1930) 361, as in W. Heitler, The Quantum Theory of Radiation (1954), § 27; from memory.
    """
    excess = mpmath.mpf(kinetic) / mpmath.mpf(ELECTRON)
    gamma, square = 1 + excess, excess * (excess + 2)
    root = mpmath.sqrt(square)
    bracket = (gamma**2 + 4 * gamma + 1) / square * mpmath.log(gamma + root) - (gamma + 3) / root
    return mpmath.pi * mpmath.mpf(RADIUS_SQUARED) / (gamma + 1) * bracket


def breit_and_wheeler(sqrt_s: float, mass: float) -> Any:
    """σ in b of two photons into a pair, β the velocity of the leptons in the cm.

    πr²/2 (1 − β²) [(3 − β⁴) ln((1 + β)/(1 − β)) − 2β(2 − β²)]: G. Breit, J. A. Wheeler, Phys. Rev. 46 (1934) 1087; from
    memory.
    """
    share = (2 * mpmath.mpf(mass) / mpmath.mpf(sqrt_s)) ** 2
    beta = mpmath.sqrt(1 - share)
    bracket = (3 - beta**4) * mpmath.log((1 + beta) ** 2 / share) - 2 * beta * (2 - beta**2)
    return mpmath.pi / 2 * (mpmath.mpf(ALPHA) / mpmath.mpf(mass)) ** 2 * mpmath.mpf(TO_BARN) * share * bracket


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
@pytest.mark.parametrize("exponent", range(-12, 5, 2))
def test_annihilation_in_flight(exponent: int, method: str) -> None:
    """Dirac's total to 1e-10, from 1 meV to 10 TeV, within its own error bound."""
    beams = {"kind": "fixed_target", "kinetic_energy": 10.0**exponent, "target": "e-"}
    total = predict("photon-pair", beams, method).total
    assert total.value == pytest.approx(float(dirac(10.0**exponent)), rel=1e-10, abs=0)
    assert total.error < 1e-10 * total.value


def test_rate_of_slow_positrons() -> None:
    """σv → πr²c = 7.48e-15 cm³/s (Dirac's rate at rest), to 1e-9 at 1 meV."""
    kinetic = 1e-12
    total = predict("photon-pair", {"kind": "fixed_target", "kinetic_energy": kinetic, "target": "e-"}).total.value
    velocity = np.sqrt(kinetic * (kinetic + 2 * ELECTRON)) / (kinetic + ELECTRON)
    rate = total * 1e-24 * velocity * constants.c * 100
    assert rate == pytest.approx(np.pi * RADIUS_SQUARED * 1e-24 * constants.c * 100, rel=1e-9, abs=0)
    assert f"{rate:.2e}" == "7.48e-15"


def test_annihilation_far_above_the_mass() -> None:
    """dσ/dcos θ = (2πα²/s)(1 + cos²θ)/sin²θ over one hemisphere (Peskin and Schroeder, eq. (5.107), from memory)."""
    beams = {"kind": "collider", "sqrt_s": 10.0}
    edges = [0.0, 0.3, 0.8, 0.95]
    angle = {"name": "angle", "observables": ["abs(cos_theta(each(gamma)))"], "bins": [{"edges": edges}], "per": "bin"}
    cut = {"name": "acceptance", "observable": "abs(cos_theta(each(gamma)))", "max": 0.95}
    for method in ("closed_form", "quadrature"):
        p = predict("photon-pair", beams, method, masses={"e-": 0.0}, histograms=[angle], cuts=[cut])
        integral = np.diff([2 * np.arctanh(c) - c for c in edges])
        expected = 2 * np.pi * ALPHA**2 / 100 * TO_BARN * integral
        assert p.histograms["angle"].values == pytest.approx(2 * expected, rel=1e-11, abs=0)
        assert p.total.value == pytest.approx(expected.sum(), rel=1e-11, abs=0)


@pytest.mark.parametrize("process", ["photon-pair", "breit-wheeler"])
def test_massless_electrons_need_a_cut(process: str) -> None:
    """With the electron's mass the total is finite; without it the poles are open, and the error names a cut."""
    beams = {"kind": "collider", "sqrt_s": 10.0}
    assert predict(process, beams).status == "converged"
    with pytest.raises(barnwright.RequestError, match=r"cuts: got 'none', expected a cut .* away from"):
        predict(process, beams, masses={"e-": 0.0})


@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
@pytest.mark.parametrize("factor", [1 + 1e-10, 1.001, 1.4, 30.0, 1e4])
@pytest.mark.parametrize(
    ("process", "mass"), [("breit-wheeler", ELECTRON), ("breit-wheeler-muon", MUON), ("breit-wheeler-tau", TAU)]
)
def test_pairs_from_photons(process: str, mass: float, factor: float, method: str) -> None:
    """Breit and Wheeler's total to 1e-10, within its own error bound, from the threshold to 10 000 times its energy."""
    sqrt_s = 2 * mass * factor
    lepton = {"breit-wheeler": "e-", "breit-wheeler-muon": "mu-", "breit-wheeler-tau": "tau-"}[process]
    total = predict(process, {"kind": "collider", "sqrt_s": sqrt_s}, method, masses={lepton: mass}).total
    assert total.value == pytest.approx(float(breit_and_wheeler(sqrt_s, mass)), rel=1e-10, abs=0)
    assert total.error < 1e-10 * total.value


def test_largest_cross_section_of_pairs() -> None:
    """The largest total is 0.256 of Thomson's, at β = 0.701 (Breit and Wheeler; from memory)."""
    velocities = np.linspace(0.69, 0.71, 81)
    energies = 2 * ELECTRON / np.sqrt(1 - velocities**2)
    request = {"process": "qed/breit-wheeler", "beams": {"kind": "collider", "sqrt_s": 0.002}, "unit": "b"}
    sweep = barnwright.scan(request, over={"beams.sqrt_s": energies.tolist()})
    largest = int(np.argmax(sweep.values))
    assert velocities[largest] == pytest.approx(0.701, abs=1e-3)
    assert sweep.values[largest] / (8 * np.pi / 3 * RADIUS_SQUARED) == pytest.approx(0.256, abs=5e-4)


@pytest.mark.parametrize("sqrt_s", [1.03e-3, 0.02, 7.0])
def test_detailed_balance(sqrt_s: float) -> None:
    """σ(γγ → e-e+) = 2β² σ(e-e+ → γγ) at one √s, to 1e-13: four states each, two identical photons."""
    beams = {"kind": "collider", "sqrt_s": sqrt_s}
    created, annihilated = (predict(name, beams).total.value for name in ("breit-wheeler", "photon-pair"))
    square = (sqrt_s - 2 * ELECTRON) * (sqrt_s + 2 * ELECTRON) / sqrt_s**2
    assert created == pytest.approx(2 * square * annihilated, rel=1e-12, abs=0)


def textbook_integral(x: float, share: Any) -> Any:
    """∫ |M|²/2e⁴ dcos θ from 0, term by term as it comes; it cancels, which 50 digits bear. ``share`` is 4m²/s."""
    c, square = mpmath.mpf(x), 1 - share
    beta = mpmath.sqrt(square)
    log = mpmath.log((1 + beta * c) / (1 - beta * c)) / (2 * beta)
    halved = (c / (1 - square * c**2) + log) / 2
    return -2 * c + 4 * (1 + share) * log - 4 * share**2 * halved


@pytest.mark.parametrize("exponent", [-14, -10, -6, -3, -1, 0, 2, 5, 8, 12])
@pytest.mark.parametrize("name", ["photon-pair", "breit-wheeler"])
def test_closed_forms_lose_no_digits(name: str, exponent: int) -> None:
    """√s from 1e-14 to 1e12 of the threshold above it: the antiderivative to 3e-15 at every angle, poles included."""
    entry = ENTRIES[name]
    found = collision(2 * mpmath.mpf(ELECTRON) * (1 + mpmath.mpf(10) ** exponent))
    root = mpmath.mpf(float(found.sqrt_s[0, 0])) + mpmath.mpf(float(found.correction[0, 0]))
    share = (2 * mpmath.mpf(ELECTRON) / root) ** 2
    beta, square = mpmath.sqrt(1 - share), mpmath.mpf(ALPHA) ** 2
    scale = mpmath.pi * square / root**2 * (1 / (2 * beta) if name == "photon-pair" else beta)
    x = [-1.0, 1e-9 - 1, -0.95, -0.5, -1e-3, -1e-12, 1e-7, 0.3, 0.33, 0.34, 0.999, 1 - 1e-13, 1.0]
    heights = entry.process.closed_forms[0].cumulative(np.array([x]), entry.point(found), COUPLING)
    for cosine, height in zip(x, np.asarray(heights)[0], strict=True):
        assert height == pytest.approx(float(scale * textbook_integral(cosine, share)), rel=3e-15, abs=0)
    assert entry.process.closed_forms[0].cumulative(np.zeros((1, 1)), entry.point(found), COUPLING) == 0
