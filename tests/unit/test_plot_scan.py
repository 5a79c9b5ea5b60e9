"""Pictures of scans: lines, families of lines and maps of everything that a scan has."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

import numpy as np
import pytest
from unit.made import prediction, total

import barnwright
from barnwright.documents import ByName, Derived, Part, Prediction, Scanned
from barnwright.errors import RequestError
from barnwright.plot import check_axes, encode
from barnwright.plot.keys import key_label, value_label


@dataclass(frozen=True)
class Made(Scanned):
    """A scan made by hand."""

    over: Mapping[str, tuple[Any, ...]]
    predictions: tuple[Prediction, ...]

    def __getitem__(self, index: Any) -> Any:
        """The prediction at a point."""
        return self.predictions[index]


def number(name: str, value: float | None, **ends: Any) -> Derived:
    """A derived quantity of the total."""
    return Derived.build(name=name, value=value, error=0.01, error_kind="statistical", **ends)


def part(name: str, value: float, asymmetry: float | None = 0.1) -> Part:
    """A part with an asymmetry."""
    return Part.build(name=name, total=total(value), derived=ByName([number("A_FB", asymmetry)]))


def over_energy(energies: Sequence[float], **parts: Any) -> Made:
    """A scan over √s of a total that falls like 1/s; each keyword gives parts by functions of √s."""
    made = []
    for energy in energies:
        fields = {key: ByName(entry(energy)) for key, entry in parts.items()}
        fields.setdefault("derived", ByName([number("A_FB", 0.01 * energy - 0.9)]))
        made.append(prediction([1.0], total=total(1e5 / energy**2, 1.0), **fields))
    return Made({"beams.sqrt_s": tuple(energies)}, tuple(made))


def lines(axes: Any) -> dict[str, list[float]]:
    """The values of the lines of a panel that have a name."""
    return {line.get_label(): list(line.get_ydata()) for line in axes.lines if not line.get_label().startswith("_")}


def test_total_contributions_and_asymmetry_against_the_energy() -> None:
    """The total and each contribution are lines of the main panel, the asymmetry stands below it."""
    energies = np.linspace(20.0, 200.0, 91)
    sweep = over_energy(energies, contributions=lambda e: [part("photon", 9e4 / e**2), part("z", 1e4 / e**2)])
    main, below = sweep.plot().axes
    assert list(lines(main)) == ["z", "photon", "total"]
    assert lines(main)["total"] == pytest.approx(1e5 / energies**2)
    assert (main.get_xscale(), main.get_yscale()) == ("linear", "log")
    assert (main.get_ylabel(), below.get_ylabel()) == (r"$\sigma$ [pb]", r"$A_\mathrm{FB}$")
    assert below.get_xlabel() == r"$\sqrt{s}$ [GeV]"
    assert list(below.lines[0].get_ydata()) == pytest.approx(0.01 * energies - 0.9)


def test_a_contribution_that_changes_its_sign_stays_in_the_picture() -> None:
    """An interference that is negative below the peak is drawn on an axis with both signs."""
    sweep = over_energy(
        np.linspace(20.0, 200.0, 91), contributions=lambda e: [part("interference", 5e3 * (e - 91.0) / e**3, None)]
    )
    main = sweep.plot().axes[0]
    assert main.get_yscale() == "symlog"
    assert main.get_ylim()[0] < min(lines(main)["interference"]) < 0


def test_variations_have_ratios_and_asymmetries_of_their_own() -> None:
    """Variations are lines everywhere, in one look; the panels of ratio and asymmetry have those of all."""
    sweep = over_energy([10.0, 20.0, 40.0], variations=lambda e: [part("up", 2e5 / e**2, 0.5)])
    main, ratio, below = sweep.plot().axes
    assert list(lines(main)) == ["up", "nominal"]
    assert drawn(ratio) == [pytest.approx([2.0] * 3), pytest.approx([1.0] * 3)]
    assert drawn(below)[0] == [0.5, 0.5, 0.5]
    colours = [[line.get_color() for line in axes.lines if line.get_marker() == "o"] for axes in (main, ratio, below)]
    assert colours[0] == colours[1] == colours[2]


def test_an_envelope_is_a_band_around_the_total() -> None:
    """Its lowest and highest values are a band of the main panel and of the ratio, and no panel of their own."""
    sweep = over_energy(
        [10.0, 20.0, 40.0], derived=lambda e: [number("scale", 1e5 / e**2, low=9e4 / e**2, high=12e4 / e**2)]
    )
    main, ratio = sweep.plot().axes
    heights = main.collections[0].get_paths()[0].get_extents()
    assert (heights.y0, heights.y1) == pytest.approx((9e4 / 1600, 12e4 / 100))
    assert [text.get_text() for text in main.get_legend().get_texts()] == ["nominal", "scale"]
    assert ratio.collections[0].get_paths()[0].get_extents().y1 == pytest.approx(1.2)


def test_points_are_drawn_as_they_increase() -> None:
    """A scan in any order is one line from left to right; one point alone is a point."""
    main = over_energy([20.0, 10.0, 15.0]).plot().axes[0]
    assert list(main.lines[0].get_xdata()) == [10.0, 15.0, 20.0]
    assert lines(main)["total"] == pytest.approx([1000.0, 1e5 / 225, 250.0])
    assert encode(over_energy([10.0]).plot(), "png").startswith(b"\x89PNG")


def test_ratios_of_energies_get_logarithmic_axes() -> None:
    """A scan with logarithmic steps over decades has two logarithmic axes."""
    main = over_energy(np.geomspace(1.0, 1000.0, 10)).plot().axes[0]
    assert (main.get_xscale(), main.get_yscale()) == ("log", "log")


def drawn(axes: Any) -> list[list[float]]:
    """The values of all lines of a panel in the order of drawing, without the bars' ends and the lines across."""
    return [list(line.get_ydata()) for line in axes.lines if line.get_marker() == "o"]


