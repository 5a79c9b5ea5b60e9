"""Formulas that are hard to integrate: right within the stated error, or not called converged."""

from __future__ import annotations

import math
from typing import Any

import mpmath
import pytest

import barnwright

FLUX = 16 * math.pi * 1e4
"""16π s² in GeV⁴ at √s = 10 GeV: dσ/dt = |M|²/(16π s²) for massless particles, −s < t < 0."""


def predict(squared_amplitude: str, **more: Any) -> barnwright.Prediction:
    """The prediction of a formula for massless e- e+ -> mu- mu+ at 10 GeV, in GeV⁻²."""
    return barnwright.predict(
        formula={
            "reaction": "e- e+ -> mu- mu+",
            "squared_amplitude": squared_amplitude,
            "spin_colour": "averaged",
        },
        beams={"kind": "collider", "sqrt_s": 10.0},
        masses={"e-": 0.0, "mu-": 0.0},
        unit="GeV^-2",
        **more,
    )


SETTLING = {
    "1/((t + 30)**2 + 1e-8)": (mpmath.atan(30 / mpmath.mpf("1e-4")) + mpmath.atan(70 / mpmath.mpf("1e-4"))) * 1e4,
    "exp(-((t + 30)/0.3)**2)": mpmath.sqrt(mpmath.pi) * 0.3,
    "sin(100*t)**2": 50 - mpmath.sin(20000) / 400,
    "abs(t + 17)": (17**2 + 83**2) / mpmath.mpf(2),
    "1 + (t + 33.3)/sqrt((t + 33.3)**2)": 2 * mpmath.mpf(33.3),
    "sqrt(-t)": mpmath.mpf(2000) / 3,
    "1/sqrt(-t)": mpmath.mpf(20),
    "log(-t/s)**2": mpmath.mpf(200),
    "1/(1e-9 - t)": mpmath.log(1 + 100 / mpmath.mpf("1e-9")),
    "1/(1e-9 - u)**2": 1 / mpmath.mpf("1e-9") - 1 / (100 + mpmath.mpf("1e-9")),
}


@pytest.mark.parametrize("text", SETTLING)
def test_what_settles_is_right(text: str) -> None:
    """Peaks, waves, kinks, jumps and integrable singularities, none of them declared: to 1e-11, within the bound."""
    mpmath.mp.dps = 30
    p = predict(text)
    expected = float(SETTLING[text]) / FLUX
    assert p.status == "converged"
    assert p.total.value == pytest.approx(expected, rel=1e-11)
    assert abs(p.total.value - expected) <= p.total.error + 4e-16 * expected


@pytest.mark.parametrize("text", ["1/t", "1/t**2", "1/(t*u)", "sin(1e6*t)**2", "1/(t + 30)**2", "1/abs(t + 30)"])
def test_what_does_not_settle_is_suspect(text: str) -> None:
    """Divergences and waves beyond resolution are never called converged."""
    p = predict(text)
    assert p.status == "suspect"
    assert {"not_settled", "non_finite"} & {note.code for note in p.notes}


@pytest.mark.parametrize(
    ("text", "code"), [("-1 - t**2", "negative"), ("sqrt(t)", "non_finite"), ("1/(s - s)", "non_finite")]
)
def test_what_is_no_squared_amplitude_is_suspect(text: str, code: str) -> None:
    """Negative and undefined values are counted, and the first is shown with its momenta."""
    p = predict(text)
    assert p.status == "suspect"
    note = next(note for note in p.notes if note.code == code)
    assert "momenta (E, px, py, pz)" in note.text


def test_a_law_that_vanishes_says_so() -> None:
    """An exact 0 carries a note, so that a structure too narrow to be seen is not mistaken for an answer."""
    p = predict("exp(-abs(t + 30)/1e-6)")
    assert p.total.value == 0.0
    assert [note.code for note in p.notes] == ["law_is_zero"]


def test_a_declared_peak_is_never_missed() -> None:
    """The same formula with its peak declared at its mass: the width of the peak maps the axis."""
    mass = 1e-7
    formula = {
        "reaction": "e- e+ -> mu- mu+",
        "squared_amplitude": "1/(m**2 - t)**2",
        "spin_colour": "averaged",
        "parameters": {"m": mass},
        "peaks": [{"of": "t", "shape": "power", "at": "m"}],
    }
    beams = {"kind": "collider", "sqrt_s": 10.0}
    p = barnwright.predict(formula=formula, beams=beams, masses={"e-": 0.0, "mu-": 0.0}, unit="GeV^-2")
    assert p.total.value == pytest.approx((1 / mass**2 - 1 / (100 + mass**2)) / FLUX, rel=1e-12)


