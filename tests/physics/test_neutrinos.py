"""Neutrinos on electrons: laws, amplitudes and closed forms against traces, published spectra and textbook slopes."""

from __future__ import annotations

from itertools import product
from typing import Any

import mpmath
import numpy as np
import pytest
from barnwright_electroweak import inverse_muon_decay
from barnwright_electroweak.neutrino_electron import (
    electron_antineutrino,
    electron_neutrino,
    muon_antineutrino,
    muon_neutrino,
)
from scipy import constants

import barnwright
from barnwright.amplitudes import current, dot, external_states, helicity_rows
from barnwright.event import Event, Point
from barnwright.kinematics import Collision, TwoBody
from barnwright.process import Process
from barnwright.testing import check_process

from . import traces

FERMI, SIN2 = 1.1663787e-5, 0.23
ELECTRON, MUON = 0.51099895e-3, 0.1056583755
AREA = (constants.hbar * constants.c / (1e9 * constants.e)) ** 2 * 1e4
"""GeV⁻² in cm², from CODATA."""

ELASTIC = [muon_neutrino, muon_antineutrino, electron_neutrino, electron_antineutrino]
COUPLINGS = {
    "muon-neutrino-electron": (-0.5 + SIN2, SIN2),
    "muon-antineutrino-electron": (SIN2, -0.5 + SIN2),
    "electron-neutrino-electron": (0.5 + SIN2, SIN2),
    "electron-antineutrino-electron": (SIN2, 0.5 + SIN2),
}
"""(g_L, g_R) for neutrinos, (g_R, g_L) for antineutrinos: G. 't Hooft, Phys. Lett. B 37 (1971) 195."""

CONTACT = inverse_muon_decay.FermiInputs(fermi_constant=FERMI)
GIVEN = muon_neutrino.parameters(fermi_constant=FERMI, sin2_theta_w=SIN2)
ANGLES = np.array([[-1.0, -1 + 1e-9, -0.7, 0.0, 0.3, 0.99, 1 - 1e-9, 1.0]])
ENERGIES = [1e-6, 1e-4, 3e-3, 1.0, 1e3]
"""Of the neutrino in the electron's rest frame, GeV: from far below the electron's mass to far above."""


def by_name(process: Process) -> str:
    """The process's name, for the names of tests."""
    return process.name


def on_electron(energy: float) -> Collision:
    """A neutrino of ``energy`` GeV on an electron at rest; √s is kept in two floats."""
    exact = sqrt_s(energy)
    head = float(exact)
    return Collision(np.array([[head]]), np.array([[float(exact - head)]]), np.ones((1, 1)))


def sqrt_s(energy: float) -> Any:
    """√(m² + 2mE) in 30 digits."""
    with mpmath.workdps(30):
        return mpmath.sqrt(mpmath.mpf(ELECTRON) ** 2 + 2 * mpmath.mpf(ELECTRON) * mpmath.mpf(energy))


def event(process: Process, energy: float, heavy: float = 0.0) -> Event:
    """Events at ANGLES; leg 1 or leg 2 is the charged lepton."""
    return Event(process.legs, TwoBody(on_electron(energy), masses(heavy), 1 - ANGLES, 1 + ANGLES))


def masses(heavy: float) -> tuple[float, float, float, float]:
    """Of the legs: a muon first, or an electron last."""
    return (0.0, ELECTRON, heavy, 0.0) if heavy else (0.0, ELECTRON, 0.0, ELECTRON)


def heights(process: Process, energy: float, heavy: float = 0.0) -> Any:
    """The closed form at ANGLES, (angle,), in GeV⁻²."""
    point = Point.of(process.legs, on_electron(energy), masses(heavy))
    given = CONTACT if heavy else GIVEN
    return np.asarray(process.closed_forms[0].heights(ANGLES, point, given))[0]


GAMMA5 = 1j * traces.GAMMA[0] * traces.GAMMA[1] * traces.GAMMA[2] * traces.GAMMA[3]
P_LEFT, P_RIGHT = (traces.ONE - GAMMA5) / 2, (traces.ONE + GAMMA5) / 2


