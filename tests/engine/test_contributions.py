"""Contributions: each reported, the signed ones marked, together the whole."""

from __future__ import annotations

import numpy as np
import pytest
from engine.laws import two_bosons

import barnwright
from barnwright.errors import RequestError

BEAMS = {"kind": "collider", "sqrt_s": 60.0}
ANGLE = {"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 5, "low": -1.0, "high": 1.0}]}
MOMENTUM = {"name": "pt", "observables": ["pt(mu-)"], "bins": [{"count": 6, "low": 0.0, "high": 30.0}]}


def test_contributions_add_up_to_the_whole() -> None:
    """Totals and bins of photon, z and interference add up; the interference is negative, and marked."""
    found = barnwright.predict(process=two_bosons, beams=BEAMS, histograms=[ANGLE, MOMENTUM])
    assert [part.name for part in found.contributions] == ["photon", "z", "interference"]
    assert sum(part.total.value for part in found.contributions) == pytest.approx(found.total.value, rel=1e-13)
    for index, histogram in enumerate(found.histograms):
        added = np.sum([part.histograms[index].contents for part in found.contributions], axis=0)
        assert added == pytest.approx(histogram.contents, rel=1e-12)
    assert found.contributions["interference"].total.value < 0
    assert [note.code for note in found.contributions["interference"].notes] == ["signed"]
    assert found.contributions["photon"].notes == ()
    assert found.status == "converged"
    assert found.notes == ()


def test_chosen_contributions_are_the_whole() -> None:
    """The total is that of the contributions that were asked for, alone or together."""
    every = barnwright.predict(process=two_bosons, beams=BEAMS)
    some = barnwright.predict(process=two_bosons, beams=BEAMS, contributions=["photon", "interference"])
    parts = [every.contributions[name].total.value for name in ("photon", "interference")]
    assert some.total.value == pytest.approx(sum(parts), rel=1e-13)
    one = barnwright.predict(process=two_bosons, beams=BEAMS, contributions=["z"])
    assert one.total.value == every.contributions["z"].total.value


def test_an_unknown_contribution_is_refused() -> None:
    """The message lists those there are, with the nearest."""
    with pytest.raises(
        RequestError, match="expected a contribution of two-bosons: photon, z, interference; nearest: photon"
    ):
        barnwright.predict(process=two_bosons, beams=BEAMS, contributions=["photn"])


def test_a_scan_keeps_the_bits_of_contributions() -> None:
    """A point of a scan is its own prediction, contributions included, with edges that are searched."""
    request = {"histograms": [MOMENTUM], "variations": [{"name": "left", "beams": {"polarisation": {"e-": -1.0}}}]}
    sweep = barnwright.scan(process=two_bosons, beams=BEAMS, **request, over={"beams.sqrt_s": [50.0, 70.0, 90.0]})
    alone = barnwright.predict(process=two_bosons, beams={"kind": "collider", "sqrt_s": 70.0}, **request)
    assert sweep[1].same_bits(alone)


def test_variations_report_the_whole_only() -> None:
    """A variation has its total; a polarised one is not the nominal."""
    left = {"name": "left", "beams": {"polarisation": {"e-": -1.0}}}
    right = {"name": "right", "beams": {"polarisation": {"e-": 1.0}}}
    derived = {"name": "A_LR", "kind": "asymmetry", "between": ["left", "right"]}
    found = barnwright.predict(process=two_bosons, beams=BEAMS, variations=[left, right], derived=[derived])
    totals = [found.variations[name].total.value for name in ("left", "right")]
    assert sum(totals) / 2 == pytest.approx(found.total.value, rel=1e-13)
    assert found.derived["A_LR"].value == pytest.approx((totals[0] - totals[1]) / sum(totals), rel=1e-13)


def test_small_panels_of_one_part_are_those_of_all() -> None:
    """Bins far forward are small for some parts and not for others; all still add up, by either road."""
    forward = {
        "name": "forward",
        "observables": ["pseudorapidity(c)"],
        "bins": [{"edges": [-6.0, -4.9, -4.7, 0.0, 4.86, 5.3, 6.0]}],
    }
    for method in ("closed_form", "quadrature"):
        found = barnwright.predict(
            process="electroweak/charm-pair",
            beams={"kind": "collider", "sqrt_s": 26.9},
            histograms=[forward],
            accuracy={"method": method},
        )
        assert sum(part.total.value for part in found.contributions) == pytest.approx(found.total.value, rel=1e-14)
        added = np.sum([part.histograms[0].contents for part in found.contributions], axis=0)
        assert added == pytest.approx(found.histograms[0].contents, rel=1e-11)
