"""n-body kinematics against two-body ones, against 40-digit arithmetic and against plain numpy."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import combinations

import numpy as np
import pytest
from mpmath import mp, mpf
from numpy.typing import NDArray

from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.kinematics import CM, LAB, Collision, Frame, ManyBody, TwoBody
from barnwright.observables import compile_observable
from barnwright.phase_space import Channel, Limits, channels_of, flat_channel
from barnwright.reaction import parse_reaction

Array = NDArray[np.float64]

ELECTRON, MUON, PROTON = 0.000510998950, 0.1056583755, 0.93827208816
SETTINGS = {
    "head on": BeamSettings("kinetic", (9.0,), (3.1,)),
    "cm": BeamSettings("sqrt_s", (10.0,)),
    "the other way": BeamSettings("kinetic", (9.0,), (3.1,), orientation=-1),
    "fixed target": BeamSettings("kinetic", (160.0,), (0.0,), target=-2),
    "target first": BeamSettings("kinetic", (0.0,), (160.0,), orientation=-1, target=-1),
    "crossing": BeamSettings("kinetic", (9.0,), (3.1,), crossing_angle=0.083),
    "crossing the other way": BeamSettings("kinetic", (9.0,), (3.1,), orientation=-1, crossing_angle=0.083),
}
QUANTITIES = (
    "energy",
    "kinetic_energy",
    "momentum",
    "pt",
    "theta",
    "phi",
    "px",
    "py",
    "pz",
    "rapidity",
    "plus",
    "minus",
)


@dataclass(frozen=True)
class Pair:
    """The same elastic events by both classes."""

    two: TwoBody
    many: ManyBody


def pair(name: str, masses: tuple[float, ...] = (ELECTRON, PROTON, ELECTRON, PROTON)) -> Pair:
    """Forty elastic events."""
    settings = SETTINGS[name]
    collision = collide(settings, masses[:2])
    rng = np.random.default_rng(1)
    cosine, azimuth = rng.uniform(-0.999, 0.999, (1, 40)), rng.uniform(-3.1, 3.1, (1, 40))
    two = TwoBody(collision, masses, 1 - cosine, 1 + cosine, settings.orientation * azimuth)
    p, sine = collision.momentum(*masses[2:]), np.sqrt(1 - cosine**2)
    momentum = np.stack(np.broadcast_arrays(p * sine * np.cos(azimuth), p * sine * np.sin(azimuth), p * cosine))[:, 0]
    legs = [
        np.concatenate([np.hypot(p[0], m) + 0 * momentum[:1], sign * momentum])
        for m, sign in zip(masses[2:], (1, -1), strict=True)
    ]
    return Pair(two, ManyBody(collision, masses, np.stack(legs)))


@pytest.mark.parametrize("name", SETTINGS)
@pytest.mark.parametrize("frame", [CM, LAB, Frame("rest", (1,)), Frame("rest", (1, 2))], ids=str)
def test_two_of_many_bodies_are_two_bodies(name: str, frame: Frame) -> None:
    """Every component of every leg is what two-body kinematics says, in every frame; all ways to collide."""
    bodies = pair(name)
    assert bodies.many.shape == bodies.two.shape
    assert bodies.many.turns == bodies.two.turns
    for code in (-1, -2, 1, 2):
        many, two = bodies.many.vector(code, frame), bodies.two.vector(code, frame)
        scale = np.max(np.abs(two.energy))
        for quantity in QUANTITIES:
            if quantity == "rapidity" and code < 0:
                continue
            found, expected = np.broadcast_arrays(getattr(many, quantity), getattr(two, quantity))
            if quantity == "phi":
                found, expected = np.sin(found) * many.pt, np.sin(expected) * two.pt
            np.testing.assert_allclose(found, expected, rtol=1e-10, atol=1e-12 * scale, err_msg=f"{quantity} of {code}")


@pytest.mark.parametrize("name", SETTINGS)
def test_invariants_of_two_of_many_bodies(name: str) -> None:
    """Four-products and transfers of every pair of legs."""
    bodies = pair(name)
    for one, other in [*combinations((-1, -2, 1, 2), 2), (1, 1), (-1, -1)]:
        for quantity in ("dot", "transfer") if one != other else ("dot",):
            found, expected = np.broadcast_arrays(
                getattr(bodies.many, quantity)(one, other), getattr(bodies.two, quantity)(one, other)
            )
            slack = 1e-13 * np.max(np.abs(bodies.two.s))
            np.testing.assert_allclose(
                found, expected, rtol=1e-11, atol=slack, err_msg=f"{quantity} of {one} and {other}"
            )
    np.testing.assert_array_equal(bodies.many.s, bodies.two.s)
    assert [bodies.many.mass(code) for code in (-1, -2, 1, 2)] == [bodies.two.mass(code) for code in (-1, -2, 1, 2)]


def test_small_angles_keep_their_digits() -> None:
    """t of elastic scattering at 1e-7 rad, and its product with the beam, to 1e-8 (what the momenta tell)."""
    masses = (MUON, PROTON, MUON, PROTON)
    w = np.array([[100.0]])
    p = Collision(w, 0 * w, 1 + 0 * w).momentum(MUON, PROTON)[0, 0]
    legs = [[np.hypot(p, m), s * p * 1e-7, 0.0, s * p * (1 - 5e-15)] for m, s in ((MUON, 1), (PROTON, -1))]
    many = ManyBody(Collision(w, 0 * w, 1 + 0 * w), masses, np.array(legs)[:, :, None])
    np.testing.assert_allclose(many.transfer(-1, 1), -((p * 1e-7) ** 2), rtol=1e-8)
    np.testing.assert_allclose(many.dot(-1, 1), MUON**2 + (p * 1e-7) ** 2 / 2, rtol=1e-8)


def four(channel: Channel, energy: float, count: int, stretch: float = 1.0) -> ManyBody:
    """Events of a channel, the lab moving along z."""
    momenta, _ = channel.momenta(np.random.default_rng(7).random((channel.axes, count)), energy)
    w = np.full((1, 1), energy)
    collision = Collision(w, np.zeros_like(w), np.full_like(w, stretch), lab_is_cm=stretch == 1.0)
    return ManyBody(collision, (*channel.incoming, *channel.masses), momenta)


def test_products_of_legs_almost_parallel() -> None:
    """p·q of legs down to 1e-6 rad apart, by 50 digits on the same components, to 1e-10 (ε over the angle)."""
    rng = np.random.default_rng(2)
    angle, size = 10.0 ** rng.uniform(-6, 0, 60), rng.uniform(1, 50, (2, 60))
    masses = (0.0, MUON)
    momenta = np.empty((2, 4, 60))
    momenta[0, 1:] = size[0] * np.array([np.sin(angle), 0 * angle, np.cos(angle)])
    momenta[1, 1:] = size[1] * np.array([0 * angle, np.sin(angle), np.cos(angle)])
    for leg, mass in enumerate(masses):
        momenta[leg, 0] = np.sqrt(mass**2 + np.sum(momenta[leg, 1:] ** 2, axis=0))
    w = np.full((1, 1), 200.0)
    found = ManyBody(Collision(w, 0 * w, 1 + 0 * w), (0.0, 0.0, *masses), momenta).dot(1, 2)
    with mp.workdps(50):
        for event in range(60):
            x, y = ([mpf(float(c)) for c in momenta[leg, 1:, event]] for leg in (0, 1))
            energies = [mp.sqrt(mpf(m) ** 2 + sum(c * c for c in v)) for m, v in zip(masses, (x, y), strict=True)]
            exact = energies[0] * energies[1] - sum(a * b for a, b in zip(x, y, strict=True))
            assert float(found[0, event]) == pytest.approx(float(exact), rel=1e-10)


def test_the_lab_has_the_invariants_of_the_cm() -> None:
    """Four-products from lab components, for beams and legs, are those of the cm; momentum is conserved."""
    channel = flat_channel((ELECTRON, PROTON), (ELECTRON, 0.0, PROTON, 0.5))
    bodies = four(channel, 12.0, 200, stretch=4.0)
    parts = {code: bodies.vector(code, LAB).components() for code in (-1, -2, 1, 2, 3, 4)}
    for one, other in combinations(parts, 2):
        x, y = parts[one], parts[other]
        naive = x[0] * y[0] - x[1] * y[1] - x[2] * y[2] - x[3] * y[3]
        np.testing.assert_allclose(naive, np.broadcast_to(bodies.dot(one, other), naive.shape), rtol=1e-11, atol=1e-12)
    np.testing.assert_allclose(
        parts[1] + parts[2] + parts[3] + parts[4], parts[-1] + parts[-2] + 0 * parts[1], atol=1e-12
    )


def test_transfers_are_differences_of_momenta() -> None:
    """(p_x − p_y)² by components, for beams and legs."""
    bodies = four(flat_channel((ELECTRON, PROTON), (ELECTRON, 0.0, PROTON, 0.5)), 12.0, 200)
    for one, other in combinations((-1, -2, 1, 2, 3, 4), 2):
        d = bodies.vector(one, CM).components() - bodies.vector(other, CM).components()
        naive = d[0] ** 2 - d[1] ** 2 - d[2] ** 2 - d[3] ** 2
        np.testing.assert_allclose(np.broadcast_to(bodies.transfer(one, other), naive.shape), naive, atol=1e-12)
    np.testing.assert_array_equal(bodies.transfer(-1, -1), np.zeros((1, 1)))


@pytest.mark.parametrize("legs", [(1, 2), (1, 3, 4), (2,), (1, 2, 3, 4)], ids=str)
def test_rest_frames(legs: tuple[int, ...]) -> None:
    """In the rest frame of a system its momentum vanishes and its energy is its mass; of all legs it is the cm."""
    bodies = four(flat_channel((0.0, 0.0), (0.3, 0.2, 0.1, 0.5)), 12.0, 200, stretch=3.0)
    total = sum(bodies.vector(code, Frame("rest", legs)).components() for code in legs)
    square = sum(bodies.dot(i, j) for i in legs for j in legs)
    np.testing.assert_allclose(np.squeeze(total[1:]), 0.0, atol=1e-12)
    np.testing.assert_allclose(np.squeeze(total[0]), np.squeeze(np.sqrt(square)) + np.zeros(200), rtol=1e-12)


def test_a_fixed_target_recoils_by_the_transfer() -> None:
    """The kinetic energy in the lab of every leg is ((m_T − m)² − t)/2m_T, and agrees with E − m."""
    masses = (ELECTRON, PROTON, ELECTRON, 0.0, PROTON)
    collision = collide(BeamSettings("kinetic", (5.0,), (0.0,), target=-2), masses[:2])
    channel = flat_channel(masses[:2], masses[2:])
    momenta, _ = channel.momenta(np.random.default_rng(3).random((5, 300)), float(collision.sqrt_s[0, 0]))
    bodies = ManyBody(collision, masses, momenta)
    total = sum(bodies.vector(code, LAB).kinetic_energy for code in (1, 2, 3))
    np.testing.assert_allclose(total, 5.0, rtol=1e-11)
    for code in (1, 2, 3):
        vector = bodies.vector(code, LAB)
        np.testing.assert_allclose(vector.kinetic_energy, vector.energy - vector.mass, rtol=1e-9, atol=1e-12)


def test_a_parent_at_rest_and_in_flight() -> None:
    """A decay: the parent's product with a leg is M E*, the recoil (P − p)²; in flight it carries its momentum."""
    channel = flat_channel((1.777,), (ELECTRON, 0.0, 0.0))
    momenta, _ = channel.momenta(np.random.default_rng(4).random((5, 100)), 1.777)
    w = np.full((1, 1), 1.777)
    bodies = ManyBody(Collision(w, 0 * w, 2.5 + 0 * w), (1.777, ELECTRON, 0.0, 0.0), momenta)
    np.testing.assert_allclose(bodies.dot(-1, 1)[0], 1.777 * momenta[0, 0], rtol=1e-13)
    recoil = bodies.transfer(-1, 1)[0]
    np.testing.assert_allclose(recoil, 2 * bodies.dot(2, 3)[0], atol=1e-13)
    flight = bodies.vector(-1, LAB)
    assert flight.pz[0, 0] == pytest.approx(1.777 * np.sinh(np.log(2.5)))
    total = sum(bodies.vector(code, LAB).pz for code in (1, 2, 3))
    np.testing.assert_allclose(total, flight.pz[0, 0], rtol=1e-12)


