"""Units of energy, area, time and angle, and the text form of a number with its error.

- Inside the program ħ = c = 1 and everything is a power of GeV; angles are in rad. A unit appears where a person reads.
- 1 b = 1e-28 m². A cross section of 1 GeV⁻² is `HBARC2` = 0.389379… mb.
- `HBARC2` and `HBAR` follow from h, e and c, which the SI fixes exactly since 2019: they have no error and no edition.
"""

from __future__ import annotations

from .constants import HBAR, HBARC2
from .convert import AREA_UNITS, ENERGY_UNITS, AreaUnit, EnergyUnit, UnitError, convert, from_natural
from .quantity import Quantity

__all__ = [
    "AREA_UNITS",
    "ENERGY_UNITS",
    "HBAR",
    "HBARC2",
    "AreaUnit",
    "EnergyUnit",
    "Quantity",
    "UnitError",
    "convert",
    "from_natural",
]
