"""The rows that need more than two bodies, against explicit four-vectors."""

from __future__ import annotations

import numpy as np
import pytest
from unit.observables.exact import ONE, PAIR, Scene, added, angle, boosted, mass, minus, mp, thrust
from unit.observables.n_body import three_bodies

from barnwright.event import Event
from barnwright.observables import compile_observable

MASSES = (0.1056583755, 0.1056583755, 0.0)


@pytest.fixture(scope="module", name="batch")
def _batch() -> tuple[Event, list[Scene]]:
    return three_bodies("e- e+ -> mu- mu+ gamma", MASSES)


def check(text: str, batch: tuple[Event, list[Scene]], exact: list[object]) -> None:
    """The observable has these values, to 1e-11."""
    event, _ = batch
    found = np.broadcast_to(compile_observable(text, event.reaction).values(event), event.shape)
    assert [float(v) for v in found] == pytest.approx([float(v) for v in exact], rel=1e-11, abs=1e-11)  # type: ignore[arg-type]


@pytest.mark.parametrize("row", ONE)
@pytest.mark.parametrize(
    ("text", "kind", "rest"),
    [("lab", "lab", ()), ("cm", "cm", ()), ("rest(mu-, gamma)", "rest", (1, 3)), ("rest(mu-, mu+, gamma)", "cm", ())],
)
def test_rows_of_one_particle(
    batch: tuple[Event, list[Scene]], row: str, text: str, kind: str, rest: tuple[int, ...]
) -> None:
    """Each particle in the lab, in the cm and where two of three are at rest."""
    for code, name in ((1, "mu-"), (2, "mu+"), (3, "gamma")):
        exact = [ONE[row](scene.seen(kind, rest)[code]) for scene in batch[1]]
        check(f"{row}({name}, frame={text})", batch, exact)  # type: ignore[arg-type]


@pytest.mark.parametrize("row", PAIR)
def test_rows_of_two_particles(batch: tuple[Event, list[Scene]], row: str) -> None:
    """Pairs in the lab and where two are at rest; delta_phi has a sign."""
    check(f"{row}(mu+, gamma)", batch, [PAIR[row](scene.lab[2], scene.lab[3]) for scene in batch[1]])
    seen = [scene.seen("rest", (1, 3)) for scene in batch[1]]
    check(f"{row}(mu+, mu-, frame=rest(mu-, gamma))", batch, [PAIR[row](momenta[2], momenta[1]) for momenta in seen])


@pytest.mark.parametrize("legs", [(1, 2), (1, 3), (2, 3), (1, 2, 3), (3, 1), (2,)])
def test_masses_and_recoil_of_subsets(batch: tuple[Event, list[Scene]], legs: tuple[int, ...]) -> None:
    """The mass of some, and the mass of everything else."""
    names = ", ".join(str(leg) for leg in legs)
    systems = [added(*(scene.lab[leg] for leg in legs)) for scene in batch[1]]
    check(f"mass({names})", batch, [mass(system) for system in systems])
    missing = [mass(minus(scene.total, system)) for scene, system in zip(batch[1], systems, strict=True)]
    check(f"recoil_mass({names})", batch, missing)  # type: ignore[arg-type]


def test_thrust(batch: tuple[Event, list[Scene]]) -> None:
    """Over all axes, in the cm: between 2/3 and 1 for three bodies."""
    exact = [thrust([scene.seen("cm")[k] for k in (1, 2, 3)]) for scene in batch[1]]
    check("thrust", batch, exact)  # type: ignore[arg-type]
    assert all(2 / 3 <= value <= 1 for value in exact)


@pytest.mark.parametrize(("name", "code"), [("mu-", 1), ("gamma", 3)])
@pytest.mark.parametrize("system", ["(mu-, gamma)", "(gamma, mu-)"])
def test_helicity_angle(batch: tuple[Event, list[Scene]], name: str, code: int, system: str) -> None:
    """Between the particle where its system is at rest and the flight of the system in the cm."""
    exact = []
    for scene in batch[1]:
        cm = scene.seen("cm")
        flight = added(cm[1], cm[3])
        exact.append(angle(boosted(cm[code], flight), flight))
    check(f"helicity_angle({name}, of={system})", batch, exact)  # type: ignore[arg-type]


def test_the_two_of_a_system_fly_apart(batch: tuple[Event, list[Scene]]) -> None:
    """Their helicity angles add up to half a turn."""
    text = "helicity_angle(mu-, of=(mu-, mu+)) + helicity_angle(mu+, of=(mu-, mu+))"
    check(text, batch, [mp.pi] * len(batch[1]))
