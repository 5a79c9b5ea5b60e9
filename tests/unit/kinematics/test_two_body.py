"""Two-body kinematics against 60-digit arithmetic."""

from __future__ import annotations

import mpmath
import numpy as np
import pytest

from barnwright.kinematics import CM, LAB, Collision, Frame, TwoBody

ELECTRON, MUON, PROTON = 0.000510998950, 0.1056583755, 0.93827208816

CASES = [
    pytest.param((ELECTRON, ELECTRON, MUON, MUON), 2 * MUON * (1 + 1e-8), 0.3, id="just above threshold"),
    pytest.param((ELECTRON, ELECTRON, MUON, MUON), 10.0, -0.999, id="far above threshold"),
    pytest.param((0.0, ELECTRON, 0.0, ELECTRON), 3.2, -1 + 1e-9, id="photon scattered back at high energy"),
    pytest.param((ELECTRON, PROTON, ELECTRON, PROTON), 1.2, 1 - 1e-7, id="forward elastic"),
    pytest.param((0.1, 2.0, 0.7, 0.05), 3.0, 0.5, id="four different masses"),
]


def exact(masses: tuple[float, ...], sqrt_s: float, one_minus: float) -> dict[str, list[mpmath.mpf]]:
    """The four momenta (E, px, pz) of the cm and everything made from them, by the textbook formulas in 60 digits."""
    mp = mpmath.mp
    w = mp.mpf(sqrt_s)
    a, b, one, two = (mp.mpf(m) for m in masses)

    def momentum(x: mpmath.mpf, y: mpmath.mpf) -> mpmath.mpf:
        return mp.sqrt((w**2 - (x + y) ** 2) * (w**2 - (x - y) ** 2)) / (2 * w)

    p, q = momentum(a, b), momentum(one, two)
    cosine = 1 - mp.mpf(one_minus)
    sine = mp.sqrt(1 - cosine**2)
    return {
        "-1": [mp.sqrt(p**2 + a**2), mp.mpf(0), p],
        "-2": [mp.sqrt(p**2 + b**2), mp.mpf(0), -p],
        "1": [mp.sqrt(q**2 + one**2), q * sine, q * cosine],
        "2": [mp.sqrt(q**2 + two**2), -q * sine, -q * cosine],
    }


def dot(x: list[mpmath.mpf], y: list[mpmath.mpf]) -> mpmath.mpf:
    """The four-product of (E, px, pz)."""
    return x[0] * y[0] - x[1] * y[1] - x[2] * y[2]


def two_body(masses: tuple[float, ...], sqrt_s: float, one_minus: float) -> TwoBody:
    """The same through the code under test."""
    w = np.array([[sqrt_s]])
    collision = Collision(w, np.zeros_like(w), np.ones_like(w))
    return TwoBody(collision, masses, np.array([[one_minus]]), np.array([[2 - one_minus]]))  # type: ignore[arg-type]


@pytest.mark.parametrize(("masses", "sqrt_s", "cosine"), CASES)
@pytest.mark.parametrize("pair", [(-1, 1), (-1, 2), (-2, 1), (-2, 2), (-1, -2), (1, 2)])
def test_products_and_transfers_keep_their_digits(
    masses: tuple[float, ...], sqrt_s: float, cosine: float, pair: tuple[int, int]
) -> None:
    """Every four-product is right to 2e-14, every squared transfer to 2e-14 of its larger parts."""
    mpmath.mp.dps = 60
    one_minus = 1 - cosine
    truth = exact(masses, sqrt_s, one_minus)
    x, y = truth[str(pair[0])], truth[str(pair[1])]
    body = two_body(masses, sqrt_s, one_minus)
    assert float(body.dot(*pair)[0, 0]) == pytest.approx(float(dot(x, y)), rel=2e-14, abs=0)
    difference = [i - j for i, j in zip(x, y, strict=True)]
    transfer = dot(difference, difference)
    ceiling = max(abs(float(transfer)), abs(float((x[0] - y[0]) ** 2)))
    assert float(np.broadcast_to(body.transfer(*pair), (1, 1))[0, 0]) == pytest.approx(
        float(transfer), rel=0, abs=2e-14 * ceiling + 1e-300
    )


@pytest.mark.parametrize(("masses", "sqrt_s", "cosine"), CASES)
@pytest.mark.parametrize("code", [-1, -2, 1, 2])
def test_momenta_of_the_cm(masses: tuple[float, ...], sqrt_s: float, cosine: float, code: int) -> None:
    """Energy, transverse and longitudinal momentum in the cm."""
    mpmath.mp.dps = 60
    one_minus = 1 - cosine
    energy, px, pz = exact(masses, sqrt_s, one_minus)[str(code)]
    vector = two_body(masses, sqrt_s, one_minus).vector(code, CM)
    assert float(vector.energy[0, 0]) == pytest.approx(float(energy), rel=1e-14)
    assert float(vector.pt[0, 0]) == pytest.approx(abs(float(px)), rel=1e-13, abs=1e-300)
    assert float(vector.pz[0, 0]) == pytest.approx(float(pz), rel=1e-13)


def test_soft_photon_on_a_target() -> None:
    """A 1 eV photon leaves an electron at rest with the recoil of Compton's formula, to 1e-13."""
    mpmath.mp.dps = 60
    mass, photon = ELECTRON, 1e-9
    excess = 2 * photon * mass
    sqrt_s = np.array([[np.sqrt(mass**2 + excess)]])
    collision = Collision(sqrt_s, excess / (sqrt_s + mass) - (sqrt_s - mass), np.array([[1.0]]), 1, -2)
    stretch = np.sqrt((2 * photon + mass) / mass)
    collision = Collision(sqrt_s, collision.correction, np.array([[stretch]]), 1, -2)
    body = TwoBody(collision, (0.0, mass, 0.0, mass), np.array([[2.0]]), np.array([[0.0]]))
    recoil = float(body.vector(2, LAB).kinetic_energy[0, 0])
    edge = 2 * mpmath.mpf(photon) ** 2 / (mpmath.mpf(mass) + 2 * mpmath.mpf(photon))
    assert recoil == pytest.approx(float(edge), rel=1e-13)


def test_rest_frames() -> None:
    """In the rest frame of leg 1 it stands still, and leg 2 has the energy p1.p2/m1."""
    body = two_body((ELECTRON, ELECTRON, MUON, MUON), 1.0, 0.7)
    frame = Frame("rest", (1,))
    assert float(body.vector(1, frame).momentum[0, 0]) == 0.0
    other = float(body.vector(2, frame).energy[0, 0])
    assert other == pytest.approx(float(body.dot(1, 2)[0, 0]) / MUON, rel=1e-14)
