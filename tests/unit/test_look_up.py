"""Masses and widths for the defaults of parameters: a number of the table, or an error that names the particle."""

from __future__ import annotations

import pytest

from barnwright.particles import find, mass_of, table_source, table_version, width_of


def test_numbers_of_the_table() -> None:
    """They are those of the particle, in GeV."""
    assert (mass_of("Z0"), width_of("Z0")) == (find("Z0").mass, find("Z0").width)
    assert table_version() in table_source()


def test_what_the_table_lacks_is_an_error() -> None:
    """A width that is not known, a mass that is not, and a name that nobody has."""
    with pytest.raises(LookupError, match=r"^the particle table has no width of b$"):
        width_of("b")
    with pytest.raises(LookupError, match=r"^the particle table has no mass of nu\(mu\)$"):
        mass_of("nu(mu)")
    with pytest.raises(LookupError, match="no particle is called 'Z00'"):
        mass_of("Z00")
