"""One splitting of a tree, both ways: from numbers to the momenta of its parts, and from momenta to the density."""

from __future__ import annotations

from collections.abc import Iterator
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space import angle, invariant
from barnwright.phase_space.angle import Aim
from barnwright.phase_space.boost import Vector, at_rest, beside_beam, into_cm
from barnwright.phase_space.incoming import Surroundings
from barnwright.phase_space.invariant import Drawn, place_of
from barnwright.phase_space.mother import Mother, Split
from barnwright.phase_space.parts import Part, Splitting
from barnwright.phase_space.systems import Systems
from barnwright.phase_space.windows import of_angle

Array = NDArray[np.float64]
Turn = tuple[Array, Array]
Numbers = tuple[Iterator[Array], Array, Turn]


class Made(NamedTuple):
    """The parts of a splitting, their momenta, and the density of the splitting's own numbers."""

    parts: tuple[Drawn, Drawn]
    vectors: tuple[Vector, Vector]
    density: Array


def make(splitting: Splitting, mother: Mother, numbers: Numbers, around: Surroundings) -> Made:
    """Split a mother.

    Parameters
    ----------
    numbers : the u of invariants (as many are taken as there are parts with legs to split), that of the cosine, and
        cosine and sine of the azimuth
    """
    invariants, cosine, turn = numbers
    first, density = _drawn(0, splitting, _mass_of_leg(splitting.second), mother, invariants, around)
    second, another = _drawn(1, splitting, first.mass, mother, invariants, around)
    momentum = invariant.momentum(mother, first, second)
    split = Split.of((first.mass, second.mass), (first.square, second.square), momentum)
    direction = angle.draw(cosine, turn, _aim(splitting, split, mother, around))
    own = mother.mass / momentum * direction.density
    for factor in (density, another):
        own = own if factor is None else own * factor
    return Made((first, second), _vectors(mother, split, direction), own)


def _vectors(mother: Mother, split: Split, direction: angle.Drawn) -> tuple[Vector, Vector]:
    """The momenta of both parts in the centre of mass."""
    if mother.axes is None:
        return at_rest(split.energies, direction.inside)
    first, second = into_cm(mother.vector[0], mother.mass, mother.axes, direction.inside)
    if direction.beside is not None:
        first = beside_beam(mother.vector[0], mother.mass, mother.axes, *direction.beside)
    return first, second


def tell(splitting: Splitting, systems: Systems, around: Surroundings) -> Array:
    """The density of the splitting's own numbers, of events that any channel made."""
    mother, legs = systems.mother(splitting.mother), (splitting.first.legs, splitting.second.legs)
    squares, masses = (systems.square(legs[0]), systems.square(legs[1])), (systems.mass(legs[0]), systems.mass(legs[1]))
    if mother.axes is None:
        _, px, py, pz = systems.vector(legs[0])
        momentum = np.sqrt(px * px + py * py + pz * pz)
    else:
        product, least = systems.product(*legs), masses[0] * masses[1]
        momentum = np.sqrt(np.maximum((product - least) * (product + least), 0.0)) / mother.mass
    density = mother.mass / momentum
    for number, part in enumerate((splitting.first, splitting.second)):
        if part.map is not None:
            known = _mass_of_leg(splitting.second) if number == 0 else masses[0]
            place = place_of(_in_turn(number, splitting), known, mother, around)
            gap = _gap(legs, number, systems, mother) if part.map.shape == "soft" else None
            rise = systems.rise(part.legs) if part.map.shape in invariant.PEAKS else None
            density = density * invariant.density(Drawn(squares[number], masses[number], gap, rise), place)
    aim = _aim(splitting, Split.of(masses, squares, momentum), mother, around)
    return density * angle.density(systems.vector(legs[0]), squares[0], aim)


def _gap(legs: tuple[tuple[int, ...], tuple[int, ...]], number: int, systems: Systems, mother: Mother) -> Array:
    """M² − m² of a part in GeV², from the other one, without cancellation."""
    other = legs[1 - number]
    if mother.axes is None:
        return 2.0 * mother.mass * systems.vector(other)[0] - systems.square(other)
    return systems.square(other) + 2.0 * systems.product(*legs)


def _mass_of_leg(part: Part) -> Array | None:
    """The mass of a single leg in GeV; None for a system, whose mass is drawn."""
    return np.asarray(part.mass) if part.single else None


def _in_turn(number: int, splitting: Splitting) -> tuple[Part, Part]:
    """The first (0) or second (1) part, and then the other."""
    parts = splitting.first, splitting.second
    return parts[number], parts[1 - number]


def _drawn(
    number: int,
    splitting: Splitting,
    other: Array | None,
    mother: Mother,
    invariants: Iterator[Array],
    around: Surroundings,
) -> tuple[Drawn, Array | None]:
    """The mass of a part and its density; a leg has the mass that it has."""
    parts = _in_turn(number, splitting)
    if parts[0].map is None:
        mass = np.asarray(parts[0].mass)
        return Drawn(mass * mass, mass), None
    place = place_of(parts, other, mother, around)
    drawn = invariant.draw(next(invariants), place)
    return drawn, invariant.density(drawn, place)


def _aim(splitting: Splitting, split: Split, mother: Mother, around: Surroundings) -> Aim:
    ends, cut = of_angle(splitting, split, mother, around.incoming)
    return Aim(splitting.angle, ends, cut, split, mother, around.incoming)
