"""Requests for fermion pairs through the whole engine: totals, asymmetries, contributions, and what is refused."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from barnwright_electroweak import electron_pair, lepton_pairs, quark_pairs

import barnwright
from barnwright.errors import RequestError
from barnwright.particles import mass_of, width_of
from barnwright.process import Process
from barnwright.testing import check_process

from .electroweak_pairs import FLAVOURS, PINNED, POLARISED, Flavour, Published

ENERGIES = [10.0, 34.5, 88.4, 91.1876, 93.7, 161.0, 250.0]
PICOBARN = 3.8937937217186e8
"""GeV⁻² in pb, CODATA 2018 and later (the constants are exact since)."""
USED = ("alpha", "sin2_theta_w", "z_mass", "z_width")
PROCESSES = [*(flavour.process for flavour in FLAVOURS.values()), electron_pair.process]
every_flavour = pytest.mark.parametrize("flavour", FLAVOURS.values(), ids=FLAVOURS.keys())
every_process = pytest.mark.parametrize("process", PROCESSES, ids=lambda process: process.name)


def beams(sqrt_s: float = 91.1876, polarised: tuple[float, float] = (0.0, 0.0)) -> dict[str, Any]:
    """A collider's."""
    return {"kind": "collider", "sqrt_s": sqrt_s, "polarisation": dict(zip(("e-", "e+"), polarised, strict=True))}


def masses(flavour: Flavour) -> dict[str, float]:
    """The pinned mass of the fermion, where it has one."""
    return {flavour.name: flavour.mass} if flavour.mass else {}


def sweep(flavour: Flavour, polarised: tuple[float, float], **more: Any) -> Any:
    """A scan over ENERGIES with pinned inputs and A_FB, in pb."""
    asymmetry = {"name": "A_FB", "kind": "asymmetry", "observable": f"cos_theta({flavour.name}, frame=cm)", "at": 0.0}
    request: dict[str, Any] = {
        "process": f"electroweak/{flavour.process.name}",
        "beams": beams(91.0, polarised),
        "parameters": {key: PINNED[key] for key in USED},
        "masses": masses(flavour),
        "derived": [asymmetry],
        "unit": "pb",
        **more,
    }
    return barnwright.scan(request, over={"beams.sqrt_s": ENERGIES})


@every_flavour
@pytest.mark.parametrize("polarised", [*POLARISED, (1.0, 1.0)])
def test_total_and_asymmetry_are_the_published_ones(flavour: Flavour, polarised: tuple[float, float]) -> None:
    """From 10 to 250 GeV σ and A_FB agree to 1e-10 with the published formula, for six polarisations of the beams."""
    found = sweep(flavour, polarised, accuracy={"method": "quadrature"})
    for index, energy in enumerate(ENERGIES):
        published = Published(flavour, energy, flavour.parameters(), flavour.charged)
        back, ahead = (float(published.integral(*ends, polarised)) for ends in ((-1, 0), (0, 1)))
        assert found[index].total.value == pytest.approx((back + ahead) * PICOBARN, rel=1e-10, abs=0)
        if back + ahead:
            expected = (ahead - back) / (ahead + back)
            assert found[index].derived["A_FB"].value == pytest.approx(expected, rel=1e-10, abs=1e-12)


@every_flavour
def test_closed_form_answers_without_polarisation(flavour: Flavour) -> None:
    """The cheapest road is the closed form; it gives what quadrature gives, to 1e-12."""
    closed, integrated = (sweep(flavour, (0.0, 0.0), accuracy=accuracy) for accuracy in ({}, {"method": "quadrature"}))
    assert closed[0].method == "closed_form"
    assert closed.values == pytest.approx(integrated.values, rel=1e-12, abs=0)


def test_left_right_asymmetry_between_variations() -> None:
    """A_LR of b quarks from two variations of the beams agrees to 1e-10 with the published formula at each energy."""
    bottom = FLAVOURS["bottom"]
    left_right = {"name": "A_LR", "kind": "asymmetry", "between": ["left", "right"]}
    variations = [
        {"name": name, "beams": {"polarisation": {"e-": sign, "e+": 0.0}}}
        for name, sign in (("left", -1), ("right", 1))
    ]
    found = sweep(bottom, (0.0, 0.0), derived=[left_right], variations=variations)
    for index, energy in enumerate(ENERGIES):
        published = Published(bottom, energy, bottom.parameters())
        left, right = (float(published.integral(-1, 1, (sign, 0.0))) for sign in (-1.0, 1.0))
        expected = (left - right) / (left + right)
        assert found[index].derived["A_LR"].value == pytest.approx(expected, rel=1e-10)


@pytest.mark.parametrize("polarised", [(0.0, 0.0), (-0.8, 0.3)])
def test_contributions_add_up(polarised: tuple[float, float]) -> None:
    """Photon, Z and interference are reported, add up to the total, and each can be asked for alone."""
    muon = FLAVOURS["muon"]
    found = sweep(muon, polarised)
    alone = {name: sweep(muon, polarised, contributions=[name]) for name in ("photon", "z", "interference")}
    for index in range(len(ENERGIES)):
        parts = {part.name: part.total.value for part in found[index].contributions}
        assert sum(parts.values()) == pytest.approx(found[index].total.value, rel=1e-12)
        for name, value in parts.items():
            assert alone[name][index].total.value == pytest.approx(value, rel=1e-12)
    assert alone["interference"][0].total.value * alone["interference"][-1].total.value < 0


