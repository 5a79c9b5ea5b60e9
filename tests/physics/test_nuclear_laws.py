"""The laws of e- p -> e- p against traces of the Feynman rules, one another and a published asymmetry."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import mpmath
import numpy as np
import pytest
from barnwright_nuclear.electron_proton import process
from barnwright_nuclear.form_factors import ElasticInputs, sachs

from barnwright.event import Event
from barnwright.kinematics import Collision, TwoBody
from barnwright.process import HelicityAmplitudes, SquaredAmplitude
from barnwright.testing import check_process

from . import traces

ELECTRON, PROTON = 0.51099895069e-3, 0.93827208943
ANGLES = [-1.0, -1 + 1e-9, -0.7, 0.0, 0.3, 0.99, 1 - 1e-9]
POINT = ElasticInputs(form_factors="point")
DIPOLE = ElasticInputs(form_factors="dipole")


@pytest.fixture(autouse=True)
def _digits() -> Iterator[None]:
    """Work in 50 digits, whatever another test asked for."""
    with mpmath.workdps(50):
        yield


def collided(kinetic: float, electron: float = ELECTRON) -> tuple[Collision, Any]:
    """An electron of this kinetic energy in GeV on a proton at rest: the collision, and the √s that it holds."""
    energy, mass = mpmath.mpf(kinetic) + mpmath.mpf(electron), mpmath.mpf(PROTON)
    sqrt_s = mpmath.sqrt(mass**2 + mpmath.mpf(electron) ** 2 + 2 * mass * energy)
    head = float(sqrt_s)
    rest = float(sqrt_s - head)
    return Collision(np.array([[head]]), np.array([[rest]]), np.ones((1, 1))), mpmath.mpf(head) + mpmath.mpf(rest)


def event_at(found: Collision, cosines: list[float], electron: float = ELECTRON) -> Event:
    """Events at angles of the electron in the cm."""
    c = np.array([cosines])
    masses = (electron, PROTON, electron, PROTON)
    return Event(process.legs, TwoBody(found, masses, 1 - c, 1 + c))


def digits(kinetic: float) -> float:
    """1e-13, and the share of the kinetic energy that is lost in the float m + M."""
    return 1e-13 + 2 * float(np.spacing(ELECTRON + PROTON)) / kinetic


def by_squared(event: Event, given: ElasticInputs) -> Any:
    """|M|² by the first law, (angle,)."""
    law = process.laws[0]
    assert isinstance(law, SquaredAmplitude)
    return np.broadcast_to(law.squared(event, given), event.shape)[0]


def by_helicities(event: Event, given: ElasticInputs, polarisation: tuple[float, float] = (0.0, 0.0)) -> Any:
    """|M|² by the second law, (angle,)."""
    law = process.laws[1]
    assert isinstance(law, HelicityAmplitudes)
    return np.broadcast_to(law.squared(event, given, None, polarisation), event.shape)[0]


def from_traces(momenta: Any, electron: Any, given: ElasticInputs) -> Any:
    """|M|² straight from the Feynman rules: e⁴/4t² Tr[(k'+m)γ^μ(k+m)γ^ν] Tr[(p'+M)Γ_μ(p+M)Γ̄_ν].

    Γ^μ = F₁ γ^μ + i σ^{μν} q_ν F₂/2M, q = p' − p, σ^{μν} = i/2 [γ^μ, γ^ν]: Rosenbluth, Phys. Rev. 79 (1950) 615.
    """
    k, p, after, recoil = momenta
    mass = mpmath.mpf(PROTON)
    q = [recoil[i] - p[i] for i in range(4)]
    t = q[0] ** 2 - sum(q[i] ** 2 for i in range(1, 4))
    dirac, pauli = mpmath.mpf(1), mpmath.mpf(0)
    if given.form_factors == "dipole":
        electric = 1 / (1 - t / mpmath.mpf(given.dipole_scale)) ** 2
        magnetic, tau = mpmath.mpf(given.proton_moment) * electric, -t / (4 * mass**2)
        dirac, pauli = (electric + tau * magnetic) / (1 + tau), (magnetic - electric) / (1 + tau)
    turned = traces.slash(q)
    # i σ^{μν} q_ν = −[γ^μ, q̸]/2; the adjoint vertex has q the other way round
    commutators = [(turned * matrix - matrix * turned) / 2 for matrix in traces.GAMMA]
    scale = pauli / (2 * mass)
    vertices = [dirac * g + scale * c for g, c in zip(traces.GAMMA, commutators, strict=True)]
    mirrored = [dirac * g - scale * c for g, c in zip(traces.GAMMA, commutators, strict=True)]
    sums = [traces.slash(v) + m * traces.ONE for v, m in ((k, electron), (p, mass), (after, electron), (recoil, mass))]
    light = [sums[2] * g for g in traces.GAMMA], [sums[0] * g for g in traces.GAMMA]
    heavy = [sums[3] * v for v in vertices], [sums[1] * v for v in mirrored]
    total = mpmath.mpf(0)
    for mu in range(4):
        for nu in range(4):
            product = _traced(light[0][mu], light[1][nu]) * _traced(heavy[0][mu], heavy[1][nu])
            total += traces.METRIC[mu] * traces.METRIC[nu] * mpmath.re(product)
    return (4 * mpmath.pi * mpmath.mpf(given.alpha)) ** 2 * total / (4 * t**2)


def _traced(first: Any, second: Any) -> Any:
    """Tr[A B]."""
    return sum(first[i, j] * second[j, i] for i in range(4) for j in range(4))


@pytest.mark.parametrize("given", [POINT, DIPOLE], ids=lambda given: given.form_factors)
@pytest.mark.parametrize("kinetic", [1e-6, 1e-3, 0.5, 10.0])
def test_law_is_the_trace_of_the_feynman_rules(kinetic: float, given: ElasticInputs) -> None:
    """|M|² agrees with the traces over Dirac matrices to `digits`, from 1 keV to 10 GeV and at any angle."""
    found, sqrt_s = collided(kinetic)
    law = by_squared(event_at(found, ANGLES), given)
    for cosine, value in zip(ANGLES, law, strict=True):
        c = mpmath.mpf(cosine)
        momenta = traces.two_to_two(sqrt_s, (ELECTRON, PROTON, ELECTRON, PROTON), 1 - c, 1 + c)
        expected = from_traces(momenta, mpmath.mpf(ELECTRON), given)
        assert value == pytest.approx(float(expected), rel=digits(kinetic), abs=0)


@pytest.mark.parametrize("given", [POINT, DIPOLE], ids=lambda given: given.form_factors)
@pytest.mark.parametrize(
    ("kinetic", "electron"), [(1e-6, ELECTRON), (1e-3, ELECTRON), (0.5, ELECTRON), (100.0, ELECTRON), (0.5, 0.0)]
)
def test_helicity_amplitudes_give_the_same(kinetic: float, electron: float, given: ElasticInputs) -> None:
    """The two laws agree to 1e-11, massive and massless, from 1 keV to 100 GeV."""
    found, _ = collided(kinetic, electron)
    event = event_at(found, ANGLES[1:], electron)
    np.testing.assert_allclose(by_helicities(event, given), by_squared(event, given), rtol=1e-11)


@pytest.mark.parametrize("electron", [0.0, ELECTRON])
@pytest.mark.parametrize("kinetic", [1e-4, 1e-3, 0.01])
def test_light_electrons_scattered_backwards_keep_their_digits(kinetic: float, electron: float) -> None:
    """At 100 keV to 10 MeV and θ = π |M|² is 1e-6 of its forward scale, and agrees with the trace to `digits`."""
    found, sqrt_s = collided(kinetic, electron)
    for one_plus in (0.0, 1e-12, 1e-6):
        masses = (electron, PROTON, electron, PROTON)
        event = Event(process.legs, TwoBody(found, masses, np.array([[2 - one_plus]]), np.array([[one_plus]])))
        momenta = traces.two_to_two(sqrt_s, masses, 2 - mpmath.mpf(one_plus), mpmath.mpf(one_plus))
        expected = from_traces(momenta, mpmath.mpf(electron), DIPOLE)
        assert by_squared(event, DIPOLE)[0] == pytest.approx(float(expected), rel=digits(kinetic), abs=0)


def test_one_polarised_beam_changes_nothing() -> None:
    """Parity is conserved: a single polarisation leaves |M|² as it is, opposite pairs average to it."""
    found, _ = collided(0.5)
    event = event_at(found, ANGLES[1:])
    plain = by_helicities(event, DIPOLE)
    for single in ((1.0, 0.0), (0.0, -0.7)):
        np.testing.assert_allclose(by_helicities(event, DIPOLE, single), plain, rtol=1e-11)
    pair = by_helicities(event, DIPOLE, (1.0, 1.0)) + by_helicities(event, DIPOLE, (1.0, -1.0))
    np.testing.assert_allclose(pair / 2, plain, rtol=1e-11)


def polarised_asymmetry(energy: float, transfer: Any) -> Any:
    """(σ₊ − σ₋)/(σ₊ + σ₋) for a target spin along the massless beam, ± the electron's helicity.

    T. Donnelly, A. Raskin, Ann. Phys. 169 (1986) 247, θ* the angle from the spin to q, in the electron's plane; from
    memory.
    """
    mass = mpmath.mpf(PROTON)
    q2 = -mpmath.mpf(transfer)
    tau, nu = q2 / (4 * mass**2), q2 / (2 * mass)
    after = energy - nu
    sine_squared = q2 / (4 * energy * after)
    tangent = mpmath.sqrt(sine_squared / (1 - sine_squared))
    length = mpmath.sqrt(q2 + nu**2)
    along = (energy - after * (1 - 2 * sine_squared)) / length
    across = mpmath.sqrt(1 - along**2)
    electric = 1 / (1 + q2 / mpmath.mpf(DIPOLE.dipole_scale)) ** 2
    magnetic = mpmath.mpf(DIPOLE.proton_moment) * electric
    ratio = q2 / length**2
    transverse = ratio / 2 + tangent**2
    primed = tangent * mpmath.sqrt(ratio + tangent**2)
    mixed = -ratio * tangent / mpmath.sqrt(2)
    above = 2 * tau * primed * along * magnetic**2
    above -= 2 * mpmath.sqrt(2 * tau * (1 + tau)) * mixed * across * magnetic * electric
    return -above / ((1 + tau) * ratio**2 * electric**2 + 2 * tau * transverse * magnetic**2)


@pytest.mark.parametrize("energy", [0.2, 0.85, 4.0])
def test_double_spin_asymmetry(energy: float) -> None:
    """Beam and target polarised: the asymmetry is that of Donnelly and Raskin to 1e-11 (helicity of the target in the
    cm, so its spin at rest is along −z)."""
    found, _ = collided(energy, 0.0)
    event = event_at(found, ANGLES[2:6], 0.0)
    plus, minus = (by_helicities(event, DIPOLE, (sign, -1.0)) for sign in (1.0, -1.0))
    expected = [float(polarised_asymmetry(mpmath.mpf(energy), t)) for t in event.t[0]]
    np.testing.assert_allclose((plus - minus) / (plus + minus), expected, rtol=1e-11)


def test_a_point_has_dirac_form_factors() -> None:
    """F₁ = 1 and F₂ = 0 exactly at any transfer: g = 2."""
    q2 = np.array([0.0, 0.1, 30.0])
    tau = q2 / (4 * PROTON**2)
    found = sachs(q2, POINT)
    assert np.all(found.pauli(tau) == 0)
    assert np.all(found.mean_squared(tau) == 1)


def test_it_keeps_the_contract_and_says_what_a_user_must_know() -> None:
    """Load checks pass, the two laws against one another among them; validity, pole and cautions are stated."""
    check_process(process)
    assert process.references
    assert process.order == "tree"
    assert process.valid is not None
    assert process.singular == ("t",)
    assert any("radiation-protection expert" in caution for caution in process.cautions)
