"""Pictures of predictions: every number of a histogram, its parts, variations and derived quantities is drawn."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from unit.made import bins, histogram, part, prediction, total

import barnwright
from barnwright.documents import ByName, Derived, DerivedBins
from barnwright.plot import draw, encode

ANGLE = {"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 4, "low": -1, "high": 1}]}


def steps(axes: Any) -> dict[str, list[float]]:
    """The values of the lines of a panel by label."""
    return {patch.get_label(): patch.get_data().values.tolist() for patch in axes.patches if not patch.get_fill()}


def bands(axes: Any) -> list[tuple[list[float], list[float]]]:
    """Lower and upper ends of the bands of a panel."""
    filled = [patch.get_data() for patch in axes.patches if patch.get_fill() and hasattr(patch, "get_data")]
    return [(np.asarray(data.baseline).tolist(), data.values.tolist()) for data in filled]


def legend(axes: Any) -> list[str]:
    """The entries of a legend."""
    return [text.get_text() for text in axes.get_legend().get_texts()]


def test_a_histogram_alone_has_steps_band_and_bars() -> None:
    """Known errors are a band and a bar in every bin, an unknown one is neither; there is no legend for one line."""
    shown = histogram([1.0, 2.0, 3.0], errors=np.array([0.1, np.nan, 0.2]))
    (axes,) = draw(prediction([1.0], histograms=ByName([shown]))).axes
    assert steps(axes) == {"total": [1.0, 2.0, 3.0]}
    assert bands(axes) == [([0.9, 2.0, 2.8], [1.1, 2.0, 3.2])]
    assert len(axes.containers) == 1
    assert axes.get_ylim()[0] == 0.0
    assert axes.get_legend() is None
    assert (axes.get_title(), axes.get_ylabel()) == (
        "angle",
        r"$\mathrm{d}\sigma/\mathrm{d}\,\cos\,\theta(\mu^{-})$ [pb]",
    )


def test_errors_that_are_not_known_draw_nothing() -> None:
    """A histogram without errors is steps alone; hundred bins have no bars."""
    (axes,) = draw(prediction([1.0, 2.0])).axes
    assert (bands(axes), len(axes.containers)) == ([], 0)
    many = histogram(np.ones(100), errors=np.full(100, 0.1))
    (axes,) = draw(prediction([1.0], histograms=ByName([many]))).axes
    assert (len(bands(axes)), len(axes.containers)) == (1, 0)


def test_variations_have_lines_and_a_panel_of_ratios() -> None:
    """Each variation stands over the nominal values (not over rounding), whose relative error is the band around 1."""
    shown = ByName([histogram([1.0, 2.0, 1e-16, 4.0], errors=np.array([0.1, 0.1, 0.0, 0.4]))])
    varied = ByName([part("up", [2.0, 3.0, 1.0, 4.0]), part("down", [0.5, 1.0, 0.0, 2.0])])
    main, ratio = draw(prediction([1.0], histograms=shown, variations=varied)).axes
    assert legend(main) == ["nominal", "up", "down"]
    up, down, one = (next(p for p in ratio.patches[1:] if p.get_data().values[0] == first) for first in (2.0, 0.5, 1.0))
    assert up.get_data().values == pytest.approx([2.0, 1.5, np.nan, 1.0], nan_ok=True)
    assert down.get_data().values == pytest.approx([0.5, 0.5, np.nan, 0.5], nan_ok=True)
    assert one.get_data().values == pytest.approx([1.0, 1.0, np.nan, 1.0], nan_ok=True)
    ((low, high),) = bands(ratio)
    assert low == pytest.approx([0.9, 0.95, np.nan, 0.9], nan_ok=True)
    assert high == pytest.approx([1.1, 1.05, np.nan, 1.1], nan_ok=True)
    assert ratio.get_ylabel() == "ratio to\nnominal"


def test_no_ratio_where_all_is_zero() -> None:
    """Where the nominal values are 0 there is nothing to compare with."""
    figure = draw(prediction([0.0, 0.0], variations=ByName([part("up", [0.0, 1.0])])))
    assert len(figure.axes) == 1
    (axes,) = draw(prediction([0.0, 0.0])).axes
    assert axes.get_ylim() == (0.0, 1.0)


def test_negative_contributions_stay_in_the_picture() -> None:
    """An interference below 0 is drawn on an axis that reaches below it, with a line at 0."""
    parts = ByName([part("photon", [5.0, 5.0, 5.0, 5.0]), part("interference", [2.0, 1.0, -1.0, -2.0])])
    (axes,) = draw(prediction([7.0, 6.0, 4.0, 3.0], contributions=parts)).axes
    assert legend(axes) == ["total", "photon", "interference"]
    assert steps(axes)["interference"] == [2.0, 1.0, -1.0, -2.0]
    assert axes.get_yscale() == "linear"
    assert axes.get_ylim()[0] < -2.0
    assert [0.0, 0.0] in [list(line.get_ydata()) for line in axes.lines]


def test_negative_contributions_over_decades_get_a_symmetric_axis() -> None:
    """Both signs over many decades are logarithmic on both sides of 0, and the linear part is marked."""
    falling = np.geomspace(1e4, 0.1, 20)
    parts = ByName([part("direct", falling), part("interference", -0.1 * falling)])
    (axes,) = draw(prediction(0.9 * falling, contributions=parts)).axes
    assert axes.get_yscale() == "symlog"
    assert axes.get_ylim()[0] < -1e3
    assert [text.get_text() for text in axes.texts] == ["linear"]


def test_processes_of_a_sum_have_lines() -> None:
    """Each process of a sum is a line beside the total."""
    parts = ByName([part("qed/muon-pair", [1.0, 1.0]), part("qed/tau-pair", [2.0, 2.0])])
    (axes,) = draw(prediction([3.0, 3.0], processes=parts)).axes
    assert legend(axes) == ["total", "qed/muon-pair", "qed/tau-pair"]


def test_an_envelope_is_a_band_in_place_of_its_variations() -> None:
    """The band of an envelope stands for its members, which have no lines; the ratio panel has it as well."""
    asked = {
        "variations": [{"name": name, "parameters": {"alpha": 0.007}} for name in ("up", "down", "other")],
        "derived": [{"name": "scale", "kind": "envelope", "of": ["up", "down"]}],
    }
    varied = ByName([part("up", [2.0, 2.0]), part("down", [1.0, 1.0]), part("other", [3.0, 3.0])])
    spread = bins("scale", [1.5, 1.5], low=[1.0, 1.0], high=[2.0, 3.0])
    main, ratio = draw(prediction([1.5, 1.5], asked, variations=varied, derived=ByName([spread]))).axes
    assert legend(main) == ["nominal", "other", "scale"]
    assert bands(main) == [([1.0, 1.0], [2.0, 3.0])]
    assert bands(ratio)[0][0] == pytest.approx([1 / 1.5] * 2)
    assert bands(ratio)[0][1] == pytest.approx([2 / 1.5, 2.0])


def test_asymmetries_bin_by_bin_have_a_panel_each() -> None:
    """What is derived bin by bin stands below; an asymmetry that is 0 but for rounding shows no noise."""
    found = ByName([bins("A_LR", [0.1, -0.2, 0.3, 0.4]), bins("nothing", [1e-17, 0.0, -1e-17, 0.0])])
    main, first, second = draw(prediction([1.0, 1.0, 1.0, 1.0], derived=found)).axes
    assert (first.get_ylabel(), second.get_ylabel()) == (r"$A_\mathrm{LR}$", "nothing")
    assert steps(first)[""] == [0.1, -0.2, 0.3, 0.4]
    assert main.get_xlabel() == first.get_xlabel() == ""
    assert second.get_xlabel() == r"$\cos\,\theta(\mu^{-})$"


def test_many_derived_quantities_share_a_panel() -> None:
    """More than three derived quantities are lines of one panel with a legend."""
    found = ByName([bins(f"A_{number}", [0.1 * number, 0.2]) for number in range(5)])
    _, shared = draw(prediction([1.0, 1.0], derived=found)).axes
    assert legend(shared) == [rf"$A_\mathrm{{{number}}}$" for number in range(5)]


def test_more_lines_than_colours_are_counted() -> None:
    """Lines for which no colour is left are drawn thin and grey, and the legend says how many they are."""
    varied = ByName([part(f"member {number}", [1.0 + number, 1.0]) for number in range(10)])
    main, ratio = draw(prediction([1.0, 1.0], variations=varied)).axes
    assert legend(main) == ["nominal", *(f"member {number}" for number in range(6)), "and 4 more"]
    assert sum(not patch.get_fill() for patch in main.patches) == 11
    assert sum(not patch.get_fill() for patch in ratio.patches) == 11


def test_odd_names_are_shown_as_they_are() -> None:
    """Names with signs that matplotlib takes for its own are in the legend, long ones end in three dots."""
    varied = ByName([part(name, [1.0, 2.0]) for name in ("_up", "$x$ and $y", "a name " * 10)])
    figure = draw(prediction([1.0, 1.0], variations=varied))
    assert legend(figure.axes[0]) == ["nominal", "_up", r"\$x\$ and \$y", f"{('a name ' * 10)[:29].rstrip()}…"]
    assert encode(figure, "svg").startswith(b"<?xml")


def test_the_legend_covers_no_line() -> None:
    """Room for the legend is made above the lines, on linear and on logarithmic axes."""
    for values in ([4.0, 1.0, 1.0, 4.0], [1e4, 1.0, 1.0, 1e4]):
        varied = ByName([part(f"number {n}", np.array(values) * (1 + 0.1 * n)) for n in range(6)])
        figure = draw(prediction(values, variations=varied))
        figure.canvas.draw()
        axes = figure.axes[0]
        below = axes.get_legend().get_window_extent().y0
        assert axes.transData.transform((0.0, 1.5 * values[0]))[1] < below


def test_maps_have_a_bar_of_colours_and_white_for_what_is_empty() -> None:
    """Two observables are a map, logarithmic over many decades, empty and unknown bins white; asymmetries beside it."""
    values = np.array([[0.0, 1.0, 10.0], [100.0, 1e3, np.nan]])
    changes = {"observables": ("cos_theta(mu-)", "pt(mu-)"), "axis_units": ("", "GeV"), "unit": "pb/GeV"}
    shown = histogram(values, edges=(np.linspace(-1, 1, 3), np.linspace(0, 3, 4)), **changes)
    low = {"values": [[0.1, -0.1, 0.2], [0.0, 0.0, 0.1]]}
    asymmetry = DerivedBins.build(name="angle", values=np.array(low["values"]), errors=np.zeros((2, 3)))
    derived = Derived.build(name="A_LR", value=0.1, error=0.1, error_kind="statistical", histograms=ByName([asymmetry]))
    figure = draw(prediction([1.0], histograms=ByName([shown]), derived=ByName([derived])))
    first, second = (axes for axes in figure.axes if axes.get_title())
    assert first.collections[0].get_array().mask.sum() == 2
    assert type(first.collections[0].norm).__name__ == "LogNorm"
    assert (first.get_ylabel(), second.get_title()) == (r"$p_\mathrm{T}(\mu^{-})$ [GeV]", r"$A_\mathrm{LR}$, angle")
    assert second.collections[0].norm.vmin == -second.collections[0].norm.vmax == -0.2
    bar = r"$\mathrm{d}^2\sigma/\mathrm{d}\,\cos\,\theta(\mu^{-})\,\mathrm{d}p_\mathrm{T}(\mu^{-})$ [pb/GeV]"
    assert bar in [axes.get_ylabel() for axes in figure.axes]


@pytest.mark.parametrize(
    ("values", "norm"),
    [
        ([[0.0, 0.0], [0.0, 0.0]], "Normalize"),
        ([[2.0, 2.0], [2.0, np.nan]], "Normalize"),
        ([[1.0, 2.0], [3.0, 4.0]], "Normalize"),
        ([[np.nan, np.nan], [np.nan, np.nan]], "Normalize"),
        ([[-1.0, 2.0], [3.0, 4.0]], "CenteredNorm"),
        ([[-1e-3, 2e4], [3.0, -1e-3]], "SymLogNorm"),
    ],
)
def test_colours_are_chosen_from_the_values(values: list[list[float]], norm: str) -> None:
    """White is 0 where there are both signs; nothing at all, or one value everywhere, can be drawn as well."""
    edges = (np.linspace(0, 1, 3), np.linspace(0, 1, 3))
    shown = histogram(values, edges=edges, observables=("cos_theta(mu-)", "pt(mu-)"), axis_units=())
    figure = draw(prediction([1.0], histograms=ByName([shown])))
    assert type(figure.axes[0].collections[0].norm).__name__ == norm
    assert encode(figure, "png").startswith(b"\x89PNG")


def test_headings_say_what_is_shown() -> None:
    """Process or reaction, total with its error and status; fifteen digits are six, and long names take a line."""
    assert draw(prediction([1.0])).get_suptitle() == "electroweak/muon-pair: 84.32(7) pb (converged)"
    exact = prediction([1.0], total=total(632.342429289446, 1e-12))
    assert draw(exact).get_suptitle() == "electroweak/muon-pair: 632.342 pb (converged)"
    assert draw(prediction([1.0], total=total(None, None))).get_suptitle().endswith(": not known (converged)")
    long = prediction([1.0], {"process": None, "processes": [f"electroweak/{n}-pair" for n in ("muon", "tau", "up")]})
    assert draw(long).get_suptitle().endswith("\n84.32(7) pb (converged)")
    formula = {"reaction": "e- e+ -> mu- mu+", "squared_amplitude": "1", "spin_colour": "averaged"}
    reaction = prediction([1.0], {"process": None, "formula": formula})
    assert draw(reaction).get_suptitle().startswith(r"$e^{-}\,e^{+} \to")


def test_a_prediction_of_the_engine_is_drawn_whole() -> None:
    """What the engine makes has the same picture: variations, ratio, asymmetry of the two, envelope."""
    made = barnwright.predict(
        process="qed/muon-pair",
        beams={"kind": "collider", "sqrt_s": 10.0},
        histograms=[ANGLE],
        variations=[
            {"name": "stronger", "parameters": {"alpha": 0.0078}},
            {"name": "weaker", "parameters": {"alpha": 0.0070}},
            {"name": "strongest", "parameters": {"alpha": 0.0080}},
        ],
        derived=[
            {"name": "A", "kind": "asymmetry", "between": ["stronger", "weaker"]},
            {"name": "spread", "kind": "envelope", "of": ["strongest"]},
        ],
    )
    main, ratio, asymmetry = made.plot().axes
    assert legend(main) == ["nominal", "stronger", "weaker", "spread"]
    assert ratio.get_ylabel() == "ratio to\nnominal"
    assert steps(asymmetry)[""] == pytest.approx([(78**2 - 70**2) / (78**2 + 70**2)] * 4)