def chain(first: Any, second: Any, vertex: Any) -> list[list[Any]]:
    """Tr[first γ^μ vertex second γ^ν vertex]."""
    steps = [first * gamma * vertex * second for gamma in traces.GAMMA]
    ends = [gamma * vertex for gamma in traces.GAMMA]
    return [[sum((step * end)[i, i] for i in range(4)) for end in ends] for step in steps]


def contact(first: list[list[Any]], second: list[list[Any]]) -> float:
    """8 G_F² times the contraction of two chains, averaged over the electron's two states."""
    signs = traces.METRIC
    pairs = product(range(4), repeat=2)
    return float(4 * FERMI**2 * mpmath.re(sum(signs[m] * signs[n] * first[m][n] * second[m][n] for m, n in pairs)))


def momenta(energy: float, cosine: float, heavy: float = 0.0) -> tuple[Any, ...]:
    """Four-momenta in 30 digits."""
    c = mpmath.mpf(float(cosine))
    return traces.two_to_two(sqrt_s(energy), tuple(map(mpmath.mpf, masses(heavy))), 1 - c, 1 + c)


@pytest.mark.parametrize("energy", ENERGIES)
@pytest.mark.parametrize("process", ELASTIC, ids=by_name)
def test_elastic_law_is_the_trace_of_the_contact_interaction(process: Process, energy: float) -> None:
    """|M|² is the product of the two traces over Dirac matrices, electron massive, to 1e-12 at any angle."""
    left, right = COUPLINGS[process.name] if "anti" not in process.name else COUPLINGS[process.name][::-1]
    found = np.broadcast_to(process.laws[0].squared(event(process, energy), GIVEN), ANGLES.shape)[0]
    with mpmath.workdps(30):
        for cosine, value in zip(ANGLES[0, ::3], found[::3], strict=True):
            neutrino, electron, after, recoil = momenta(energy, cosine)
            line = (neutrino, after) if "anti" in process.name else (after, neutrino)
            expected = contact(
                chain(*map(traces.slash, line), P_LEFT),
                chain(
                    traces.slash(recoil) + ELECTRON * traces.ONE,
                    traces.slash(electron) + ELECTRON * traces.ONE,
                    left * P_LEFT + right * P_RIGHT,
                ),
            )
            assert value == pytest.approx(expected, rel=1e-12, abs=0)


@pytest.mark.parametrize("energy", ENERGIES)
@pytest.mark.parametrize("process", ELASTIC, ids=by_name)
def test_elastic_amplitudes_are_those_of_spinors(process: Process, energy: float) -> None:
    """Each helicity amplitude has the modulus that spinors give, to 1e-12 of the largest; their squares are the law."""
    events = event(process, energy)
    left, right = COUPLINGS[process.name] if "anti" not in process.name else COUPLINGS[process.name][::-1]
    neutrino, electron, after, recoil = external_states(events)
    line = current(neutrino, after) if "anti" in process.name else current(after, neutrino)
    expected = 2 * np.sqrt(2) * FERMI * helicity_rows(events, dot(line, current(recoil, electron, left, right)))
    law = process.laws[1]
    rows = law.combinations(process.legs)
    order = [rows.index(tuple(row)) for row in all_rows(process)]
    found = np.abs(law.amplitudes(events, GIVEN)[order])
    assert found == pytest.approx(np.abs(expected), rel=1e-12, abs=1e-12 * np.abs(expected).max())
    assert law.squared(events, GIVEN) == pytest.approx(process.laws[0].squared(events, GIVEN), rel=1e-12, abs=0)


def all_rows(process: Process) -> list[tuple[int, ...]]:
    """Helicities in written order, the last leg fastest; the neutrino has one."""
    own = 1 if "anti" in process.name else -1
    return [(own, before, own, after) for before in (-1, 1) for after in (-1, 1)]


class Crossed:
    """An event with the neutrino moved to the other side: p_ν and p_ν' exchanged, both with the other sign."""

    def __init__(self, events: Event) -> None:
        self.events, self.mass = events, events.mass

    def dot(self, first: str | int, second: str | int) -> Any:
        """The four-product of the exchanged momenta."""
        other = {"beam_a": 1, 1: "beam_a"}
        signs = (-1) ** sum(leg in other for leg in (first, second))
        return signs * self.events.dot(other.get(first, first), other.get(second, second))


