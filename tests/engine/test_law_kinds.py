"""Helicity amplitudes, dσ/dΩ and σ(s) through the whole engine, against integrals done by hand."""

from __future__ import annotations

from itertools import pairwise
from typing import Any

import numpy as np
import pytest
from engine.laws import PICOBARN, Plain, amplitudes, falling, partial_wave, two_bosons

import barnwright
from barnwright.errors import RequestError
from barnwright.plugin import AngularCrossSection, HelicityAmplitudes, Process, SquaredAmplitude, TotalCrossSection

COLLIDER = {"kind": "collider", "sqrt_s": 60.0}
ANGLE = {"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 5, "low": -1.0, "high": 1.0}]}


def couplings() -> tuple[np.ndarray, np.ndarray]:
    """The two bosons' couplings to the four helicities at 60 GeV."""
    propagator = 3600 / (3600 - 91.0**2 + 2.5j * 91)
    return np.full(4, 0.09), 0.2 * np.array([1.2, -0.3, -0.3, 1.5]) * propagator


def expected(low: float, high: float, polarisation: tuple[float, float]) -> float:
    """σ in pb between two cosines: ∫(1 ± c)² over helicities, weighed by hand."""
    first, second = couplings()
    strength = np.abs(first + second) ** 2
    shapes = [((1 + s * high) ** 3 - (1 + s * low) ** 3) / (3 * s) for s in (1, -1, -1, 1)]
    minus, plus = polarisation
    left, right = (1 - minus) * (1 + plus) / 4, (1 + minus) * (1 - plus) / 4
    total = sum(w * a * f for w, a, f in zip((left, left, right, right), strength, shapes, strict=True))
    return float(total / (32 * np.pi * 3600) * PICOBARN)


@pytest.mark.parametrize("polarisation", [(0.0, 0.0), (-0.8, 0.3), (0.8, -0.3), (1.0, -1.0), (-1.0, 1.0)])
def test_polarised_beams_weigh_the_helicities(polarisation: tuple[float, float]) -> None:
    """Every bin is the sum over helicities with the weights (1 ± P)/2."""
    beams = {**COLLIDER, "polarisation": dict(zip(("e-", "e+"), polarisation, strict=True))}
    found = barnwright.predict(process=two_bosons, beams=beams, histograms=[ANGLE])
    edges = found.histograms["angle"].edges
    contents = [expected(low, high, polarisation) for low, high in pairwise(edges)]
    assert found.histograms["angle"].contents == pytest.approx(contents, rel=1e-12)
    assert found.total.value == pytest.approx(expected(-1, 1, polarisation), rel=1e-12)


def test_equal_helicities_annihilate_nothing() -> None:
    """(P-, P+) = (1, 1) leaves a massless vector exchange without a cross section, and the note says so."""
    found = barnwright.predict(process=two_bosons, beams={**COLLIDER, "polarisation": {"e-": 1.0, "e+": 1.0}})
    assert found.total.value == 0
    assert [note.code for note in found.notes] == ["law_is_zero"]


def test_only_wanted_helicities_are_computed() -> None:
    """A function with the parameter ``helicities`` is asked for those that have a weight."""
    asked: list[Any] = []

    def chosen(event: Any, parameters: Any, helicities: Any) -> Any:
        asked.append(helicities)
        rows = [two_bosons.laws[0].helicities.index(one) for one in helicities]
        return sum(amplitudes(event, Plain(), frozenset((part,))) for part in ("photon", "z"))[rows]

    law = HelicityAmplitudes(chosen, helicities=two_bosons.laws[0].helicities)
    process = Process(name="chosen", reaction="e- e+ -> mu- mu+", laws=(law,), masses={"e-": 0.0, "mu-": 0.0})
    found = barnwright.predict(process=process, beams={**COLLIDER, "polarisation": {"e-": -1.0}})
    assert set(asked) == {((-1, 1, -1, 1), (-1, 1, 1, -1))}
    assert found.total.value == pytest.approx(expected(-1, 1, (-1.0, 0.0)), rel=1e-12)


def test_helicities_of_each_leg_are_a_product() -> None:
    """Helicities leg by leg stand for their product, the last leg varying fastest."""
    law = HelicityAmplitudes(amplitudes, helicities=((-1, 1), (1,), (-1,), (1, -1)))
    rows = ((-1, 1, -1, 1), (-1, 1, -1, -1), (1, 1, -1, 1), (1, 1, -1, -1))
    assert law.combinations(two_bosons.legs) == rows


def test_colours_and_flows() -> None:
    """A colour matrix over two flows is contracted as A_i C_ij A_j*."""

    def flows(event: Any, parameters: Any) -> Any:
        return np.stack([[np.ones(event.shape), 2j * np.ones(event.shape)]])

    law = HelicityAmplitudes(flows, helicities=((-1, 1, -1, 1),), colour=((9.0, 3.0j), (-3.0j, 9.0)))
    process = Process(name="flows", reaction="u u~ -> c c~", laws=(law,), masses={"u": 0.0, "c": 0.0})
    found = barnwright.predict(process=process, beams={"kind": "collider", "sqrt_s": 10.0})
    squared = (9 + 36 + 2 * (3.0j * np.conj(2j)).real) / 36
    assert found.total.value == pytest.approx(squared / (16 * np.pi * 100) * PICOBARN, rel=1e-12)


def test_a_law_without_helicities_refuses_polarised_beams() -> None:
    """The message names the process; a spinless beam is refused by name."""
    with pytest.raises(
        RequestError, match="expected 0: the laws of flat have no helicities, so its beams are unpolarised"
    ):
        barnwright.predict(
            process=Process(name="flat", reaction="e- e+ -> mu- mu+", laws=(SquaredAmplitude(lambda event, p: 1.0),)),
            beams={**COLLIDER, "polarisation": {"e-": 0.5}},
        )
    with pytest.raises(
        RequestError, match=r"beams\.polarisation\.pi\+: got 0\.5, expected 0: pi\+ has not two helicities"
    ):
        barnwright.predict(
            process=partial_wave,
            beams={"kind": "fixed_target", "kinetic_energy": 0.19, "polarisation": {"pi+": 0.5}},
        )


def test_an_angular_law_is_integrated_over_the_sphere() -> None:
    """∫(1 + 3c²)/k² dΩ = 8π/k², whatever the frame of the question."""
    beams = {"kind": "fixed_target", "kinetic_energy": 0.19}
    bins = [{"count": 7, "low": 0.0, "high": 180.0}]
    lab = {"name": "lab", "observables": ["theta(pi+) / deg"], "bins": bins}
    found = barnwright.predict(process=partial_wave, beams=beams, histograms=[lab])
    s = (0.13957039 + 0.93827208816) ** 2 + 2 * 0.93827208816 * 0.19
    total, difference = 0.13957039 + 0.93827208816, 0.93827208816 - 0.13957039
    momentum_squared = (s - total**2) * (s - difference**2) / (4 * s)
    mass = found.masses["pi+"], found.masses["p"]
    assert mass == pytest.approx((0.13957039, 0.93827208816), rel=1e-6)
    assert found.total.value == pytest.approx(8 * np.pi / momentum_squared * PICOBARN, rel=1e-6)
    assert found.histograms["lab"].contents.sum() == pytest.approx(found.total.value, rel=1e-12)


def test_a_total_law_answers_for_the_energy_alone() -> None:
    """σ(s) needs no final state; cuts and bins of √s work, and an angle is refused by name."""
    bins = {"name": "energy", "observables": ["sqrt_s"], "bins": [{"edges": [1.0, 50.0, 70.0]}]}
    found = barnwright.predict(process=falling, beams=COLLIDER, histograms=[bins])
    assert found.method == "closed_form"
    assert found.total.value == pytest.approx(PICOBARN / 3600, rel=1e-14)
    assert list(found.histograms["energy"].contents) == [0.0, found.total.value]
    cut = {"observable": "sqrt_s", "max": 50.0}
    assert barnwright.predict(process=falling, beams=COLLIDER, cuts=[cut]).total.value == 0
    with pytest.raises(
        RequestError, match="expected sqrt_s, or arithmetic with it: nothing is known of the final state"
    ):
        barnwright.predict(process=falling, beams=COLLIDER, histograms=[ANGLE])


def test_a_total_law_of_a_known_final_state_refuses_angles() -> None:
    """The legs are there, but the law has no angular distribution."""
    law = TotalCrossSection(lambda point, parameters: 1 / point.s)
    process = Process(name="total", reaction="e- e+ -> mu- mu+", laws=(law,))
    with pytest.raises(RequestError, match="nothing about the final state: total is a total cross section"):
        barnwright.predict(process=process, beams=COLLIDER, histograms=[ANGLE])
    assert barnwright.predict(process=process, beams={"kind": "collider", "sqrt_s": 0.1}).total.value == 0


def test_the_error_of_a_total_law_covers_the_rounding_of_the_energy() -> None:
    """On the flank of a line of Γ/M = 3e-5 the last digit of √s moves σ far more than ε."""

    def line(point: Any, parameters: Any) -> Any:
        return 1 / ((point.s - 9.0) ** 2 + (3.0 * 1e-4) ** 2)

    process = Process(name="line", reaction="e- e+ -> X", laws=(TotalCrossSection(line),))
    found = barnwright.predict(process=process, beams={"kind": "collider", "sqrt_s": 3.0 + 5e-5})
    assert 1e-13 < found.total.error / found.total.value < 1e-9


def test_identical_particles_of_an_angular_law_count_once() -> None:
    """The core multiplies dσ/dΩ by 1/2 for two identical particles."""
    law = AngularCrossSection(lambda point, cosine, parameters: 1 + 0 * cosine)
    process = Process(name="sphere", reaction="p p -> p p", laws=(law,))
    found = barnwright.predict(process=process, beams={"kind": "collider", "sqrt_s": 10.0})
    assert found.total.value == pytest.approx(2 * np.pi * PICOBARN, rel=1e-12)
