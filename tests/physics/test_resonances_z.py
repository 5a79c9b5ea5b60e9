"""The lineshape of the Z: LEP's identity, the width schemes, and the formula in many digits."""

from __future__ import annotations

from typing import Any

import mpmath
import numpy as np
import pytest
from barnwright_resonances.z_hadrons import process
from scipy import constants
from scipy.optimize import minimize_scalar

import barnwright
from barnwright.amplitudes import converted_width, propagator
from barnwright.testing import check_process

TO_NANOBARN = 1e37 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2

LEP = {"z_mass": 91.1875, "z_width": 2.4952, "electron_width": 0.083984, "hadron_width": 1.7444}
"""GeV. ALEPH, DELPHI, L3, OPAL, SLD and the electroweak groups, Phys. Rept. 427 (2006) 257, from memory: the
five-parameter fit has M_Z = 91.1875(21), Γ_Z = 2.4952(23), Γ_ll = 83.984(86) MeV, Γ_had = 1744.4(2.0) MeV, σ⁰_had =
41.540(37) nb."""
POLE_NANOBARN, POLE_ERROR = 41.540, 0.037

ENERGIES = [60.0, 85.0, 90.0, 91.1, 91.1875, 91.2, 92.0, 97.0, 200.0]
SCHEMES = ["running", "fixed", "complex_mass"]


def predict(sqrt_s: float, **more: Any) -> barnwright.Prediction:
    """The prediction with LEP's numbers in nb."""
    parameters = {**LEP, **more.pop("parameters", {})}
    beams = {"kind": "collider", "sqrt_s": sqrt_s}
    return barnwright.predict(process="resonances/z-hadrons", unit="nb", beams=beams, parameters=parameters, **more)


def scanned(energies: Any, **parameters: Any) -> Any:
    """σ in nb at energies in GeV."""
    request = {
        "process": "resonances/z-hadrons",
        "unit": "nb",
        "beams": {"kind": "collider", "sqrt_s": 91.0},
        "parameters": {**LEP, **parameters},
    }
    return barnwright.scan(request, over={"beams.sqrt_s": list(energies)}).values


def published(sqrt_s: float, scheme: str) -> float:
    """σ = 12π s Γ_e Γ_had/(M² |D|²) in nb in 40 digits, D = s − M² + i s Γ/M, or + i M Γ.

    Source: Phys. Rept. 427 (2006) 257, section 1.5, for the running form; from memory.
    """
    with mpmath.workdps(40):
        mass, width, electron, hadron = (mpmath.mpf(value) for value in LEP.values())
        s = mpmath.mpf(sqrt_s) ** 2
        absorbed = s * width / mass if scheme == "running" else mass * width
        line = s / ((s - mass**2) ** 2 + absorbed**2)
        return float(12 * mpmath.pi * electron * hadron / mass**2 * line * mpmath.mpf(TO_NANOBARN))


@pytest.mark.parametrize("scheme", SCHEMES)
def test_published_formula(scheme: str) -> None:
    """The prediction agrees with the formula in 40 digits to 1e-13, from 60 to 200 GeV, at the peak and beside it."""
    expected = [published(energy, scheme) for energy in ENERGIES]
    np.testing.assert_allclose(scanned(ENERGIES, width_scheme=scheme), expected, rtol=1e-13)


@pytest.mark.parametrize("scheme", SCHEMES)
def test_pole_cross_section_of_lep(scheme: str) -> None:
    """σ at √s = M is LEP's own 41.540(37) nb with LEP's own widths: an identity of the lineshape in every form."""
    total = predict(LEP["z_mass"], parameters={"width_scheme": scheme}).total
    identity = 12 * np.pi * LEP["electron_width"] * LEP["hadron_width"] / (LEP["z_mass"] * LEP["z_width"]) ** 2
    assert total.value == pytest.approx(identity * TO_NANOBARN, rel=1e-13)
    assert abs(total.value - POLE_NANOBARN) < POLE_ERROR / 10
    assert f"{total.value:.2f}" == "41.54"


def peak_of(**parameters: Any) -> float:
    """√s in GeV of the largest cross section."""
    found = minimize_scalar(lambda energy: -scanned([energy], **parameters)[0], bracket=(91.0, 91.3), tol=1e-9)
    return float(found.x)


