"""Two energies with masses, head on: √s, the flux and momenta of the lab against explicit boosts in 60 digits."""

from __future__ import annotations

import numpy as np
import pytest
from mpmath import mp, mpf
from unit.kinematics.crossing import Crossing, square

from barnwright.beams import BeamSettings, collide, flux
from barnwright.kinematics import LAB, TwoBody

mp.dps = 60
ELECTRON, MUON, PROTON = 0.00051099895, 0.1056583755, 0.93827208816


@pytest.mark.parametrize(
    "case",
    [
        pytest.param(Crossing((10.0, 100.0), (ELECTRON, PROTON), 0.0), id="electrons on protons"),
        pytest.param(Crossing((10.0, 100.0), (ELECTRON, PROTON), 0.0, -1), id="protons along z"),
        pytest.param(Crossing((27.5, 920.0), (ELECTRON, PROTON), 0.0), id="at higher energies"),
        pytest.param(Crossing((1e-9, 2.0), (0.0, PROTON), 0.0), id="light on protons"),
        pytest.param(Crossing((1e-4, 3e-4), (ELECTRON, MUON), 0.0), id="slow"),
    ],
)
def test_head_on(case: Crossing) -> None:
    """√s − m_a − m_b is right to 4e-15 of itself, momenta of elastic scattering in the lab to 2e-14 of their energy."""
    first, second = ((t,) for t in case.kinetic)
    found = collide(BeamSettings("kinetic", first, second, case.orientation), case.masses)
    above = mp.sqrt(square(case.system)) - sum(map(mpf, case.masses))
    assert abs(float(mpf(float(found.above(sum(case.masses))[0, 0])) / above - 1)) < 4e-15
    a, b = case.beam(-1), case.beam(-2)
    product = a[0] * b[0] - sum(a[k] * b[k] for k in (1, 2, 3))
    expected = 4 * mp.sqrt(product**2 - (mpf(case.masses[0]) * mpf(case.masses[1])) ** 2)
    assert abs(float(mpf(float(flux(found, case.masses)[0, 0])) / expected - 1)) < 1e-13
    body = TwoBody(found, (*case.masses, *case.masses), np.array([[0.4]]), np.array([[1.6]]), 0.7)
    for code in (-1, -2, 1, 2):
        exact = case.beam(code) if code < 0 else case.outgoing(code, case.masses, 0.4, 0.7)[1]
        own = body.vector(code, LAB)
        for value, true in zip((own.energy, own.px, own.py, own.pz), exact, strict=True):
            assert abs(float((mpf(float(np.squeeze(value))) - true) / exact[0])) < 2e-14