@pytest.mark.parametrize(("process", "other"), [ELASTIC[:2], ELASTIC[2:]], ids=["muon", "electron"])
def test_antineutrino_is_the_neutrino_crossed(process: Process, other: Process) -> None:
    """The law of one with p_ν and −p_ν' exchanged is the law of the other to 1e-13, as both claim."""
    for one, two in ((process, other), (other, process)):
        assert one.claims is not None
        assert one.claims.crossing == (f"electroweak/{two.name}",)
        for energy in ENERGIES:
            crossed = one.laws[0].squared(Crossed(event(one, energy)), GIVEN)
            expected = two.laws[0].squared(event(two, energy), GIVEN)
            assert crossed == pytest.approx(expected, rel=1e-13, abs=0)


@pytest.mark.parametrize("energy", ENERGIES)
@pytest.mark.parametrize("process", ELASTIC, ids=by_name)
def test_elastic_closed_form_is_the_published_recoil_spectrum(process: Process, energy: float) -> None:
    """Bins agree to 1e-11 with the integral of dσ/dT = (2G²m/π)[g₁² + g₂²(1 − T/E)² − g₁g₂ mT/E²].

    Source: G. 't Hooft, Phys. Lett. B 37 (1971) 195; W. Marciano, Z. Parsa, J. Phys. G 29 (2003) 2629. T is the
    electron's kinetic energy, T = E²(1 − c)/(m + 2E).
    """
    found = heights(process, energy)
    with mpmath.workdps(30):
        mass, k, g, sin2 = map(mpmath.mpf, (ELECTRON, energy, FERMI, SIN2))
        first, second = (sin2 + shift for shift in shifts(process))

        def density(recoil: Any) -> Any:
            bracket = first**2 + second**2 * (1 - recoil / k) ** 2 - first * second * mass * recoil / k**2
            return 2 * g**2 * mass / mpmath.pi * bracket

        recoils = [k**2 * (1 - mpmath.mpf(float(c))) / (mass / 2 + k) / 2 for c in ANGLES[0]]
        for low, high in ((0, 7), (0, 1), (1, 4), (6, 7)):
            expected = mpmath.quad(density, [recoils[high], recoils[low]])
            assert found[high] - found[low] == pytest.approx(float(expected), rel=1e-11, abs=1e-14 * found[-1])


def shifts(process: Process) -> tuple[float, float]:
    """What is added to sin²θ_W in the first and the second coupling."""
    own = 0.5 if process.name.startswith("electron") else -0.5
    return (0.0, own) if "anti" in process.name else (own, 0.0)


SLOPES = {
    "muon-neutrino-electron": 1.56,
    "muon-antineutrino-electron": 1.33,
    "electron-neutrino-electron": 9.49,
    "electron-antineutrino-electron": 3.97,
}
"""σ/E in 1e-42 cm²/GeV at sin²θ_W = 0.23: 17.23 (g₁² + g₂²/3); C. Giunti, C. W. Kim, Fundamentals of Neutrino Physics
(2007), table 5.2 (93, 39, 15 and 13 times 1e-46 cm² s/MeV² with s = 2mE), from memory."""


@pytest.mark.parametrize("process", ELASTIC, ids=by_name)
def test_elastic_slopes_are_those_of_the_textbooks(process: Process) -> None:
    """σ/E of a neutrino of 10 GeV on an electron at rest, asked for as a user would, is the published one to 1 %."""
    prediction = barnwright.predict(
        process=f"electroweak/{process.name}",
        beams={"kind": "fixed_target", "energy": 10.0},
        parameters={"sin2_theta_w": SIN2},
        unit="cm2",
    )
    assert prediction.method == "closed_form"
    assert prediction.total.value / 10.0 == pytest.approx(SLOPES[process.name] * 1e-42, rel=0.01, abs=0)


