"""Units: inferred from rows and arithmetic; sums of different ones are refused where they stand."""

from __future__ import annotations

import pytest

from barnwright.observables import ObservableError, compile_observable, table
from barnwright.reaction import parse_reaction

REACTION = parse_reaction("e- e+ -> mu- mu+ gamma")


@pytest.mark.parametrize(
    ("text", "unit"),
    [
        ("pt(mu-)", "GeV"),
        ("-pt(mu-)", "GeV"),
        ("abs(pt(mu-))", "GeV"),
        ("pt(mu-) + energy(mu+)", "GeV"),
        ("pt(mu-) + 1", "GeV"),
        ("1 - pt(mu-)", "GeV"),
        ("2*pt(mu-)", "GeV"),
        ("pt(mu-)/2", "GeV"),
        ("min(pt(mu-), 3)", "GeV"),
        ("max(3, 2, sqrt_s)", "GeV"),
        ("transfer(beam_a, mu-)", "GeV^2"),
        ("pt(mu-)*energy(mu-)", "GeV^2"),
        ("pt(mu-)**2", "GeV^2"),
        ("pt(mu-)**2 + q2(beam_a, mu-)", "GeV^2"),
        ("sqrt(pt(mu-)**2 + q2(beam_a, mu-))", "GeV"),
        ("sqrt(pt(mu-))", "GeV^0.5"),
        ("pt(mu-)**0.5", "GeV^0.5"),
        ("pt(mu-)**(1/2)", "GeV^0.5"),
        ("pt(mu-)**-1", "GeV^-1"),
        ("pt(mu-)**(-2)", "GeV^-2"),
        ("1/pt(mu-)", "GeV^-1"),
        ("pt(mu-)/energy(mu-)", ""),
        ("pt(mu-)/energy(mu-) + 1", ""),
        ("pt(mu-)**0", ""),
        ("cos_theta(mu-)", ""),
        ("1", ""),
        ("pi", ""),
        ("2**3", ""),
        ("theta(mu-)", "rad"),
        ("deg", "rad"),
        ("30*deg", "rad"),
        ("theta(mu-) - 30*deg", "rad"),
        ("pi - theta(mu-)", "rad"),
        ("2*theta(mu-)/deg", ""),
        ("theta(mu-)/deg", "deg"),
        ("delta_phi(mu-, mu+, frame=cm) / deg", "deg"),
        ("pt(mu-)/deg", "GeV rad^-1"),
        ("theta(mu-)**2", "rad^2"),
        ("theta(mu-)*pt(mu-)", "GeV rad"),
        ("delta_eta(mu-, mu+)**2 + delta_phi(mu-, mu+)**2", ""),
        ("sqrt(delta_eta(mu-, mu+)**2 + delta_phi(mu-, mu+)**2)", ""),
        ("cos_theta(mu-)**cos_theta(mu+)", ""),
        ("2**theta(mu-)", ""),
        ("2**(theta(mu-)/deg)", ""),
    ],
)
def test_units_are_inferred(text: str, unit: str) -> None:
    """Numbers fit any unit in a sum; an angle is a pure number where one is wanted."""
    assert compile_observable(text, REACTION).unit == unit


@pytest.mark.parametrize("row", [row for row in table() if row.shape == "one"], ids=lambda row: row.name)
def test_the_unit_of_a_row_is_the_table_s(row: object) -> None:
    """A row by itself has the unit and the range that the table gives."""
    observable = compile_observable(f"{row.name}(mu-)", REACTION)  # type: ignore[attr-defined]
    assert (observable.unit, observable.range) == (row.unit, row.range)  # type: ignore[attr-defined]


@pytest.mark.parametrize(
    ("text", "position", "expected"),
    [
        ("pt(mu-) + cos_theta(mu-)", 8, "quantities of one unit in a sum or comparison, not GeV and a pure number"),
        ("cos_theta(mu-) - pt(mu-)", 15, "not a pure number and GeV"),
        ("pt(mu-) + theta(mu-)", 8, "not GeV and rad"),
        ("1 + pt(mu-) - transfer(beam_a, mu-)", 12, "not GeV and GeV^2"),
        ("min(1, pt(mu-), cos_theta(mu-))", 0, "not GeV and a pure number"),
        ("2*max(pt(mu-), transfer(beam_a, mu-))", 2, "not GeV and GeV^2"),
        ("2**pt(mu-)", 3, "an exponent without a unit, not one in GeV"),
        ("pt(mu-)**cos_theta(mu-)", 9, "a number, since the base has the unit GeV"),
    ],
)
def test_units_that_do_not_fit(text: str, position: int, expected: str) -> None:
    """The finding stands at the operator, and names both units."""
    with pytest.raises(ObservableError, match="expected") as caught:
        compile_observable(text, REACTION)
    (finding,) = caught.value.findings
    assert finding.position == position
    assert expected in finding.expected
