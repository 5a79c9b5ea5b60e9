"""Events of three bodies, with explicit momenta in plain numpy: what an event asks of a phase space."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray
from unit.observables.exact import Scene, added, boosted, mpf

from barnwright.event import Event
from barnwright.kinematics import FourVector, Frame
from barnwright.reaction import parse_reaction

Array = NDArray[np.float64]


class Explicit:
    """Momenta given one by one: arrays (4, event) by leg code, in the lab."""

    def __init__(self, scenes: list[Scene], masses: dict[int, float]) -> None:
        self._scenes, self._masses = scenes, masses

    @property
    def shape(self) -> tuple[int, ...]:
        return (len(self._scenes),)

    def _array(self, code: int, kind: str, rest: tuple[int, ...] = ()) -> Array:
        return np.array([[float(c) for c in scene.seen(kind, rest)[code]] for scene in self._scenes]).T

    @property
    def s(self) -> Array:
        return np.square(self.sqrt_s)

    @property
    def sqrt_s(self) -> Array:
        return self._array(-1, "cm")[0] + self._array(-2, "cm")[0]

    @property
    def turns(self) -> bool:
        return False

    def mass(self, code: int) -> float:
        return self._masses[code]

    def dot(self, first: int, second: int) -> Array:
        x, y = self._array(first, "lab"), self._array(second, "lab")
        return x[0] * y[0] - np.sum(x[1:] * y[1:], axis=0)

    def transfer(self, first: int, second: int) -> Array:
        return self._masses[first] ** 2 + self._masses[second] ** 2 - 2 * self.dot(first, second)

    def vector(self, code: int, frame: Frame) -> FourVector:
        energy, px, py, pz = self._array(code, frame.kind, frame.legs)
        return FourVector.from_components(energy, px, py, pz, self._masses[code])


def three_bodies(
    reaction: str, masses: tuple[float, float, float], events: int = 12, seed: int = 5
) -> tuple[Event, list[Scene]]:
    """Events with random momenta that balance in the cm, massless beams along z there, and a lab that moves along z."""
    generator = np.random.default_rng(seed)
    scenes = []
    for first, second in generator.normal(size=(events, 2, 3)):
        momenta = [[mpf(float(c)) for c in p] for p in (first, second)]
        momenta.append([-a - b for a, b in zip(*momenta, strict=True)])
        cm = {
            k: ((mpf(m) ** 2 + sum(c * c for c in p)) ** mpf("0.5"), *p)
            for k, (m, p) in enumerate(zip(masses, momenta, strict=True), 1)
        }
        half = sum(v[0] for v in cm.values()) / 2
        cm |= {-1: (half, mpf(0), mpf(0), half), -2: (half, mpf(0), mpf(0), -half)}
        moving = (mpf(5) / 4, mpf(0), mpf(0), -mpf(3) / 4)
        scenes.append(Scene({code: boosted(v, moving) for code, v in cm.items()}))  # type: ignore[arg-type]
    assert all(abs(added(*(s.lab[k] for k in (1, 2, 3)))[3] - s.total[3]) < mpf(10) ** -30 for s in scenes)
    kinematics = Explicit(scenes, {-1: 0.0, -2: 0.0, **dict(enumerate(masses, 1))})
    return Event(parse_reaction(reaction), kinematics), scenes
