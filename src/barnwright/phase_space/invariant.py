"""Which map serves an invariant: m² of a part from a number u, and its density."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.incoming import Surroundings
from barnwright.phase_space.maps import collinear, flat, paired, power, resonance, soft, volume
from barnwright.phase_space.mother import Mother, momentum_from_gap, momentum_from_masses, momentum_from_rise
from barnwright.phase_space.parts import InvariantMap, Part
from barnwright.phase_space.windows import Window, of_invariant

Array = NDArray[np.float64]

FLOOR = 1e-9
"""A pole at the edge of the range is moved below it by this share of the largest m²: what no cut excludes is finite."""


PEAKS = ("power", "logarithm", "collinear")
"""The maps that make m² − (Σ of masses)²."""


class Drawn(NamedTuple):
    """A part's m² and mass (GeV², GeV); M² − m² and m² − (Σ of masses)² (GeV²) where the map made that."""

    square: Array
    mass: Array
    gap: Array | None = None
    rise: Array | None = None


class Place(NamedTuple):
    """Where an invariant lives.

    Attributes
    ----------
    part, map, window : of the invariant
    mother : Mother
    energy : array, GeV
        √s.
    bend : Bend or None
        Of u, for the sake of a resonance that is drawn later.
    """

    part: Part
    map: InvariantMap
    window: Window
    mother: Mother
    energy: Array
    bend: paired.Bend | None = None


def place_of(parts: tuple[Part, Part], other: Array | None, mother: Mother, around: Surroundings) -> Place:
    """Where the invariant of the first of two parts lives; ``other``: the mass of the second (GeV) if known."""
    part, partner = parts
    assert part.map is not None
    window = of_invariant(parts, other, mother, around.incoming)
    place = Place(part, part.map, window, mother, around.energy)
    drawn_later = other is None and partner.map is not None and partner.map.shape == "resonance"
    if part.map.shape != "resonance" or not drawn_later:
        return place
    return place._replace(bend=_bend(place, partner))


def draw(u: Array, place: Place) -> Drawn:
    """The invariant of a part."""
    chosen, window = place.map, place.window
    if chosen.shape == "soft":
        gap = soft.value(u, *_gaps(place))
        square = np.maximum(place.mother.square - gap, 0.0)
        return Drawn(square, np.sqrt(square), gap)
    if chosen.shape == "volume":
        mass = _volume_value(u, place)
        return Drawn(mass * mass, mass)
    if chosen.shape == "flat":
        square = flat.value(u, window.low, window.high)
    elif chosen.shape == "resonance":
        square = _resonance_value(u, place)
    else:
        ahead = power.value(u, _start(place), window.high - window.low, _exponent(chosen))
        square = window.low + ahead
        return Drawn(square, np.sqrt(square), rise=ahead + (window.low - place.part.mass**2))
    return Drawn(square, np.sqrt(square))


def density(drawn: Drawn, place: Place) -> Array:
    """du/dm² in GeV⁻² of an invariant; 0 outside its window (but for rounding). Only the soft map needs the gap."""
    found, window, square = _density(drawn, place), place.window, drawn.square
    if not window.cut:
        return found
    slack = 1e-10 * np.abs(window.high)
    inside = (square >= window.low - slack) & (square <= window.high + slack) & (window.low < window.high)
    return np.where(inside, found, 0.0)


def _density(drawn: Drawn, place: Place) -> Array:
    chosen, window, square = place.map, place.window, drawn.square
    if chosen.shape == "soft":
        gap = place.mother.square - square if drawn.gap is None else drawn.gap
        return soft.density(gap, *_gaps(place))
    if chosen.shape == "volume":
        return _volume_density(drawn.mass, place)
    if chosen.shape == "flat":
        return flat.density(window.low, window.high)
    if chosen.shape == "resonance":
        return _resonance_density(square, place)
    start, ahead = _start(place), square - window.low
    if drawn.rise is not None:
        ahead = drawn.rise - (window.low - place.part.mass**2)
    return power.density(ahead + start, start, window.high - window.low, _exponent(chosen))


def momentum(mother: Mother, first: Drawn, second: Drawn) -> Array:
    """p* in GeV, by the road that keeps most digits."""
    if first.gap is not None:
        return momentum_from_gap(mother.mass, first.gap, second.mass, first.mass)
    if second.gap is not None:
        return momentum_from_gap(mother.mass, second.gap, first.mass, second.mass)
    if mother.rise is not None and first.mass.ndim == 0 and second.mass.ndim == 0:
        return momentum_from_rise(mother.mass, mother.rise, first.mass, second.mass)
    return momentum_from_masses(mother.mass, first.mass, second.mass)


def _gaps(place: Place) -> tuple[Array, Array]:
    """The ends of M² − m²."""
    return place.mother.square - place.window.high, place.mother.square - place.window.low


def _start(place: Place) -> Array:
    """The distance in GeV² from the pole to the lower end of the window."""
    low, energy = place.window.low, place.energy
    if place.map.shape == "collinear":
        emitter = place.part.mass
        offset = collinear.offset(energy, emitter, place.map.first, place.map.second)
        return np.maximum(low - emitter * emitter, offset)
    return np.maximum(low - place.map.first, FLOOR * place.window.high)


def _exponent(chosen: InvariantMap) -> float:
    return chosen.second if chosen.shape == "power" else 1.0


def _room(place: Place) -> volume.Room:
    return volume.Room(place.part.mass, place.window.kinetic, len(place.part.legs) - 1)


def _volume_value(u: Array, place: Place) -> Array:
    room, window = _room(place), place.window
    if window.cut:
        low, high = _fractions(window, room)
        u = low + u * (high - low)
    return volume.value(u, room)


def _volume_density(mass: Array, place: Place) -> Array:
    room, window = _room(place), place.window
    found = volume.density(mass, room)
    if not window.cut:
        return found
    low, high = _fractions(window, room)
    return found / (high - low)


def _fractions(window: Window, room: volume.Room) -> tuple[Array, Array]:
    """u at the ends of a window."""
    return volume.fraction(np.sqrt(window.low), room), volume.fraction(np.sqrt(window.high), room)


def _resonance_value(u: Array, place: Place) -> Array:
    v = u if place.bend is None else paired.value(u, place.bend)
    return resonance.value(v, place.window.low, place.window.high, *_line(place.part))


def _resonance_density(square: Array, place: Place) -> Array:
    found = resonance.density(square, place.window.low, place.window.high, *_line(place.part))
    return found if place.bend is None else found * paired.density(square, place.bend)


def _line(part: Part) -> paired.Line:
    assert part.map is not None
    return paired.Line(part.map.first, part.map.second)


def _bend(place: Place, partner: Part) -> paired.Bend | None:
    """None where both resonances have room on their lines."""
    lines, mass = (_line(place.part), _line(partner)), place.mother.mass
    if np.all(np.sqrt(lines[0].centre) + np.sqrt(lines[1].centre) < mass):
        return None
    return paired.bend_of((place.window.low, place.window.high), lines, mass, partner.square[0])
