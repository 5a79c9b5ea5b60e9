"""What the person who asked should know about the inputs."""

from __future__ import annotations

from barnwright.engine.plan import Note
from barnwright.process import Process


def notes_of(process: Process) -> tuple[Note, ...]:
    """Notes that hold at every point: what the reaction does not conserve."""
    return tuple(Note("conservation", text) for text in process.legs.conservation_notes())
