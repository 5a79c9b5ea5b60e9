"""The beams in the centre of mass, as splittings with a transfer see them."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics.invariants import below_pole, light_cone
from barnwright.phase_space.boost import Beside, Vector
from barnwright.phase_space.mother import Mother, momentum_from_masses

Array = NDArray[np.float64]


class Incoming(NamedTuple):
    """Both beams: momentum along ±z, and energies; GeV."""

    masses: tuple[float, float]
    momentum: Array
    energies: tuple[Array, Array]

    @classmethod
    def of(cls, masses: tuple[float, float], energy: Array) -> Incoming:
        """From their masses and √s."""
        first, second = np.asarray(masses[0]), np.asarray(masses[1])
        momentum = momentum_from_masses(energy, first, second)
        energies = tuple(np.sqrt(momentum * momentum + mass * mass) for mass in (first, second))
        return cls(masses, momentum, (energies[0], energies[1]))


class Surroundings(NamedTuple):
    """√s in GeV, and the beams; None for a decay."""

    energy: Array
    incoming: Incoming | None

    @classmethod
    def of(cls, masses: tuple[float, ...], energy: Array) -> Surroundings:
        """From the masses of the one or two incoming particles and √s, GeV."""
        return cls(energy, Incoming.of((masses[0], masses[1]), energy) if len(masses) == 2 else None)


class Beam(NamedTuple):
    """One beam in a mother's rest frame.

    Attributes
    ----------
    mass : float, GeV
    momentum, energy : |k| and E, GeV
    direction : its unit vector along the first and the third axis
    in_cm : E and p_z in the centre of mass, GeV
    """

    mass: float
    momentum: Array
    energy: Array
    direction: tuple[Array, Array]
    in_cm: tuple[Array, Array]

    @property
    def plus(self) -> Array:
        """E + |p_z| in the centre of mass, GeV."""
        return self.in_cm[0] + np.abs(self.in_cm[1])

    @property
    def beside(self) -> Beside:
        """What the momentum of a part close to the beam is made of."""
        rest = np.asarray(self.mass * self.mass / (self.energy + self.momentum))
        return Beside(self.in_cm, self.momentum, rest, self.direction)


def beam_in(mother: Mother, incoming: Incoming, number: int) -> Beam:
    """Beam a (0) or b (1) in the rest frame of a mother."""
    mass, momentum, energy = incoming.masses[number], incoming.momentum, incoming.energies[number]
    sign = 1.0 - 2.0 * number
    in_cm = energy, sign * momentum
    if mother.axes is None:
        return Beam(mass, momentum, energy, (np.zeros(()), np.asarray(sign)), in_cm)
    cosine, sine = sign * mother.axes.cosine, sign * mother.axes.sine
    large = 1.0 + np.abs(cosine)
    small = sine * sine / large
    ahead = cosine > 0
    rest, grow = mass * mass / (energy + momentum), (mother.vector[0] + mother.axes.momentum) / mother.mass
    forward = (rest + momentum * np.where(ahead, large, small)) / grow
    backward = (rest + momentum * np.where(ahead, small, large)) * grow
    along, aside = 0.5 * (forward - backward), -momentum * sine
    size = np.sqrt(along * along + aside * aside)
    return Beam(mass, size, np.sqrt(size * size + mass * mass), (aside / size, along / size), in_cm)


def nearest(beam: Beam, energy: Array, momentum: Array, square: Array, exchanged: float = 0.0) -> Array:
    """M² − t in GeV² at zero angle between a beam and a product of this E, p and m² in one frame."""
    return below_pole((beam.energy + beam.momentum, beam.mass), energy + momentum, square, 0.0, exchanged)


def distance(beam: Beam, number: int, vector: Vector, square: Array, exchanged: float) -> Array:
    """M² − t in GeV² of beam a (0) or b (1) and a product with this momentum in the centre of mass."""
    energy, px, py, pz = vector
    across = px * px + py * py
    plus, _ = light_cone(energy, pz if number == 0 else -pz, square, across)
    return below_pole((beam.plus, beam.mass), plus, square, across, exchanged)
