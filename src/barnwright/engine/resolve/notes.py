"""What the person who asked should know about the inputs."""

from __future__ import annotations

import numpy as np

from barnwright.beams import collide
from barnwright.engine.plan import Note
from barnwright.engine.setting import Setting
from barnwright.process import Process


def notes_of(process: Process, setting: Setting) -> tuple[Note, ...]:
    """Notes on conservation laws, validity and thresholds."""
    found = [Note("conservation", text) for text in process.legs.conservation_notes()]
    collision = collide(setting.beams, setting.masses[:2])
    if process.valid is not None and process.valid.sqrt_s is not None:
        low, high = process.valid.sqrt_s
        if np.any((collision.sqrt_s < low) | (collision.sqrt_s > high)):
            text = f"√s lies outside {low:g} to {high:g} GeV, where {process.name} is valid: {process.valid.text}"
            found.append(Note("outside_validity", text))
    return tuple(found)
