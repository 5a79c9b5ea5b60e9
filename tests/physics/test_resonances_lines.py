"""J/psi, a general Breit-Wigner and two interfering ones, against published formulas in many digits."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import product
from typing import Any

import mpmath
import numpy as np
import pytest
from barnwright_resonances import breit_wigner, jpsi_hadrons, two_resonances
from scipy import constants

import barnwright
from barnwright.testing import check_process

ELECTRON = 0.51099895e-3
TO_NANOBARN = 1e37 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2

JPSI = {"mass": 3.0969, "width": 92.6e-6, "electron_width": 5.53e-6, "branching": 0.877}
PHI = {"mass": 1.019461, "width": 4.249e-3, "initial_width": 1.27e-6, "final_width": 2.086e-3}
RHO = {"mass": 0.77526, "width": 0.1474, "initial_width": 7.04e-6, "final_width": 0.1474}
OMEGA = {"mass": 0.78266, "width": 8.68e-3, "initial_width": 0.63e-6, "final_width": 0.133e-3}


@pytest.fixture(autouse=True)
def _digits() -> Iterator[None]:
    """Work in 40 digits, whatever another test asked for."""
    with mpmath.workdps(40):
        yield


def scanned(process: str, parameters: dict[str, Any], energies: Any, **more: Any) -> Any:
    """σ in nb at energies in GeV, the electron's mass pinned."""
    request = {
        "process": f"resonances/{process}",
        "unit": "nb",
        "beams": {"kind": "collider", "sqrt_s": float(energies[0])},
        "parameters": parameters,
        "masses": {"e-": ELECTRON},
        **more,
    }
    return barnwright.scan(request, over={"beams.sqrt_s": [float(energy) for energy in energies]}).values


def around(mass: float, width: float) -> list[float]:
    """Energies on the line and beside it."""
    return [mass + width * step for step in (-20.0, -3.0, -0.5, -0.01, 0.0, 0.2, 1.0, 7.0, 40.0)]


def momentum_squared(energy: float) -> Any:
    """k² in GeV² in the cm."""
    return mpmath.mpf(energy) ** 2 / 4 - mpmath.mpf(ELECTRON) ** 2


def amplitude(energy: float, numbers: dict[str, float], scheme: str) -> Any:
    """s/M √(Γ_i Γ_f)/(M² − s − i A), A = s Γ/M or M Γ: a relativistic Breit-Wigner, PDG Review, "Resonances"."""
    mass, width, initial, final = (mpmath.mpf(value) for value in numbers.values())
    s = mpmath.mpf(energy) ** 2
    absorbed = s * width / mass if scheme == "running" else mass * width
    return s / mass * mpmath.sqrt(initial * final) / mpmath.mpc(mass**2 - s, -absorbed)


def wave(energy: float, spin: int) -> Any:
    """(2J + 1)/((2s₁ + 1)(2s₂ + 1)) 4π/k² in nb of e- e+: PDG Review, "Cross-section formulae"; from memory."""
    return mpmath.mpf(2 * spin + 1) / 4 * 4 * mpmath.pi / momentum_squared(energy) * mpmath.mpf(TO_NANOBARN)


def test_jpsi_is_the_published_line() -> None:
    """σ = (3/4)(π/k²) Γ_ee Γ B/((W − M)² + Γ²/4) (Boyarski et al., PRL 34 (1975) 1357; from memory) to 1e-12."""
    mass, width, electron, branching = (mpmath.mpf(value) for value in JPSI.values())
    energies = around(JPSI["mass"], JPSI["width"])
    expected = [
        wave(energy, 1) / 4 * electron * width * branching / ((mpmath.mpf(energy) - mass) ** 2 + width**2 / 4)
        for energy in energies
    ]
    np.testing.assert_allclose(scanned("jpsi-hadrons", JPSI, energies), [float(x) for x in expected], rtol=1e-12)


