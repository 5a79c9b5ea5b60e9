"""Which map serves the angles of a splitting: a direction from two numbers u, and its density in the cosine.

In the whole, which rests, the third axis is +z, along beam a; in a moving mother it is her flight in the centre of
mass. The azimuth is even everywhere.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.boost import Beside, Inside, Vector, around, around_beam
from barnwright.phase_space.incoming import Beam, Incoming, beam_in, distance, nearest
from barnwright.phase_space.maps import cosine, transfer, two_sided
from barnwright.phase_space.mother import Mother, Split
from barnwright.phase_space.parts import AngleMap
from barnwright.phase_space.windows import EVERYWHERE, SMALL, Ends

Array = NDArray[np.float64]
Halves = tuple[Array, Array]

SLACK = 1e-10


class Aim(NamedTuple):
    """Where an angle lives: its map, the ends of 1 − cos to the third axis and whether cuts made them, surroundings."""

    map: AngleMap
    ends: Ends
    cut: bool
    split: Split
    mother: Mother
    incoming: Incoming | None


class Pole(NamedTuple):
    """Of a transfer: the beam, M (GeV), 2kp and M² − t at zero angle (GeV²), and δ."""

    beam: Beam
    exchanged: float
    slope: Array
    nearest: Array
    delta: Array


class Drawn(NamedTuple):
    """A direction.

    Attributes
    ----------
    inside : Inside
        The splitting in the mother's rest frame, with respect to her flight.
    density : array
        du/dcos.
    beside : Inside and Beside, or None
        In a moving mother: the splitting with respect to the beam whose transfer peaks, and the beam.
    """

    inside: Inside
    density: Array
    beside: tuple[Inside, Beside] | None = None


def draw(u: Array, turn: tuple[Array, Array], aim: Aim) -> Drawn:
    """The direction of the first part; ``turn`` is cosine and sine of the azimuth."""
    halves, density = _draw(u, aim)
    own = Inside(aim.split.momentum, aim.split.small, halves, around(halves, turn))
    if aim.map.shape != "transfer" or aim.mother.axes is None:
        return Drawn(own, density)
    beam = _pole(aim).beam.beside
    inside = Inside(own.momentum, own.small, *around_beam(beam.direction, halves, own.transverse))
    return Drawn(inside, density, (own, beam))


def _draw(u: Array, aim: Aim) -> tuple[Halves, Array]:
    """1 ∓ cos to the axis of the map, for a beam in a moving mother, or else to the third axis; and du/dcos."""
    shape, power = aim.map.shape, aim.map.power
    if shape == "uniform":
        return cosine.value(u, *aim.ends) if aim.cut else cosine.everywhere(u), cosine.density(*aim.ends)
    if shape == "two_sided":
        poles = _poles(aim)
        deltas = poles[0].delta, poles[1].delta
        ahead, behind = two_sided.value(u, aim.ends, deltas)
        distances = ahead + deltas[0], behind + deltas[1]
        return (ahead, behind), two_sided.density(distances, aim.ends, deltas)
    ends, delta = _own_ends(aim), _softness(aim)[1] if shape == "soft" else _pole(aim).delta
    x = transfer.value(u, ends, delta, power)
    density = transfer.density(x + delta, ends, delta, power)
    return ((2.0 - x, x) if _backward(aim) else (x, 2.0 - x)), density


def density(vector: Vector, square: Array, aim: Aim) -> Array:
    """du/dcos for the first part with this momentum and m²; 0 outside the window (but for rounding)."""
    found = _density(vector, square, aim)
    if not aim.cut:
        return found
    x, slack = _position(vector, aim)
    low, high = aim.ends
    return np.where((x >= low - slack) & (x <= high + slack) & (low < high), found, 0.0)


def _density(vector: Vector, square: Array, aim: Aim) -> Array:
    shape, power = aim.map.shape, aim.map.power
    if shape == "uniform":
        return cosine.density(*aim.ends)
    if shape == "soft":
        reach, delta = _softness(aim)
        return transfer.density(vector[0] / reach, _own_ends(aim), delta, power)
    if shape == "two_sided":
        first, second = _poles(aim)
        distances = _distance(first, 0, vector, square), _distance(second, 1, vector, square)
        return two_sided.density(distances, aim.ends, (first.delta, second.delta))
    pole = _pole(aim)
    return transfer.density(_distance(pole, _number(aim), vector, square), _own_ends(aim), pole.delta, power)


def _position(vector: Vector, aim: Aim) -> tuple[Array, Array | float]:
    """1 − cos to the third axis, and what rounding may do to it."""
    if aim.mother.axes is None:
        return 1.0 - vector[3] / np.maximum(aim.split.momentum, SMALL), SLACK
    reach = _reach(aim)
    middle = aim.mother.vector[0] / aim.mother.mass * aim.split.energies[0]
    return 1.0 - (vector[0] - middle) / reach, SLACK * (1.0 + middle / reach)


def _number(aim: Aim) -> int:
    return 0 if aim.map.axis == "a" else 1


def _backward(aim: Aim) -> bool:
    """Whether the pole lies at cos = −1 of the third axis."""
    return aim.map.shape == "soft" or (aim.map.axis == "b" and aim.mother.axes is None)


def _own_ends(aim: Aim) -> Ends:
    """The ends of the distance from the map's own pole."""
    if aim.map.shape == "transfer" and aim.mother.axes is not None:
        return EVERYWHERE
    low, high = aim.ends
    return (2.0 - high, 2.0 - low) if _backward(aim) else (low, high)


def _reach(aim: Aim) -> Array:
    """β γ p*, GeV: half the range of the first part's energy in the centre of mass."""
    assert aim.mother.axes is not None
    return np.maximum(aim.mother.axes.momentum / aim.mother.mass * aim.split.momentum, SMALL)


def _softness(aim: Aim) -> tuple[Array, Array]:
    """`_reach`, and the least energy of the first part in its units."""
    assert aim.mother.axes is not None
    grow = (aim.mother.vector[0] + aim.mother.axes.momentum) / aim.mother.mass
    small, reach = aim.split.small[0], _reach(aim)
    least = 0.5 * (small * grow + (small + 2.0 * aim.split.momentum) / grow)
    return reach, least / reach


def _pole(aim: Aim) -> Pole:
    """The pole of a map with one transfer."""
    return _pole_of(_number(aim), aim.map.masses[_number(aim)], aim)


def _poles(aim: Aim) -> tuple[Pole, Pole]:
    """The poles of a map with a transfer from each beam."""
    return _pole_of(0, aim.map.masses[0], aim), _pole_of(1, aim.map.masses[1], aim)


def _pole_of(number: int, mass: float, aim: Aim) -> Pole:
    assert aim.incoming is not None
    beam, split = beam_in(aim.mother, aim.incoming, number), aim.split
    slope = np.maximum(2.0 * beam.momentum * split.momentum, SMALL)
    close = nearest(beam, split.energies[0], split.momentum, split.squares[0], mass)
    return Pole(beam, mass, slope, close, transfer.delta(close, slope))


def _distance(pole: Pole, number: int, vector: Vector, square: Array) -> Array:
    """x + δ of a momentum: (M² − t)/2kp, but where δ has its floor."""
    away = distance(pole.beam, number, vector, square, pole.exchanged)
    return np.asarray(away / pole.slope + (pole.delta - pole.nearest / pole.slope))
