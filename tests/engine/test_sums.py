"""Sums of processes: contents and bounds add up, each part is reported on its own."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

import barnwright
from barnwright.errors import RequestError

BEAMS = {"kind": "collider", "sqrt_s": 10.0}
BOTH = ["qed/muon-pair", "qed/tau-pair"]
ANGLE = {"name": "angle", "observables": ["cos_theta(1)"], "bins": [{"count": 5, "low": -1.0, "high": 1.0}]}
FORWARD = {"name": "A_FB", "kind": "asymmetry", "observable": "cos_theta(1)", "at": 0.5}


def asked(**more: Any) -> dict[str, Any]:
    """A request of the sum, or of one of its members."""
    return {"beams": BEAMS, "histograms": [ANGLE], "derived": [FORWARD], **more}


def test_a_sum_is_the_sum_of_its_parts() -> None:
    """Total, bins, bounds and asymmetry are those of the parts together; the parts have the bits of their own."""
    found = barnwright.predict(asked(processes=BOTH))
    parts = [barnwright.predict(asked(process=name)) for name in BOTH]
    assert [part.name for part in found.processes] == BOTH
    for name, part in zip(BOTH, parts, strict=True):
        assert found.processes[name].total == part.total
        assert found.processes[name].histograms["angle"].values == pytest.approx(part.histograms["angle"].values, rel=0)
    assert found.total.value == sum(part.total.value for part in parts)
    assert found.total.error == pytest.approx(sum(part.total.error for part in parts), rel=1e-12)
    contents = np.sum([part.histograms["angle"].contents for part in parts], axis=0)
    assert found.histograms["angle"].contents == pytest.approx(contents, rel=1e-14)
    above = sum((1 + part.derived["A_FB"].value) / 2 * part.total.value for part in parts)
    assert found.derived["A_FB"].value == pytest.approx(2 * above / found.total.value - 1, rel=1e-12)
    assert found.source_digests.keys() == set(BOTH)


def test_parameters_and_masses_go_to_those_that_know_them() -> None:
    """The mass of a muon changes the muon pairs alone, and so does its variation."""
    heavy = {"name": "heavy", "masses": {"mu-": 2.0}}
    found = barnwright.predict(asked(processes=BOTH, masses={"mu-": 1.0}, variations=[heavy]))
    muons = barnwright.predict(asked(process=BOTH[0], masses={"mu-": 1.0}, variations=[heavy]))
    taus = barnwright.predict(asked(process=BOTH[1]))
    assert found.processes[0].total == muons.total
    assert found.processes[1].total == taus.total
    assert found.variations["heavy"].total.value == muons.variations["heavy"].total.value + taus.total.value


def test_members_that_do_not_fit_are_named() -> None:
    """Other beams, an observable that one lacks, a parameter that none knows: all in one answer."""
    cut = {"observable": "pt(mu-)", "min": 0.1}
    with pytest.raises(RequestError) as caught:
        barnwright.predict(asked(processes=[*BOTH, "qed/compton"], cuts=[cut], parameters={"alpa": 0.1}))
    text = str(caught.value)
    assert "processes[2]: got 'compton (gamma e- -> gamma e-)', expected a process with the beams of the first" in text
    assert "expected a leg of e- e+ -> tau- tau+: tau-, tau+, 1 to 2, beam_a, beam_b (in qed/tau-pair)" in text
    assert "(in qed/compton)" in text
    assert "parameters.alpa: got 0.1, expected a name that one of the processes knows: alpha; nearest: alpha" in text


def test_a_scan_of_a_sum_keeps_its_bits() -> None:
    """A point below the threshold of one member is the other alone, with a note."""
    request = asked(processes=BOTH)
    sweep = barnwright.scan(request, over={"beams.sqrt_s": [3.0, 10.0]})
    assert sweep[1].same_bits(barnwright.predict(request))
    assert sweep[0].processes["qed/tau-pair"].total.value == 0
    assert sweep[0].total == sweep[0].processes["qed/muon-pair"].total
    (note,) = [note for note in sweep[0].notes if note.code == "below_threshold"]
    assert note.text.startswith("qed/tau-pair: √s is not above 3.55386 GeV")
