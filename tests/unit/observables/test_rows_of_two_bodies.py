"""Every row of the table that two bodies have, against explicit four-vectors."""

from __future__ import annotations

from collections.abc import Sequence
from functools import cache

import numpy as np
import pytest
from unit.observables.exact import ONE, PAIR, Scene, added, dot, mass, minus, mp, thrust, two_to_two

from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.kinematics import TwoBody
from barnwright.observables import compile_observable, table
from barnwright.reaction import parse_reaction

ELECTRON, MUON, PROTON, PION = 0.00051099895, 0.1056583755, 0.93827208943, 0.13957039
COSINES = (-0.93, -0.4, 0.07, 0.61, 0.98)
AZIMUTH = 0.7

# name: reaction, kinetic energies, masses, direction of beam a, target
COLLISIONS: dict[str, tuple[str, tuple[float, float], tuple[float, float, float, float], int, int | None]] = {
    "7 on 4 GeV": ("e- e+ -> mu- mu+", (7.0, 4.0), (ELECTRON, ELECTRON, MUON, MUON), 1, None),
    "7 on 4 GeV, z along the other": ("e- e+ -> mu- mu+", (7.0, 4.0), (ELECTRON, ELECTRON, MUON, MUON), -1, None),
    "equal beams": ("e- e+ -> mu- mu+", (5.0, 5.0), (ELECTRON, ELECTRON, MUON, MUON), 1, None),
    "photon on an electron": ("gamma e- -> gamma e-", (0.3, 0.0), (0.0, ELECTRON, 0.0, ELECTRON), 1, -2),
    "proton on a proton": ("pi- p -> pi- p", (1.5, 0.0), (PION, PROTON, PION, PROTON), 1, -2),
    "a target that is named first": ("p pi- -> p pi-", (0.0, 1.5), (PROTON, PION, PROTON, PION), -1, -1),
}
every_collision = pytest.mark.parametrize("name", COLLISIONS)


@cache
def events(name: str) -> tuple[Event, list[Scene]]:
    """One batch of shape (1, 5), and the same events in 40 digits."""
    reaction, kinetic, masses, ahead, target = COLLISIONS[name]
    collision = collide(BeamSettings("kinetic", (kinetic[0],), (kinetic[1],), ahead, target), masses[:2])
    cosine = np.array([COSINES])
    event = Event(parse_reaction(reaction), TwoBody(collision, masses, 1 - cosine, 1 + cosine, np.array([[AZIMUTH]])))
    return event, [two_to_two(kinetic, masses, (c, AZIMUTH), ahead) for c in COSINES]


def values(text: str, event: Event) -> list[float]:
    """The values of an observable, one an event."""
    found = compile_observable(text, event.reaction).values(event)
    return [float(v) for v in np.broadcast_to(found, event.shape).ravel()]


def close(found: Sequence[float], exact: Sequence[object], absolute: float = 2e-14) -> bool:
    """Equal to 2e-12 of the value, or absolutely for what is 0 by a cancellation."""
    return found == pytest.approx([float(v) for v in exact], rel=2e-12, abs=absolute)  # type: ignore[arg-type]


LAB_OR_CM = [("", "lab"), (", frame=lab", "lab"), (", frame=cm", "cm")]


@every_collision
@pytest.mark.parametrize(("frame", "kind"), LAB_OR_CM)
@pytest.mark.parametrize("row", ONE)
def test_rows_of_one_particle(name: str, frame: str, kind: str, row: str) -> None:
    """Each outgoing particle in the lab, which is the default, and in the cm."""
    event, scenes = events(name)
    for code in (1, 2):
        exact = [ONE[row](scene.seen(kind)[code]) for scene in scenes]
        assert close(values(f"{row}({code}{frame})", event), exact), code


