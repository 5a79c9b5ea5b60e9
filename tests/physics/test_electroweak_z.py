"""The Z against numbers from outside: asymmetries, peak cross sections, forms of the width, and the photon alone."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from barnwright_qed import muon_pair as qed_muon_pair
from scipy import constants
from scipy.optimize import minimize_scalar

import barnwright
from barnwright.amplitudes import converted_width, electric_charge, weak_isospin
from barnwright.event import Event, Point
from barnwright.kinematics import TwoBody

from .electroweak_pairs import COSINES, FLAVOURS, PINNED, Flavour, collision, z_squared

EFFECTIVE = 0.23153
"""sin²θ_eff of leptons, the average of LEP and SLD: Phys. Rept. 427 (2006) 257, table 8.4 (from memory)."""
CHARGED = {name: flavour for name, flavour in FLAVOURS.items() if flavour.charged}
Z_ALONE = frozenset({"z"})


def massless(flavour: Flavour) -> Flavour:
    """The same fermion without its mass."""
    return flavour._replace(mass=0.0)


def asymmetry(name: str, sin2: float) -> float:
    """A_f = 2 g_V g_A/(g_V² + g_A²), g_V = T₃ − 2Q sin²θ_eff, g_A = T₃: Phys. Rept. 427 (2006) 257, eq. 1.51."""
    axial = weak_isospin(name)
    vector = axial - 2 * electric_charge(name) * sin2
    return 2 * vector * axial / (vector**2 + axial**2)


def hemispheres(flavour: Flavour, parameters: Any, sqrt_s: float, parts: Any) -> Any:
    """σ of cos θ below and above 0 by the closed form in GeV⁻²."""
    point = Point.of(flavour.process.legs, collision(np.array([[sqrt_s]])), (0.0, 0.0, flavour.mass, flavour.mass))
    edges = np.array([[-1.0, 0.0, 1.0]])
    return np.diff(flavour.process.closed_forms[0].heights(edges, point, parameters, parts))[0]


def total(flavour: Flavour, parameters: Any, sqrt_s: float, parts: Any = None) -> float:
    """σ in GeV⁻²."""
    everything = frozenset({"photon", "z", "photon*z"}) if flavour.charged else None
    return float(hemispheres(flavour, parameters, sqrt_s, parts or everything).sum())


@pytest.mark.parametrize("flavour", CHARGED.values(), ids=CHARGED.keys())
def test_forward_backward_asymmetry_of_the_z(flavour: Flavour) -> None:
    """At √s = M_Z the Z alone has A_FB = ¾ A_e A_f, masses 0 (Phys. Rept. 427 (2006) 257, eq. 1.59)."""
    parameters = flavour.parameters(sin2_theta_w=EFFECTIVE)
    back, ahead = hemispheres(massless(flavour), parameters, parameters.z_mass, Z_ALONE)
    expected = 0.75 * asymmetry("e-", EFFECTIVE) * asymmetry(flavour.name, EFFECTIVE)
    assert (ahead - back) / (ahead + back) == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize("flavour", FLAVOURS.values(), ids=FLAVOURS.keys())
def test_left_right_asymmetry_of_the_z(flavour: Flavour) -> None:
    """At √s = M_Z the Z alone has A_LR = A_e in every channel (Phys. Rept. 427 (2006) 257, eq. 1.60)."""
    parameters = flavour.parameters(sin2_theta_w=EFFECTIVE)
    event = massless(flavour).event(energies=np.array([[parameters.z_mass]]), cosines=np.array([[-0.57735, 0.57735]]))
    law: Any = flavour.process.laws[1]
    parts = Z_ALONE if flavour.charged else None
    left, right = (law.squared(event, parameters, parts, (sign, 0.0)).sum() for sign in (-1.0, 1.0))
    assert (left - right) / (left + right) == pytest.approx(asymmetry("e-", EFFECTIVE), rel=1e-12)


def test_asymmetries_that_lep_and_sld_measured() -> None:
    """A_FB of leptons, b and c at the pole, with the effective angle, lie within 3σ of what was measured.

    0.0171(10), 0.0992(16) and 0.0707(35): Phys. Rept. 427 (2006) 257, tables 2.13 and 5.11 (from memory).
    """
    measured = {"muon": (0.0171, 0.0010), "bottom": (0.0992, 0.0016), "charm": (0.0707, 0.0035)}
    for name, (value, error) in measured.items():
        flavour = FLAVOURS[name]
        parameters = flavour.parameters(sin2_theta_w=EFFECTIVE)
        back, ahead = hemispheres(flavour, parameters, parameters.z_mass, Z_ALONE)
        assert abs((ahead - back) / (ahead + back) - value) < 3 * error


def test_on_shell_and_effective_angle_differ_in_the_leptons_asymmetry() -> None:
    """At the peak, photon included, A_FB of muons is 0.034 with sin²θ_W of the masses, 0.016 with the effective one."""
    found = {}
    for scheme in ("on_shell", "alpha"):
        parameters = FLAVOURS["muon"].parameters(scheme=scheme, sin2_theta_w=EFFECTIVE)
        back, ahead = hemispheres(
            FLAVOURS["muon"], parameters, parameters.z_mass, frozenset({"photon", "z", "photon*z"})
        )
        found[scheme] = f"{(ahead - back) / (ahead + back):.3f}"
    assert found == {"on_shell": "0.034", "alpha": "0.016"}


@pytest.mark.parametrize("flavour", FLAVOURS.values(), ids=FLAVOURS.keys())
def test_peak_is_made_of_partial_widths(flavour: Flavour) -> None:
    """The Z alone at √s = M_Z is 12π Γ_e Γ_f/(M² Γ²) with Γ_f = N g_Z² (g_L² + g_R²) M/24π.

    Source: Phys. Rept. 427 (2006) 257, eq. 1.41 for the peak, PDG Review 2024, eq. 10.60 for the widths (from memory).
    """
    parameters = flavour.parameters(scheme="fermi")
    mass, width, sin2 = parameters.z_mass, parameters.z_width, parameters.sin2_theta_w

    def partial(name: str, colours: int) -> float:
        right = -electric_charge(name) * sin2
        squares = (weak_isospin(name) + right) ** 2 + right**2
        return colours * z_squared(parameters) * squares * mass / (24 * np.pi)

    expected = 12 * np.pi * partial("e-", 1) * partial(flavour.name, flavour.colours) / (mass * width) ** 2
    found = total(massless(flavour), parameters, mass, Z_ALONE if flavour.charged else None)
    assert found == pytest.approx(expected, rel=1e-12)


def test_partial_widths_are_those_of_lep() -> None:
    """Γ_l from the peak of muons, times ρ_l = 1.0050 and 1 + 3α/4π, is LEP's 83.985(86) MeV; Γ_ν/Γ_l is 1.991.

    Source: Phys. Rept. 427 (2006) 257, tables 2.13 and 8.4 and section 1.5 (from memory). What lowest order leaves out
    is that ρ, from the top quark's loops, and the photons of the final state.
    """
    widths = {}
    for name in ("muon", "neutrino"):
        flavour = FLAVOURS[name]
        parameters = flavour.parameters(scheme="fermi", sin2_theta_w=EFFECTIVE)
        mass, width = parameters.z_mass, parameters.z_width
        peak = total(massless(flavour), parameters, mass, Z_ALONE if flavour.charged else None)
        widths[name] = peak * (mass * width) ** 2 / (12 * np.pi)
    lepton = np.sqrt(widths["muon"])
    assert abs(1e3 * lepton * 1.0050 * (1 + 3 / (4 * np.pi * 128.9)) - 83.985) < 0.086
    assert widths["neutrino"] / lepton**2 == pytest.approx(1.991, rel=2e-3)


def peak_of(parameters: Any) -> float:
    """√s in GeV where the total of muon pairs is largest."""
    found = minimize_scalar(
        lambda sqrt_s: -total(FLAVOURS["muon"], parameters, sqrt_s),
        bounds=(90.8, 91.6),
        method="bounded",
        options={"xatol": 1e-7},
    )
    return float(found.x)


def test_running_and_fixed_width_lie_34_mev_apart() -> None:
    """With the same M and Γ the running width peaks 34.1 MeV lower, Γ²/2M; converted, both peak at one energy.

    Source: D. Bardin, A. Leike, T. Riemann, M. Sachwitz, Phys. Lett. B 206 (1988) 539.
    """
    muon = FLAVOURS["muon"]
    running, fixed = muon.parameters(), muon.parameters(width_scheme="fixed")
    distance = peak_of(fixed) - peak_of(running)
    assert f"{1e3 * distance:.1f}" == "34.1"
    assert distance == pytest.approx(running.z_width**2 / (2 * running.z_mass), rel=2e-3)
    mass, width = converted_width(running.z_mass, running.z_width, "running", "fixed")
    moved = muon.parameters(width_scheme="fixed", z_mass=float(mass), z_width=float(width))
    assert peak_of(moved) == pytest.approx(peak_of(running), abs=1e-4)
    assert total(muon, muon.parameters(width_scheme="complex_mass"), 80.0) == total(muon, fixed, 80.0)


def test_converted_line_keeps_its_shape() -> None:
    """In the fixed form with converted mass and width the Z's line of neutrinos is that of the running one times
    1 + Γ²/M², at fixed couplings."""
    neutrino = FLAVOURS["neutrino"]
    running = neutrino.parameters()
    mass, width = converted_width(running.z_mass, running.z_width, "running", "fixed")
    fixed = neutrino.parameters(width_scheme="fixed", z_mass=float(mass), z_width=float(width))
    ratios = [total(neutrino, fixed, w) / total(neutrino, running, w) for w in (30.0, 90.0, 91.2, 92.0, 250.0)]
    assert ratios == pytest.approx([1 + (running.z_width / running.z_mass) ** 2] * 5, rel=1e-12)


@pytest.mark.parametrize("flavour", CHARGED.values(), ids=CHARGED.keys())
@pytest.mark.parametrize("sqrt_s", [10.0, 34.0, 250.0])
def test_photon_alone_far_above_threshold(flavour: Flavour, sqrt_s: float) -> None:
    """Without masses the photon alone gives 4πα²Q²N/3s (Peskin and Schroeder, eq. 5.16, from memory)."""
    parameters = flavour.parameters()
    expected = 4 * np.pi * parameters.alpha**2 / (3 * sqrt_s**2) * electric_charge(flavour.name) ** 2 * flavour.colours
    assert total(massless(flavour), parameters, sqrt_s, frozenset({"photon"})) == pytest.approx(expected, rel=1e-13)


def test_photon_alone_is_the_muon_pair_of_electrodynamics() -> None:
    """With the Z switched off and one α, law and amplitudes are those of qed/muon-pair, both masses exact."""
    muon = FLAVOURS["muon"]
    parameters = muon.parameters(alpha=constants.fine_structure)
    other = qed_muon_pair.process
    for electron in (0.0, 0.51099895e-3, 0.05):
        energies = np.array([[0.2113168], [0.25], [3.0], [60.0]])
        ours = muon.event(electron, energies)
        masses = (electron, electron, muon.mass, muon.mass)
        theirs = Event(other.legs, TwoBody(collision(energies), masses, 1 - COSINES, 1 + COSINES))
        expected: Any = other.laws[0]
        wanted = expected.squared(theirs, other.parameters(alpha=constants.fine_structure))
        for law in (muon.process.laws[0], muon.process.laws[-1]):
            found: Any = law
            got = found.squared(ours, parameters, frozenset({"photon"}))
            assert got == pytest.approx(np.broadcast_to(wanted, got.shape), rel=1e-10, abs=0)


def test_peak_of_muon_pairs_before_radiation() -> None:
    """Photon and Z give LEP's pole cross section of leptons, 41.540/20.767 = 2.000 nb, to 1 %.

    Source: Phys. Rept. 427 (2006) 257, table 2.13 (from memory); ρ_l and the photon's share make up the difference.
    """
    prediction = barnwright.predict(
        process="electroweak/muon-pair",
        beams={"kind": "collider", "sqrt_s": 91.1876},
        parameters={"scheme": "fermi", **{key: PINNED[key] for key in ("fermi_constant", "z_mass", "z_width")}},
        unit="nb",
    )
    assert prediction.total.value == pytest.approx(41.540 / 20.767, rel=0.01)


@pytest.mark.parametrize("flavour", FLAVOURS.values(), ids=FLAVOURS.keys())
def test_schemes_are_ways_to_say_the_same(flavour: Flavour) -> None:
    """The on-shell inputs, turned into those of the other two schemes, give the same |M|² to 1e-13."""
    on_shell = flavour.parameters(scheme="on_shell")
    sin2 = 1 - (on_shell.w_mass / on_shell.z_mass) ** 2
    alpha = np.sqrt(2) * on_shell.fermi_constant * on_shell.w_mass**2 * sin2 / np.pi
    event, law = flavour.event(), flavour.process.laws[0]
    parts = frozenset({"photon", "z", "photon*z"}) if flavour.charged else None
    expected = law.squared(event, on_shell, parts)  # type: ignore[union-attr]
    for scheme in ("alpha", "fermi"):
        parameters = flavour.parameters(scheme=scheme, sin2_theta_w=sin2, alpha=float(alpha))
        found = law.squared(event, parameters, parts)  # type: ignore[union-attr]
        assert found == pytest.approx(expected, rel=1e-13, abs=0)
