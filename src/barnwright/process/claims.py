"""What a process claims about itself: symmetries and limits that a checker can try."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Claims:
    """Statements about |M|² beyond its numbers; legs by number, outgoing particle, ``beam_a`` or ``beam_b``.

    Attributes
    ----------
    exchange : pairs of legs
        |M|² stays the same when the two momenta are exchanged.
    crossing : names of processes, ``plugin/name``
        The same amplitude with legs moved to the other side.
    gauge_legs : legs
        An amplitude vanishes when the polarisation vector of one of these is replaced by its momentum.
    limits : sentences
        Known limits, each with its source.
    """

    exchange: tuple[tuple[str | int, str | int], ...] = ()
    crossing: tuple[str, ...] = ()
    gauge_legs: tuple[str | int, ...] = ()
    limits: tuple[str, ...] = ()