def test_jpsi_area() -> None:
    """Integrated over ±1000 widths the line has (2/π) arctan 2000 of 6π² Γ_ee B/M², in the range SPEAR measured.

    Source of the measurement: ∫ σ_had dE = 10.4 ± 1.5 nb GeV, Boyarski et al., PRL 34 (1975) 1357; from memory.
    """
    nodes, weights = np.polynomial.legendre.leggauss(60)
    end = np.arctan(2000.0)
    angles = end * nodes
    energies = JPSI["mass"] + JPSI["width"] / 2 * np.tan(angles)
    jacobian = JPSI["width"] / 2 / np.cos(angles) ** 2
    area = end * np.sum(weights * jacobian * scanned("jpsi-hadrons", JPSI, energies))
    published = 6 * np.pi**2 * JPSI["electron_width"] * JPSI["branching"] / JPSI["mass"] ** 2 * TO_NANOBARN
    assert area == pytest.approx(published * 2 * end / np.pi, rel=2e-6)
    assert abs(area - 10.4) < 1.5


def test_jpsi_is_a_breit_wigner_of_spin_1() -> None:
    """A distance ΔW from the mass, the relativistic line with the same numbers differs by about 3 ΔW/M, below 1e-3."""
    numbers = {"mass": 3.0969, "width": 92.6e-6, "initial_width": 5.53e-6, "final_width": 0.877 * 92.6e-6}
    energies = [energy for energy in around(3.0969, 92.6e-6) if abs(energy - 3.0969) < 93e-5]
    general = scanned("breit-wigner", numbers, energies)
    np.testing.assert_allclose(general, scanned("jpsi-hadrons", JPSI, energies), rtol=1e-3)


@pytest.mark.parametrize(("spin", "scheme"), [*product([0, 1, 2], ["running", "fixed", "complex_mass"])])
def test_breit_wigner_over_a_coherent_background(spin: int, scheme: str) -> None:
    """σ = |√(4πg) T/k + √b e^{iφ}|² to 1e-12, where the two add, where they cancel and without a background."""
    for level, phase in ((0.0, 0.0), (2e-3, 0.7), (6e-2, -1.9)):
        given = {"spin": spin, "width_scheme": scheme, "background": level, "background_phase": phase}
        energies = around(PHI["mass"], PHI["width"])
        expected = []
        for energy in energies:
            flat = mpmath.sqrt(mpmath.mpf(level) * mpmath.mpf(TO_NANOBARN)) * mpmath.expj(phase)
            both = mpmath.sqrt(wave(energy, spin)) * amplitude(energy, PHI, scheme) + flat
            expected.append(float(abs(both) ** 2))
        np.testing.assert_allclose(scanned("breit-wigner", {**PHI, **given}, energies), expected, rtol=1e-12)


def test_incoherent_background_is_added() -> None:
    """Without coherence the cross sections add, whatever the phase says."""
    energies = around(PHI["mass"], PHI["width"])
    given = {**PHI, "background": 2e-3, "coherent": False}
    alone = scanned("breit-wigner", PHI, energies)
    for phase in (0.0, 1.0):
        found = scanned("breit-wigner", {**given, "background_phase": phase}, energies)
        np.testing.assert_allclose(found, alone + 2e-3 * TO_NANOBARN, rtol=1e-13)


def test_phase_of_the_resonance_passes_90_degrees_at_its_mass() -> None:
    """A background of phase π/2 adds to the peak with its full amplitude, one of −π/2 takes as much away."""
    peak, level = scanned("breit-wigner", PHI, [PHI["mass"]])[0], 1e-3
    for phase, sign in ((np.pi / 2, 1), (-np.pi / 2, -1)):
        given = {**PHI, "background": level, "background_phase": phase}
        found = scanned("breit-wigner", given, [PHI["mass"]])[0]
        assert found == pytest.approx((np.sqrt(peak) + sign * np.sqrt(level * TO_NANOBARN)) ** 2, rel=1e-13)


@pytest.mark.parametrize("spin", [0, 1, 3])
def test_elastic_peak_is_the_unitarity_limit(spin: int) -> None:
    """With all of the width in one channel the peak is g 4π/k² (Breit and Wigner, Phys. Rev. 49 (1936) 519)."""
    numbers = {"mass": 2.0, "width": 0.1, "initial_width": 0.1, "final_width": 0.1, "spin": spin}
    assert scanned("breit-wigner", numbers, [2.0])[0] == pytest.approx(float(wave(2.0, spin)), rel=1e-14)


