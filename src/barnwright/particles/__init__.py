"""Particles by the names of the Particle Data Group, with masses in GeV; the table is read when first asked for."""

from __future__ import annotations

from .data import ParticleData
from .index import UnknownParticleError, find, names, table_version
from .look_up import mass_of, table_source, width_of

__all__ = [
    "ParticleData",
    "UnknownParticleError",
    "find",
    "mass_of",
    "names",
    "table_source",
    "table_version",
    "width_of",
]
