"""The wave functions of all legs at once, and the way back to rows of helicities."""

from __future__ import annotations

import ast
import subprocess
import sys
from inspect import isfunction
from pathlib import Path

import numpy as np
import pytest
from unit.amplitudes.diagrams import lepton_pair
from unit.amplitudes.momenta import ELECTRON, MUON, Z_MASS, heading, two_bodies

import barnwright.amplitudes
from barnwright.amplitudes import (
    adjoint,
    current,
    dot,
    external_states,
    helicity_rows,
    polarisation_vector,
    spinor_u,
    spinor_v,
    vacuum_value,
    z_coupling,
)
from barnwright.amplitudes.arrays import Array, Complex
from barnwright.event import Event
from barnwright.kinematics import FourVector, Frame
from barnwright.process import HelicityAmplitudes, Parameters
from barnwright.process.polarisation import all_combinations
from barnwright.reaction import parse_reaction

FOLDER = Path(barnwright.amplitudes.__file__).parent


class Decay:
    """The kinematics of a parent at rest that decays into two massless particles."""

    s, sqrt_s, turns = np.array([[Z_MASS**2]]), np.array([[Z_MASS]]), False

    def __init__(self, half_angles: Array) -> None:
        self.shape = (1, half_angles.size)
        sine, cosine = np.sin(half_angles)[None], np.cos(half_angles)[None]
        one = heading(Z_MASS / 2, sine, cosine, 0.3, 0.0)
        other = heading(Z_MASS / 2, cosine, sine, 0.3 - np.pi, 0.0)
        zero, mass = np.zeros((1, 1)), np.full((1, 1), Z_MASS)
        self.vectors = {-1: FourVector(mass, mass, zero, zero, Z_MASS), 1: one, 2: other}

    def vector(self, code: int, frame: Frame) -> FourVector:
        """The momentum of a leg, the same in the lab and in the cm."""
        assert frame.kind == "cm"
        return self.vectors[code]

    def mass(self, code: int) -> float:
        """The mass of a leg in GeV."""
        return float(self.vectors[code].mass)

    def dot(self, first: int, second: int) -> Array:
        """The product of two momenta in GeV²."""
        return np.real(dot(self.vectors[first], self.vectors[second]))

    def transfer(self, first: int, second: int) -> Array:
        """The squared difference of two momenta in GeV²."""
        return self.mass(first) ** 2 + self.mass(second) ** 2 - 2 * self.dot(first, second)


def event_of_pairs() -> Event:
    """Muon pairs at two energies and three angles."""
    return two_bodies("e- e+ -> mu- mu+", [0.3, 5.0], (ELECTRON, ELECTRON, MUON, MUON), [[-0.4, 0.1, 0.9]], 0.5)


def test_each_leg_has_its_axis() -> None:
    """Helicity axes stand in the order of the legs before those of the batch, which keep their own sizes."""
    states = external_states(event_of_pairs())
    assert [state.shape for state in states] == [
        (4, 2, 1, 1, 1, 2, 1),
        (4, 1, 2, 1, 1, 2, 1),
        (4, 1, 1, 2, 1, 2, 3),
        (4, 1, 1, 1, 2, 2, 3),
    ]


def test_fermions_in_and_out() -> None:
    """Incoming u and v̄, outgoing ū and v, with the physical helicity of each."""
    event = event_of_pairs()
    states = external_states(event)
    for index, h in enumerate((-1, 1)):
        expected = (
            spinor_u(event.cm_vector("beam_a"), h),
            adjoint(spinor_v(event.cm_vector("beam_b"), h)),
            adjoint(spinor_u(event.cm_vector(1), h)),
            spinor_v(event.cm_vector(2), h),
        )
        for leg, (state, wave) in enumerate(zip(states, expected, strict=True)):
            one = np.take(state, index, axis=1 + leg).squeeze(axis=(1, 2, 3))
            np.testing.assert_array_equal(one, wave)


def test_bosons_in_and_out() -> None:
    """An incoming boson has ε, an outgoing one ε*, a scalar 1 and no component axis."""
    event = two_bodies("gamma e- -> gamma e-", 0.1, (0.0, ELECTRON, 0.0, ELECTRON), [[0.2, 0.7]], 0.5)
    photon, _, out, _ = external_states(event)
    np.testing.assert_array_equal(photon[:, 1, 0, 0, 0], polarisation_vector(event.cm_vector("beam_a"), 1))
    np.testing.assert_array_equal(out[:, 0, 0, 0, 0], np.conj(polarisation_vector(event.cm_vector(1), -1)))
    event = two_bodies("e- e+ -> Z0 H0", 250.0, (0.0, 0.0, Z_MASS, 125.0), [[0.2, 0.7]])
    electron, positron, boson, scalar = external_states(event)
    assert boson.shape == (4, 1, 1, 3, 1, 1, 2)
    np.testing.assert_array_equal(scalar, np.ones((1, 1, 1, 1, 1, 1)))
    rows = helicity_rows(event, dot(current(positron, electron), boson) * scalar)
    assert rows.shape == (12, 1, 1, 2)


