"""Envelopes of variations, and the note about quotients with nothing below the line."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

import barnwright
from barnwright.documents import ByName, EnvelopeRequest, Histogram, Part, Total
from barnwright.engine.envelope import envelope

ALPHAS = {"up": 0.0075, "down": 0.0070, "same": 0.0072973525643}
REQUEST: dict[str, Any] = {
    "process": "qed/muon-pair",
    "beams": {"kind": "collider", "sqrt_s": 10.0},
    "parameters": {"alpha": ALPHAS["same"]},
    "cuts": [{"name": "side", "observable": "cos_theta(mu-, frame=cm)", "min": -1.0}],
    "histograms": [
        {
            "name": "angle",
            "observables": ["cos_theta(mu-, frame=cm)"],
            "bins": [{"count": 4, "low": -1.0, "high": 1.0}],
        }
    ],
}


def predicted(variations: list[dict[str, Any]], *derived: dict[str, Any]) -> barnwright.Prediction:
    """The prediction with these variations and derived quantities."""
    return barnwright.predict({**REQUEST, "variations": variations, "derived": list(derived)})


def test_an_envelope_holds_the_request_and_its_variations() -> None:
    """σ is proportional to α², so the ends are those of the largest and the smallest α, in every bin."""
    varied = [{"name": name, "parameters": {"alpha": alpha}} for name, alpha in ALPHAS.items()]
    found = predicted(varied, {"name": "coupling", "kind": "envelope", "of": ["down", "same", "up"]})
    scale, total = found.derived["coupling"], found.total
    assert (scale.value, scale.error, scale.unit) == (total.value, total.error, "pb")
    assert scale.low == found.variations["down"].total.value
    assert scale.high == found.variations["up"].total.value
    assert scale.high == pytest.approx(total.value * (ALPHAS["up"] / ALPHAS["same"]) ** 2, rel=1e-12)
    bins = scale.histograms["angle"]
    assert np.array_equal(bins.values, found.histograms["angle"].values)
    assert np.array_equal(bins.low, found.variations["down"].histograms["angle"].values)
    assert np.array_equal(bins.high, found.variations["up"].histograms["angle"].values)


def test_the_request_belongs_to_its_envelope() -> None:
    """Of one smaller variation alone, the request as it stands is the upper end."""
    varied = [{"name": "down", "parameters": {"alpha": ALPHAS["down"]}}]
    found = predicted(varied, {"name": "coupling", "kind": "envelope", "of": ["down"]})
    assert found.derived["coupling"].high == found.total.value


def test_an_envelope_of_a_sum_is_that_of_its_total() -> None:
    """Members are summed first."""
    asked = {
        **REQUEST,
        "process": None,
        "processes": ["qed/muon-pair", "qed/tau-pair"],
        "cuts": [],
        "histograms": [],
        "variations": [{"name": "up", "parameters": {"alpha": ALPHAS["up"]}}],
        "derived": [{"name": "coupling", "kind": "envelope", "of": ["up"]}],
    }
    found = barnwright.predict(asked)
    assert found.derived["coupling"].value == found.total.value
    assert found.derived["coupling"].high == found.variations["up"].total.value


def part(name: str, total: float | None, values: list[float]) -> Part:
    """A part with one histogram per value, half a unit wide."""
    histogram = Histogram.build(
        name="angle",
        observables=("cos_theta(mu-)",),
        edges=np.array([-1.0, -0.5, 0.0]),
        values=np.array(values),
        errors=np.zeros(2),
        unit="pb",
        error_kind="numerical_bound",
        underflow=0.0,
        overflow=0.0,
    )
    estimate = Total.build(value=total, error=None, unit="pb", error_kind="numerical_bound")
    return Part.build(name=name, total=estimate, histograms=ByName([histogram]))


def test_signed_quantities_have_ends_of_their_own_sign() -> None:
    """Smallest and largest are those of the numbers, not of their sizes; densities stay densities."""
    nominal, other = part("", -2.0, [-3.0, 1.0]), part("other", -5.0, [1.0, -4.0])
    asked = EnvelopeRequest(name="e", kind="envelope", of=("other",))
    found = envelope(asked, {"total": nominal.total, "histograms": nominal.histograms}, ByName([other]))
    assert (found.low, found.high) == (-5.0, -2.0)
    assert found.histograms["angle"].low is not None
    assert found.histograms["angle"].low.tolist() == [-3.0, -4.0]
    assert found.histograms["angle"].high is not None
    assert found.histograms["angle"].high.tolist() == [1.0, 1.0]


def test_an_unknown_member_leaves_the_ends_unknown() -> None:
    """What is not known may be smaller or larger than all the others."""
    nominal, other = part("", 2.0, [3.0, 1.0]), part("other", None, [np.nan, 4.0])
    asked = EnvelopeRequest(name="e", kind="envelope", of=("other",))
    found = envelope(asked, {"total": nominal.total, "histograms": nominal.histograms}, ByName([other]))
    assert (found.value, found.low, found.high) == (2.0, None, None)
    assert found.histograms["angle"].high is not None
    assert np.array_equal(found.histograms["angle"].high, [np.nan, 4.0], equal_nan=True)


NOTHING = {"name": "nothing", "parameters": {"alpha": 0.0}}
HALF = {"name": "half", "cuts": [{"name": "side", "min": 0.0}]}
A_FB = {"name": "A_FB", "kind": "asymmetry", "observable": "cos_theta(mu-, frame=cm)", "at": 0.0}


@pytest.mark.parametrize(
    ("variations", "derived", "what"),
    [
        (
            [NOTHING, HALF],
            [{"name": "R", "kind": "ratio", "between": ["half", "nothing"]}],
            "R; R in 4 of 4 bins of angle",
        ),
        (
            [NOTHING, {**NOTHING, "name": "none"}],
            [{"name": "A", "kind": "asymmetry", "between": ["nothing", "none"]}],
            "A; A in 4 of 4 bins of angle",
        ),
        (
            [{"name": "all"}, HALF],
            [{"name": "R", "kind": "ratio", "between": ["all", "half"]}],
            "R in 2 of 4 bins of angle",
        ),
        ([NOTHING], [A_FB], "A_FB in variation nothing"),
    ],
)
def test_a_division_by_nothing_is_told(
    variations: list[dict[str, Any]], derived: list[dict[str, Any]], what: str
) -> None:
    """The note names the quantity, the histogram with how many of its bins, and the variation."""
    found = predicted(variations, *derived)
    texts = [note.text for note in found.notes if note.code == "undefined_ratio"]
    assert texts == [f"not known, since what it is divided by is 0: {what}"]


def test_what_is_known_has_no_such_note() -> None:
    """An asymmetry that is 0 is known."""
    assert predicted([HALF], A_FB).notes == ()


def test_an_asymmetry_about_a_value_is_known_bin_by_bin() -> None:
    """In bins of another observable it is that of the two halves of a map of both; in its own bins it says nothing."""
    beams = {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}}
    angle, momentum = "cos_theta(mu-)", "pt(mu-)"
    bins = [{"count": 5, "low": 0.0, "high": 5.6}]
    histograms = [
        {"name": "pt", "observables": [momentum], "bins": bins},
        {"name": "own", "observables": [angle], "bins": [{"count": 4, "low": -1.0, "high": 1.0}]},
        {"name": "map", "observables": [momentum, angle], "bins": [*bins, {"edges": [-1.0, 0.2, 1.0]}], "per": "bin"},
    ]
    derived = [{"name": "A", "kind": "asymmetry", "observable": angle, "at": 0.2}]
    found = barnwright.predict(process="qed/muon-pair", beams=beams, histograms=histograms, derived=derived)
    below, above = found.histograms["map"].contents.T
    assert [bins.name for bins in found.derived["A"].histograms] == ["pt"]
    by_bin = found.derived["A"].histograms["pt"]
    assert by_bin.values == pytest.approx((above - below) / (above + below), rel=1e-12, abs=1e-13)
    assert (by_bin.errors < 1e-11).all()
    whole = (above.sum() - below.sum()) / (above.sum() + below.sum())
    assert found.derived["A"].value == pytest.approx(whole, rel=1e-11)


def test_a_quotient_may_name_the_request_itself() -> None:
    """``nominal`` is the request without its variations: a share of all events, in every bin too."""
    cut = {"name": "hard", "observable": "pt(mu-)", "min": 2.0}
    bins = [{"count": 3, "low": -1.0, "high": 1.0}]
    found = barnwright.predict(
        process="qed/muon-pair",
        beams={"kind": "collider", "sqrt_s": 10.0},
        cuts=[cut],
        histograms=[{"name": "angle", "observables": ["cos_theta(mu-)"], "bins": bins}],
        variations=[{"name": "all", "cuts": [{"name": "hard", "min": 0.0}]}],
        derived=[{"name": "share", "kind": "ratio", "between": ["nominal", "all"]}],
    )
    share = found.derived["share"]
    assert share.value == pytest.approx(found.total.value / found.variations["all"].total.value, rel=1e-14)
    assert share.histograms["angle"].values[1] == pytest.approx(1.0, rel=1e-13)


def test_numbers_in_another_unit_are_noted() -> None:
    """Edges in degrees on an axis in rad, an asymmetry at 90 rad, bins in keV on an axis in GeV."""
    found = barnwright.predict(
        process="qed/muon-pair",
        beams={"kind": "collider", "sqrt_s": 10.0},
        histograms=[
            {"name": "degrees", "observables": ["theta(mu-)"], "bins": [{"count": 4, "low": 0.0, "high": 180.0}]},
            {"name": "keV", "observables": ["pt(mu-)"], "bins": [{"count": 4, "low": 100.0, "high": 1100.0}]},
        ],
        derived=[{"name": "A", "kind": "asymmetry", "observable": "theta(mu-)", "at": 90.0}],
    )
    notes = [note.text for note in found.notes]
    assert any(
        text.startswith("the last edge, 180, of histogram degrees lies outside 0 to 3.14159 rad") for text in notes
    )
    assert any(text.startswith("at = 90 of A lies outside 0 to 3.14159 rad") for text in notes)
    assert "all events lie below the bins of histogram keV" in notes
