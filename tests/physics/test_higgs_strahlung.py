"""e- e+ -> Z0 H0: amplitudes, squared amplitude and closed form against spinors and the published formula."""

from __future__ import annotations

from itertools import pairwise
from typing import Any

import mpmath
import numpy as np
import pytest
from barnwright_electroweak.higgs_strahlung import ROWS, HiggsStrahlungInputs, process
from scipy import constants

import barnwright
from barnwright.amplitudes import current, dot, external_states, helicity_rows, z_coupling
from barnwright.errors import RequestError
from barnwright.event import Event, Point
from barnwright.kinematics import Collision, TwoBody
from barnwright.testing import check_process

Z_MASS, HIGGS_MASS = 91.1876, 125.2
GIVEN = HiggsStrahlungInputs(
    fermi_constant=1.1663787e-5, sin2_theta_w=0.2312, z_mass=Z_MASS, z_width=2.4952, higgs_mass=HIGGS_MASS
)
NO_WIDTH = GIVEN.model_copy(update={"z_width": 0.0})
DOCUMENT = {
    "fermi_constant": 1.1663787e-5,
    "sin2_theta_w": 0.2312,
    "z_mass": Z_MASS,
    "z_width": 0.0,
    "higgs_mass": HIGGS_MASS,
}
PICOBARN = 1e40 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2
"""GeV⁻² in pb, from CODATA."""

ANGLES = np.array([[-1.0, -1 + 1e-9, -0.7, 0.0, 0.3, 0.99, 1 - 1e-9, 1.0]])
ENERGIES = np.array([[217.0], [240.0], [250.0], [350.0], [3000.0]])
MASSES = (0.0, 0.0, Z_MASS, HIGGS_MASS)
SCHEMES = [
    {},
    {"width_scheme": "fixed"},
    {"width_scheme": "complex_mass", "z_width": 10.0},
    {"scheme": "alpha", "alpha": 1 / 128.9},
    {"scheme": "on_shell", "w_mass": 80.369},
]


def collision(orientation: int = 1) -> Collision:
    """At ENERGIES, beam a along ``orientation`` times +z."""
    return Collision(ENERGIES, np.zeros_like(ENERGIES), np.ones_like(ENERGIES), orientation)


def event(orientation: int = 1) -> Event:
    """Events at ENERGIES and ANGLES, at an azimuth."""
    return Event(process.legs, TwoBody(collision(orientation), MASSES, 1 - ANGLES, 1 + ANGLES, 0.7))


def heights(parameters: HiggsStrahlungInputs) -> Any:
    """The closed form at ENERGIES and ANGLES in GeV⁻²."""
    return process.closed_forms[0].heights(ANGLES, Point.of(process.legs, collision(), MASSES), parameters)


def published(sqrt_s: float, one: float = -1.0, other: float = 1.0, polarised: tuple[float, float] = (0.0, 0.0)) -> Any:
    """∫ dσ/dcos θ between two cosines in GeV⁻², without width, in 30 digits.

    σ = G² M_Z⁴ (v² + a²) √λ (λ + 12 M_Z²/s)/(96π s (1 − M_Z²/s)²), a = −1, v = −1 + 4 sin²θ_W, and
    dσ/dcos θ ∝ λ sin²θ + 8 M_Z²/s. Source: B. L. Ioffe, V. A. Khoze (1978); A. Djouadi, Phys. Rept. 457 (2008) 1, eqs.
    4.4 to 4.7. Polarised beams: v² + a² becomes (1 − P₋P₊)(v² + a²) + 2va (P₊ − P₋), from (v ± a)² of e-_L and e-_R.
    """
    with mpmath.workdps(30):
        s, z, h = mpmath.mpf(sqrt_s) ** 2, mpmath.mpf(Z_MASS) ** 2, mpmath.mpf(HIGGS_MASS) ** 2
        kallen = (1 - z / s - h / s) ** 2 - 4 * z * h / s**2
        v, a = -1 + 4 * mpmath.mpf(GIVEN.sin2_theta_w), mpmath.mpf(-1)
        electron, positron = polarised
        couplings = (1 - electron * positron) * (v**2 + a**2) + 2 * v * a * (positron - electron)
        total = mpmath.mpf(GIVEN.fermi_constant) ** 2 * z**2 / (96 * mpmath.pi * s) * couplings
        total *= mpmath.sqrt(kallen) * (kallen + 12 * z / s) / (1 - z / s) ** 2

        def shape(c: Any) -> Any:
            return kallen * (c - c**3 / 3) + 8 * z / s * c

        return total * (shape(mpmath.mpf(other)) - shape(mpmath.mpf(one))) / (2 * shape(mpmath.mpf(1)))


