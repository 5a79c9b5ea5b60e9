"""Beams that cross at an angle, against explicit four-vectors in 60 digits."""

from __future__ import annotations

import numpy as np
import pytest
from mpmath import mp, mpf
from unit.kinematics.crossing import Crossing, square

from barnwright.beams import BeamSettings, collide, flux
from barnwright.kinematics import CM, LAB, FourVector, Turn, TwoBody

mp.dps = 60
ELECTRON, MUON, PROTON = 0.00051099895, 0.1056583755, 0.93827208816

CASES = [
    pytest.param(Crossing((7.0, 4.0), (ELECTRON, ELECTRON), 0.083), id="7 on 4 GeV"),
    pytest.param(Crossing((7.0, 4.0), (ELECTRON, ELECTRON), 0.083, -1), id="the other way round"),
    pytest.param(Crossing((10.0, 275.0), (ELECTRON, PROTON), 0.025), id="electrons on protons"),
    pytest.param(Crossing((18.0, 20_000.0), (ELECTRON, 183.4), 0.025, -1), id="electrons on ions"),
    pytest.param(Crossing((1e3, 1e-3), (0.0, 0.0), 0.1), id="a million times the energy"),
    pytest.param(Crossing((1e-3, 2e-3), (PROTON, PROTON), 0.5), id="slow"),
    pytest.param(Crossing((1e-6, 3e-6), (PROTON, ELECTRON), 2.0), id="slow and unequal"),
    pytest.param(Crossing((5.0, 5.0), (ELECTRON, ELECTRON), 1e-9), id="almost head on"),
    pytest.param(Crossing((5.0, 5.0), (0.1, 0.1), 3.1), id="almost side by side"),
    pytest.param(Crossing((5.0, 5.0001), (0.1, 0.1), float(np.pi) - 1e-7), id="side by side, one a little faster"),
    pytest.param(Crossing((2.0, 3.0), (0.0, 0.0), float(np.pi) - 1e-5), id="massless, side by side"),
    pytest.param(Crossing((3.0, 1e-12), (ELECTRON, PROTON), 1.0), id="one that hardly moves"),
]


def collision_of(case: Crossing):  # type: ignore[no-untyped-def]
    """The collision of a case through the code under test."""
    first, second = ((t,) for t in case.kinetic)
    return collide(BeamSettings("kinetic", first, second, case.orientation, crossing_angle=case.angle), case.masses)


def deviation(found: FourVector, expected: list[mpf]) -> float:
    """The largest relative deviation of E ± pz, and that of the components as a share of the energy."""
    energy, pz = expected[0], expected[3]
    pairs = [(found.plus, energy + pz, energy + pz), (found.minus, energy - pz, energy - pz)]
    pairs += zip((found.energy, found.px, found.py, found.pz), expected, [energy] * 4, strict=True)
    return max(abs(float((mpf(float(np.squeeze(x))) - y) / scale)) for x, y, scale in pairs)


@pytest.mark.parametrize("case", CASES)
def test_s_keeps_its_digits(case: Crossing) -> None:
    """√s − m_a − m_b is right to 4e-15 of itself however the beams lie; the flux (m_a − m_b is rounded) to 1e-13."""
    found, total = collision_of(case), sum(map(mpf, case.masses))
    above = mp.sqrt(square(case.system)) - total
    assert abs(float(mpf(float(found.above(sum(case.masses))[0, 0])) / above - 1)) < 4e-15
    a, b = case.beam(-1), case.beam(-2)
    product = a[0] * b[0] - sum(a[k] * b[k] for k in (1, 2, 3))
    expected = 4 * mp.sqrt(product**2 - (mpf(case.masses[0]) * mpf(case.masses[1])) ** 2)
    assert abs(float(mpf(float(flux(found, case.masses)[0, 0])) / expected - 1)) < 1e-13


@pytest.mark.parametrize("case", CASES)
@pytest.mark.parametrize("masses", [(0.0, 0.0), (1.0, 0.2)], ids=["massless", "massive"])
def test_lab_vectors(case: Crossing, masses: tuple[float, float]) -> None:
    """Beams and outgoing legs agree with a rotation and an explicit boost, close to both poles as well."""
    collision = collision_of(case)
    root_s = float(mp.sqrt(square(case.system)))
    legs = (masses[0] * 0.4 * root_s, masses[1] * 0.4 * root_s)
    for one_minus, azimuth in ((0.3, 0.7), (1.9, -2.0), (1e-9, 3.0), (2 - 1e-6, 0.1), (1.0, np.pi / 2)):
        polar = np.array([[one_minus]]), np.array([[2 - one_minus]])
        body = TwoBody(collision, (*case.masses, *legs), *polar, np.array([[azimuth]]))
        for code in (-1, -2):
            assert deviation(body.vector(code, LAB), case.beam(code)) < 5e-15
        for code in (1, 2):
            in_cm, in_lab = case.outgoing(code, legs, one_minus, azimuth)
            assert deviation(body.vector(code, CM), in_cm) < 5e-15
            assert deviation(body.vector(code, LAB), in_lab) < 2e-14


