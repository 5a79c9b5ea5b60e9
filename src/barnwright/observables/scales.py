"""Units as constants of the language: an observable divided by one of them is in that unit."""

from __future__ import annotations

import math

SCALES: dict[str, tuple[str, float]] = {
    "deg": ("rad", math.pi / 180),
    "eV": ("GeV", 1e-9),
    "keV": ("GeV", 1e-6),
    "MeV": ("GeV", 1e-3),
    "TeV": ("GeV", 1e3),
}
"""Name: the unit that it is a part or a multiple of, and how much of it."""
