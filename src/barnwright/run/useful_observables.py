"""Observables that make sense for a reaction, as texts that a request may use as they stand."""

from __future__ import annotations

from collections.abc import Iterator

from barnwright.observables import ObservableError, Row, compile_observable, table
from barnwright.process import Process
from barnwright.reaction import Reaction
from barnwright.run.ready_request import has_final_state

#: What a two-body final state fixes by itself: back to back in the cm, with the mass and recoil of the whole.
FIXED_BY_TWO_BODIES = frozenset({"acoplanarity", "delta_phi", "helicity_angle", "mass", "phi", "recoil_mass", "thrust"})


def useful_observables(process: Process) -> tuple[str, ...]:
    """One text or two (lab and cm) for every row of the table that says something about this process.

    Rows of one particle are written in the lab for every kind of outgoing particle, in the cm and with others for the
    first; ``each(...)`` where there are several of a kind. Where all that there is is σ(s), it is the energy alone.
    """
    reaction = process.legs
    if not has_final_state(process):
        return ("sqrt_s",)
    rows = [row for row in table() if not (len(reaction.outgoing) == 2 and row.name in FIXED_BY_TWO_BODIES)]
    return tuple(text for row in rows for text in _texts(row, reaction) if _stands(text, reaction))


def _texts(row: Row, reaction: Reaction) -> Iterator[str]:
    first, second = _first_two(reaction)
    one = f"each({first})" if reaction.outgoing.count(first) > 1 else first
    if row.shape == "none":
        yield row.name
    elif row.shape == "one":
        yield f"{row.name}({one})"
        if row.frame == "lab":
            others = (name for name in dict.fromkeys(reaction.outgoing) if name != first)
            yield from (f"{row.name}({name})" for name in others if reaction.outgoing.count(name) == 1)
            yield f"{row.name}({one}, frame=cm)"
    elif row.shape == "transfer":
        yield f"{row.name}(beam_a, {one})"
    elif row.shape == "within":
        yield f"{row.name}({first}, of=({first}, {second}))"
    else:
        yield f"{row.name}({first}, {second})"


def _first_two(reaction: Reaction) -> tuple[str, str]:
    names = list(dict.fromkeys(reaction.outgoing))
    return (names[0], names[1]) if len(names) > 1 else (names[0], names[0])


def _stands(text: str, reaction: Reaction) -> bool:
    try:
        compile_observable(text, reaction)
    except ObservableError:
        return False
    return True
