"""e- p -> e- p as a user asks for it, against Rutherford, Mott, recoil and Rosenbluth in the lab."""

from __future__ import annotations

from typing import Any

import mpmath
import numpy as np
import pytest
from scipy import constants

import barnwright

ALPHA = constants.fine_structure
ELECTRON, PROTON = 0.51099895069e-3, 0.93827208943
MOMENT = 2.79284734463
TO_NANOBARN = 1e37 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2

DEGREES = [20.0, 45.0, 60.0, 90.0, 120.0, 160.0]
POINT = {"form_factors": "point"}
DIPOLE = {"form_factors": "dipole", "dipole_scale": 0.71, "proton_moment": MOMENT}


def in_bins(beams: dict[str, Any], frame: str, proton: dict[str, Any], masses: dict[str, float]) -> Any:
    """dσ/dΩ in nb/sr of the electron, averaged over ±0.5° at the six angles, and their edges as cosines."""
    edges = np.sort(np.cos(np.radians([degree + half for degree in DEGREES for half in (-0.5, 0.5)])))
    angle = f"cos_theta(e-, frame={frame})"
    p = barnwright.predict(
        process="nuclear/electron-proton",
        unit="nb",
        beams=beams,
        masses={"e-": ELECTRON, "p": PROTON, **masses},
        parameters={"alpha": ALPHA, **proton},
        cuts=[{"name": "not forward", "observable": angle, "max": 0.96}],
        histograms=[{"name": "a", "observables": [angle], "bins": [{"edges": edges.tolist()}], "per": "solid_angle"}],
    )
    assert p.histograms["a"].unit == "nb/sr"
    return p.histograms["a"].values[::2], edges.reshape(-1, 2)


def averaged(density: Any, edges: Any) -> list[float]:
    """The means of dσ/dΩ in GeV⁻²/sr over bins of the cosine, in nb/sr, by quadrature in 30 digits."""
    with mpmath.workdps(30):
        ends = [(mpmath.mpf(low), mpmath.mpf(high)) for low, high in edges]
        return [float(mpmath.quad(density, end) / (end[1] - end[0])) * TO_NANOBARN for end in ends]


def at_rest(energy: float) -> dict[str, Any]:
    """Electrons of this energy on protons at rest."""
    return {"kind": "fixed_target", "energy": energy}


def rosenbluth(energy: float, proton: dict[str, Any]) -> Any:
    """The function dσ/dΩ of the cosine in the lab, in GeV⁻²/sr, of massless electrons.

    α² cos²(θ/2)/(4E² sin⁴(θ/2)) · E'/E · [(G_E² + τ G_M²)/(1 + τ) + 2τ G_M² tan²(θ/2)]: M. Rosenbluth, Phys. Rev. 79
    (1950) 615, with the form factors of R. Sachs (1962); from memory.
    """

    def density(cosine: Any) -> Any:
        before, mass = mpmath.mpf(energy), mpmath.mpf(PROTON)
        sine_squared, cosine_squared = (1 - cosine) / 2, (1 + cosine) / 2
        after = before / (1 + 2 * before / mass * sine_squared)
        q2 = 4 * before * after * sine_squared
        tau = q2 / (4 * mass**2)
        electric, magnetic = mpmath.mpf(1), mpmath.mpf(1)
        if proton["form_factors"] == "dipole":
            electric = 1 / (1 + q2 / mpmath.mpf(proton["dipole_scale"])) ** 2
            magnetic = mpmath.mpf(proton["proton_moment"]) * electric
        mott = mpmath.mpf(ALPHA) ** 2 * cosine_squared / (4 * before**2 * sine_squared**2)
        structure = (electric**2 + tau * magnetic**2) / (1 + tau)
        return mott * after / before * (structure + 2 * tau * magnetic**2 * sine_squared / cosine_squared)

    return density


@pytest.mark.parametrize("proton", [POINT, DIPOLE], ids=["point", "dipole"])
@pytest.mark.parametrize("energy", [0.05, 0.188, 0.55, 4.0])
def test_rosenbluth_at_six_angles_in_the_lab(energy: float, proton: dict[str, Any]) -> None:
    """dσ/dΩ in nb/sr of the lab is Rosenbluth's formula to 1e-11 for massless electrons, from 50 MeV to 4 GeV."""
    values, edges = in_bins(at_rest(energy), "lab", proton, {"e-": 0.0})
    np.testing.assert_allclose(values, averaged(rosenbluth(energy, proton), edges), rtol=1e-11)


@pytest.mark.parametrize("energy", [0.05, 0.55])
def test_mass_of_the_electron_is_a_correction_of_m_squared(energy: float) -> None:
    """With the electron's mass dσ/dΩ differs from Rosenbluth's by (m/E)² over cos²(θ/2), not by more."""
    values, edges = in_bins(at_rest(energy), "lab", DIPOLE, {})
    massless = np.array(averaged(rosenbluth(energy, DIPOLE), edges))
    bound = 5 * (ELECTRON / energy) ** 2 / (1 + edges.mean(axis=1))
    shift = np.abs(values / massless - 1)
    assert np.all(shift < bound)
    assert np.all(shift > 0.01 * bound)


