"""One splitting of a tree: from momenta, whichever channel made them, to the density.

What channels have in common (sums, invariants, momenta in rest frames) is worked out once, in `Systems`.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space import angle, invariant
from barnwright.phase_space.incoming import Surroundings
from barnwright.phase_space.invariant import Drawn, place_of
from barnwright.phase_space.parts import Part, Splitting
from barnwright.phase_space.steps import aim_of, mass_of_leg
from barnwright.phase_space.systems import Legs, Systems

Array = NDArray[np.float64]


def tell(splitting: Splitting, systems: Systems, around: Surroundings) -> Array:
    """The density of the splitting's own numbers."""
    first, second = splitting.first, splitting.second
    mother, split = systems.mother(splitting.mother), systems.split(splitting.mother, first.legs, second.legs)
    density = mother.mass / split.momentum
    if first.map is not None:
        density = density * _invariant((first, second), mass_of_leg(second), splitting.mother, systems, around)
    if second.map is not None:
        density = density * _invariant((second, first), split.masses[0], splitting.mother, systems, around)
    aim = aim_of(splitting, split, mother, around)
    return np.asarray(density * angle.density(systems.vector(first.legs), split.squares[0], aim))


def _invariant(
    parts: tuple[Part, Part], known: Array | None, mother: Legs, systems: Systems, around: Surroundings
) -> Array:
    """The density of the first of two parts' m²; ``known`` is the mass of the second where it is drawn earlier."""
    place = place_of(parts, known, systems.mother(mother), around)
    return invariant.density(_drawn(parts[0], parts[1].legs, mother, systems), place)


def _drawn(part: Part, other: Legs, mother: Legs, systems: Systems) -> Drawn:
    """A part's invariant, in the form that its map makes."""
    assert part.map is not None
    gap = systems.gap(mother, part.legs, other) if part.map.shape == "soft" else None
    rise = systems.rise(part.legs) if part.map.shape in invariant.PEAKS else None
    return Drawn(systems.square(part.legs), systems.mass(part.legs), gap, rise)