@pytest.mark.parametrize(
    "text",
    [
        "e- e+ -> mu- mu+",
        "gamma e- -> gamma e-",
        "nu(mu) e- -> nu(mu) e-",
        "e- e+ -> nu(e) nu(e)~",
        "e- e+ -> Z0 H0",
        "e- p -> e- p",
        "u u~ -> g g",
        "e- e+ -> W- W+",
    ],
)
def test_rows_are_those_of_the_core(text: str) -> None:
    """The helicity axes have the sizes, and the rows the order, of the core's own list of combinations."""
    masses = (0.1, 0.1, 0.1, 0.1) if not any(name in text for name in ("gamma", "g g", "nu")) else (0.0,) * 4
    event = two_bodies(text, 9.0, masses, [[0.2, 0.7]])
    combinations = all_combinations(event.reaction)
    product = external_states(event)
    in_rows = external_states(event, combinations)
    sizes = [state.shape[len(state.shape) - 6 + leg] for leg, state in enumerate(product)]
    assert np.prod(sizes) == len(combinations)
    for leg, (spread, listed) in enumerate(zip(product, in_rows, strict=True)):
        assert listed.shape[-3:] == (len(combinations), *spread.shape[-2:])
        head = spread.shape[:-6]
        full = np.broadcast_to(spread, (*head, *sizes, *spread.shape[-2:]))
        np.testing.assert_array_equal(full.reshape(*head, -1, *spread.shape[-2:]), listed, err_msg=f"leg {leg}")


def test_wanted_rows_only() -> None:
    """With combinations given, the amplitudes are those rows of the product, in the given order."""
    event, wanted = event_of_pairs(), ((1, -1, -1, 1), (-1, 1, 1, -1), (-1, -1, 1, 1))
    electron, positron, lepton, antilepton = external_states(event, wanted)
    found = dot(current(positron, electron), current(lepton, antilepton)) / event.s
    everything = helicity_rows(event, lepton_pair(event))
    order = [all_combinations(event.reaction).index(row) for row in wanted]
    assert found.shape == (3, 2, 3)
    np.testing.assert_allclose(found[:, None], everything[order], atol=1e-15)


def test_a_law_takes_the_rows_as_they_are() -> None:
    """`HelicityAmplitudes` squares and averages what `helicity_rows` returns."""

    def amplitudes(event: Event, _parameters: Parameters) -> Complex:
        return helicity_rows(event, lepton_pair(event))

    event = event_of_pairs()
    squares = HelicityAmplitudes(amplitudes).squared(event, Parameters())
    np.testing.assert_allclose(squares, np.sum(np.abs(lepton_pair(event)) ** 2, axis=(0, 1, 2, 3)) / 4, rtol=1e-14)


def test_flows_stand_behind_helicities() -> None:
    """Several flows broadcast against one another and become the second axis."""
    event = event_of_pairs()
    amplitude = lepton_pair(event)
    rows = helicity_rows(event, amplitude, 2 * amplitude, amplitude[..., :1])
    assert rows.shape == (16, 3, 2, 3)
    np.testing.assert_array_equal(rows[:, 1], 2 * rows[:, 0])


def test_the_decay_of_a_particle_at_rest() -> None:
    """Γ(Z → e e) = G_F M³ (g_V² + g_A²)/(6√2 π) from the amplitudes of a Z at rest, for each of its helicities.

    Source: Particle Data Group, review "Electroweak model and constraints on new physics", from memory.
    """
    fermi, sin2 = 1.1663787e-5, 0.23
    nodes, weights = np.polynomial.legendre.leggauss(4)
    event = Event(parse_reaction("Z0 -> e- e+"), Decay(np.arccos(nodes) / 2))
    boson, electron, positron = external_states(event)
    left, right = z_coupling("e-", sin2)
    unit = 2 * Z_MASS / vacuum_value(fermi)
    rows = helicity_rows(event, unit * dot(boson, current(electron, positron, left, right)))
    assert rows.shape == (12, 1, 1, 4)
    squares = np.sum(np.abs(rows.reshape(3, 4, 4)) ** 2, axis=1)
    widths = squares @ weights / (2 * 16 * np.pi * Z_MASS)
    expected = fermi * Z_MASS**3 * ((left + right) ** 2 + (left - right) ** 2) / (6 * np.sqrt(2) * np.pi)
    np.testing.assert_allclose(widths, expected, rtol=1e-12)


def test_other_spins_are_refused() -> None:
    """A nucleus, and a particle of spin 3/2, have no wave function here."""
    for name in ("He4", "Delta(1232)++"):
        event = two_bodies(f"e- {name} -> e- {name}", 9.0, (0.0, 1.0, 0.0, 1.0), 0.2)
        with pytest.raises(ValueError, match=r"leg: got .*, expected a particle of spin 0, 1/2 or 1"):
            external_states(event)


def test_no_linear_algebra_library_is_called() -> None:
    """No product of matrices stands in the package: `@`, dot, matmul, tensordot, inner, vdot, linalg."""
    banned = {"dot", "matmul", "tensordot", "inner", "vdot", "linalg"}
    for file in FOLDER.glob("*.py"):
        for node in ast.walk(ast.parse(file.read_text(encoding="utf-8"))):
            assert not isinstance(node, ast.MatMult), file.name
            library = isinstance(node, ast.Attribute) and isinstance(node.value, ast.Name) and node.value.id == "np"
            assert not (library and node.attr in banned), file.name  # type: ignore[attr-defined]


def test_the_package_does_not_import_it() -> None:
    """`import barnwright` leaves the toolkit alone."""
    code = "import sys, barnwright; print('barnwright.amplitudes' in sys.modules)"
    found = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert found.stdout.strip() == "False"


def test_public_names() -> None:
    """Every name of `__all__` exists, in order, and each function has a docstring."""
    names = barnwright.amplitudes.__all__
    assert names == sorted(names)
    values = [getattr(barnwright.amplitudes, name) for name in names]
    assert all(value.__doc__ for value in values if isfunction(value))
