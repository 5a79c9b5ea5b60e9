"""Limits that no value of the observable can meet, or that every value meets, are pointed out."""

from __future__ import annotations

import pytest

import barnwright


@pytest.mark.parametrize(
    ("cut", "fragments"),
    [
        ({"observable": "theta(mu-)", "max": 150.0}, ("max = 150", "0 to 3.14159 rad", "theta(mu-) / deg")),
        ({"observable": "pt(mu-)", "min": -5.0}, ("min = -5", "0 to inf GeV")),
        ({"observable": "cos_theta(mu-)", "min": 1.2}, ("min = 1.2", "-1 to 1")),
    ],
)
def test_a_limit_outside_the_range_has_a_note(cut: dict[str, object], fragments: tuple[str, ...]) -> None:
    """Degrees in the place of radians are the usual slip: the note names limit, range and remedy."""
    p = barnwright.predict(
        process="qed/muon-pair", beams={"kind": "collider", "sqrt_s": 10.0}, cuts=[{"name": "acceptance", **cut}]
    )
    note = next(note for note in p.notes if note.code == "limit_out_of_range")
    assert all(fragment in note.text for fragment in fragments)


def test_energies_in_kev_and_angles_in_degrees() -> None:
    """What is divided by a unit is in that unit, axis and density too, and has the contents of the same bins in GeV."""
    p = barnwright.predict(
        process="qed/compton",
        beams={"kind": "fixed_target", "energy": 0.000662},
        unit="mb",
        histograms=[
            {"name": "keV", "observables": ["kinetic_energy(e-) / keV"], "bins": [{"edges": [100.0, 200.0, 400.0]}]},
            {"name": "GeV", "observables": ["kinetic_energy(e-)"], "bins": [{"edges": [1e-4, 2e-4, 4e-4]}]},
        ],
    )
    small, large = p.histograms["keV"], p.histograms["GeV"]
    assert (small.unit, small.axis_units, large.unit) == ("mb/keV", ("keV",), "mb/GeV")
    assert small.values * 1e6 == pytest.approx(large.values, rel=1e-11)
