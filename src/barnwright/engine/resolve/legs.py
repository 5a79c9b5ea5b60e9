"""Which beam a request means by a name: by its particle, or as beam_a and beam_b."""

from __future__ import annotations

from barnwright.engine.resolve.findings import Findings
from barnwright.errors import nearest
from barnwright.reaction import Reaction

BEAM_CODES = {"beam_a": -1, "beam_b": -2}


def beam_code(name: str, reaction: Reaction, where: str, findings: Findings) -> int | None:
    """The leg code of the incoming particle called ``name``; None, and a finding, when there is no such beam."""
    if name in BEAM_CODES and len(reaction.incoming) == 2:
        return BEAM_CODES[name]
    matches = [i for i, particle in enumerate(reaction.incoming) if particle == name]
    if len(matches) == 1:
        return -1 - matches[0]
    if matches:
        findings.add(where, name, f"beam_a or beam_b, since both beams are {name}", "beam_a")
    else:
        choices = (*dict.fromkeys(reaction.incoming), *BEAM_CODES)
        findings.add(where, name, f"one of the beams: {', '.join(choices)}", nearest(name, choices))
    return None
