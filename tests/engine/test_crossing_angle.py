"""Beams that cross at an angle, through the whole engine.

Roads, each as different from the engine as can be: integrals over the angles of the lab with the textbook
Jacobian of massless particles, a plain sum over explicit four-vectors, and what must not change at all.
"""

from __future__ import annotations

from itertools import pairwise
from typing import Any

import numpy as np
import pytest
from engine.test_against_a_grid import OBSERVABLES, Vectors, angle, size, square
from numpy.polynomial.legendre import leggauss

import barnwright
from barnwright.beams import BeamSettings, collide
from barnwright.event import Event
from barnwright.kinematics import TwoBody
from barnwright.observables import compile_observable
from barnwright.plugin import Peak, Process, SquaredAmplitude
from barnwright.reaction import parse_reaction

MUON, ELECTRON, PROTON = 0.1056583755, 0.00051099895, 0.93827208816
MASSLESS = {"mu-": 0.0, "e-": 0.0}
BEAMS: dict[str, Any] = {"kind": "collider", "energies": {"e-": 7.007, "e+": 4.0}, "crossing_angle": 0.083}
QUADRATURE = {"method": "quadrature"}


def muons(beams: dict[str, Any] = BEAMS, **more: Any) -> barnwright.Prediction:
    """e- e+ -> mu- mu+ through a photon."""
    return barnwright.predict(process="qed/muon-pair", beams=beams, **more)


def histogram(text: str, edges: Any, name: str = "h") -> dict[str, Any]:
    """Contents of bins."""
    return {"name": name, "observables": [text], "bins": [{"edges": [float(e) for e in edges]}], "per": "bin"}


def momenta(angle: float) -> tuple[np.ndarray, np.ndarray]:
    """(E, px, py, pz) of the massless beams of `BEAMS` at another angle."""
    sine, cosine = np.sin(angle / 2), np.cos(angle / 2)
    return 7.007 * np.array([1, sine, 0, cosine]), 4.0 * np.array([1, sine, 0, -cosine])


