"""Phases of the states: rotations, boosts and mirrors of spinors and polarisation vectors."""

from __future__ import annotations

import numpy as np
import pytest
from unit.amplitudes.momenta import ALL, MASSIVE, MASSLESS, times

from barnwright.amplitudes import GAMMA, polarisation_vector, spinor_u, spinor_v
from barnwright.amplitudes.arrays import Array, Complex
from barnwright.kinematics import FourVector

ANGLE, RAPIDITY = 0.83, 0.7
PAULI = GAMMA[1:, :2, 2:]
DIRECTED = [name for name in ALL if name != "rest"]


def along(axis: Array) -> Complex:
    """σ·n for axes (3, …)."""
    return np.asarray(np.einsum("kij,k...->ij...", PAULI, axis))


def in_blocks(left: Complex, right: Complex) -> Complex:
    """A matrix on spinors from what acts on the left- and the right-handed components."""
    out = np.zeros((4, 4, *left.shape[2:]), dtype=complex)
    out[:2, :2], out[2:, 2:] = left, right
    return out


def turn(axis: Array, angle: float) -> tuple[Complex, Array]:
    """A rotation about axes (3, …), on spinors exp(−iα n·σ/2) and on vectors (Rodrigues)."""
    one = np.eye(2).reshape(2, 2, *(1,) * (axis.ndim - 1))
    half = np.cos(angle / 2) * one - 1j * np.sin(angle / 2) * along(axis)
    matrix = np.zeros((4, 4, *axis.shape[1:]))
    matrix[0, 0] = 1
    cross = np.einsum("ijk,k...->ij...", LEVI_CIVITA, axis)
    flat = np.eye(3).reshape(3, 3, *(1,) * (axis.ndim - 1))
    outer = axis[:, None] * axis[None]
    matrix[1:, 1:] = np.cos(angle) * flat + (1 - np.cos(angle)) * outer - np.sin(angle) * cross
    return in_blocks(half, half), matrix


def boost(axis: Array, rapidity: float) -> tuple[Complex, Array]:
    """A boost along axes (3, …), on spinors exp(∓η n·σ/2) and on vectors."""
    one = np.eye(2).reshape(2, 2, *(1,) * (axis.ndim - 1))
    cosh, sinh = np.cosh(rapidity / 2) * one, np.sinh(rapidity / 2) * along(axis)
    matrix = np.zeros((4, 4, *axis.shape[1:]))
    matrix[0, 0] = np.cosh(rapidity)
    matrix[0, 1:] = matrix[1:, 0] = np.sinh(rapidity) * axis
    flat = np.eye(3).reshape(3, 3, *(1,) * (axis.ndim - 1))
    matrix[1:, 1:] = flat + (np.cosh(rapidity) - 1) * axis[:, None] * axis[None]
    return in_blocks(cosh - sinh, cosh + sinh), matrix


LEVI_CIVITA = np.array([[[(i - j) * (j - k) * (k - i) / 2 for k in range(3)] for j in range(3)] for i in range(3)])


def flight(vector: FourVector) -> Array:
    """The directions of the momenta, (3, …)."""
    return np.asarray(vector.components()[1:] / vector.momentum)


def moved(vector: FourVector, matrix: Array) -> FourVector:
    """The momenta after a Lorentz transformation."""
    return FourVector.from_components(*times(matrix, vector.components()).real, vector.mass)


def phase_between(wave: Complex, other: Complex) -> Complex:
    """e^{iα} with wave = e^{iα} other, after a check that there is one."""
    ratio = np.sum(wave * np.conj(other), axis=0) / np.sum(np.abs(other) ** 2, axis=0)
    np.testing.assert_allclose(np.abs(ratio), 1, rtol=1e-13)
    np.testing.assert_allclose(wave, ratio * other, atol=1e-13 * np.max(np.abs(other)))
    return np.asarray(ratio)


@pytest.mark.parametrize("name", DIRECTED)
@pytest.mark.parametrize("helicity", [-1, 1])
def test_rotation_about_the_flight_direction(name: str, helicity: int) -> None:
    """By an angle α: u gets e^{−iαh/2}, v as a wave function of the outgoing e^{+iαh/2}, ε gets e^{−iαh}."""
    vector = ALL[name]
    on_spinors, on_vectors = turn(flight(vector), ANGLE)
    for wave, factor in ((spinor_u(vector, helicity), -0.5), (spinor_v(vector, helicity), 0.5)):
        found = phase_between(times(on_spinors, wave), wave)
        np.testing.assert_allclose(found, np.exp(1j * factor * helicity * ANGLE), rtol=1e-13)
    wave = polarisation_vector(vector, helicity)
    np.testing.assert_allclose(times(on_vectors, wave), np.exp(-1j * helicity * ANGLE) * wave, atol=1e-14)


