"""One splitting of a tree: from numbers to the momenta of its parts."""

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
    first, density = _drawn(0, splitting, mass_of_leg(splitting.second), mother, invariants, around)
    second, another = _drawn(1, splitting, first.mass, mother, invariants, around)
    momentum = invariant.momentum(mother, first, second)
    split = Split.of((first.mass, second.mass), (first.square, second.square), momentum)
    direction = angle.draw(cosine, turn, aim_of(splitting, split, mother, around))
    own = mother.mass * direction.density / momentum
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


def mass_of_leg(part: Part) -> Array | None:
    """The mass of a single leg in GeV; None for a system, whose mass is drawn."""
    return np.asarray(part.mass) if part.single else None


def in_turn(number: int, splitting: Splitting) -> tuple[Part, Part]:
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
    parts = in_turn(number, splitting)
    if parts[0].map is None:
        mass = np.asarray(parts[0].mass)
        return Drawn(mass * mass, mass), None
    place = place_of(parts, other, mother, around)
    drawn = invariant.draw(next(invariants), place)
    return drawn, invariant.density(drawn, place)


def aim_of(splitting: Splitting, split: Split, mother: Mother, around: Surroundings) -> Aim:
    """Where the angle of a splitting lives."""
    ends, cut = of_angle(splitting, split, mother, around.incoming)
    return Aim(splitting.angle, ends, cut, split, mother, around.incoming)
