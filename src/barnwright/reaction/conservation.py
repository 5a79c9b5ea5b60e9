"""What a reaction does not conserve; counted in whole thirds, so that quarks add up exactly."""

from __future__ import annotations

from collections.abc import Callable
from functools import lru_cache
from typing import TYPE_CHECKING

from barnwright.particles import find

if TYPE_CHECKING:
    from barnwright.particles import ParticleData


def _lepton_thirds(family: int) -> Callable[[ParticleData], int]:
    return lambda particle: 3 * particle.lepton_numbers[family]


_CONSERVED: dict[str, Callable[[ParticleData], int]] = {
    "charge": lambda particle: round(3 * particle.charge),
    "baryon number": lambda particle: round(3 * particle.baryon_number),
    "electron number": _lepton_thirds(0),
    "muon number": _lepton_thirds(1),
    "tau number": _lepton_thirds(2),
}


@lru_cache(maxsize=1024)
def unbalanced(incoming: tuple[str, ...], outgoing: tuple[str, ...]) -> tuple[str, ...]:
    """A sentence for each number that differs between the two sides, given by names of particles."""
    sides = [[find(name) for name in side] for side in (incoming, outgoing)]
    sums = {label: [sum(map(thirds, side)) for side in sides] for label, thirds in _CONSERVED.items()}
    return tuple(
        f"{label} is not conserved: {_written(before)} before, {_written(after)} after"
        for label, (before, after) in sums.items()
        if before != after
    )


def _written(thirds: int) -> str:
    return str(thirds // 3) if thirds % 3 == 0 else f"{thirds}/3"
