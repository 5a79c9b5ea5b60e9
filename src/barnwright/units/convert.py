"""Conversion between units of one kind, by ratios of exact fractions: 1 pb is 1000 fb to the last bit."""

from __future__ import annotations

from fractions import Fraction
from functools import lru_cache
from math import pi
from typing import TYPE_CHECKING, Literal, get_args, overload

from barnwright.errors import BarnwrightError, nearest, show

from .constants import HBAR, HBARC2

if TYPE_CHECKING:
    import numpy as np
    from numpy.typing import NDArray

AreaUnit = Literal["b", "mb", "ub", "µb", "nb", "pb", "fb", "ab", "cm2", "m2", "GeV^-2"]
EnergyUnit = Literal["eV", "keV", "MeV", "GeV", "TeV"]
AREA_UNITS: tuple[str, ...] = get_args(AreaUnit)
ENERGY_UNITS: tuple[str, ...] = get_args(EnergyUnit)

_MICRO = Fraction(1, 10**6)
_SIZES: dict[str, dict[str, Fraction]] = {
    "an area": {
        "b": Fraction(1),
        "mb": Fraction(1, 10**3),
        "ub": _MICRO,
        "µb": _MICRO,
        "nb": Fraction(1, 10**9),
        "pb": Fraction(1, 10**12),
        "fb": Fraction(1, 10**15),
        "ab": Fraction(1, 10**18),
        "cm2": Fraction(10**24),
        "m2": Fraction(10**28),
        "GeV^-2": Fraction(HBARC2),
    },
    "an energy": {
        "eV": Fraction(1, 10**9),
        "keV": _MICRO,
        "MeV": Fraction(1, 10**3),
        "GeV": Fraction(1),
        "TeV": Fraction(10**3),
    },
    "a time": {"s": Fraction(1), "GeV^-1": Fraction(HBAR)},
    "an angle": {"rad": Fraction(1), "deg": Fraction(pi) / 180},
}
_NATURAL = {"an area": "GeV^-2", "an energy": "GeV", "a time": "GeV^-1", "an angle": "rad"}
_KINDS = {unit: kind for kind, sizes in _SIZES.items() for unit in sizes}


class UnitError(BarnwrightError, ValueError):
    """A unit that does not exist, or two that measure different things; the message is all it holds."""


@overload
def convert(value: float, from_unit: str, to_unit: str) -> float: ...
@overload
def convert(value: NDArray[np.float64], from_unit: str, to_unit: str) -> NDArray[np.float64]: ...
def convert(value: float | NDArray[np.float64], from_unit: str, to_unit: str) -> float | NDArray[np.float64]:
    """The same quantity in another unit of its kind.

    Parameters
    ----------
    value
        A number or an array of any shape, in `from_unit`.
    from_unit, to_unit
        Areas (`AREA_UNITS`), energies (`ENERGY_UNITS`), times (``s``, ``GeV^-1``) or angles (``rad``, ``deg``).

    Raises
    ------
    UnitError
        A ValueError: an unknown unit, with the nearest one; or units of two kinds.
    """
    return value * _ratio(from_unit, to_unit)


def from_natural(unit: str) -> float:
    """How many of `unit` one natural unit of its kind is (GeV⁻², GeV, GeV⁻¹ or rad).

    ``cross_section_in_gev * from_natural("pb")`` is in pb.

    Raises
    ------
    UnitError
        For an unknown unit, with the nearest one.
    """
    return _ratio(_NATURAL[_kind(unit)], unit)


@lru_cache(maxsize=256)
def _ratio(from_unit: str, to_unit: str) -> float:
    kind, other = _kind(from_unit), _kind(to_unit)
    if kind != other:
        raise UnitError(f"{from_unit} measures {kind} and {to_unit} {other}: there is no conversion")
    return float(_SIZES[kind][from_unit] / _SIZES[kind][to_unit])


def _kind(unit: str) -> str:
    if unit in _KINDS:
        return _KINDS[unit]
    near = nearest(unit, _KINDS)
    ending = f"; nearest: {near}" if near else ""
    raise UnitError(f"no unit is called {show(unit)}, expected one of {', '.join(_KINDS)}{ending}")
