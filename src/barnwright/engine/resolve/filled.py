"""The defaults of a request that depend on its process: what is at rest, what flies along +z, which parts count."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from barnwright.documents import DecayBeams, FixedTargetBeams, Request
from barnwright.engine.plan import ProcessSource
from barnwright.process import Process


def filled(request: Request, offers: Sequence[tuple[Process, ProcessSource]]) -> Request:
    """The request that a prediction repeats; asked again, it means the same."""
    changes: dict[str, Any] = {}
    names = offers[0][0].legs.incoming
    if not isinstance(request.beams, DecayBeams) and len(names) == 2:
        beams = _beams(request, names if names[0] != names[1] else ("beam_a", "beam_b"))
        if beams:
            changes["beams"] = request.beams.model_copy(update=beams)
    parts = {tuple(process.contributions) for process, _ in offers}
    if request.contributions is None and len(parts) == 1 and any(parts):
        changes["contributions"] = next(iter(parts))
    return request.model_copy(update=changes) if changes else request


def _beams(request: Request, names: tuple[str, ...]) -> dict[str, str]:
    """Target and the beam along +z, where the request leaves them open."""
    found: dict[str, str] = {}
    beams, ahead = request.beams, names[0]
    if isinstance(beams, FixedTargetBeams):
        target = beams.target if beams.target is not None else names[1]
        if beams.target is None:
            found["target"] = target
        ahead = names[1] if target in (names[0], "beam_a") else names[0]
    if getattr(beams, "along_z", None) is None:
        found["along_z"] = ahead
    return found
