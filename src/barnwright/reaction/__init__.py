"""The reaction: what goes in and what comes out, and which leg a name means.

- A reaction is written ``e- e+ -> mu- mu+``: names as the PDG spells them, spaces between them, one arrow. One incoming
  particle is a decay, two are a collision; ``X`` alone after the arrow stands for anything (inclusive).
- Leg codes: -1 and -2 are the incoming particles in written order (``beam_a``, ``beam_b``; a decaying parent is
  ``beam_a``), 1 to n the outgoing ones. A bare name is an outgoing particle, never a beam.
"""

from __future__ import annotations

from .legs import BEAMS, LegError, LegKey
from .parse import ReactionError, parse_reaction
from .reaction import Reaction

__all__ = ["BEAMS", "LegError", "LegKey", "Reaction", "ReactionError", "parse_reaction"]
