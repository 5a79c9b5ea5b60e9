"""Helicities of the legs, and what polarised beams make of the average over the initial ones.

Rules of this file
------------------
- A helicity is written as a whole number: twice its value for fermions (±1), its value for bosons (photon ±1, massive
  vector −1, 0, 1).
- P = (N_R − N_L)/(N_R + N_L) by helicity in the cm, so a helicity ±1 of two has the weight (1 ± P)/2.
- Neutrinos have one helicity: left-handed, antineutrinos right-handed.
"""

from __future__ import annotations

from functools import lru_cache
from itertools import product
from math import prod

from barnwright.errors import RequestError, Violation, show
from barnwright.particles import find
from barnwright.reaction import Reaction

Combination = tuple[int, ...]
Polarisation = tuple[float, float]
UNPOLARISED: Polarisation = (0.0, 0.0)


def helicities_of(name: str) -> tuple[int, ...]:
    """The physical helicities of a particle, in rising order.

    Raises
    ------
    RequestError
        For a particle whose spin the table does not know (a nucleus).
    """
    particle = find(name)
    states = particle.spin_states
    if states is None:
        expected = f"a particle whose spin the table knows, not {name}"
        raise RequestError([Violation("laws.helicities", show(name), expected)])
    if states == 1:
        chiral = any(particle.lepton_numbers)
        return (-1 if sum(particle.lepton_numbers) > 0 else 1,) if chiral else (0,)
    if states == 2:
        return (-1, 1)
    return tuple(range(-(states - 1), states, 2)) if states % 2 == 0 else tuple(range(-(states // 2), states // 2 + 1))


@lru_cache(maxsize=256)
def all_combinations(reaction: Reaction) -> tuple[Combination, ...]:
    """Every combination of helicities, one a leg in written order, the last leg varying fastest."""
    return tuple(product(*(helicities_of(name) for name in (*reaction.incoming, *reaction.outgoing))))


@lru_cache(maxsize=1024)
def weight(reaction: Reaction, combination: Combination, polarisation: tuple[float, ...]) -> float:
    """The share of a combination's initial helicities and colours in polarised beams."""
    shares = []
    for name, helicity, amount in zip(reaction.incoming, combination, polarisation, strict=False):
        states = len(helicities_of(name))
        shares.append((1 + helicity * amount) / 2 if states == 2 else 1 / states)
        shares.append(1 / find(name).colour)
    return prod(shares)


def can_be_polarised(name: str) -> bool:
    """Whether a beam of this particle has two helicities to choose from."""
    return find(name).spin_states == 2