@pytest.mark.parametrize("spin", [-1.0, 0.4, 1.0])
@pytest.mark.parametrize("process", ELASTIC, ids=by_name)
def test_polarised_electrons_at_rest_scatter_by_their_chirality(process: Process, spin: float) -> None:
    """Far above the mass a target of polarisation P gives (1 ∓ P) g₁² + (1 ± P) g₂²/3, by helicity amplitudes."""
    prediction = barnwright.predict(
        process=f"electroweak/{process.name}",
        beams={"kind": "fixed_target", "energy": 1000.0, "polarisation": {"e-": spin}},
        parameters={"sin2_theta_w": SIN2, "fermi_constant": FERMI},
        masses={"e-": ELECTRON},
        unit="cm2",
    )
    first, second = (SIN2 + shift for shift in shifts(process))
    own = 1 if "anti" in process.name else -1
    expected = 2 * FERMI**2 * ELECTRON * 1000.0 / np.pi * AREA
    expected *= (1 + own * spin) * first**2 + (1 - own * spin) * second**2 / 3
    assert prediction.total.value == pytest.approx(expected, rel=3e-6, abs=0)


@pytest.mark.parametrize("energy", [10.93, 30.0, 1e4])
def test_inverse_decay_by_trace_spinors_and_published_formula(energy: float) -> None:
    """|M|² is the trace and the square of the spinors' amplitudes to 1e-12, σ = G²(s − m_μ²)²/πs to 1e-11.

    Source: G. 't Hooft, Phys. Lett. B 37 (1971) 195; P. Vilain et al. (CHARM II), Phys. Lett. B 364 (1995) 121.
    """
    process = inverse_muon_decay.process
    events = event(process, energy, MUON)
    neutrino, electron, muon, after = external_states(events)
    line = dot(current(muon, neutrino, 1, 0), current(after, electron, 1, 0))
    amplitudes = 2 * np.sqrt(2) * FERMI * helicity_rows(events, line)
    expected = np.sum(np.abs(amplitudes) ** 2, axis=(0, 1)) / 2
    for law in process.laws:
        found = np.broadcast_to(law.squared(events, CONTACT), ANGLES.shape)
        assert found == pytest.approx(expected, rel=1e-12, abs=0)
    with mpmath.workdps(30):
        neutrino, electron, muon, after = momenta(energy, 0.3, MUON)
        sides = (traces.slash(muon) + MUON * traces.ONE, traces.slash(neutrino))
        others = (traces.slash(after), traces.slash(electron) + ELECTRON * traces.ONE)
        assert found[0, 4] == pytest.approx(contact(chain(*sides, P_LEFT), chain(*others, P_LEFT)), rel=1e-12, abs=0)
        s = sqrt_s(energy) ** 2
        total = mpmath.mpf(FERMI) ** 2 * (s - mpmath.mpf(MUON) ** 2) ** 2 / (mpmath.pi * s)
    found = heights(process, energy, MUON)
    assert found[-1] - found[0] == pytest.approx(float(total), rel=1e-11, abs=0)


def test_inverse_decay_begins_at_its_threshold() -> None:
    """On electrons at rest σ is 0 at 10.9 GeV, rises from 10.93 GeV on, and tends to 17.2e-42 cm²/GeV times E.

    Source: threshold (m_μ² − m_e²)/2m_e = 10.92 GeV and slope 2G²m_e/π = 17.2e-42 cm²/GeV of CHARM II, Phys. Lett. B
    364 (1995) 121 (from memory).
    """
    below, above, far = (
        barnwright.predict(
            process="electroweak/inverse-muon-decay", beams={"kind": "fixed_target", "energy": energy}, unit="cm2"
        )
        for energy in (10.9, 10.93, 1e4)
    )
    assert below.total.value == 0.0
    assert "below_threshold" in {note.code for note in below.notes}
    assert 0 < above.total.value < 1e-46
    assert far.total.value / 1e4 == pytest.approx(17.2e-42 * (1 - 10.92 / 1e4) ** 2, rel=2e-3, abs=0)


@pytest.mark.parametrize("process", [*ELASTIC, inverse_muon_decay.process], ids=by_name)
def test_every_process_passes_the_conformance_kit(process: Process) -> None:
    """Load checks, closed form against law and law against law hold; validity, sources and the caution are stated."""
    check_process(process)
    assert process.references
    assert process.valid is not None
    assert "contact limit" in process.valid.text
    assert any("radiation-protection expert" in caution for caution in process.cautions)