def test_34_mev_between_the_peaks_of_one_mass_in_two_forms() -> None:
    """With the same numbers the running form peaks 34 MeV below the fixed one: M (1 + γ²)^(∓1/4), γ = Γ/M.

    Source of the 34 MeV: D. Bardin, A. Leike, T. Riemann, M. Sachwitz, Phys. Lett. B 206 (1988) 539; from memory.
    """
    running, fixed = peak_of(width_scheme="running"), peak_of(width_scheme="fixed")
    rise = 1 + (LEP["z_width"] / LEP["z_mass"]) ** 2
    assert round(1000 * (fixed - running)) == 34
    assert running == pytest.approx(LEP["z_mass"] * rise**-0.25, abs=2e-6)
    assert fixed == pytest.approx(LEP["z_mass"] * rise**0.25, abs=2e-6)


@pytest.mark.parametrize("scheme", ["fixed", "complex_mass"])
def test_same_line_in_another_form_has_a_mass_34_mev_lower(scheme: str) -> None:
    """The converted mass and width give LEP's line again, all of it times 1 + γ², to 1e-12."""
    mass, width = converted_width(LEP["z_mass"], LEP["z_width"], "running", scheme)
    assert round(1000 * (LEP["z_mass"] - mass)) == 34
    assert round(1000 * (LEP["z_width"] - width), 1) == 0.9
    partial = {name: LEP[name] * mass / LEP["z_mass"] for name in ("electron_width", "hadron_width")}
    other = scanned(ENERGIES, z_mass=mass, z_width=width, width_scheme=scheme, **partial)
    rise = 1 + (LEP["z_width"] / LEP["z_mass"]) ** 2
    np.testing.assert_allclose(other / scanned(ENERGIES), rise, rtol=1e-12)
    given = process.alternatives[f"lep-{scheme.replace('_', '-')}"]
    np.testing.assert_allclose(scanned(ENERGIES, **given), other, rtol=1e-14)


@pytest.mark.parametrize("scheme", SCHEMES)
def test_line_is_the_propagator_of_the_amplitude_toolkit(scheme: str) -> None:
    """σ is 12π s Γ_e Γ_had/M² times the squared propagator that helicity amplitudes have."""
    s = np.square(ENERGIES)
    line = np.square(np.abs(propagator(s, LEP["z_mass"], LEP["z_width"], scheme)))
    expected = 12 * np.pi * s * LEP["electron_width"] * LEP["hadron_width"] / LEP["z_mass"] ** 2 * line * TO_NANOBARN
    np.testing.assert_allclose(scanned(ENERGIES, width_scheme=scheme), expected, rtol=1e-12)


@pytest.mark.parametrize("scheme", SCHEMES)
def test_general_breit_wigner_of_spin_1_is_this_line(scheme: str) -> None:
    """resonances/breit-wigner with the Z's numbers and massless electrons gives the same cross sections."""
    names = {
        "mass": LEP["z_mass"],
        "width": LEP["z_width"],
        "initial_width": LEP["electron_width"],
        "final_width": LEP["hadron_width"],
    }
    request = {
        "process": "resonances/breit-wigner",
        "unit": "nb",
        "beams": {"kind": "collider", "sqrt_s": 91.0},
        "parameters": {**names, "width_scheme": scheme},
        "masses": {"e-": 0.0},
    }
    general = barnwright.scan(request, over={"beams.sqrt_s": ENERGIES}).values
    np.testing.assert_allclose(general, scanned(ENERGIES, width_scheme=scheme), rtol=1e-14)


def test_a_massive_electron_has_less_momentum() -> None:
    """With the electron's mass set, σ grows by s/(s − 4m²), as 1/k² does."""
    heavy = 5.0
    ratio = predict(91.0, masses={"e-": heavy}).total.value / predict(91.0).total.value
    assert ratio == pytest.approx(91.0**2 / (91.0**2 - 4 * heavy**2), rel=1e-13)


def test_final_state_cannot_be_asked_about() -> None:
    """A histogram of an angle is refused, since a total law knows nothing of the final state."""
    histogram = {"name": "a", "observables": ["cos_theta(1)"], "bins": [{"count": 2, "low": -1, "high": 1}]}
    with pytest.raises(barnwright.RequestError, match=r"histograms\[0\]"):
        predict(91.0, histograms=[histogram])


@pytest.mark.parametrize("name", ["z_mass", "z_width", "electron_width", "hadron_width"])
def test_negative_numbers_are_refused_by_name(name: str) -> None:
    """A mass or a width below 0 is an error that names the parameter."""
    with pytest.raises(barnwright.RequestError, match=rf"^parameters\.{name}: got -1\.0, expected .*greater than"):
        predict(91.0, parameters={name: -1.0})


def test_it_keeps_the_contract_and_says_what_a_user_must_know() -> None:
    """Load checks pass; references, order, validity and cautions are stated."""
    check_process(process)
    assert process.references
    assert process.order == "tree"
    assert process.valid is not None
    assert any("radiation-protection expert" in caution for caution in process.cautions)
