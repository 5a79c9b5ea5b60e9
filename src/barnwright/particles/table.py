"""The table of the `particle` package, read without its 6000 nuclei until a nucleus is asked for.

`particle.Particle.from_name` reads everything and searches it anew at every call (100 ms); here the particles are
read once (some 15 ms) into a class of our own, which leaves the package's own table as it was. Nothing of the package
is imported before that.
"""

from __future__ import annotations

from functools import lru_cache
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from particle import Particle


@lru_cache(maxsize=1)
def particles() -> tuple[Particle, ...]:
    """Every particle but the nuclei, in the table's order."""
    return _rows("particle")


@lru_cache(maxsize=1)
def nuclei() -> tuple[Particle, ...]:
    """The nuclei; the nucleons among them are those of `particles` once more."""
    return _rows("nuclei")


@lru_cache(maxsize=1)
def table_version() -> str:
    """The table that masses come from: ``"particle 1.1.0, PDG table 2026"``."""
    from particle import __version__

    return f"particle {__version__}, PDG table {_newest('particle').removeprefix('particle').removesuffix('.csv')}"


def _newest(kind: str) -> str:
    from particle.data import basepath

    return max(path.name for path in basepath.iterdir() if path.name.startswith(kind) and path.name.endswith(".csv"))


def _rows(kind: str) -> tuple[Particle, ...]:
    from particle import Particle
    from particle.data import basepath

    class Table(Particle):
        """Holds the rows of one file; made anew for every call, so that two callers never share a half-read table."""

        __slots__ = ()

    Table.load_table(basepath.joinpath(_newest(kind)))
    return tuple(Table.all())
