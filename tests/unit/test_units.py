"""Units: exact ratios, published constants, and how numbers are written."""

from __future__ import annotations

import subprocess
import sys

import numpy as np
import pytest
from scipy import constants

from barnwright.units import (
    AREA_UNITS,
    ENERGY_UNITS,
    HBAR,
    HBARC2,
    Quantity,
    UnitError,
    convert,
    from_natural,
)


def test_conversion_constant_is_the_published_one() -> None:
    """(ħc)² is 0.389 379 372 1… mb GeV² (Review of Particle Physics, table 1.1 Physical constants; from memory)."""
    assert pytest.approx(0.3893793721, rel=2e-10) == HBARC2 * 1e3


def test_constants_are_those_of_scipy() -> None:
    """The numbers written out are CODATA's, which scipy.constants holds."""
    assert pytest.approx(constants.hbar / constants.e * 1e-9, rel=1e-15) == HBAR
    hbarc = constants.value("reduced Planck constant times c in MeV fm")  # 197.326 980 4… MeV fm, given to 10 digits
    assert pytest.approx(hbarc**2 * 1e-8, rel=1e-9) == HBARC2


@pytest.mark.parametrize(
    ("value", "source", "target", "expected"),
    [
        (1.0, "pb", "fb", 1000.0),
        (1.0, "b", "cm2", 1e-24),
        (1.0, "m2", "b", 1e28),
        (1.0, "µb", "ub", 1.0),
        (5.0, "mb", "nb", 5e6),
        (1.0, "ab", "fb", 1e-3),
        (511.0, "keV", "MeV", 0.511),
        (13.0, "TeV", "GeV", 13000.0),
        (2.0, "eV", "eV", 2.0),
        (1.0, "GeV^-2", "b", HBARC2),
    ],
)
def test_conversions_are_exact(value: float, source: str, target: str, expected: float) -> None:
    """Powers of ten come out to the last bit."""
    assert convert(value, source, target) == expected


def test_angles_convert_on_arrays() -> None:
    """An array keeps its shape."""
    degrees = np.array([[0.0, 90.0], [180.0, 360.0]])
    np.testing.assert_allclose(convert(degrees, "deg", "rad"), np.radians(degrees), rtol=1e-15)


def test_natural_units() -> None:
    """One GeV⁻² is 389.379 μb, a width of 1 GeV a lifetime of 6.582e-25 s (Review of Particle Physics; from memory)."""
    assert from_natural("ub") == pytest.approx(389.3793721, rel=1e-9)
    assert from_natural("pb") == pytest.approx(0.3893793721e9, rel=1e-9)
    assert from_natural("s") == pytest.approx(6.582119569e-25, rel=1e-9)
    assert (from_natural("MeV"), from_natural("GeV^-2"), from_natural("rad")) == (1000.0, 1.0, 1.0)


@pytest.mark.parametrize("unit", [*AREA_UNITS, *ENERGY_UNITS])
def test_round_trip(unit: str) -> None:
    """There and back again is the same number."""
    natural = "GeV" if unit in ENERGY_UNITS else "GeV^-2"
    assert convert(convert(1.7, natural, unit), unit, natural) == pytest.approx(1.7, rel=1e-15)


def test_units_of_two_kinds_do_not_mix() -> None:
    """An area is no energy."""
    with pytest.raises(UnitError, match=r"^pb measures an area and GeV an energy: there is no conversion$"):
        convert(1.0, "pb", "GeV")


def test_unknown_unit_names_the_nearest() -> None:
    """A typing error is met with the unit that may have been meant."""
    with pytest.raises(ValueError, match=r"^no unit is called 'GeB', expected one of b, mb, .*, deg; nearest: GeV$"):
        from_natural("GeB")
    with pytest.raises(UnitError, match=r"^no unit is called 'furlong', expected one of b, mb, .*, deg$"):
        from_natural("furlong")


@pytest.mark.parametrize(
    ("value", "error", "text"),
    [
        (84.3217, 0.0702, "84.32(7) pb"),
        (1.2344e-7, 4.6e-10, "1.234(5)e-07 pb"),
        (1.2e9, 3e7, "1.200(30)e+09 pb"),
        (8432.1, 70.2, "8430(70) pb"),
        (84.32, 1.23, "84.3(12) pb"),
        (-3.2, 0.07, "-3.20(7) pb"),
        (0.0, 0.07, "0.00(7) pb"),
        (0.0, 1e-9, "0.0(10)e-09 pb"),
        (999999.0, 5.0, "999999(5) pb"),
        (0.00012, 0.00004, "0.00012(4) pb"),
        (1e300, 1e298, "1.000(10)e+300 pb"),
        (5e-324, 5e-324, "5(5)e-324 pb"),
        (3.0, 70.0, "0(70) pb"),
    ],
)
def test_quantity_with_error(value: float, error: float, text: str) -> None:
    """The digits in parentheses count in the last place of the value; extremes get a power of ten."""
    assert str(Quantity(value, error, "pb")) == text


@pytest.mark.parametrize(
    ("error", "text"),
    [
        (0.100, "0.83(10)"),
        (0.119, "0.83(12)"),
        (0.354, "0.83(35)"),
        (0.355, "0.8(4)"),
        (0.367, "0.8(4)"),
        (0.949, "0.8(9)"),
        (0.950, "0.8(10)"),
        (0.9996, "0.8(10)"),
    ],
)
def test_rounding_rule(error: float, text: str) -> None:
    """The rule and its examples 0.827 ± 0.119 and 0.827 ± 0.367: Review of Particle Physics, Introduction, Rounding."""
    assert str(Quantity(0.827, error, "")) == text


@pytest.mark.parametrize(
    ("value", "error", "text"),
    [
        (84.3217, None, "84.3217 pb"),
        (84.3217, 0.0, "84.3217 pb"),
        (2.2e-5, None, "2.2e-05 pb"),
        (0.0, None, "0 pb"),
        (0.1 + 0.2, None, "0.3 pb"),
        (1.25, 1e-18, "1.25 pb"),
        (float("nan"), 1.0, "nan pb"),
        (2.0, float("inf"), "2 pb"),
    ],
)
def test_quantity_without_error(value: float, error: float | None, text: str) -> None:
    """An error that is not known, or beyond the digits of a float, is not written."""
    assert str(Quantity(value, error, "pb")) == text


def test_numpy_numbers_are_numbers() -> None:
    """A numpy number is written like any other."""
    assert str(Quantity(np.float64(84.3217), np.float64(0.0702), "pb")) == "84.32(7) pb"


def test_units_import_nothing_heavy() -> None:
    """Units are needed by every document, so they load neither numpy nor scipy nor pydantic."""
    code = "import sys, barnwright.units; print(*{'numpy', 'scipy', 'pydantic'} & set(sys.modules))"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == ""