@every_collision
@pytest.mark.parametrize("row", ONE)
def test_rows_of_one_particle_in_rest_frames(name: str, row: str) -> None:
    """Where both are at rest together, which is the cm, and each where the other one is, if that has a mass."""
    event, scenes = events(name)
    for code, other in ((1, 2), (2, 1)):
        exact = [ONE[row](scene.seen("cm")[code]) for scene in scenes]
        assert close(values(f"{row}({code}, frame=rest(1, 2))", event), exact), code
        if event.mass(other):
            exact = [ONE[row](scene.seen("rest", (other,))[code]) for scene in scenes]
            assert close(values(f"{row}({code}, frame=rest({other}))", event), exact), code


@every_collision
@pytest.mark.parametrize("row", ["energy", "kinetic_energy", "momentum"])
@pytest.mark.parametrize("beam", ["beam_a", "beam_b"])
def test_rows_of_a_beam(name: str, row: str, beam: str) -> None:
    """A beam has energy and momentum in the lab and in the cm."""
    event, scenes = events(name)
    code = {"beam_a": -1, "beam_b": -2}[beam]
    for frame in ("lab", "cm"):
        exact = [ONE[row](scene.seen(frame)[code]) for scene in scenes]
        assert close(values(f"{row}({beam}, frame={frame})", event), exact), frame


@every_collision
@pytest.mark.parametrize(("frame", "kind"), LAB_OR_CM)
@pytest.mark.parametrize("row", PAIR)
def test_rows_of_two_particles(name: str, frame: str, kind: str, row: str) -> None:
    """The two outgoing particles; in the cm they are back to back, so that what measures it is 0 to rounding."""
    event, scenes = events(name)
    exact = [PAIR[row](*(scene.seen(kind)[k] for k in (1, 2))) for scene in scenes]
    assert close(values(f"{row}(1, 2{frame})", event), exact, 1e-12)


@every_collision
def test_angles_to_a_beam(name: str) -> None:
    """The angle between a particle and the beam that moves, in the lab and in the cm."""
    event, scenes = events(name)
    beam, code = ("beam_b", -2) if COLLISIONS[name][1][0] == 0 else ("beam_a", -1)
    for frame in ("lab", "cm"):
        exact = [PAIR["angle"](scene.seen(frame)[code], scene.seen(frame)[1]) for scene in scenes]
        assert close(values(f"angle({beam}, 1, frame={frame})", event), exact, 1e-12)


@every_collision
@pytest.mark.parametrize(("beam", "code"), [("beam_a", -1), ("beam_b", -2)])
@pytest.mark.parametrize("leg", [1, 2])
def test_transfers(name: str, beam: str, code: int, leg: int) -> None:
    """The squared difference of two momenta, and its opposite."""
    event, scenes = events(name)
    exact = [dot(*[minus(scene.lab[code], scene.lab[leg])] * 2) for scene in scenes]
    assert close(values(f"transfer({beam}, {leg})", event), exact)
    assert close(values(f"q2({beam}, {leg})", event), [-t for t in exact])


@every_collision
def test_energies_and_masses_of_the_collision(name: str) -> None:
    """√s, energy fractions, masses of one and of both, and what recoils."""
    event, scenes = events(name)
    root = [mass(scene.total) for scene in scenes]
    assert close(values("sqrt_s", event), root)
    assert close(values("mass(1, 2)", event), root)
    assert close(values("recoil_mass(1, 2)", event), [0] * len(scenes))
    for leg, other in ((1, 2), (2, 1)):
        for frame in ("cm", "lab"):
            exact = [2 * scene.seen(frame)[leg][0] / w for scene, w in zip(scenes, root, strict=True)]
            assert close(values(f"energy_fraction({leg}, frame={frame})", event), exact)
        exact = [2 * scene.seen("cm")[leg][0] / w for scene, w in zip(scenes, root, strict=True)]
        assert close(values(f"energy_fraction({leg})", event), exact)
        assert close(values(f"mass({leg})", event), [mass(scene.lab[leg]) for scene in scenes], 1e-12)
        missing = [mass(minus(added(scene.lab[1], scene.lab[2]), scene.lab[leg])) for scene in scenes]
        assert close(values(f"recoil_mass({leg})", event), missing, 1e-12)
        assert close(values(f"recoil_mass({leg})", event), [mass(scene.lab[other]) for scene in scenes], 1e-12)


