"""Reactions with peaks and limits that between them use every map and every rule."""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import lru_cache
from math import cos, inf, radians

import numpy as np
from numpy.typing import NDArray
from unit.phase_space.volumes import products

from barnwright.peaks import Peak
from barnwright.phase_space import Channel, Limits, channels_of
from barnwright.reaction import parse_reaction

Array = NDArray[np.float64]


@dataclass(frozen=True)
class Case:
    """A reaction at an energy (GeV), with masses of its incoming and outgoing legs, peaks and limits."""

    text: str
    energy: float
    masses: tuple[float, ...]
    peaks: tuple[Peak, ...]
    limits: Limits = field(default_factory=Limits)

    @property
    def incoming(self) -> tuple[float, ...]:
        """Masses of the incoming legs."""
        return self.masses[: len(parse_reaction(self.text).incoming)]

    @property
    def outgoing(self) -> tuple[float, ...]:
        """Masses of the outgoing legs."""
        return self.masses[len(self.incoming) :]

    @property
    def channels(self) -> tuple[Channel, ...]:
        """Its channels."""
        return channels_of(parse_reaction(self.text), self.masses, self.peaks, self.limits)

    def accepts(self, momenta: Array, slack: float = 0.0) -> NDArray[np.bool_]:
        """Which events are inside all limits; ``slack`` widens each by this share of a typical size."""
        dot, inside = products(momenta), np.ones(momenta.shape[2], dtype=bool)
        pairs = [(momenta[leg - 1, 0], ends) for leg, ends in self.limits.energy.items()]
        sizes = np.sqrt(np.sum(np.square(momenta[:, 1:]), axis=1))
        pairs += [(momenta[leg - 1, 3] / sizes[leg - 1], ends) for leg, ends in self.limits.cosine.items()]
        pairs += [(np.hypot(*momenta[leg - 1, 1:3]), (least, inf)) for leg, least in self.limits.pt.items()]
        for legs, ends in self.limits.mass.items():
            square = sum(dot(i, j) for i in legs for j in legs)
            pairs.append((np.sqrt(np.maximum(square, 0.0)), ends))
        pairs += [(self.transfer(momenta, *of), ends) for of, ends in self.limits.transfer.items()]
        for value, (low, high) in pairs:
            room = slack * np.max(np.abs(value))
            inside &= (value >= low - room) & (value <= high + room)
        return inside

    def transfer(self, momenta: Array, beam: int, leg: int) -> Array:
        """(p_beam − p_leg)² in GeV², by components."""
        m, n = self.incoming
        p = np.sqrt((self.energy**2 - (m + n) ** 2) * (self.energy**2 - (m - n) ** 2)) / (2 * self.energy)
        mass, sign = (m, 1.0) if beam == -1 else (n, -1.0)
        energy, px, py, pz = momenta[leg - 1]
        return np.asarray((np.hypot(p, mass) - energy) ** 2 - px**2 - py**2 - (sign * p - pz) ** 2)


RADIATION = (
    Peak("gamma", "soft"),
    Peak("gamma beam_a", "collinear"),
    Peak("gamma beam_b", "collinear"),
    Peak("gamma mu-", "collinear"),
    Peak("gamma mu+", "collinear"),
    Peak("mu- mu+", "power"),
)
WIDE = 0.2 * 91.0
ANGLE = radians(10)

