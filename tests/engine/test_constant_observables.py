"""Observables that are the same for all events: an edge or a cut at their value does not split rounding noise."""

from __future__ import annotations

from typing import Any

import pytest

import barnwright


def predict(sqrt_s: float, **more: Any) -> barnwright.Prediction:
    """Muon pairs at rest in the lab."""
    return barnwright.predict(process="qed/muon-pair", beams={"kind": "collider", "sqrt_s": sqrt_s}, **more)


@pytest.mark.parametrize("sqrt_s", [0.5, 1.7, 10.0, 91.2])
@pytest.mark.parametrize(
    ("text", "edges", "full"),
    [
        ("energy_fraction(mu-)", [0.5, 1.0, 1.5], 1),
        ("energy(mu+)/sqrt_s", [0.1, 0.5, 0.9], 1),
        ("acollinearity(mu-, mu+)", [0.0, 1e-16, 1.0], 0),
        ("acoplanarity(mu-, mu+)", [0.0, 1e-16, 1.0], 0),
        ("thrust", [0.5, 0.9, 1.0], 1),
        ("mass(mu-, mu+) - sqrt_s", [-1.0, 0.0, 1.0], 1),
    ],
)
def test_a_bin_edge_at_the_value(text: str, edges: list[float], full: int, sqrt_s: float) -> None:
    """Everything is in the bin that starts at the value, nothing in the other, and the errors say so."""
    p = predict(sqrt_s, histograms=[{"name": "h", "observables": [text], "bins": [{"edges": edges}], "per": "bin"}])
    found = p.histograms["h"]
    assert found.values[full] == pytest.approx(p.total.value, rel=1e-14)
    assert found.values[1 - full] == found.errors[1 - full] == 0.0
    assert found.errors[full] < 1e-11 * p.total.value


def test_a_cut_at_the_value_keeps_everything() -> None:
    """A minimum at the exact value passes."""
    whole = predict(10.0).total.value
    assert predict(10.0, cuts=[{"observable": "energy_fraction(mu-)", "min": 1.0}]).total.value == whole


def test_accuracy_that_rounding_forbids_is_not_called_converged() -> None:
    """A cut 1e-13 below the largest pt leaves an error of √ε: more than was asked for, and the answer says so."""
    p = predict(
        10.0,
        masses={"mu-": 0.0, "e-": 0.0},
        cuts=[{"observable": "pt(mu-)", "min": 5.0 * (1 - 1e-13)}],
        accuracy={"relative": 1e-6},
    )
    assert p.status == "evaluation_limit"
    assert [note.code for note in p.notes] == ["accuracy_not_reached"]
    assert 1e-6 * p.total.value < p.total.error < p.total.value


def test_a_constant_of_the_lab_is_not_scattered_by_rounding() -> None:
    """The energies of both muons add up to that of the beams: a cut and an edge there keep everything on one side."""
    beams = {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}}
    text = "energy(mu-) + energy(mu+)"
    histogram = {"name": "h", "observables": [text], "bins": [{"edges": [10.0, 11.0, 12.0]}], "per": "bin"}
    request = {"process": "qed/muon-pair", "beams": beams}
    whole = barnwright.predict(request).total.value
    p = barnwright.predict(request, cuts=[{"observable": text, "min": 11.0}], histograms=[histogram])
    assert p.total.value == pytest.approx(whole, rel=1e-13)
    assert p.total.error < 1e-11 * whole
    assert p.histograms["h"].values[0] == 0.0