@every_collision
def test_two_bodies_have_thrust_one(name: str) -> None:
    """Two momenta back to back lie on one axis."""
    event, scenes = events(name)
    assert values("thrust", event) == [1.0] * len(scenes)
    assert close([1.0], [thrust([scenes[0].seen("cm")[k] for k in (1, 2)])])


def test_two_bodies_are_half_a_turn_apart_at_every_azimuth() -> None:
    """delta_phi is +π to the bit, whatever the rounding of the azimuths, so that no event changes its bin."""
    reaction = parse_reaction("e- e+ -> mu- mu+")
    collision = collide(BeamSettings("sqrt_s", (10.0,)), (0.0, 0.0))
    azimuth = np.linspace(-np.pi, np.pi, 1001)[None, 1:]
    half = np.ones((1, 1))
    event = Event(reaction, TwoBody(collision, (0.0, 0.0, 0.0, 0.0), half, half, azimuth))
    for text in ("delta_phi(mu-, mu+)", "delta_phi(mu+, mu-, frame=cm)"):
        assert np.all(compile_observable(text, reaction).values(event) == np.pi)
    assert np.all(compile_observable("acoplanarity(mu-, mu+)", reaction).values(event) == 0.0)
    assert compile_observable("phi(mu-)", reaction).values(event) == pytest.approx(azimuth)


def test_along_the_beam() -> None:
    """Pseudorapidity is ±∞, which overflow and underflow take; angles and cosines are exact."""
    reaction = parse_reaction("e- e+ -> mu- mu+")
    collision = collide(BeamSettings("sqrt_s", (10.0,)), (0.0, 0.0))
    event = Event(reaction, TwoBody(collision, (0.0, 0.0, MUON, MUON), np.array([[0.0, 2.0]]), np.array([[2.0, 0.0]])))

    def of(text: str) -> list[float]:
        return [float(v) for v in compile_observable(text, reaction).values(event)[0]]

    assert of("pseudorapidity(mu-)") == [np.inf, -np.inf]
    assert of("delta_eta(mu-, mu+)") == [np.inf, -np.inf]
    assert of("delta_r(mu-, mu+)") == [np.inf, np.inf]
    assert of("cos_theta(mu-)") == [1.0, -1.0]
    assert of("theta(mu-)") == [0.0, np.pi]
    assert of("pt(mu-)") == [0.0, 0.0]
    assert of("rapidity(mu-)") == pytest.approx([float(mp.acosh(5 / MUON)), -float(mp.acosh(5 / MUON))])


def test_every_row_is_tested() -> None:
    """The rows of this file and of the n-body file together are the table."""
    tested = {*ONE, *PAIR, "energy_fraction", "mass", "recoil_mass", "transfer", "q2", "sqrt_s", "thrust"}
    assert {row.name for row in table()} == tested | {"helicity_angle"}


def test_arithmetic_over_rows() -> None:
    """Operators, abs, min, max, sqrt, pi and deg, against numpy on the values of the rows."""
    event, _ = events("7 on 4 GeV")
    p, q, c, th = (np.array(values(text, event)) for text in ("pt(mu-)", "energy(mu+)", "cos_theta(mu-)", "theta(mu-)"))
    cases = {
        "pt(mu-) + 2*energy(mu+) - 1": p + 2 * q - 1,
        "-pt(mu-)**2/energy(mu+)": -(p**2) / q,
        "abs(cos_theta(mu-))": np.abs(c),
        "sqrt(pt(mu-)**2 + energy(mu+)**2)": np.hypot(p, q),
        "min(pt(mu-), energy(mu+), 3)": np.minimum(np.minimum(p, q), 3),
        "max(pt(mu-), energy(mu+), 3)": np.maximum(np.maximum(p, q), 3),
        "theta(mu-) / deg": np.degrees(th),
        "theta(mu-) - pi/2": th - np.pi / 2,
        "2**cos_theta(mu-)": 2**c,
        "energy(mu+)**(-1/2)": q**-0.5,
    }
    for text, expected in cases.items():
        assert values(text, event) == pytest.approx(list(expected), rel=1e-14), text
