"""Flat n-body phase space as a channel: legs split off one by one, invariants as phase space distributes them."""

from __future__ import annotations

from collections.abc import Sequence
from math import inf

from barnwright.phase_space.channel import Channel
from barnwright.phase_space.limits import OPEN, Bounds, Limits
from barnwright.phase_space.parts import InvariantMap, Part, Splitting

Legs = tuple[int, ...]


def flat_channel(incoming: tuple[float, ...], outgoing: tuple[float, ...], limits: Limits | None = None) -> Channel:
    """The channel that favours nothing: massless legs have the same weight everywhere.

    Parameters
    ----------
    incoming, outgoing : masses in GeV
    limits : Limits
        Decide which leg leaves first: one with bounds on direction or energy, not one of a group whose mass has.
    """
    bounds = Limits() if limits is None else limits
    order = splitting_order(range(1, len(outgoing) + 1), bounds)
    splittings = []
    for place in range(len(order) - 1):
        mother, leg, rest = order[place:], order[place : place + 1], order[place + 1 :]
        parts = part_of(leg, outgoing, bounds), part_of(rest, outgoing, bounds)
        splittings.append(Splitting(tuple(sorted(mother)), *parts))
    return Channel("flat", incoming, outgoing, tuple(splittings))


def splitting_order(legs: Sequence[int], limits: Limits) -> Legs:
    """Which leg leaves first: bounded ones before free ones, members of a group with bounds on its mass last."""
    grouped = {leg for group in limits.mass for leg in group}
    return tuple(sorted(legs, key=lambda leg: (leg in grouped, -limits.on(leg), leg)))


def part_of(legs: Sequence[int], masses: tuple[float, ...], limits: Limits, chosen: InvariantMap | None = None) -> Part:
    """A part with what the limits say of it; a system without a chosen map gets that of phase space."""
    own = tuple(sorted(legs))
    mass = sum(masses[leg - 1] for leg in own)
    energy = _energy(own, masses, limits)
    if len(own) > 1:
        square, emission = _square(own, mass, masses, limits), _emission(own, masses, limits)
        return Part(own, mass, square, energy, emission=emission, map=chosen or InvariantMap())
    leg = own[0]
    transfers = tuple((code, *ends) for (code, of), ends in sorted(limits.transfer.items()) if of == leg)
    cosine, pt = limits.cosine.get(leg, OPEN), limits.pt.get(leg, 0.0)
    return Part(own, mass, (mass * mass, inf), energy, cosine, pt, transfers)


def _energy(legs: Legs, masses: tuple[float, ...], limits: Limits) -> Bounds:
    """Bounds on the energy of legs together, GeV."""
    least = [limits.least_energy(leg, masses[leg - 1]) for leg in legs]
    most = sum(limits.energy.get(leg, OPEN)[1] for leg in legs)
    bounded = any(energy > masses[leg - 1] for leg, energy in zip(legs, least, strict=True))
    return (sum(least) if bounded else -inf, most)


def _square(legs: Legs, mass: float, masses: tuple[float, ...], limits: Limits) -> Bounds:
    """Bounds on m² in GeV², from bounds on the mass of these legs, of some of them, and of more than them."""
    least, most = mass, inf
    for group, (low, high) in limits.mass.items():
        if set(group) <= set(legs):
            least = max(least, low + mass - sum(masses[leg - 1] for leg in group))
        if set(group) >= set(legs):
            most = min(most, high + mass - sum(masses[leg - 1] for leg in group))
    return (least * least if least > mass else mass * mass, most * most)


def _emission(legs: Legs, masses: tuple[float, ...], limits: Limits) -> tuple[float, float] | None:
    """Of a massive and a massless leg: the least energy of the latter, and the mass of the former, GeV."""
    light, heavy = min(legs, key=lambda leg: masses[leg - 1]), max(legs, key=lambda leg: masses[leg - 1])
    least = limits.least_energy(light, 0.0)
    if len(legs) != 2 or masses[light - 1] > 0 or masses[heavy - 1] == 0 or least == 0:
        return None
    return least, masses[heavy - 1]
