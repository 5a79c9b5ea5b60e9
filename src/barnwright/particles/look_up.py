"""Masses and widths as defaults of parameters: numbers, or an error, never nothing."""

from __future__ import annotations

from .index import find
from .table import table_version


def mass_of(name: str) -> float:
    """The mass in GeV of a particle as the PDG spells it: ``mass_of("Z0")``.

    Raises
    ------
    LookupError
        When no particle has this name, or the table has no mass of it.
    """
    particle = find(name)
    if not particle.mass_known:
        raise LookupError(f"the particle table has no mass of {name}")
    return particle.mass


def width_of(name: str) -> float:
    """The total width in GeV; raises as `mass_of` does."""
    width = find(name).width
    if width is None:
        raise LookupError(f"the particle table has no width of {name}")
    return width


def table_source() -> str:
    """Where these numbers come from, for the source of a parameter."""
    return f"PDG, {table_version()}"