def test_events_with_an_energy_of_their_own() -> None:
    """A collision with arrays of the events' shape gives quantities of that shape."""
    channel = flat_channel((0.0, 0.0), (0.0,) * 3)
    energy = np.linspace(5.0, 20.0, 50)
    momenta, _ = channel.momenta(np.random.default_rng(5).random((5, 50)), energy)
    bodies = ManyBody(Collision(energy, 0 * energy, 1 + 0 * energy, lab_is_cm=True), (0.0,) * 5, momenta)
    assert bodies.shape == (50,)
    assert bodies.vector(1, LAB).energy.shape == (50,)
    np.testing.assert_allclose(
        sum(bodies.dot(-1, leg) + bodies.dot(-2, leg) for leg in (1, 2, 3)), energy**2, rtol=1e-12
    )


@pytest.fixture(scope="module")
def event() -> Event:
    """Two muons and two photons in a moving lab."""
    reaction = parse_reaction("e- e+ -> mu- mu+ gamma gamma")
    masses = (ELECTRON, ELECTRON, MUON, MUON, 0.0, 0.0)
    (channel,) = channels_of(reaction, masses, (), Limits())
    return Event(reaction, four(channel, 10.0, 500, stretch=1.5))


def values(event: Event, text: str) -> Array:
    """An observable's values."""
    return compile_observable(text, event.reaction).values(event)