@pytest.mark.parametrize("name", ["ordinary", "massless", "rest"])
@pytest.mark.parametrize("helicity", [-1, 1])
def test_boost_along_the_flight_direction(name: str, helicity: int) -> None:
    """Helicity states go into those of the faster particle without a phase: the convention is the same at any speed."""
    vector = ALL[name]
    axis = np.array([[0.0] * 2, [0.0] * 2, [1.0] * 2]) if name == "rest" else flight(vector)
    on_spinors, on_vectors = boost(axis, RAPIDITY)
    after = moved(vector, on_vectors)
    for state in (spinor_u, spinor_v):
        np.testing.assert_allclose(times(on_spinors, state(vector, helicity)), state(after, helicity), atol=1e-14)
    for value in (helicity, 0) if np.all(vector.mass) else (helicity,):
        waves = polarisation_vector(vector, value), polarisation_vector(after, value)
        np.testing.assert_allclose(times(on_vectors, waves[0]), waves[1], atol=4e-15)


@pytest.mark.parametrize("name", ["ordinary", "light", "massless"])
def test_any_rotation_is_a_phase(name: str) -> None:
    """Any rotation multiplies a state by a phase, opposite for opposite helicity and twice as large for spin 1."""
    vector = ALL[name]
    axis = np.tile(np.array([2.0, 3.0, 6.0])[:, None] / 7, (1, 20))
    on_spinors, on_vectors = turn(axis, 1.9)
    after = moved(vector, on_vectors)
    up, down = (phase_between(times(on_spinors, spinor_u(vector, h)), spinor_u(after, h)) for h in (1, -1))
    np.testing.assert_allclose(up * down, 1, atol=1e-13)
    spin_one = phase_between(times(on_vectors, polarisation_vector(vector, 1)), polarisation_vector(after, 1))
    np.testing.assert_allclose(spin_one, up * up, atol=1e-13)


@pytest.mark.parametrize("helicity", [-1, 1])
def test_any_boost_of_a_massless_state_is_a_phase(helicity: int) -> None:
    """A massless spinor keeps its helicity in any frame; a polarisation vector too, but for some of its momentum."""
    vector = MASSLESS["massless"]
    axis = np.tile(np.array([2.0, -3.0, 6.0])[:, None] / 7, (1, 20))
    on_spinors, on_vectors = boost(axis, 1.1)
    after = moved(vector, on_vectors)
    phase = phase_between(times(on_spinors, spinor_u(vector, helicity)), spinor_u(after, helicity))
    rest = times(on_vectors, polarisation_vector(vector, helicity)) - phase**2 * polarisation_vector(after, helicity)
    multiple = rest[0] / after.energy
    np.testing.assert_allclose(rest, multiple * after.components(), atol=2e-14)


@pytest.mark.parametrize("name", ["ordinary", "light", "massless", "axis"])
@pytest.mark.parametrize("helicity", [-1, 1])
def test_the_mirror_turns_helicity_round(name: str, helicity: int) -> None:
    """γ⁰ makes of a state that of the opposite momentum and helicity, up to a phase."""
    vector = ALL[name]
    azimuth = np.where(vector.phi > 0, vector.phi - np.pi, vector.phi + np.pi)
    mirrored = FourVector(vector.minus, vector.plus, vector.pt, azimuth, vector.mass)
    for state in (spinor_u, spinor_v):
        phase_between(times(GAMMA[0], state(vector, helicity)), state(mirrored, -helicity))


def test_states_do_not_jump_near_plus_z() -> None:
    """Around +z the states are continuous whatever the azimuth: a step of 1e-9 changes them by 1e-9."""
    near = MASSIVE["axis"]
    for helicity in (-1, 1):
        u, wave = spinor_u(near, helicity), polarisation_vector(near, helicity)
        np.testing.assert_allclose(u[:, 2], u[:, 0], atol=4e-9)
        np.testing.assert_allclose(wave[:, 2], wave[:, 0], atol=4e-9)