def test_line_of_a_millielectronvolt_keeps_its_digits() -> None:
    """Next to a resonance of width 1e-12 GeV the prediction agrees with 40 digits to 1e-12."""
    narrow = {"mass": 3.0, "width": 1e-12, "initial_width": 1e-13, "final_width": 5e-13}
    energies = [3.0 + step * 2.0**-52 for step in (-20_000, -2000, 0, 1600, 30_000)]
    expected = [float(wave(energy, 1) * abs(amplitude(energy, narrow, "running")) ** 2) for energy in energies]
    np.testing.assert_allclose(scanned("breit-wigner", narrow, energies), expected, rtol=1e-12)


def two(phase: float, **more: Any) -> dict[str, Any]:
    """The parameters of rho and omega."""
    first = {f"first_{name}": value for name, value in RHO.items()}
    second = {f"second_{name}": value for name, value in OMEGA.items()}
    return {**first, **second, "relative_phase": phase, **more}


@pytest.mark.parametrize(("phase", "scheme"), [*product([0.0, 1.8, np.pi], ["running", "fixed"])])
def test_two_resonances_interfere(phase: float, scheme: str) -> None:
    """σ = g 4π/k² |T₁ + e^{iφ} T₂|² to 1e-12 across rho and omega."""
    energies = np.linspace(0.70, 0.85, 16)
    expected = []
    for energy in energies:
        both = amplitude(energy, RHO, scheme) + mpmath.expj(phase) * amplitude(energy, OMEGA, scheme)
        expected.append(float(wave(energy, 1) * abs(both) ** 2))
    found = scanned("two-resonances", two(phase, width_scheme=scheme), energies)
    np.testing.assert_allclose(found, expected, rtol=1e-12)


def test_interference_is_a_contribution_of_its_own() -> None:
    """The parts add up to the whole, and the third is 2 √(σ₁σ₂) cos(δ₁ − δ₂ − φ) with the phases of the two lines."""
    phase, energy = 1.8, 0.79
    p = barnwright.predict(
        process="resonances/two-resonances",
        unit="nb",
        beams={"kind": "collider", "sqrt_s": energy},
        parameters=two(phase),
        masses={"e-": ELECTRON},
    )
    first, second, cross = (p.contributions[name].total.value for name in ("first", "second", "interference"))
    shift = mpmath.arg(amplitude(energy, RHO, "running")) - mpmath.arg(amplitude(energy, OMEGA, "running")) - phase
    assert p.total.value == pytest.approx(first + second + cross, rel=1e-13)
    assert cross == pytest.approx(float(2 * np.sqrt(first * second) * mpmath.cos(shift)), rel=1e-11)
    alone = scanned("breit-wigner", RHO, [energy])[0]
    assert first == pytest.approx(alone, rel=1e-14)
    only = scanned("two-resonances", two(phase), [energy], contributions=["first", "second"])[0]
    assert only == pytest.approx(first + second, rel=1e-14)


def test_exchange_of_the_two_resonances_turns_the_phase() -> None:
    """The cross section stays when first and second change places and the phase its sign."""
    first = {f"first_{name}": value for name, value in OMEGA.items()}
    second = {f"second_{name}": value for name, value in RHO.items()}
    energies = np.linspace(0.74, 0.82, 5)
    exchanged = scanned("two-resonances", {**first, **second, "relative_phase": -0.6}, energies)
    np.testing.assert_allclose(exchanged, scanned("two-resonances", two(0.6), energies), rtol=1e-13)


def test_parameters_without_a_default_are_asked_for_by_name() -> None:
    """Every required parameter that is missing is named, and a spin below 0 beside them."""
    with pytest.raises(barnwright.RequestError) as caught:
        scanned("breit-wigner", {"spin": -1}, [3.0])
    text = str(caught.value)
    assert [name for name in PHI if f"parameters.{name}" in text] == [*PHI]
    assert "parameters.spin: got -1" in text


@pytest.mark.parametrize(
    "process", [jpsi_hadrons.process, breit_wigner.process, two_resonances.process], ids=lambda p: p.name
)
def test_each_process_keeps_the_contract_and_says_what_a_user_must_know(process: barnwright.Process) -> None:
    """Load checks pass; references, order, validity and cautions are stated."""
    check_process(process)
    assert process.references
    assert process.order == "tree"
    assert process.valid is not None
    assert any("radiation-protection expert" in caution for caution in process.cautions)
