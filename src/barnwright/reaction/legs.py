"""From what somebody calls a leg to its code."""

from __future__ import annotations

from functools import lru_cache
from typing import TYPE_CHECKING

from barnwright.errors import BarnwrightError, Violation, nearest, show
from barnwright.particles import UnknownParticleError, find

if TYPE_CHECKING:
    from .reaction import Reaction

BEAMS = {"beam_a": -1, "beam_b": -2}

LegKey = str | int | tuple[str, int]


class LegError(BarnwrightError, LookupError):
    """A leg that the reaction does not have, or a name that several legs share.

    Parameters
    ----------
    key
        What was asked for, as `show` shows it.
    expected
        What would be right, candidates named.
    nearest
        The candidate that may have been meant, or None.
    """

    def __init__(self, key: str, expected: str, nearest: str | None = None) -> None:
        self.key = key
        self.expected = expected
        self.nearest = nearest
        super().__init__(key, expected, nearest)

    def __str__(self) -> str:
        return str(Violation("leg", self.key, self.expected, self.nearest))


@lru_cache(maxsize=4096)
def code_of(reaction: Reaction, key: LegKey) -> int:
    """The code of a leg; `Reaction.leg` says what a key may be.

    Raises
    ------
    LegError
        When no leg, or more than one, answers to the key.
    """
    if isinstance(key, int):
        return _numbered(reaction, key)
    if isinstance(key, tuple):
        return _kth(reaction, *key)
    if key in beams_of(reaction):
        return BEAMS[key]
    legs = _named(reaction, key)
    if len(legs) != 1:
        raise _not_one(reaction, key, legs)
    return legs[0]


def beams_of(reaction: Reaction) -> tuple[str, ...]:
    """The names of the incoming legs: one for a decay, two for a collision."""
    return tuple(BEAMS)[: len(reaction.incoming)]


def _numbered(reaction: Reaction, number: int) -> int:
    if reaction.inclusive or not 1 <= number <= len(reaction.outgoing):
        raise LegError(show(number), _candidates(reaction))
    return number


def _kth(reaction: Reaction, name: str, k: int) -> int:
    legs = _named(reaction, name)
    if not legs:
        raise LegError(show((name, k)), _candidates(reaction), nearest(name, reaction.outgoing))
    if not 1 <= k <= len(legs):
        raise LegError(show((name, k)), f"a number from 1 to {len(legs)}, since {len(legs)} {name} come out")
    return legs[k - 1]


def _named(reaction: Reaction, name: str) -> tuple[int, ...]:
    """The outgoing legs of this name, also when it is another spelling of the particle's name."""
    if reaction.inclusive:
        return ()
    if name not in reaction.outgoing:
        try:
            name = find(name).name
        except UnknownParticleError:
            return ()
    return tuple(i for i, outgoing in enumerate(reaction.outgoing, 1) if outgoing == name)


def _not_one(reaction: Reaction, name: str, legs: tuple[int, ...]) -> LegError:
    if legs:
        pairs = " or ".join(f'("{name}", {k})' for k in range(1, len(legs) + 1))
        return LegError(show(name), f"one particle; {len(legs)} {name} come out, so take {pairs}")
    beams = dict(zip(reaction.incoming, beams_of(reaction), strict=True))
    outgoing = () if reaction.inclusive else reaction.outgoing
    near = beams.get(name) or nearest(name, (*outgoing, *beams.values()))
    return LegError(show(name), _candidates(reaction), near)


def _candidates(reaction: Reaction) -> str:
    outgoing = () if reaction.inclusive else (*dict.fromkeys(reaction.outgoing), f"1 to {len(reaction.outgoing)}")
    return f"a leg of {reaction.text}: {', '.join([*outgoing, *beams_of(reaction)])}"