def grid(first: Sequence[Any], second: Sequence[Any], key: str) -> Made:
    """A scan over √s and another key: total √s + place of the second value, asymmetry 0.1 times it."""
    made = [
        prediction([1.0], total=total(energy + place), derived=ByName([number("A_FB", 0.1 * place - 0.1)]))
        for energy in first
        for place in range(len(second))
    ]
    return Made({"beams.sqrt_s": tuple(first), key: tuple(second)}, tuple(made))


def test_two_keys_are_a_family_of_lines() -> None:
    """A second key with few values, also words, gives a line for each of them, and likewise of the asymmetry."""
    main, below = grid([1.0, 2.0, 3.0], ["alpha", "fermi"], "parameters.scheme").plot().axes
    assert lines(main) == {"scheme = alpha": [1.0, 2.0, 3.0], "scheme = fermi": [2.0, 3.0, 4.0]}
    assert drawn(below) == [[0.0] * 3, [-0.1] * 3]


def test_two_keys_with_many_values_are_maps() -> None:
    """A second key with many values gives a map of the total, and one of the asymmetry, in increasing order."""
    masses = [0.1 * number for number in range(9, 0, -1)]
    figure = grid([2.0, 1.0], masses, "masses.mu-").plot()
    first, second = (axes for axes in figure.axes if axes.get_title())
    assert (first.get_title(), second.get_title()) == ("total", r"$A_\mathrm{FB}$")
    assert (first.get_xlabel(), first.get_ylabel()) == (r"$\sqrt{s}$ [GeV]", r"$m$ of $\mu^{-}$ [GeV]")
    assert first.collections[0].get_array().shape == (9, 2)
    assert first.collections[0].get_array()[0].tolist() == [9.0, 10.0]


@pytest.mark.parametrize(
    ("over", "message"),
    [
        ({"a.b": [1.0], "c.d": [1.0], "e.f": [1.0]}, r"over: got 3 keys, expected one or two keys"),
        ({"parameters.scheme": ["alpha", "fermi"]}, r"over\.parameters\.scheme: got 'alpha', expected numbers"),
        ({"parameters.loops": [True, False]}, r"over\.parameters\.loops: got True, expected numbers"),
    ],
)
def test_scans_that_cannot_be_drawn(over: dict[str, list[object]], message: str) -> None:
    """More than two keys, and words or truth values along an axis, are refused."""
    with pytest.raises(RequestError, match=message):
        check_axes(over)


@pytest.mark.parametrize(
    ("key", "label"),
    [
        ("beams.sqrt_s", r"$\sqrt{s}$ [GeV]"),
        ("beams.kinetic_energy", r"$E_\mathrm{kin}$ of the beam [GeV]"),
        ("beams.crossing_angle", "crossing angle [rad]"),
        ("beams.energies.e-", "$E$ of $e^{-}$ [GeV]"),
        ("beams.polarisation.e-", "$P$ of $e^{-}$"),
        ('masses."mu-"', r"$m$ of $\mu^{-}$ [GeV]"),
        ("parameters.alpha", "alpha"),
        ("parameters.z_mass", "z_mass [GeV]"),
        ("cuts.acceptance.max", "cuts.acceptance.max"),
    ],
)
def test_labels_of_keys(key: str, label: str) -> None:
    """Beams and masses have symbols and GeV, a parameter the unit that its process declares."""
    assert key_label(key, prediction([1.0], {"process": "electroweak/higgs-strahlung"}).request) == label


def test_labels_of_keys_without_their_process() -> None:
    """A parameter of a process that is not installed here has no unit; values carry the unit of their key."""
    elsewhere = prediction([1.0], {"process": "elsewhere/pair"}).request
    assert key_label("parameters.z_mass", elsewhere) == key_label("parameters.z_mass") == "z_mass"
    assert value_label("beams.energies.e-", 7.0) == "$E$ of $e^{-}$ = 7 GeV"
    assert value_label("beams.polarisation.e-", -0.8) == "$P$ of $e^{-}$ = −0.8"


def test_a_scan_of_the_engine_is_written(tmp_path: Path) -> None:
    """`sweep.plot` writes the picture of a scan over energies."""
    sweep = barnwright.scan(
        process="qed/muon-pair",
        beams={"kind": "collider", "sqrt_s": 10.0},
        derived=[{"name": "A_FB", "kind": "asymmetry", "observable": "cos_theta(mu-)", "at": 0.0}],
        over={"beams.sqrt_s": [10.0, 20.0, 30.0]},
    )
    sweep.plot(tmp_path / "scan.svg")
    assert (tmp_path / "scan.svg").read_bytes().startswith(b"<?xml")
