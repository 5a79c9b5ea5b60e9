"""Questions that change at a pole of the cm, and names that mean one number twice."""

from __future__ import annotations

from typing import Any

import pytest

import barnwright
from barnwright.errors import RequestError

TARGET = {"kind": "fixed_target", "energy": 1.0}
COLLIDER = {"kind": "collider", "sqrt_s": 91.0}
OPENING = [
    ("electroweak/electron-antineutrino-electron", "angle(nu(e)~, e-)", [0.0, 1.0, 1.5707963267948966, 2.0, 3.2]),
    ("qed/compton", "angle(gamma, e-) / deg", [0.0, 60.0, 90.0, 120.0, 180.0]),
]


@pytest.mark.parametrize(("process", "observable", "edges"), OPENING)
def test_an_edge_that_is_met_at_rest(process: str, observable: str, edges: list[float]) -> None:
    """An opening angle of 90 degrees is that of a recoil at rest; both roads put what is beside it into one bin."""
    histogram = {"name": "opening", "observables": [observable], "bins": [{"edges": edges}]}
    closed, quadrature = (
        barnwright.predict(process=process, beams=TARGET, histograms=[histogram], accuracy={"method": method})
        for method in ("closed_form", "quadrature")
    )
    assert closed.histograms[0].contents == pytest.approx(quadrature.histograms[0].contents, rel=1e-10)


@pytest.mark.parametrize(
    ("more", "field"),
    [
        ({"beams": {**COLLIDER, "polarisation": {"e-": 0.8, "beam_a": -0.3}}}, "beams.polarisation.beam_a"),
        ({"beams": {"kind": "collider", "energies": {"e-": 7.0, "beam_a": 4.0}}}, "beams.energies.beam_a"),
        ({"beams": COLLIDER, "masses": {"mu+": 0.2, "mu-": 0.1}}, "masses.mu-"),
    ],
    ids=lambda value: value if isinstance(value, str) else "",
)
def test_one_number_under_two_names_is_refused(more: dict[str, Any], field: str) -> None:
    """Which of them counts would depend on an order that tables do not have."""
    with pytest.raises(RequestError, match=f"^{field.replace('.', '[.]')}: got .*, expected one "):
        barnwright.predict(process="electroweak/muon-pair", **more)


def test_a_scan_does_not_reach_into_derived_quantities() -> None:
    """The points of a scan share their questions, so the value of an asymmetry cannot be scanned."""
    forward = {"name": "A", "kind": "asymmetry", "observable": "cos_theta(mu-)", "at": 0.0}
    with pytest.raises(RequestError, match=r"over\.derived\.A\.at: got 'derived.A.at', expected a key with a number"):
        barnwright.scan(
            process="electroweak/muon-pair", beams=COLLIDER, derived=[forward], over={"derived.A.at": [0.0, 0.5]}
        )