@pytest.mark.parametrize("orientation", [1, -1])
@pytest.mark.parametrize("changes", SCHEMES, ids=str)
def test_amplitudes_are_those_of_spinors(changes: dict[str, Any], orientation: int) -> None:
    """Every helicity amplitude has the modulus that spinors and polarisation vectors give, to 1e-12 of the largest."""
    parameters = GIVEN.model_copy(update=changes)
    events = event(orientation)
    electron, positron, z, _ = external_states(events)
    line = current(positron, electron, *z_coupling("e-", mixing(parameters)))
    expected = np.abs(strength(parameters) * Z_MASS * helicity_rows(events, dot(line, z) * exchanged(parameters)))
    rows = [(a, b, z, 0) for a in (-1, 1) for b in (-1, 1) for z in (-1, 0, 1)]
    law = process.laws[1]
    found = np.zeros(expected.shape)
    for row, amplitude in zip(ROWS, law.amplitudes(events, parameters), strict=True):
        found[rows.index(row)] = np.abs(amplitude)
    scale = np.max(expected, axis=(0, 1, 3), keepdims=True)
    assert np.all(np.abs(found - expected) < 1e-12 * scale)
    assert law.squared(events, parameters) == pytest.approx(
        process.laws[0].squared(events, parameters), rel=1e-12, abs=0
    )


def mixing(parameters: HiggsStrahlungInputs) -> float:
    """sin²θ_W of the scheme."""
    if parameters.scheme == "on_shell":
        return 1 - (parameters.w_mass / parameters.z_mass) ** 2
    return parameters.sin2_theta_w


def strength(parameters: HiggsStrahlungInputs) -> float:
    """g_Z²: 4√2 G M_Z², or e²/(s²c²)."""
    if parameters.scheme == "alpha":
        return 4 * np.pi * parameters.alpha / (mixing(parameters) * (1 - mixing(parameters)))
    return 4 * np.sqrt(2) * parameters.fermi_constant * parameters.z_mass**2


def exchanged(parameters: HiggsStrahlungInputs) -> Any:
    """The Z's propagator written out, (energy, 1): a pole at M² − iMΓ, or a width that runs."""
    s, mass, width = np.square(ENERGIES), parameters.z_mass, parameters.z_width
    if parameters.width_scheme == "running":
        return 1 / (s - mass**2 + 1j * s * width / mass)
    return 1 / (s - (mass**2 - 1j * mass * width))


def test_closed_form_is_the_published_formula() -> None:
    """Bins at 217 GeV (0.6 above threshold), 240, 250 and 350 GeV and 3 TeV agree to 1e-11 with the formula."""
    found = heights(NO_WIDTH)
    for row, energy in zip(found, ENERGIES[:, 0], strict=True):
        for low, high in ((0, 7), (1, 2), (3, 5), (6, 7)):
            expected = published(energy, ANGLES[0, low], ANGLES[0, high])
            assert row[high] - row[low] == pytest.approx(float(expected), rel=1e-11, abs=1e-15 * row[-1])


@pytest.mark.parametrize("changes", SCHEMES, ids=str)
def test_schemes_change_coupling_and_propagator_alone(changes: dict[str, Any]) -> None:
    """In every scheme σ has g_Z⁴, g_L² + g_R² and |D|⁻² of that scheme in place of the others."""
    parameters = GIVEN.model_copy(update=changes)
    found, basic = heights(parameters), heights(NO_WIDTH)
    ratio = (strength(parameters) / strength(NO_WIDTH)) ** 2 * np.abs(exchanged(parameters) / exchanged(NO_WIDTH)) ** 2
    ratio *= sum_of_squares(mixing(parameters)) / sum_of_squares(mixing(NO_WIDTH))
    assert found == pytest.approx(basic * ratio, rel=1e-12, abs=0)


def sum_of_squares(sin2: float) -> float:
    """g_L² + g_R² of the electron."""
    return (0.5 - sin2) ** 2 + sin2**2


@pytest.mark.parametrize("sqrt_s", [240.0, 250.0, 350.0])
@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_a_user_gets_the_published_cross_section(sqrt_s: float, method: str) -> None:
    """Total and angular distribution by either method are the formula's to 1e-10."""
    prediction = barnwright.predict(
        process="electroweak/higgs-strahlung",
        beams={"kind": "collider", "sqrt_s": sqrt_s},
        parameters=DOCUMENT,
        histograms=[
            {
                "name": "angle",
                "observables": ["cos_theta(Z0, frame=cm)"],
                "bins": [{"count": 4, "low": -1.0, "high": 1.0}],
            }
        ],
        accuracy={"method": method},
    )
    assert prediction.method == method
    assert prediction.total.value == pytest.approx(float(published(sqrt_s)) * PICOBARN, rel=1e-10, abs=0)
    edges = np.linspace(-1, 1, 5)
    expected = [float(published(sqrt_s, *pair)) * PICOBARN / 0.5 for pair in pairwise(edges)]
    assert prediction.histograms["angle"].values == pytest.approx(expected, rel=1e-10, abs=0)


