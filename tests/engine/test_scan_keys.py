"""A scan means the same key however it is quoted."""

from __future__ import annotations

import numpy as np
import pytest

import barnwright

REQUEST = {"process": "qed/muon-pair", "beams": {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}}}


@pytest.mark.parametrize("key", ["beams.energies.e-", 'beams.energies."e-"', "beams.energies.'e-'"])
def test_each_point_has_its_own_energy(key: str) -> None:
    """A scan over a beam's energy gives at each point what a request for that energy gives."""
    sweep = barnwright.scan(REQUEST, over={key: [6.0, 8.0]})
    alone = [barnwright.predict(REQUEST, beams={"energies": {"e-": energy}}).total.value for energy in (6.0, 8.0)]
    assert np.array_equal(sweep.values, alone)