def test_recoil_of_a_slow_proton_is_mott_with_e_prime() -> None:
    """At 1 MeV ≪ M a point proton is Mott's formula times E'/E up to terms of (E/M)²."""
    energy = 0.001
    values, edges = in_bins(at_rest(energy), "lab", POINT, {"e-": 0.0})

    def density(c: Any) -> Any:
        recoil = 1 + energy / mpmath.mpf(PROTON) * (1 - c)
        return mpmath.mpf(ALPHA) ** 2 * (1 + c) / (2 * energy**2 * (1 - c) ** 2) / recoil

    np.testing.assert_allclose(values, averaged(density, edges), rtol=1e-4)
    without = averaged(lambda c: density(c) * (1 + energy / PROTON * (1 - c)), edges)
    assert np.all(np.array(without) / values > 1 + 0.9 * energy / PROTON * (1 - edges[:, 1]))


@pytest.mark.parametrize("kinetic", [1e-4, 1e-3, 0.01])
def test_mott_on_an_infinitely_heavy_proton(kinetic: float) -> None:
    """(α/2pv)² (1 − v² sin²(θ/2))/sin⁴(θ/2) (N. Mott, 1929; from memory) with the electron's mass, M = 10⁵ GeV."""
    values, edges = in_bins({"kind": "fixed_target", "kinetic_energy": kinetic}, "lab", POINT, {"p": 1e5})
    energy = mpmath.mpf(kinetic) + mpmath.mpf(ELECTRON)
    p = mpmath.sqrt(energy**2 - mpmath.mpf(ELECTRON) ** 2)
    v = p / energy

    def density(c: Any) -> Any:
        sine_squared = (1 - c) / 2
        return (mpmath.mpf(ALPHA) / (2 * p * v)) ** 2 * (1 - v**2 * sine_squared) / sine_squared**2

    np.testing.assert_allclose(values, averaged(density, edges), rtol=1e-6)


def test_rutherford_in_the_cm() -> None:
    """At 10 eV, dσ/dΩ = (α/2μv²)²/sin⁴(θ/2) with the reduced mass (E. Rutherford, 1911; from memory) up to v²."""
    kinetic = 1e-8
    beams = {"kind": "fixed_target", "kinetic_energy": kinetic}
    values, edges = in_bins(beams, "cm", DIPOLE, {})
    reduced = ELECTRON * PROTON / (ELECTRON + PROTON)
    speed_squared = 2 * kinetic / ELECTRON

    def density(c: Any) -> Any:
        return 4 * (mpmath.mpf(ALPHA) / (2 * reduced * speed_squared * (1 - c))) ** 2

    np.testing.assert_allclose(values, averaged(density, edges), rtol=3 * speed_squared)


def test_point_proton_is_a_heavy_muon() -> None:
    """With the proton's mass given to the muon, qed/electron-muon has the same total within a cut in the cm."""
    common: dict[str, Any] = {
        "unit": "nb",
        "beams": {"kind": "collider", "sqrt_s": 2.0},
        "parameters": {"alpha": ALPHA},
        "cuts": [{"name": "c", "observable": "cos_theta(e-, frame=cm)", "max": 0.9}],
    }
    point = {**common, "parameters": {"alpha": ALPHA, **POINT}, "masses": {"e-": ELECTRON, "p": PROTON}}
    muon = {**common, "masses": {"e-": ELECTRON, "mu-": PROTON}}
    expected = barnwright.predict(process="qed/electron-muon", **muon).total.value
    assert barnwright.predict(process="nuclear/electron-proton", **point).total.value == pytest.approx(
        expected, rel=1e-12
    )


def test_dipole_without_anomalous_moment_is_a_squared_form_factor() -> None:
    """With μ_p = 1 the ratio to the point is (1 + Q²/Λ²)⁻⁴, whose slope is the radius of 0.81 fm.

    Source of the radius: R. Hofstadter, Rev. Mod. Phys. 28 (1956) 214, about 0.8 fm; √(12/0.71 GeV²) = 0.81 fm is the
    textbook value of the dipole; from memory.
    """
    energy = 0.02
    beams = at_rest(energy)
    plain, edges = in_bins(beams, "lab", POINT, {"e-": 0.0})
    shaped, _ = in_bins(beams, "lab", {**DIPOLE, "proton_moment": 1.0}, {"e-": 0.0})
    cosine = edges.mean(axis=1)
    after = energy / (1 + energy / PROTON * (1 - cosine))
    q2 = 2 * energy * after * (1 - cosine)
    np.testing.assert_allclose(shaped / plain, (1 + q2 / 0.71) ** -4.0, rtol=1e-6)
    radius_squared = 3 * (1 - shaped / plain) / q2 * (constants.hbar * constants.c / (1e6 * constants.e) * 1e12) ** 2
    assert np.sqrt(radius_squared[0]) == pytest.approx(0.81, abs=0.01)


def test_open_pole_is_refused_and_the_message_has_a_cut() -> None:
    """Without a cut the cross section diverges forward: an error that shows a cut which closes the pole."""
    with pytest.raises(barnwright.RequestError, match=r"^cuts: got 'none', expected a cut that keeps t .* away from 0"):
        barnwright.predict(process="nuclear/electron-proton", beams=at_rest(0.5))


@pytest.mark.parametrize("name", ["dipole_scale", "proton_moment"])
def test_parameter_that_the_point_does_not_read_is_refused(name: str) -> None:
    """A request that sets a number of the dipole for a point proton is told which form factors use it."""
    cut = {"name": "c", "observable": "cos_theta(e-)", "max": 0.9}
    with pytest.raises(barnwright.RequestError, match=rf"^parameters\.{name}: got 0\.9, expected .*dipole"):
        barnwright.predict(
            process="nuclear/electron-proton", beams=at_rest(0.5), cuts=[cut], parameters={**POINT, name: 0.9}
        )