def lab_shares(angle: float, cosines: np.ndarray, azimuths: np.ndarray) -> np.ndarray:
    """Shares of massless e- e+ -> mu- mu+ in bins of the angles of mu- in the lab.

    dΩ_cm/dΩ_lab = s/(E − P·n)² for a massless particle along n, from E_lab (E − P·n) = s/2.
    """
    a, b = momenta(angle)
    system, s = a + b, square(a + b)
    x, w = leggauss(40)

    def nodes(edges: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
        fine = np.concatenate([np.linspace(*pair, 9)[:-1] for pair in pairwise(edges)])
        ends = np.append(fine, edges[-1])
        half = np.diff(ends)[:, None] / 2
        return (ends[:-1, None] + half * (1 + x)).reshape(edges.size - 1, -1), (half * w).reshape(edges.size - 1, -1)

    theta, d_theta = nodes(np.arccos(cosines)[::-1])
    phi, d_phi = nodes(azimuths)
    shares = np.zeros((cosines.size - 1, azimuths.size - 1))
    for j in range(azimuths.size - 1):
        sine = np.sin(theta)[..., None]
        n_x, n_z = sine * np.cos(phi[j]), np.cos(theta)[..., None]
        away = system[0] - system[1] * n_x - system[3] * n_z
        t = -(s / away) * (a[0] - a[1] * n_x - a[3] * n_z)
        density = (1 + (1 + 2 * t / s) ** 2) * s / away**2 * sine
        shares[:, j] = np.einsum("btp,bt,p->b", density, d_theta, d_phi[j])[::-1]
    return shares / (2 * np.pi * 8 / 3)


@pytest.mark.parametrize(
    ("angle", "method"), [(1e-3, "closed_form"), (0.083, "closed_form"), (2.8, "closed_form"), (0.083, "quadrature")]
)
def test_angles_of_the_lab(angle: float, method: str) -> None:
    """Bins of cos θ and φ of the lab are right to 1e-9 of the total, and within their errors."""
    cosines, azimuths = np.linspace(-1, 1, 9), np.array([-np.pi, -2.0, -0.3, 0.0, 1.0, 2.9, np.pi])
    beams = {**BEAMS, "crossing_angle": angle}
    asked = [histogram("cos_theta(mu-)", cosines, "cosine"), histogram("phi(mu-)", azimuths, "azimuth")]
    found = muons(beams, histograms=asked, masses=MASSLESS, accuracy={"method": method})
    shares = lab_shares(angle, cosines, azimuths)
    for name, expected in (("cosine", shares.sum(axis=1)), ("azimuth", shares.sum(axis=0))):
        own = found.histograms[name]
        deviation = np.abs(own.values - expected * found.total.value)
        assert np.max(deviation) < 1e-9 * found.total.value
        assert np.all(deviation < own.errors + 1e-13 * found.total.value)
        assert np.max(own.errors) < 1e-8 * found.total.value


def test_two_dimensions_and_a_cut() -> None:
    """cos θ by φ of the lab, and a cut on both, are right to 1e-9 of the total and within their errors."""
    cosines, azimuths = np.array([-0.9, -0.1, 0.5, 0.97]), np.array([-1.5, 0.2, 2.0])
    axes = [{"edges": cosines.tolist()}, {"edges": azimuths.tolist()}]
    both = {"name": "h", "observables": ["cos_theta(mu-)", "phi(mu-)"], "bins": axes, "per": "bin"}
    found = muons(histograms=[both], masses=MASSLESS)
    expected = lab_shares(0.083, cosines, azimuths) * found.total.value
    deviation = np.abs(found.histograms["h"].values - expected)
    assert np.max(deviation) < 1e-9 * found.total.value
    assert np.all(deviation < found.histograms["h"].errors)
    cuts = [
        {"name": "polar", "observable": "cos_theta(mu-)", "min": -0.9, "max": 0.97},
        {"name": "around", "observable": "phi(mu-)", "min": -1.5, "max": 2.0},
    ]
    kept = muons(cuts=cuts, masses=MASSLESS).total
    assert abs(kept.value - expected.sum()) < max(kept.error, 1e-12 * kept.value)
    assert kept.error < 1e-7 * kept.value


def boosted(p: np.ndarray, system: np.ndarray, sign: int) -> np.ndarray:
    """p in the rest frame of a system (sign −1), or out of it (+1)."""
    root_s = np.sqrt(square(system))
    energy = (system[0] * p[0] + sign * (system[1] * p[1] + system[3] * p[3])) / root_s
    shift = sign * (p[0] + energy) / (system[0] + root_s)
    return np.array([energy, *(p[k] + system[k] * shift for k in (1, 2, 3))])


def grid_momenta(energies: tuple[float, float], masses: tuple[float, ...], angle: float) -> tuple[Vectors, Vectors]:
    """Momenta on a lattice of cos θ and φ in the cm, by explicit boosts: legs 1 and 2 and both beams, lab and cm."""
    points = np.arange(500_000) + 0.5
    cosine, phi = 2 * points / points.size - 1, 2 * np.pi * ((points * (np.sqrt(5) - 1) / 2) % 1)
    momentum = [np.sqrt(e**2 - m**2) for e, m in zip(energies, masses[:2], strict=True)]
    sine, along = np.sin(angle / 2), np.cos(angle / 2)
    a = np.array([energies[0], momentum[0] * sine, 0, momentum[0] * along])
    b = np.array([energies[1], momentum[1] * sine, 0, -momentum[1] * along])
    system = a + b
    root_s = np.sqrt(square(system))
    total, difference = masses[2] + masses[3], masses[2] - masses[3]
    q = np.sqrt((root_s**2 - total**2) * (root_s**2 - difference**2)) / (2 * root_s)

    in_cm = boosted(a, system, -1)
    z = in_cm[1:] / size(in_cm)
    x = np.array([z[2], 0.0, -z[0]])
    flight = q * np.array([np.sqrt(1 - cosine**2) * np.cos(phi), np.sqrt(1 - cosine**2) * np.sin(phi), cosine])
    turned = x[:, None] * flight[0] + z[:, None] * flight[2]
    turned[1] = flight[1]
    lab, cm = {"beam_a": a[:, None], "beam_b": b[:, None]}, {}
    for name, mass, sign in (("mu-", masses[2], 1), ("mu+", masses[3], -1)):
        energy = np.full_like(cosine, np.hypot(q, mass))
        cm[name] = np.array([energy, *(sign * flight)])
        lab[name] = boosted(np.array([energy, *(sign * turned)]), system, 1)
    return lab, cm


LAB_ANGLE = 0.3
MUON_MASSES = (ELECTRON, ELECTRON, MUON, MUON)
GRID = grid_momenta((7.007, 4.0), MUON_MASSES, LAB_ANGLE)
CUT = {"name": "cut", "observable": "energy(mu+)", "min": 4.0, "max": 7.0}
MORE = {
    "delta_r(mu-, mu+)": lambda lab, cm: np.hypot(
        OBSERVABLES["delta_eta(mu-, mu+)"](lab, cm), wrapped(azimuth(lab["mu-"]) - azimuth(lab["mu+"]))
    ),
    "angle(beam_a, mu-)": lambda lab, cm: angle(lab["beam_a"], lab["mu-"]),
}


def azimuth(p: np.ndarray) -> np.ndarray:
    """φ in (−π, π]."""
    return np.arctan2(p[2], p[1])


def wrapped(difference: np.ndarray) -> np.ndarray:
    """In (−π, π]."""
    return -((np.pi - difference) % (2 * np.pi) - np.pi)


OF_THE_GRID = (
    "energy(mu-)",
    "pt(mu+)",
    "cos_theta(mu-)",
    "theta(mu+, frame=cm)",
    "pseudorapidity(mu+)",
    "transfer(beam_a, mu-)",
    "acollinearity(mu-, mu+)",
    "max(pt(mu-), 0.3*energy(mu-))",
)


@pytest.mark.parametrize("text", [*OF_THE_GRID, *MORE])
def test_bins_against_a_plain_sum(text: str) -> None:
    """Eight bins over the range of the observable, with a cut on an energy of the lab, agree with a plain sum."""
    values = {**OBSERVABLES, **MORE}[text](*GRID)
    low, high = (float(q) for q in np.quantile(values, [0.02, 0.97]))
    edges = np.linspace(low, high, 9)
    found = muons({**BEAMS, "crossing_angle": LAB_ANGLE}, histograms=[histogram(text, edges)], cuts=[CUT])
    root = 4 * MUON**2 / square(GRID[0]["beam_a"] + GRID[0]["beam_b"])[0]
    tiny = root * (ELECTRON / MUON) ** 2
    cosine = GRID[1]["mu-"][3] / size(GRID[1]["mu-"])
    weight = 1 + (1 - root) * (1 - tiny) * cosine**2 + root + tiny
    kept = (GRID[0]["mu+"][0] >= 4.0) & (GRID[0]["mu+"][0] < 7.0)
    uncut = muons({**BEAMS, "crossing_angle": LAB_ANGLE}).total.value
    expected = np.histogram(values[kept], edges, weights=weight[kept])[0] / weight.sum() * uncut
    own = found.histograms["h"]
    assert own.values == pytest.approx(expected, abs=8e-5 * uncut)
    assert np.max(own.errors) < 1e-7 * uncut
    whole = own.values.sum() + own.underflow + own.overflow
    assert whole == pytest.approx(found.total.value, abs=10 * found.total.error + 1e-12 * uncut)


ELASTIC: dict[str, Any] = {
    "formula": {"reaction": "e- p -> e- p", "squared_amplitude": "1/(1 - t)**2", "spin_colour": "averaged"},
    "masses": {"e-": ELECTRON, "p": PROTON},
    "beams": {"kind": "collider", "energies": {"e-": 18.0, "p": 275.0}, "crossing_angle": 0.025},
    "cuts": [{"name": "wide", "observable": "cos_theta(e-, frame=cm)", "max": 0.9}],
}


@pytest.mark.parametrize("text", ["pt(p)", "energy(e-)", "pseudorapidity(p)"])
def test_electrons_on_protons(text: str) -> None:
    """18 on 275 GeV at 25 mrad with masses: bins that hold from 5 to 25 % agree with a plain sum."""
    lab, cm = grid_momenta((18.0, 275.0), (ELECTRON, PROTON, ELECTRON, PROTON), 0.025)
    values = {
        "pt(p)": np.hypot(lab["mu+"][1], lab["mu+"][2]),
        "energy(e-)": lab["mu-"][0],
        "pseudorapidity(p)": np.arcsinh(lab["mu+"][3] / np.hypot(lab["mu+"][1], lab["mu+"][2])),
    }[text]
    weight = np.where(cm["mu-"][3] < 0.9 * size(cm["mu-"]), 1 / (1 - square(lab["beam_a"] - lab["mu-"])) ** 2, 0.0)
    order = np.argsort(values)
    shares = np.cumsum(weight[order]) / weight.sum()
    edges = values[order][np.searchsorted(shares, [0.05, 0.3, 0.5, 0.7, 0.95])]
    found = barnwright.predict(**ELASTIC, histograms=[histogram(text, edges)])
    expected = np.histogram(values, edges, weights=weight)[0] / weight.sum() * found.total.value
    assert found.histograms["h"].values == pytest.approx(expected, abs=3e-4 * found.total.value)


def test_the_total_knows_only_s() -> None:
    """The total, and what is asked in the cm, are those of the same √s without an angle, to the rounding of √s."""
    a, b = np.hypot(18.0, 0.0), 275.0
    momentum = np.sqrt((a**2 - ELECTRON**2) * (b**2 - PROTON**2))
    root_s = np.sqrt(ELECTRON**2 + PROTON**2 + 2 * (a * b + momentum * np.cos(0.025)))
    asked = [
        histogram("cos_theta(p, frame=cm)", [-0.8, 0.0, 0.5]),
        histogram("q2(beam_a, e-)", [1.0, 10.0, 50.0], "q2"),
    ]
    crossed = barnwright.predict(**ELASTIC, histograms=asked)
    straight = barnwright.predict(**{**ELASTIC, "beams": {"kind": "collider", "sqrt_s": root_s}}, histograms=asked)
    assert crossed.total.value == pytest.approx(straight.total.value, rel=1e-12)
    for one, other in zip(crossed.histograms, straight.histograms, strict=True):
        assert one.values == pytest.approx(other.values, rel=1e-11)


def test_questions_of_the_lab_change_no_other() -> None:
    """Beside a histogram of the lab the total and the bins of the cm have the bits that they have alone."""
    of_cm = histogram("cos_theta(mu-, frame=cm)", [-1.0, -0.3, 0.5, 1.0], "cm")
    forward = {"name": "A_FB", "kind": "asymmetry", "observable": "cos_theta(mu-, frame=cm)", "at": 0.0}
    alone = muons(histograms=[of_cm], derived=[forward])
    of_lab = histogram("energy(mu-)", [3.0, 5.0, 7.0])
    beside = muons(histograms=[of_lab, of_cm], derived=[forward])
    assert beside.total == alone.total
    assert beside.histograms["cm"].values.tolist() == alone.histograms["cm"].values.tolist()
    assert beside.derived["A_FB"].value == alone.derived["A_FB"].value
    assert beside.derived["A_FB"].error == alone.derived["A_FB"].error


def test_closed_form_and_quadrature_agree() -> None:
    """Both roads give the same bins with cuts of the lab, each within its errors; an asymmetry of the lab too."""
    asked = {
        "histograms": [histogram("pt(mu-)", [0.5, 3.0, 5.1])],
        "cuts": [CUT, {"name": "angle", "observable": "cos_theta(mu-)", "min": -0.7, "max": 0.9}],
        "derived": [{"name": "A", "kind": "asymmetry", "observable": "cos_theta(mu-)", "at": 0.1}],
    }
    one, other = (muons(**asked, accuracy={"method": method}) for method in ("closed_form", "quadrature"))
    assert (one.method, other.method) == ("closed_form", "quadrature")
    assert abs(one.total.value - other.total.value) < one.total.error + other.total.error
    own, second = one.histograms["h"], other.histograms["h"]
    assert np.all(np.abs(own.values - second.values) <= own.errors + second.errors)
    assert own.values == pytest.approx(second.values, rel=1e-8)
    assert one.derived["A"].value == pytest.approx(other.derived["A"].value, abs=1e-9)


def test_scans() -> None:
    """Points of a scan of an energy or of the angle have the bits of predictions by themselves."""
    asked = [histogram("energy(mu-)", [3.0, 5.0, 7.0])]
    request = {"process": "qed/muon-pair", "beams": BEAMS, "histograms": asked}
    for key, values in (("beams.energies.e+", [3.5, 4.0]), ("beams.crossing_angle", [0.0, 0.2])):
        sweep = barnwright.scan(request, over={key: values})
        for k, value in enumerate(values):
            energies = {"e-": 7.007, "e+": value} if "energies" in key else BEAMS["energies"]
            angle = 0.083 if "energies" in key else value
            alone = muons({**BEAMS, "energies": energies, "crossing_angle": angle}, histograms=asked)
            assert sweep[k].total == alone.total
            assert sweep[k].histograms["h"].values.tolist() == alone.histograms["h"].values.tolist()


def test_the_other_beam_along_z() -> None:
    """With +z along the other beam, cos θ and rapidity change their sign; energies and pt do not."""
    turned = {**BEAMS, "along_z": "e+"}
    edges = np.array([-0.8, -0.1, 0.4, 0.95])
    one = muons(histograms=[histogram("cos_theta(mu-)", edges), histogram("pt(mu-)", [1.0, 3.0, 5.0], "pt")])
    other = muons(
        turned, histograms=[histogram("cos_theta(mu-)", -edges[::-1]), histogram("pt(mu-)", [1.0, 3.0, 5.0], "pt")]
    )
    assert other.histograms["h"].values[::-1] == pytest.approx(one.histograms["h"].values, rel=1e-9)
    assert other.histograms["pt"].values == pytest.approx(one.histograms["pt"].values, rel=1e-9)


def made(law: Any, reaction: str = "e- e+ -> gamma gamma", **more: Any) -> Process:
    """A process of one law."""
    common = {"summary": "Made up.", "order": "tree", "references": ("none",)}
    return Process(name="made-up", reaction=reaction, laws=(SquaredAmplitude(law),), **common, **more)


def test_identical_particles() -> None:
    """leading, each and any know the lab where beams cross: the leading photon is the one with more energy there."""
    process = made(lambda event, _: 1.0 + 0.0 * event.t)
    asked = [
        histogram("energy(leading(gamma))", [5.6, 6.5, 8.0]),
        histogram("energy(each(gamma))", [2.0, 4.0, 6.5, 8.0], "each"),
    ]
    found = barnwright.predict(process=process, beams=BEAMS, histograms=asked)
    assert found.histograms["each"].values[-1] == pytest.approx(found.histograms["h"].values[-1], rel=1e-9)
    assert found.histograms["each"].values.sum() < 2 * found.total.value * (1 + 1e-12)


def test_contributions() -> None:
    """Parts of a law share the circles; an interference may be negative, and the parts add up in every bin."""

    def law(event: Any, _: Any, parts: frozenset[str]) -> Any:
        x = 1 + 2 * event.t / event.s
        found = {"even": 2 + x * x, "odd": 0.1 + 0 * x, "even*odd": -0.5 * x}
        return sum(found[part] for part in parts) + 0 * x

    process = made(law, "e- e+ -> mu- mu+", contributions={"even": "even", "odd": "odd", "both": "even*odd"})
    asked = [histogram("cos_theta(mu-)", np.linspace(-1, 1, 6))]
    found = barnwright.predict(process=process, beams=BEAMS, histograms=asked)
    parts = [part.histograms["h"].values for part in found.contributions]
    assert len(parts) == 3
    assert np.min(parts) < 0
    assert np.sum(parts, axis=0) == pytest.approx(found.histograms["h"].values, rel=1e-9)


def test_a_forward_peak() -> None:
    """A peak 2e-6 wide along the beam, cut into bins by cones of the lab that touch or hold the beam's direction.

    For massless particles cos θ = pz/E of the lab is a ratio of linear functions of cos φ, so that the share of a
    circle inside a cone is an arccos; what is left is one integral.
    """
    process = made(
        lambda event, _: 1 / (1e-4 - event.t) ** 2, "e- e+ -> mu- mu+", peaks=(Peak(of="t", shape="power", at=0.01),)
    )
    towards = np.cos(0.0415)
    edges = np.array([-0.5, 0.9, towards - 1e-4, towards, towards + 1e-6, 0.9995])
    found = barnwright.predict(
        process=process, beams=BEAMS, histograms=[histogram("cos_theta(mu-)", edges)], masses=MASSLESS
    )
    a, b = momenta(0.083)
    system, s = a + b, square(a + b)
    width = 2e-4 / s
    steps = 400_000
    x = width * np.expm1((np.arange(steps) + 0.5) / steps * np.log1p(2 / width))
    weight = (x + width) / (x * s / 2 + 1e-4) ** 2
    in_cm = boosted(a, system, -1)
    z = in_cm[1:] / size(in_cm)
    across = np.array([z[2], 0.0, -z[0]])

    def lab(sign: int) -> np.ndarray:
        flight = sign * np.sqrt(x * (2 - x)) * across[:, None] + (1 - x) * z[:, None]
        return boosted(np.array([np.ones_like(x), *flight]), system, 1)

    ends = lab(1), lab(-1)
    energy, along = ((np.array([ends[0][k] + ends[1][k], ends[0][k] - ends[1][k]]) / 2) for k in (0, 3))
    inside = []
    for edge in edges:
        constant, slope = along - edge * energy
        cosine = np.clip(-constant / slope, -1, 1)
        share = np.where(slope > 0, np.arccos(cosine), np.pi - np.arccos(cosine)) / np.pi
        inside.append(np.sum(share * weight))
    expected = -np.diff(inside) / np.sum(weight) * found.total.value
    own = found.histograms["h"]
    assert own.values == pytest.approx(expected, abs=2e-6 * found.total.value)
    assert np.max(own.errors) < 1e-7 * found.total.value


def test_poles_that_a_cut_of_the_lab_leaves_open() -> None:
    """A cone about z does not keep t away from 0 where the beam leans out of it; one that holds the beam does."""
    process = made(lambda event, _: 1 / event.t**2, "e- e+ -> mu- mu+", singular=("t",))
    request = {"process": process, "beams": BEAMS, "masses": MASSLESS}
    with pytest.raises(barnwright.RequestError, match="a cut that keeps t"):
        barnwright.predict(request, cuts=[{"name": "narrow", "observable": "abs(cos_theta(mu-))", "max": 0.9998}])
    wide = barnwright.predict(request, cuts=[{"name": "wide", "observable": "abs(cos_theta(mu-))", "max": 0.998}])
    assert 0 < wide.total.error < 1e-7 * wide.total.value


def test_angles_between_the_two_in_the_lab() -> None:
    """Two bodies are not back to back across z in the lab, but they are in the cm."""
    collision = collide(BeamSettings("kinetic", (7.0,), (4.0,), crossing_angle=0.5), (0.0, 0.0))
    body = TwoBody(collision, (0.0, 0.0, 0.0, 0.0), np.array([[0.7]]), np.array([[1.3]]), 0.4)
    event = Event(parse_reaction("e- e+ -> mu- mu+"), body)
    first, second = (event.vector(code).phi for code in (1, 2))
    for text, expected in (
        ("delta_phi(mu-, mu+)", wrapped(first - second)),
        ("acoplanarity(mu-, mu+)", np.pi - np.abs(wrapped(first - second))),
        ("delta_phi(mu-, mu+, frame=cm)", np.array([[np.pi]])),
    ):
        assert compile_observable(text, event.reaction).values(event) == pytest.approx(expected, rel=1e-14)
    assert np.abs(wrapped(first - second)) < 3.1