@pytest.mark.parametrize("case", CASES)
def test_momentum_is_conserved(case: Crossing) -> None:
    """The momenta of both legs add up to those of both beams at every angle, and masses stay what they are."""
    collision = collision_of(case)
    cosine, azimuth = np.linspace(-1, 1, 9)[None], np.linspace(-3, 3, 9)[None]
    legs = 0.1 * float(collision.sqrt_s[0, 0]), 0.0
    body = TwoBody(collision, (*case.masses, *legs), 1 - cosine, 1 + cosine, azimuth)
    before, after = (sum(body.vector(code, LAB).components() for code in codes) for codes in ((-1, -2), (1, 2)))
    assert np.max(np.abs(after - before)) < 5e-15 * np.max(before)
    for code, mass in ((1, legs[0]), (2, legs[1])):
        leg = body.vector(code, LAB)
        assert leg.plus * leg.minus - leg.pt**2 == pytest.approx(
            np.full((1, 9), mass**2), abs=1e-14 * np.max(leg.energy) ** 2
        )


def test_a_small_angle_is_head_on() -> None:
    """At a crossing angle of 1e-12 every quantity of the lab is that of beams head on to 1e-11."""
    beams = [BeamSettings("kinetic", (7.0,), (4.0,), -1, crossing_angle=angle) for angle in (0.0, 1e-12)]
    cosine = np.linspace(-0.999, 0.999, 7)[None]
    bodies = [
        TwoBody(collide(b, (ELECTRON, ELECTRON)), (ELECTRON, ELECTRON, MUON, MUON), 1 - cosine, 1 + cosine, 0.4)
        for b in beams
    ]
    for code in (-1, -2, 1, 2):
        straight, crossed = (body.vector(code, LAB) for body in bodies)
        for name in ("energy", "px", "py", "pz", "pt", "cos_theta", "kinetic_energy", "rapidity"):
            assert getattr(crossed, name) == pytest.approx(getattr(straight, name), rel=1e-11, abs=1e-11)


def test_the_beams_known_to_everyone() -> None:
    """7.007 on 4.000 GeV at 83 mrad (the published design of SuperKEKB, from memory) meet at the Υ(4S), 10.579 GeV."""
    first, second = 7.007 - ELECTRON, 4.0 - ELECTRON
    found = collide(BeamSettings("kinetic", (first,), (second,), 1, crossing_angle=0.083), (ELECTRON, ELECTRON))
    assert float(found.sqrt_s[0, 0]) == pytest.approx(10.579, abs=1e-3)


def test_conventions() -> None:
    """Net momentum is along +x, z the bisector, +z along the named beam; y is the same in cm and lab."""
    for orientation in (1, -1):
        case = Crossing((7.0, 4.0), (ELECTRON, ELECTRON), 0.2, orientation)
        collision = collision_of(case)
        body = TwoBody(collision, (ELECTRON, ELECTRON, MUON, MUON), np.array([[0.6]]), np.array([[1.4]]), 1.1)
        ahead, behind = (body.vector(code, LAB) for code in ((-1, -2) if orientation == 1 else (-2, -1)))
        assert ahead.theta == pytest.approx(0.1)
        assert behind.theta == pytest.approx(np.pi - 0.1)
        assert ahead.phi == pytest.approx(0.0, abs=0)
        assert behind.phi == pytest.approx(0.0, abs=0)
        assert body.vector(-1 if orientation == 1 else -2, CM).pz > 0
        assert body.vector(1, LAB).py == pytest.approx(body.vector(1, CM).py, rel=1e-15)
        assert np.sign(body.vector(1, CM).pz) == orientation


def test_cosine_and_sine_stand_for_an_azimuth() -> None:
    """An azimuth given as cosine and sine leads to the momenta of the angle itself."""
    collision = collision_of(CASES[0].values[0])  # type: ignore[arg-type]
    masses, polar = (ELECTRON, ELECTRON, MUON, MUON), (np.array([[0.6]]), np.array([[1.4]]))
    angle = TwoBody(collision, masses, *polar, -2.2)
    turn = TwoBody(collision, masses, *polar, Turn(np.array([[np.cos(-2.2)]]), np.array([[np.sin(-2.2)]])))
    assert turn.shape == angle.shape == (1, 1)
    for frame in (CM, LAB):
        for code in (1, 2):
            assert turn.vector(code, frame).components() == pytest.approx(angle.vector(code, frame).components())


def test_facing_the_other_beam() -> None:
    """Turned by π about x the collision has E + pz and E − pz exchanged, and the azimuth with the other sign."""
    collision = collision_of(CASES[1].values[0])  # type: ignore[arg-type]
    masses, polar = (ELECTRON, ELECTRON, MUON, MUON), (np.array([[0.6]]), np.array([[1.4]]))
    one, other = TwoBody(collision, masses, *polar, 0.8), TwoBody(collision.facing_a(), masses, *polar, -0.8)
    for code in (-1, -2, 1, 2):
        straight, turned = one.vector(code, LAB), other.vector(code, LAB)
        assert turned.plus == pytest.approx(straight.minus, rel=1e-15)
        assert turned.px == pytest.approx(straight.px, rel=1e-15)
        assert turned.py == pytest.approx(-straight.py, rel=1e-15)
