"""The laws and closed forms of the QED plugin against traces, quadrature and tables, each in many digits."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import mpmath
import numpy as np
import pytest
import xraylib
from barnwright_qed import compton, logarithm, muon_pair, tau_pair
from barnwright_qed.coupling import Coupling
from scipy import constants

from barnwright.event import Event, Point
from barnwright.kinematics import Collision, TwoBody
from barnwright.process import Process

from . import traces

ELECTRON, MUON, TAU = 0.51099895069e-3, 0.1056583755, 1.77693
COUPLING = Coupling()
AREA = 1e28 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2
"""GeV⁻² in barn, from CODATA."""

PAIRS = [(muon_pair.process, MUON), (tau_pair.process, TAU)]
ANGLES = [-1.0, -1 + 1e-9, 0.0, 0.3, 1 - 1e-9, 1.0]


@pytest.fixture(autouse=True)
def _digits() -> Iterator[None]:
    """Work in 50 digits, whatever another test asked for."""
    with mpmath.workdps(50):
        yield


def collision(sqrt_s: Any) -> Collision:
    """A collision at an energy known to many digits, kept in two floats."""
    head = float(sqrt_s)
    rest = float(sqrt_s - mpmath.mpf(head))
    return Collision(np.array([[head]]), np.array([[rest]]), np.ones((1, 1)))


def held(found: Collision) -> Any:
    """The energy that the two floats hold."""
    return mpmath.mpf(float(found.sqrt_s[0, 0])) + mpmath.mpf(float(found.correction[0, 0]))


def law_at(process: Process, found: Collision, masses: tuple[float, ...], cosines: list[float]) -> Any:
    """|M|² at angles, (angle,)."""
    c = np.array([cosines])
    event = Event(process.legs, TwoBody(found, masses, 1 - c, 1 + c))  # type: ignore[arg-type]
    return np.broadcast_to(process.laws[0].squared(event, COUPLING), event.shape)[0]


def cumulative_at(process: Process, found: Collision, masses: tuple[float, ...], cosines: list[float]) -> Any:
    """The closed form at angles, (angle,), in GeV⁻²."""
    point = Point.of(process.legs, found, masses)  # type: ignore[arg-type]
    return process.closed_forms[0].cumulative(np.array([cosines]), point, COUPLING)[0]


def photon_on_electron(energy: Any) -> Collision:
    """A photon of ``energy`` GeV on an electron at rest: s = m² + 2mk."""
    mass = mpmath.mpf(ELECTRON)
    return collision(mpmath.sqrt(mass**2 + 2 * mass * mpmath.mpf(energy)))


@pytest.mark.parametrize(("process", "heavy"), PAIRS, ids=["muon", "tau"])
@pytest.mark.parametrize("factor", [1 + 1e-8, 1.3, 100.0])
def test_pair_law_is_the_trace_of_the_feynman_rules(process: Process, heavy: float, factor: float) -> None:
    """|M|² agrees to 1e-14 with the two traces over Dirac matrices, at any angle and from threshold on."""
    masses = (ELECTRON, ELECTRON, heavy, heavy)
    found = collision(2 * mpmath.mpf(heavy) * mpmath.mpf(factor))
    law = law_at(process, found, masses, ANGLES)
    for cosine, value in zip(ANGLES, law, strict=True):
        momenta = traces.two_to_two(held(found), masses, *poles(cosine))
        expected = traces.pair(momenta, masses[0], masses[2], mpmath.mpf(COUPLING.alpha))
        assert value == pytest.approx(float(expected), rel=1e-14, abs=0)


@pytest.mark.parametrize("energy", [1e-9, 1e-6, 5e-4, 1.0, 1e4])
def test_compton_law_is_the_trace_of_the_feynman_rules(energy: float) -> None:
    """|M|² of Compton scattering agrees to 1e-13 with the trace of both diagrams, from 1 eV to 10 TeV."""
    masses = (0.0, ELECTRON, 0.0, ELECTRON)
    found = photon_on_electron(energy)
    law = law_at(compton.process, found, masses, ANGLES)
    for cosine, value in zip(ANGLES, law, strict=True):
        momenta = traces.two_to_two(held(found), masses, *poles(cosine))
        expected = traces.compton(momenta, mpmath.mpf(ELECTRON), mpmath.mpf(COUPLING.alpha))
        assert value == pytest.approx(float(expected), rel=1e-13, abs=0)


def poles(cosine: float) -> tuple[Any, Any]:
    """1 − c and 1 + c, whose sum is exactly 2: far below m the diagrams cancel, and feel a photon off its shell."""
    return 1 - mpmath.mpf(cosine), 1 + mpmath.mpf(cosine)


def klein_nishina_integral(energy: float, low: float, high: float) -> Any:
    """∫ dσ/dcos θ in GeV⁻² between two cm angles by quadrature in 50 digits.

    Source: O. Klein, Y. Nishina (1929) in the electron's rest frame: πr² (k'/k)² (k'/k + k/k' − sin²θ) dcos θ, where
    with w = 1 − cos θ and k in units of m, dcos θ (k'/k)² is the measure in k'/k = 1 − (s − m²)(1 − c)/2s over k.
    """
    k = mpmath.mpf(energy) / mpmath.mpf(ELECTRON)
    radius = mpmath.mpf(COUPLING.alpha) / mpmath.mpf(ELECTRON)

    def density(c: Any) -> Any:
        ratio = (1 + k * (1 + c)) / (1 + 2 * k)
        w = (1 / ratio - 1) / k
        return (ratio + 1 / ratio - w * (2 - w)) / (1 + 2 * k)

    return mpmath.pi * radius**2 * mpmath.quad(density, breaks(low, high, 1 / k))


def breaks(low: float, high: float, width: Any) -> list[Any]:
    """Ends of panels that shrink towards c = −1, where the peak is ``width`` wide."""
    start, end = mpmath.mpf(low), mpmath.mpf(high)
    inner = [-1 + width * mpmath.mpf(4) ** n for n in range(-2, 40)]
    return [start, *(c for c in inner if start < c < end), end]


@pytest.mark.parametrize("energy", [1e-9, 1e-7, 1e-5, 2e-4, 1e-3, 0.1, 30.0, 1e4])
def test_compton_closed_form_is_the_integral_of_klein_and_nishina(energy: float) -> None:
    """The total and the halves by closed form agree to 1e-12 with quadrature in 50 digits, from 1 eV to 10 TeV."""
    ends = [-1.0, -0.2, 0.6, 1.0]
    heights = cumulative_at(compton.process, photon_on_electron(energy), (0.0, ELECTRON, 0.0, ELECTRON), ends)
    for low, high, below, above in zip(ends, ends[1:], heights, heights[1:], strict=False):
        assert above - below == pytest.approx(float(klein_nishina_integral(energy, low, high)), rel=1e-12, abs=0)


def test_compton_closed_form_changes_its_road_without_a_step() -> None:
    """On both sides of where the logarithm takes over from the series the values agree to 1e-14."""
    r = np.nextafter(logarithm.SERIES_BELOW, [0.0, 1.0])
    y = (1 - r) / (1 + r)
    below, above = logarithm.artanh_rest(r, y)
    assert below == pytest.approx(above, rel=1e-14, abs=0)


@pytest.mark.parametrize("exponent", np.arange(-6.0, 8.1, 0.5))
def test_compton_closed_form_over_fourteen_decades(exponent: float) -> None:
    """With κ = (s − m²)/2m² from 1e-6 to 1e8 the antiderivative agrees to 1e-14 with its textbook form in 50 digits."""
    found = photon_on_electron(mpmath.mpf(10) ** mpmath.mpf(float(exponent)) * mpmath.mpf(ELECTRON))
    cosines = [*np.linspace(-1, 0.9, 20), *(-1 + 10.0 ** -np.arange(2, 15, 2)), 1 - 1e-5]
    heights = cumulative_at(compton.process, found, (0.0, ELECTRON, 0.0, ELECTRON), cosines)
    for cosine, height in zip(cosines, heights, strict=True):
        assert height == pytest.approx(float(-textbook_integral(held(found), cosine)), rel=1e-14, abs=0)


def textbook_integral(sqrt_s: Any, cosine: float) -> Any:
    """∫ from c to 1 in GeV⁻², term by term; it cancels, which 50 digits bear."""
    s, square = sqrt_s**2, mpmath.mpf(ELECTRON) ** 2
    v, rate, share = 1 - mpmath.mpf(float(cosine)), (s - square) / (2 * s), square / s
    z = rate * v
    log = -mpmath.log(1 - z)
    terms = (
        v - rate * v**2 / 2,
        log / rate,
        -2 * share * (log - z) / rate**2,
        share**2 * (z - 2 * log + z / (1 - z)) / rate**3,
    )
    return mpmath.pi * mpmath.mpf(COUPLING.alpha) ** 2 / s * sum(terms)


@pytest.mark.parametrize("kev", [10.0, 59.54, 511.0, 1332.5, 10000.0])
def test_compton_per_solid_angle_is_that_of_xraylib(kev: float) -> None:
    """dσ/dΩ at rest agrees to 1e-7 with xraylib's DCS_KN (older constants: 3e-8), by closed form around the angle."""
    angle = 1.1
    found, k = photon_on_electron(kev * 1e-6), kev * 1e-6 / ELECTRON
    ratio = 1 / (1 + k * (1 - np.cos(angle)))
    cosine = (ratio * (1 + 2 * k) - 1) / k - 1
    step = 1e-5
    low, high = cumulative_at(compton.process, found, (0.0, ELECTRON, 0.0, ELECTRON), [cosine - step, cosine + step])
    slope = (1 + 2 * k) * ratio**2
    density = (high - low) / (2 * step) * slope / (2 * np.pi) * AREA
    assert density == pytest.approx(xraylib.DCS_KN(kev, angle), rel=1e-7, abs=0)


def test_compton_at_rest_is_thomson() -> None:
    """The total at 1 eV is CODATA's Thomson cross section times 1 − 2k/m + 26/5 (k/m)², to 1e-8."""
    energy = 1e-9
    low, high = cumulative_at(compton.process, photon_on_electron(energy), (0.0, ELECTRON, 0.0, ELECTRON), [-1.0, 1.0])
    k = energy / ELECTRON
    thomson = constants.value("Thomson cross section") * 1e28
    assert (high - low) * AREA == pytest.approx(thomson * (1 - 2 * k + 5.2 * k**2), rel=1e-8, abs=0)


def test_compton_without_a_mass_is_finite_away_from_the_pole() -> None:
    """With a massless electron the antiderivative is ∫ (πα²/s)(y + 1/y) dv, y = (1 + c)/2, and integrates the law."""
    sqrt_s = 2.0
    cosines = [-0.9, 0.9]
    low, high = cumulative_at(compton.process, collision(mpmath.mpf(sqrt_s)), (0.0, 0.0, 0.0, 0.0), cosines)
    a, b = 0.05, 0.95
    expected = np.pi * COUPLING.alpha**2 / sqrt_s**2 * (b**2 - a**2 + 2 * np.log(b / a))
    assert high - low == pytest.approx(expected, rel=1e-13, abs=0)


@pytest.mark.parametrize(("process", "heavy"), PAIRS, ids=["muon", "tau"])
@pytest.mark.parametrize("factor", [1 + 1e-8, 1.02, 50.0])
def test_pair_closed_form_is_the_integral_of_the_law(process: Process, heavy: float, factor: float) -> None:
    """Bins by closed form agree to 1e-12 with a 50-digit quadrature of the trace, flux and phase space written out."""
    masses = (ELECTRON, ELECTRON, heavy, heavy)
    found = collision(2 * mpmath.mpf(heavy) * mpmath.mpf(factor))
    ends = [-1.0, -0.5, 0.1, 1.0]
    heights = cumulative_at(process, found, masses, ends)
    sqrt_s = held(found)
    s, m, n = sqrt_s**2, mpmath.mpf(ELECTRON) ** 2, mpmath.mpf(heavy) ** 2
    ratio = mpmath.sqrt((s - 4 * n) / (s - 4 * m))

    def density(c: Any) -> Any:
        momenta = traces.two_to_two(sqrt_s, masses, 1 - c, 1 + c)
        squared = traces.pair(momenta, masses[0], masses[2], mpmath.mpf(COUPLING.alpha))
        return squared * ratio / (32 * mpmath.pi * s)

    for low, high, below, above in zip(ends, ends[1:], heights, heights[1:], strict=False):
        integral = gauss(density, mpmath.mpf(low), mpmath.mpf(high))
        assert above - below == pytest.approx(float(integral), rel=1e-12, abs=0)


def gauss(density: Any, low: Any, high: Any) -> Any:
    """Two-point Gauss–Legendre: exact for the cubic and lower powers of cos θ that a vector exchange gives."""
    middle, half = (low + high) / 2, (high - low) / 2
    root = 1 / mpmath.sqrt(3)
    return half * (density(middle - half * root) + density(middle + half * root))
