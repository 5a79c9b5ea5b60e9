"""Bins of every kind of observable, in every kind of beams, against a plain sum over explicit four-vectors.

The sum is as different from the engine as can be: a midpoint rule of equal steps in cos θ, textbook boosts, and the
histogram of numpy.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

import barnwright

MUON, ELECTRON = 0.1056583755, 0.00051099895
ALPHA = 0.0072973525643
STEPS = 400_000
MASSES = {"mu-": MUON, "e-": ELECTRON}

BEAMS: dict[str, dict[str, Any]] = {
    "symmetric": {"kind": "collider", "sqrt_s": 3.0},
    "asymmetric": {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}},
    "turned round": {"kind": "collider", "energies": {"e-": 7.0, "e+": 4.0}, "along_z": "e+"},
    "on a target": {"kind": "fixed_target", "energy": 100.0},
    "target of electrons": {"kind": "fixed_target", "momentum": 60.0, "target": "e-"},
}

Vectors = dict[str, np.ndarray]


def lab_momenta(beams: dict[str, Any], cosine: np.ndarray) -> tuple[Vectors, Vectors]:
    """(E, px, py, pz) of beams and muons in the lab and in the cm, by textbook formulas; azimuth 0."""
    if "sqrt_s" in beams:
        energies, signs = (beams["sqrt_s"] / 2,) * 2, (1, -1)
    elif "energies" in beams:
        energies, signs = tuple(beams["energies"].values()), (1, -1) if "along_z" not in beams else (-1, 1)
    elif beams.get("target") == "e-":
        energies, signs = (ELECTRON, np.hypot(beams["momentum"], ELECTRON)), (-1, 1)
    else:
        energies, signs = (beams["energy"], ELECTRON), (1, -1)
    momenta = [sign * np.sqrt(max(e**2 - ELECTRON**2, 0.0)) for e, sign in zip(energies, signs, strict=True)]
    total, along = sum(energies), sum(momenta)
    root_s = np.sqrt(total**2 - along**2)
    q = np.sqrt(root_s**2 / 4 - MUON**2)
    cosine = cosine * signs[0]
    sine = np.sqrt(1 - cosine**2)
    half = np.full_like(cosine, root_s / 2)
    in_cm = {
        "mu-": np.array([half, q * sine, 0 * sine, q * cosine]),
        "mu+": np.array([half, -q * sine, 0 * sine, -q * cosine]),
    }
    gamma, gamma_beta = total / root_s, along / root_s
    in_lab = {
        name: np.array([gamma * p[0] + gamma_beta * p[3], p[1], p[2], gamma * p[3] + gamma_beta * p[0]])
        for name, p in in_cm.items()
    }
    for name, e, p in zip(("beam_a", "beam_b"), energies, momenta, strict=True):
        in_lab[name] = np.array([np.full_like(half, e), 0 * half, 0 * half, np.full_like(half, p)])
    return in_lab, in_cm


def size(p: np.ndarray) -> np.ndarray:
    """|p|."""
    return np.sqrt(p[1] ** 2 + p[2] ** 2 + p[3] ** 2)


def angle(p: np.ndarray, q: np.ndarray) -> np.ndarray:
    """The angle between two momenta."""
    product = p[1] * q[1] + p[2] * q[2] + p[3] * q[3]
    return np.arccos(np.clip(product / (size(p) * size(q)), -1, 1))


def square(p: np.ndarray) -> np.ndarray:
    """p²."""
    return p[0] ** 2 - p[1] ** 2 - p[2] ** 2 - p[3] ** 2


OBSERVABLES: dict[str, Callable[[Vectors, Vectors], np.ndarray]] = {
    "energy(mu-)": lambda lab, cm: lab["mu-"][0],
    "kinetic_energy(mu+)": lambda lab, cm: lab["mu+"][0] - MUON,
    "momentum(mu-)": lambda lab, cm: size(lab["mu-"]),
    "pt(mu+)": lambda lab, cm: np.hypot(lab["mu+"][1], lab["mu+"][2]),
    "theta(mu-)": lambda lab, cm: np.arccos(lab["mu-"][3] / size(lab["mu-"])),
    "theta(mu+, frame=cm)": lambda lab, cm: np.arccos(cm["mu+"][3] / size(cm["mu+"])),
    "cos_theta(mu-)": lambda lab, cm: lab["mu-"][3] / size(lab["mu-"]),
    "abs(cos_theta(mu+, frame=cm))": lambda lab, cm: np.abs(cm["mu+"][3] / size(cm["mu+"])),
    "rapidity(mu-)": lambda lab, cm: 0.5 * np.log((lab["mu-"][0] + lab["mu-"][3]) / (lab["mu-"][0] - lab["mu-"][3])),
    "pseudorapidity(mu+)": lambda lab, cm: np.arcsinh(lab["mu+"][3] / np.hypot(lab["mu+"][1], lab["mu+"][2])),
    "transfer(beam_a, mu-)": lambda lab, cm: square(lab["beam_a"] - lab["mu-"]),
    "q2(beam_b, mu-)": lambda lab, cm: -square(lab["beam_b"] - lab["mu-"]),
    "angle(mu-, mu+)": lambda lab, cm: angle(lab["mu-"], lab["mu+"]),
    "acollinearity(mu-, mu+)": lambda lab, cm: np.pi - angle(lab["mu-"], lab["mu+"]),
    "delta_eta(mu-, mu+)": lambda lab, cm: (
        np.arcsinh(lab["mu-"][3] / np.hypot(*lab["mu-"][1:3])) - np.arcsinh(lab["mu+"][3] / np.hypot(*lab["mu+"][1:3]))
    ),
    "min(energy(mu-), energy(mu+))": lambda lab, cm: np.minimum(lab["mu-"][0], lab["mu+"][0]),
    "max(pt(mu-), 0.3*energy(mu-))": lambda lab, cm: np.maximum(np.hypot(*lab["mu-"][1:3]), 0.3 * lab["mu-"][0]),
    "sqrt(pt(mu-)*momentum(mu+))": lambda lab, cm: np.sqrt(np.hypot(*lab["mu-"][1:3]) * size(lab["mu+"])),
    "energy(mu+, frame=rest(mu-))": lambda lab, cm: (
        (cm["mu-"][0] * cm["mu+"][0] - sum(cm["mu-"][k] * cm["mu+"][k] for k in (1, 2, 3))) / MUON
    ),
}
CONSTANT = {("energy(mu+, frame=rest(mu-))", name) for name in BEAMS} | {
    (text, "symmetric")
    for text in (
        "energy(mu-)",
        "kinetic_energy(mu+)",
        "momentum(mu-)",
        "angle(mu-, mu+)",
        "acollinearity(mu-, mu+)",
        "min(energy(mu-), energy(mu+))",
    )
}


@pytest.mark.parametrize("beams", BEAMS)
@pytest.mark.parametrize("text", OBSERVABLES)
def test_bins(text: str, beams: str) -> None:
    """Ten bins over the range of the observable, and a cut on it, agree with the plain sum to its own accuracy."""
    if (text, beams) in CONSTANT:
        pytest.skip("the observable is the same for all events")
    cosine = (np.arange(STEPS) + 0.5) * (2 / STEPS) - 1
    values = OBSERVABLES[text](*lab_momenta(BEAMS[beams], cosine))
    low, high = (float(q) for q in np.quantile(values, [0.02, 0.97]))
    edges = np.linspace(low, high, 11)
    histogram = {"name": "h", "observables": [text], "bins": [{"edges": edges.tolist()}], "per": "bin"}
    cut = {"name": "cut", "observable": text, "outside": [float(edges[3]), float(edges[5])]}
    request = {"process": "qed/muon-pair", "beams": BEAMS[beams], "masses": MASSES, "parameters": {"alpha": ALPHA}}
    prediction = barnwright.predict(request, histograms=[histogram])
    total = prediction.total.value
    found = prediction.histograms["h"]
    s = _s(beams)
    weight = 1 + (1 - 4 * MUON**2 / s) * (1 - 4 * ELECTRON**2 / s) * cosine**2 + 4 * (MUON**2 + ELECTRON**2) / s
    expected = np.histogram(values, edges, weights=weight)[0] / weight.sum() * total
    assert found.values == pytest.approx(expected, abs=2e-5 * total)
    assert found.values.sum() + found.underflow + found.overflow == pytest.approx(total, rel=1e-12)
    kept = barnwright.predict(request, cuts=[cut]).total.value
    assert kept == pytest.approx(total - found.values[3:5].sum(), rel=1e-10)


def _s(beams: str) -> float:
    """s in GeV², from the sum of the beams' momenta."""
    lab, _ = lab_momenta(BEAMS[beams], np.zeros(1))
    return float(square(lab["beam_a"] + lab["beam_b"])[0])
