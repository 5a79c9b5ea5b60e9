"""What a prediction repeats of its request: defaults that depend on the process, and variations over schemes."""

from __future__ import annotations

import pytest

import barnwright
from barnwright.errors import RequestError

COLLIDER = {"kind": "collider", "sqrt_s": 60.0}


def test_beams_and_contributions_are_filled_in() -> None:
    """Asked again, the request that a prediction repeats gives the same bits."""
    found = barnwright.predict(process="electroweak/muon-pair", beams=COLLIDER)
    assert found.request.beams.along_z == "e-"
    assert found.request.contributions == ("photon", "z", "interference")
    assert barnwright.predict(found.request).same_bits(found)


def test_the_target_is_filled_in() -> None:
    """The second particle is at rest unless the request says otherwise, and +z is along the one that moves."""
    photon = barnwright.predict(process="qed/compton", beams={"kind": "fixed_target", "energy": 1e-3})
    assert (photon.request.beams.target, photon.request.beams.along_z) == ("e-", "gamma")
    beams = {"kind": "fixed_target", "kinetic_energy": 1.0}
    cut = {"observable": "abs(cos_theta(each(e-), frame=cm))", "max": 0.9}
    electrons = barnwright.predict(process="qed/moller", beams=beams, cuts=[cut])
    assert (electrons.request.beams.target, electrons.request.beams.along_z) == ("beam_b", "beam_a")


def test_a_variation_may_change_the_scheme() -> None:
    """What the request sets for its own scheme may be idle in a variation with another one; what that sets may not."""
    request = {"process": "electroweak/muon-pair", "beams": COLLIDER, "parameters": {"alpha": 1 / 127.9}}
    on_shell = {"name": "on_shell", "parameters": {"scheme": "on_shell"}}
    found = barnwright.predict(request, variations=[on_shell])
    assert "alpha" not in found.variations["on_shell"].parameters
    assert found.parameters["alpha"] == 1 / 127.9
    assert {"fermi_constant", "w_mass"} <= found.variations["on_shell"].parameters.keys()
    assert "w_mass" not in found.sources
    idle = {"name": "idle", "parameters": {"scheme": "on_shell", "sin2_theta_w": 0.23}}
    with pytest.raises(RequestError, match=r"variations\[0\]\.parameters\.sin2_theta_w: got 0\.23, expected nothing"):
        barnwright.predict(request, variations=[idle])


def test_contributions_that_are_not_signed_have_asymmetries() -> None:
    """The photon alone is even in cos theta, the Z alone is not; an interference has no asymmetry of its own."""
    forward = {"name": "A_FB", "kind": "asymmetry", "observable": "cos_theta(mu-)", "at": 0.0}
    found = barnwright.predict(process="electroweak/muon-pair", beams=COLLIDER, derived=[forward])
    assert abs(found.contributions["photon"].derived["A_FB"].value) < 1e-12
    assert found.contributions["z"].derived["A_FB"].value > 1e-3
    assert len(found.contributions["interference"].derived) == 0
