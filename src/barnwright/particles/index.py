"""Finding a particle by its name."""

from __future__ import annotations

import re
from dataclasses import replace
from decimal import Decimal
from functools import lru_cache
from typing import TYPE_CHECKING

from barnwright.errors import BarnwrightError, show

from .data import ParticleData
from .nuclear_mass import bare_mass
from .quantum_numbers import baryon_number, colour, lepton_numbers, spin_states
from .suggestions import suggest
from .table import nuclei, particles, table_version

if TYPE_CHECKING:
    from particle import Particle

__all__ = ["UnknownParticleError", "find", "names", "table_version"]

_OTHER_SPELLINGS = {"H": "H0", "H0": "H"}
_NUCLEUS = re.compile(r"[A-Z][a-z]?\d{1,3}~?", re.ASCII)
_LONGEST = 60


class UnknownParticleError(BarnwrightError, LookupError):
    """No particle has this name.

    Parameters
    ----------
    name
        What was asked for.
    nearest
        The name, or names, that may have been meant; None when nothing is near.
    """

    def __init__(self, name: str, nearest: str | None) -> None:
        self.name = name
        self.nearest = nearest
        super().__init__(name, nearest)

    def __str__(self) -> str:
        near = "" if self.nearest is None else f"; nearest: {self.nearest}"
        return f"no particle is called {show(self.name)}, expected a name as the PDG spells it{near}"


def find(name: str) -> ParticleData:
    """The particle of this name, as the PDG spells it: ``e-``, ``nu(mu)~``, ``K(S)0``, ``W+``, ``u~``, ``C12``.

    Of the nuclei, ``p`` and ``n`` are the nucleons; the Higgs boson answers to ``H0`` and ``H``.

    Raises
    ------
    UnknownParticleError
        A LookupError; its `nearest` names what may have been meant.
    """
    found = _find(name) if len(name) <= _LONGEST else None
    if found is None:
        raise UnknownParticleError(name, suggest(name, names()))
    return found


def names() -> tuple[str, ...]:
    """The names of all particles but the nuclei, in the table's order: the fundamental ones first."""
    return tuple(_by_name())


@lru_cache(maxsize=1024)
def _find(name: str) -> ParticleData | None:
    known = _by_name()
    row = known.get(name) or known.get(_OTHER_SPELLINGS.get(name, name))
    if row is not None:
        return _data(row, particles())
    nucleus = _nucleus(name)
    return None if nucleus is None else _with_bare_mass(_data(nucleus, nuclei()), nucleus)


@lru_cache(maxsize=1)
def _by_name() -> dict[str, Particle]:
    """Rows by name; where two rows share a name, as psi(4160) does, the one with a mass."""
    rows = {row.name: row for row in particles()}
    return rows | {row.name: row for row in particles() if row.mass is not None}


def _nucleus(name: str) -> Particle | None:
    """A nucleus: ``C12``, ``C12~``. The names of thousands are not made for one, the stem is compared."""
    if _NUCLEUS.fullmatch(name) is None:
        return None
    stem, sign = name.removesuffix("~"), (-1 if name.endswith("~") else 1)
    return next((row for row in nuclei() if row.pdg_name == stem and sign * row.pdgid > 0), None)


def _with_bare_mass(data: ParticleData, row: Particle) -> ParticleData:
    electron = _by_name()["e-"]
    if row.mass is None or electron.mass is None:
        return data
    return replace(data, mass=_gev(bare_mass(row.mass, abs(round(data.charge)), electron.mass)))


def _gev(mev: float) -> float:
    """MeV to GeV by a shift of the decimal point, so that 497.611 gives 0.497611 and no neighbour of it."""
    return float(Decimal(repr(mev)).scaleb(-3))


def _data(row: Particle, rows: tuple[Particle, ...]) -> ParticleData:
    """The row in the units of the program; its antiparticle is the row with the opposite number, where there is one."""
    pdg_id = row.pdgid
    antiparticle = next((other.name for other in rows if other.pdgid == -pdg_id), row.name)
    return ParticleData(
        name=row.name,
        pdg_id=int(pdg_id),
        mass=0.0 if row.mass is None else _gev(row.mass),
        mass_known=row.mass is not None,
        width=None if row.width is None else _gev(row.width),
        charge=float(row.charge or 0.0),
        spin_states=spin_states(pdg_id),
        colour=colour(pdg_id),
        baryon_number=baryon_number(pdg_id),
        lepton_numbers=lepton_numbers(pdg_id),
        antiparticle=antiparticle,
        latex=row.latex_name,
        is_self_conjugate=antiparticle == row.name,
    )