@pytest.mark.parametrize("beams", [(-0.8, 0.3), (0.8, -0.3), (-1.0, 1.0), (1.0, -1.0), (1.0, 1.0), (0.5, 0.0)])
def test_polarised_beams_choose_the_couplings(beams: tuple[float, float]) -> None:
    """σ for (P₋, P₊) is the formula with (1 − P₋P₊)(v² + a²) + 2va(P₊ − P₋) to 1e-10; equal helicities give nothing."""
    prediction = barnwright.predict(
        process="electroweak/higgs-strahlung",
        beams={"kind": "collider", "sqrt_s": 250.0, "polarisation": {"e-": beams[0], "e+": beams[1]}},
        parameters=DOCUMENT,
    )
    expected = float(published(250.0, polarised=beams)) * PICOBARN
    assert prediction.total.value == pytest.approx(expected, rel=1e-10, abs=1e-30)


def test_the_cross_section_has_its_known_size_and_place() -> None:
    """Unpolarised tree level with M_H = 125.2 GeV: about 0.24 pb at its largest, between 240 and 250 GeV.

    Source: A. Djouadi, Phys. Rept. 457 (2008) 1, section 4.1 (from memory), where the maximum is put near M_Z + √2 M_H,
    which is a little too high for so heavy a Z.
    """
    energies = np.arange(225.0, 300.0, 1.0)
    sizes = np.array([float(published(energy)) * PICOBARN for energy in energies])
    assert 240 <= energies[np.argmax(sizes)] <= 250
    assert sizes.max() == pytest.approx(0.24, rel=0.02)


def test_below_threshold_there_is_nothing() -> None:
    """At 216 GeV, below M_Z + M_H, σ is 0 with a note; z_mass and higgs_mass move the threshold."""
    below, above = (
        barnwright.predict(
            process="electroweak/higgs-strahlung",
            beams={"kind": "collider", "sqrt_s": 216.0},
            parameters={**DOCUMENT, "higgs_mass": mass},
        )
        for mass in (HIGGS_MASS, 120.0)
    )
    assert below.total.value == 0.0
    assert "below_threshold" in {note.code for note in below.notes}
    assert above.total.value > 0.01


WRONG = [
    ({"parameters": {"alpha": 0.0078}}, r"parameters\.alpha"),
    ({"parameters": {"w_mass": 80.4}}, r"parameters\.w_mass"),
    ({"parameters": {"z_width": -2.5}}, r"parameters\.z_width"),
    ({"masses": {"e-": 0.000511}}, r"masses\.e-|massless"),
]


@pytest.mark.parametrize(("changes", "message"), WRONG, ids=str)
def test_what_the_law_cannot_use_is_refused(changes: dict[str, Any], message: str) -> None:
    """Inputs of other schemes, a negative width and a massive electron are refused by name."""
    with pytest.raises(RequestError, match=message):
        barnwright.predict(
            process="electroweak/higgs-strahlung", beams={"kind": "collider", "sqrt_s": 250.0}, **changes
        )


def test_exchanged_beams_give_the_same() -> None:
    """|M|² is the same with the momenta of e- and e+ exchanged, as claimed; polarised, with (P₋, P₊) as (−P₊, −P₋)."""
    assert process.claims is not None
    assert process.claims.exchange == (("beam_a", "beam_b"),)
    for law in process.laws:
        here = law.squared(event(), GIVEN)
        assert here == pytest.approx(np.asarray(law.squared(event(-1), GIVEN)), rel=1e-13, abs=0)
        there = Event(process.legs, TwoBody(collision(), MASSES, 1 + ANGLES, 1 - ANGLES, 0.7))
        assert here == pytest.approx(np.asarray(law.squared(there, GIVEN)), rel=1e-12, abs=0)
    law = process.laws[1]
    one, other = (law.squared(event(), GIVEN, None, beams) for beams in ((0.7, -0.2), (0.2, -0.7)))
    assert one == pytest.approx(other, rel=1e-13, abs=0)


def test_it_passes_the_conformance_kit() -> None:
    """Load checks, closed form against law, law against law; alternatives are valid parameters."""
    check_process(process)
    for values in process.alternatives.values():
        process.parameters_of(values)
    assert any("radiation-protection expert" in caution for caution in process.cautions)