def naive(event: Event, frame: Frame = LAB) -> Array:
    """Components of the legs, (leg, 4, event)."""
    return np.stack([event.vector(code, frame).components()[:, 0] for code in (1, 2, 3, 4)])


def test_observables_see_many_bodies(event: Event) -> None:
    """Masses, leading photons, angles, thrust and the like from plain components."""
    lab, cm = naive(event), naive(event, CM)
    pair = lab[0] + lab[1]
    mass = np.sqrt(pair[0] ** 2 - np.sum(pair[1:] ** 2, axis=0))
    np.testing.assert_allclose(values(event, "mass(mu-, mu+)")[0], mass, rtol=1e-11)
    assert values(event, "mass(mu-, mu+, each(gamma))").shape == (2, 1, 500)
    leading = values(event, 'energy(leading(gamma, by="energy"))')
    np.testing.assert_allclose(leading[0], np.maximum(lab[2, 0], lab[3, 0]), rtol=1e-13)
    pts = np.hypot(lab[:2, 1], lab[:2, 2])
    np.testing.assert_allclose(values(event, "max(pt(mu-), pt(mu+))")[0], pts.max(axis=0), rtol=1e-13)
    sizes = np.sqrt(np.sum(cm[:, 1:] ** 2, axis=1))
    subsets = [sum(cm[i, 1:] for i in chosen) for size in (1, 2) for chosen in combinations(range(4), size)]
    best = np.max([np.sqrt(np.sum(v**2, axis=0)) for v in subsets], axis=0)
    np.testing.assert_allclose(values(event, "thrust")[0], 2 * best / sizes.sum(axis=0), rtol=1e-12)
    lengths = np.sqrt(np.sum(lab[:, 1:] ** 2, axis=1))
    cosines = [np.sum(lab[0, 1:] * lab[leg, 1:], axis=0) / (lengths[0] * lengths[leg]) for leg in (2, 3)]
    np.testing.assert_allclose(np.cos(values(event, "angle(mu-, each(gamma))"))[:, 0], cosines, atol=1e-12)


def test_laws_see_many_bodies(event: Event) -> None:
    """What a law asks for: s, products by name and number, masses, lab components; all read-only."""
    assert event.shape == (1, 500)
    total = sum(event.dot("beam_a", leg) + event.dot("beam_b", leg) for leg in ("mu-", "mu+", 3, ("gamma", 2)))
    np.testing.assert_allclose(total, event.s + np.zeros_like(total), rtol=1e-12)
    assert event.mass("mu+") == MUON
    assert event["gamma", 1].shape == (4, 1, 500)
    with pytest.raises(ValueError, match="read-only"):
        event["mu-"][0] = 0.0