@pytest.mark.parametrize("share", [1e-2, 1e-5, 1e-8])
@pytest.mark.parametrize("method", ["closed_form", "quadrature"])
def test_rounding_close_to_a_threshold_is_in_the_error(share: float, method: str) -> None:
    """Beams given by their energies: the error covers what the rounding of √s means just above 2 m_mu."""
    mpmath.mp.dps = 50
    muon, electron = 0.1056583755, 0.00051099895
    positron = 0.0018
    root = 2 * muon * (1 + share)
    momentum = math.sqrt(positron**2 - electron**2)
    energy = (root**2 - 2 * electron**2) / (2 * (positron + momentum))
    for _ in range(20):
        q = math.sqrt(energy**2 - electron**2)
        energy -= (2 * electron**2 + 2 * (energy * positron + q * momentum) - root**2) / (2 * (positron + momentum))
    p = barnwright.predict(
        process="qed/muon-pair",
        beams={"kind": "collider", "energies": {"e-": energy, "e+": positron}},
        masses={"mu-": muon, "e-": electron},
        parameters={"alpha": 0.0072973525643},
        unit="GeV^-2",
        accuracy={"method": method},
    )
    m, n, a, b = (mpmath.mpf(x) for x in (muon, electron, energy, positron))
    s = 2 * n**2 + 2 * (a * b + mpmath.sqrt(a**2 - n**2) * mpmath.sqrt(b**2 - n**2))
    beta = mpmath.sqrt(1 - 4 * m**2 / s) / mpmath.sqrt(1 - 4 * n**2 / s)
    sigma = 4 * mpmath.pi * mpmath.mpf(0.0072973525643) ** 2 / (3 * s) * beta * (1 + 2 * m**2 / s) * (1 + 2 * n**2 / s)
    assert abs(p.total.value - sigma) <= p.total.error
    assert p.total.error < 1e-14 / share * float(sigma)


@pytest.mark.parametrize("sqrt_s", [30.0, 100.0, 1000.0, 7000.0])
def test_a_forward_slope_is_seen_at_any_energy(sqrt_s: float) -> None:
    """exp(12 t) lives at −t ~ 0.1 GeV², a share of 1e-9 of the axis at 7 TeV, and nobody has declared it."""
    p = barnwright.predict(
        formula={
            "reaction": "e- e+ -> mu- mu+",
            "squared_amplitude": "exp(12*t) + 1e-12",
            "spin_colour": "averaged",
        },
        beams={"kind": "collider", "sqrt_s": sqrt_s},
        masses={"e-": 0.0, "mu-": 0.0},
        unit="GeV^-2",
    )
    expected = (1 / 12 + 1e-12 * sqrt_s**2) / (16 * math.pi * sqrt_s**4)
    assert p.total.value == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize("width", [3.0, 1.0, 0.5, 0.3])
def test_a_bump_anywhere_is_seen(width: float) -> None:
    """A bump of a few hundredths of the axis is found wherever it lies, and is within the bound."""
    for centre in range(3, 98, 5):
        p = predict(f"1 + exp(-((t + {centre}.37)/{width})**2)*10")
        ends = math.erf((99.63 - centre) / width) + math.erf((centre + 0.37) / width)
        expected = (100 + 5 * width * math.sqrt(math.pi) * ends) / FLUX
        assert abs(p.total.value - expected) <= p.total.error + 4e-15 * expected


def test_the_histogram_does_not_change_the_total() -> None:
    """The total and its error stay the same to rounding, whatever is binned."""
    alone = predict("exp(12*t)")
    edges = [0.0, 0.1, 1.0]
    binned = predict(
        "exp(12*t)", histograms=[{"name": "q", "observables": ["q2(beam_a, mu-)"], "bins": [{"edges": edges}]}]
    )
    assert binned.total.value == pytest.approx(alone.total.value, rel=1e-13)


def test_what_is_cut_away_is_not_integrated() -> None:
    """A divergence that a cut keeps out leaves the answer converged."""
    edge = 0.9999999999
    p = predict("1/t**2", cuts=[{"observable": "cos_theta(mu-)", "max": edge}])
    least = 50 * mpmath.mpf(1 - edge)
    assert p.status == "converged"
    assert p.total.value == pytest.approx(float((1 / least - mpmath.mpf(1) / 100) / FLUX), rel=1e-12)


def test_an_observable_without_a_value_is_told() -> None:
    """Where sqrt of a negative number is cut on, the answer is suspect and says why."""
    p = predict("1", cuts=[{"observable": "sqrt(pt(mu-) - 2)", "max": 9.0}])
    assert p.status == "suspect"
    assert "undefined_observable" in {note.code for note in p.notes}


def test_a_result_beyond_floats_is_told() -> None:
    """An overflow is no number, suspect, and has a note."""
    p = barnwright.predict(
        formula={"reaction": "e- e+ -> mu- mu+", "squared_amplitude": "1e300", "spin_colour": "averaged"},
        beams={"kind": "collider", "sqrt_s": 10.0},
        unit="ab",
    )
    assert (p.total.value, p.status) == (None, "suspect")
    assert "overflow" in {note.code for note in p.notes}


@pytest.mark.parametrize("bins", [1, 10, 33, 64, 100])
def test_a_jump_is_right_whatever_is_binned(bins: int) -> None:
    """A jump that lies close to an edge, or anywhere else, changes the total by 1e-12 at most with any binning."""
    axis = {"count": bins, "low": -1.0, "high": 1.0}
    histogram = {"name": "c", "observables": ["cos_theta(mu-)"], "bins": [axis]}
    for place in (3.1, 12.53, 33.3, 49.97, 61.7, 74.02, 96.9):
        p = predict(f"1 + (t + {place})/(abs(t + {place}) + 1e-300)", histograms=[histogram])
        assert p.total.value == pytest.approx(2 * place / FLUX, rel=1e-12)
        assert sum(p.histograms["c"].contents) == pytest.approx(p.total.value, rel=1e-13)