CASES = {
    "two bodies, t and u": Case(
        "e- e- -> e- e-",
        3.0,
        (0.01, 0.01, 0.01, 0.01),
        (Peak("t", "power", power=2.0), Peak("u", "power", power=2.0)),
        Limits(cosine={1: (-0.99, 0.98)}),
    ),
    "two bodies, pt": Case("e- e+ -> mu- mu+", 3.0, (0.0, 0.0, 0.1, 0.1), (Peak("t", "power"),), Limits(pt={2: 0.4})),
    "two bodies, transfer": Case(
        "e- p -> e- p",
        3.0,
        (0.001, 0.94, 0.001, 0.94),
        (Peak("t", "power", power=2),),
        Limits(transfer={(-1, 1): (-2.0, -0.1)}),
    ),
    "a photon and massless muons": Case(
        "e- e+ -> mu- mu+ gamma",
        10.0,
        (0.0,) * 5,
        (*RADIATION, Peak("mu- mu+", "resonance", at=3.0, width=0.3)),
        Limits(
            energy={3: (1.0, inf)},
            cosine={3: (-cos(ANGLE), cos(ANGLE))},
            mass={(1, 2): (1.0, inf)},
            angle={(1, 3): radians(5), (2, 3): radians(5)},
        ),
    ),
    "a photon and massive muons": Case(
        "e- e+ -> mu- mu+ gamma", 10.0, (0.0005, 0.0005, 0.3, 0.3, 0.0), RADIATION, Limits(energy={3: (0.2, 4.0)})
    ),
    "a photon without cuts": Case("e- e+ -> mu- mu+ gamma", 10.0, (0.0005, 0.0005, 0.3, 0.3, 0.0), RADIATION),
    "two photons": Case(
        "e- e+ -> mu- mu+ gamma gamma",
        10.0,
        (0.0, 0.0, 0.3, 0.3, 0.0, 0.0),
        RADIATION,
        Limits(energy={3: (0.3, inf), 4: (0.3, inf)}),
    ),
    "a gluon": Case(
        "e- e+ -> u u~ g",
        91.0,
        (0.0,) * 5,
        (Peak("g", "soft"), Peak("g u", "collinear"), Peak("g u~", "collinear")),
        Limits(energy={3: (2.0, inf)}, pt={3: 1.0}),
    ),
    "Z Z* below": Case(
        "H0 -> e- e+ mu- mu+",
        125.0,
        (125.0, 0.0, 0.0, 0.1, 0.1),
        (Peak("e- e+", "resonance", at=91.0, width=WIDE), Peak("mu- mu+", "resonance", at=91.0, width=WIDE)),
    ),
    "Z Z above": Case(
        "H0 -> e- e+ e- e+", 220.0, (220.0, 0.0, 0.0, 0.0, 0.0), (Peak("e- e+", "resonance", at=91.0, width=WIDE),)
    ),
    "a top and its W": Case(
        "e- e+ -> b b~ mu- nu(mu)~",
        365.0,
        (0.0, 0.0, 4.0, 4.0, 0.1, 0.0),
        (
            Peak("mu- nu(mu)~", "resonance", at=80.0, width=8.0),
            Peak("b~ mu- nu(mu)~", "resonance", at=172.0, width=10.0),
        ),
        Limits(mass={(3, 4): (40.0, 200.0)}),
    ),
    "two exchanges": Case(
        "e- e+ -> e- e+ mu- mu+",
        10.0,
        (0.1, 0.1, 0.1, 0.1, 0.3, 0.3),
        (
            Peak("beam_a e-", "power", at=0.5),
            Peak("beam_b e+", "power", at=0.5, power=1.5),
            Peak("mu- mu+", "logarithm"),
        ),
        Limits(transfer={(-1, 1): (-inf, -0.5)}),
    ),
    "five bodies": Case(
        "e- e+ -> mu- mu+ e- e+ gamma",
        300.0,
        (0.0, 0.0, 0.1, 0.1, 0.0, 0.0, 0.0),
        (
            Peak("mu- mu+", "resonance", at=91.0, width=WIDE),
            Peak("e- e+", "power", power=0.5),
            Peak("gamma", "soft"),
        ),
        Limits(energy={5: (3.0, inf)}, mass={(3, 4): (5.0, inf)}),
    ),
}


@lru_cache
def channels(name: str) -> tuple[Channel, ...]:
    """The channels of a case, made once."""
    return CASES[name].channels


def events(channel: Channel, name: str, count: int, seed: int = 1) -> tuple[Array, Array]:
    """Momenta and density of a channel of a case."""
    u = np.random.default_rng(seed).random((channel.axes, count))
    return channel.momenta(u, CASES[name].energy)


EVERY = [(name, number) for name in CASES for number in range(len(channels(name)))]
