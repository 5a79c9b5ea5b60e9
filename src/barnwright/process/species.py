"""Which legs a declaration means: by number, as beam_a and beam_b, or all legs of a particle's species."""

from __future__ import annotations

from functools import lru_cache

from barnwright.particles import find
from barnwright.reaction import Reaction

BEAMS = {"beam_a": -1, "beam_b": -2}


@lru_cache(maxsize=4096)
def codes_of(reaction: Reaction, leg: str | int) -> tuple[int, ...]:
    """The codes of a leg (``beam_a`` −1, ``beam_b`` −2, a number), or of all legs of a particle and its antiparticle.

    Raises
    ------
    LookupError
        When the reaction has no such leg; the message names those it has.
    """
    names = _names(reaction)
    code = BEAMS.get(leg) if isinstance(leg, str) else leg
    if code in names:
        return (code,)
    found = tuple(code for code, name in names.items() if name in _species(leg))
    if not found:
        raise LookupError(f"{leg!r} is no leg of {reaction.text}, expected one of {', '.join(leg_choices(reaction))}")
    return found


def leg_choices(reaction: Reaction) -> tuple[str, ...]:
    """Every word that names legs of the reaction: its particles, then the beams."""
    beams = tuple(name for name, code in BEAMS.items() if code in _names(reaction))
    return (*dict.fromkeys(_names(reaction).values()), *beams)


def _names(reaction: Reaction) -> dict[int, str]:
    """The particles by code; a final state X has none."""
    outgoing = () if reaction.inclusive else reaction.outgoing
    return {**{-1 - i: p for i, p in enumerate(reaction.incoming)}, **dict(enumerate(outgoing, 1))}


def _species(leg: str | int) -> set[str]:
    try:
        return {str(leg), find(str(leg)).antiparticle}
    except LookupError:
        return set()
