"""Masses and widths of the PDG's table, as the `particle` library carries them; read when a process is loaded.

`Particle.from_pdgid` reads the table with all its nuclei (0.1 s); here the particles alone are read, once.
"""

from __future__ import annotations

from decimal import Decimal
from functools import lru_cache

from particle import Particle, __version__
from particle.data import basepath

Z, J_PSI, PSI_2S, UPSILON, PHI, RHO, OMEGA, DELTA = 23, 443, 100443, 553, 333, 113, 223, 2224
"""Numbers of the PDG's numbering scheme."""

SOURCE = f"PDG, the table of particle {__version__}"
"""Where these numbers come from, for the source of a parameter."""


class _Table(Particle):
    """Rows of our own: the library's table stays as it is."""

    __slots__ = ()


@lru_cache(maxsize=1)
def _rows() -> dict[int, Particle]:
    files = [path for path in basepath.iterdir() if path.name.startswith("particle") and path.name.endswith(".csv")]
    _Table.load_table(max(files, key=lambda path: path.name))
    return {int(row.pdgid): row for row in _Table.all()}


def mass(pdg_id: int) -> float:
    """The mass in GeV.

    Raises
    ------
    ValueError
        Where the table has none.
    """
    return _gev(_rows()[pdg_id].mass, pdg_id, "mass")


def width(pdg_id: int) -> float:
    """The total width in GeV.

    Raises
    ------
    ValueError
        Where the table has none.
    """
    return _gev(_rows()[pdg_id].width, pdg_id, "width")


def _gev(mev: float | None, pdg_id: int, what: str) -> float:
    """MeV to GeV by a shift of the decimal point, so that 91187.9 gives 91.1879 and no neighbour of it."""
    if mev is None:
        raise ValueError(f"the particle table has no {what} of particle {pdg_id}")
    return float(Decimal(repr(mev)).scaleb(-3))