@pytest.mark.parametrize("electron", [0.0, 0.51099895e-3])
def test_without_the_z_it_is_electrodynamics(electron: float) -> None:
    """The photon's contribution is qed/muon-pair with the same α and masses, bin by bin."""
    common: dict[str, Any] = {
        "beams": beams(10.0),
        "masses": {"e-": electron, "mu-": 0.1056583755},
        "parameters": {"alpha": 1 / 137.0},
        "histograms": [
            {
                "name": "angle",
                "observables": ["cos_theta(mu-, frame=cm)"],
                "bins": [{"edges": [-1.0, -0.5, 0.2, 1.0]}],
            }
        ],
    }
    ours = barnwright.predict(process="electroweak/muon-pair", contributions=["photon"], **common)
    theirs = barnwright.predict(process="qed/muon-pair", **common)
    assert ours.total.value == pytest.approx(theirs.total.value, rel=1e-12)
    assert ours.histograms["angle"].values == pytest.approx(theirs.histograms["angle"].values, rel=1e-12)


def test_thresholds_of_quarks_follow_their_parameter() -> None:
    """The mass of the bottom quark is the parameter bottom_mass, which moves threshold and |M|² together."""
    light, heavy = (
        barnwright.predict(process="electroweak/bottom-pair", beams=beams(12.5), parameters={"bottom_mass": mass})
        for mass in (4.2, 6.3)
    )
    assert light.total.value > 0
    assert heavy.total.value == 0
    same = barnwright.predict(process="electroweak/bottom-pair", beams=beams(12.5), masses={"b": 4.2})
    assert same.total.value == light.total.value


@pytest.mark.parametrize(
    ("parameters", "message"),
    [
        ({"w_mass": 80.4}, r"parameters\.w_mass: .* it is used with scheme = 'on_shell'"),
        ({"fermi_constant": 1.2e-5}, r"parameters\.fermi_constant: .* it is used with scheme = 'fermi' or 'on_shell'"),
        ({"scheme": "on_shell", "sin2_theta_w": 0.23}, r"parameters\.sin2_theta_w: .* scheme = 'alpha' or 'fermi'"),
        ({"scheme": "on_shell", "w_mass": 95.0}, r"parameters\.w_mass: got 95\.0, expected a mass below z_mass"),
        ({"scheme": "mixed"}, r"parameters\.scheme: got 'mixed', expected one of 'alpha', 'fermi', 'on_shell'"),
        ({"width_scheme": "runing"}, r"parameters\.width_scheme: .* nearest: running"),
        ({"z_width": -2.5}, r"parameters\.z_width: got -2\.5"),
        ({"sin2_theta_w": 1.0}, r"parameters\.sin2_theta_w: got 1\.0"),
        ({"bottom_mass": 4.2}, r"parameters\.bottom_mass: "),
    ],
)
def test_wrong_inputs_are_refused(parameters: dict[str, Any], message: str) -> None:
    """An input that the scheme does not use, or that cannot be, is refused by name."""
    with pytest.raises(RequestError, match=message):
        barnwright.predict(process="electroweak/muon-pair", beams=beams(), parameters=parameters)


def test_alpha_is_refused_where_there_is_no_photon() -> None:
    """The neutrino pair reads alpha in its own scheme only."""
    with pytest.raises(RequestError, match=r"parameters\.alpha: .* it is used with scheme = 'alpha'"):
        barnwright.predict(
            process="electroweak/neutrino-pair", beams=beams(), parameters={"scheme": "fermi", "alpha": 1 / 137.0}
        )


@every_process
def test_every_process_conforms_and_says_what_a_user_must_know(process: Process) -> None:
    """The conformance kit passes; references, order, validity, cautions and schemes are stated."""
    check_process(process)
    assert process.references
    assert process.order == "tree"
    assert process.valid is not None
    assert process.valid.text
    assert any("radiation-protection expert" in caution for caution in process.cautions)
    assert any("Radiation from the beams" in caution for caution in process.cautions)
    assert {"fermi", "on-shell"} <= set(process.alternatives)


def test_defaults_come_from_the_tables() -> None:
    """Masses and widths are the particle table's, the other defaults those that the parameters' sources name."""
    given = quark_pairs.bottom_pair.parameters()
    assert (given.z_mass, given.z_width) == (mass_of("Z0"), width_of("Z0"))
    assert given.bottom_mass == mass_of("b")
    assert (given.scheme, given.width_scheme, given.alpha) == ("alpha", "running", 1 / 128)
    assert lepton_pairs.muon_pair.parameters().z_mass == pytest.approx(91.1876, abs=3e-3)
    with pytest.raises(LookupError, match=r"^the particle table has no width of b$"):
        width_of("b")
    assert np.isfinite(given.w_mass)
