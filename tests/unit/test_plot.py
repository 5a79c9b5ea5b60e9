"""Pictures: scales chosen from the numbers, labels in the field's notation, files that are what they say."""

from __future__ import annotations

import sys

import numpy as np
import pytest

import barnwright
from barnwright.errors import BarnwrightError, RequestError
from barnwright.plot import backend, check_axes, draw, draw_scan
from barnwright.plot.labels import density_label, observable_label, reaction_label
from barnwright.plot.panels import Series, draw_bins, draw_curve, draw_map
from barnwright.plot.scales import axis_scale, centres, value_scale


def test_edges_that_grow_by_ratios_get_a_logarithmic_axis() -> None:
    """Equal ratios over a decade or more are drawn logarithmically, equal steps are not."""
    assert axis_scale(np.geomspace(1e-3, 10.0, 20)) == "log"
    assert axis_scale(np.linspace(1.0, 100.0, 20)) == "linear"
    assert axis_scale(np.geomspace(1.0, 5.0, 20)) == "linear"
    assert axis_scale(np.linspace(-1.0, 1.0, 20)) == "linear"


def test_values_over_many_decades_get_a_logarithmic_axis() -> None:
    """A wide span of positive values is drawn logarithmically; a negative value forbids it; zeros do not count."""
    assert value_scale(np.array([1.0, 1e4, 0.0])) == "log"
    assert value_scale(np.array([1.0, 20.0])) == "linear"
    assert value_scale(np.array([-1.0, 1e4])) == "linear"
    assert value_scale(np.array([np.nan, 0.0])) == "linear"


def test_bin_centres_are_where_the_eye_sees_them() -> None:
    """On a logarithmic axis the middle of a bin is the geometric mean of its edges."""
    assert centres(np.array([1.0, 10.0, 100.0])) == pytest.approx([10**0.5, 10**1.5])
    assert centres(np.array([0.0, 1.0, 2.0])) == pytest.approx([0.5, 1.5])


@pytest.mark.parametrize(
    ("text", "unit", "label"),
    [
        ("cos_theta(mu-)", "", r"$\cos\,\theta(\mu^{-})$"),
        ("cos_theta(mu-, frame=cm)", "", r"$\cos\,\theta^{*}(\mu^{-})$"),
        ("abs(cos_theta(mu-, frame=cm))", "", r"$|\cos\,\theta^{*}(\mu^{-})|$"),
        ("pt(gamma)", "GeV", r"$p_\mathrm{T}(\gamma)$ [GeV]"),
        ("mass(mu-, mu+)", "GeV", r"$m(\mu^{-},\,\mu^{+})$ [GeV]"),
        ("sqrt_s", "GeV", r"$\sqrt{s}$ [GeV]"),
        ("pt(mu-) + 2*pt(mu+)", "GeV", "pt(mu-) + 2*pt(mu+) [GeV]"),
        ("transfer(beam_a, mu-)", "GeV^2", r"$t(\mathrm{beam}_a,\,\mu^{-})$ [GeV²]"),
    ],
)
def test_axis_labels(text: str, unit: str, label: str) -> None:
    """A known observable becomes symbols with its unit in brackets; anything else keeps its own text."""
    assert observable_label(text, unit) == label


def test_density_labels_say_what_is_divided_by_what() -> None:
    """The vertical axis names the density, the content of a bin, or the solid angle, with the unit."""
    one, density = ("pt(mu-)",), r"$\mathrm{d}\sigma/\mathrm{d}p_\mathrm{T}(\mu^{-})$"
    assert density_label(one, "value", "pb/GeV", "sigma") == f"{density} [pb/GeV]"
    assert density_label(one, "bin", "ub", "sigma") == r"$\sigma$ per bin [µb]"
    assert density_label(one, "solid_angle", "mb/sr", "sigma") == r"$\mathrm{d}\sigma/\mathrm{d}\Omega$ [mb/sr]"
    two = ("pt(mu-) + 1", "cos_theta(mu-)")
    expected = r"$\mathrm{d}^2\Gamma/\mathrm{d}x_1\,\mathrm{d}x_2$ [GeV]"
    assert density_label(two, "value", "GeV", "Gamma") == expected


def test_reaction_label_has_an_arrow() -> None:
    """A reaction is printed with the particles' own letters."""
    assert reaction_label("e- e+ -> mu- mu+") == r"$e^{-}\,e^{+} \to \mu^{-}\,\mu^{+}$"


@pytest.mark.parametrize(("form", "start"), [("png", b"\x89PNG"), ("pdf", b"%PDF"), ("svg", b"<?xml")])
def test_the_same_figure_gives_the_same_bytes(form: str, start: bytes) -> None:
    """Each format is what its name says and holds no date."""
    pictures = []
    for _ in range(2):
        figure, (axes,) = backend.blank(1)
        edges = np.linspace(0.0, 1.0, 6)
        draw_bins(axes, edges, [Series("", np.arange(1.0, 6.0), np.full(5, 0.1)), Series("b", np.ones(5), np.ones(5))])
        pictures.append(backend.encode(figure, form))
    assert pictures[0].startswith(start)
    assert pictures[0] == pictures[1]


def test_histogram_shows_steps_bands_and_bars() -> None:
    """A histogram of few bins has its steps, the band of errors and a bar in every bin; unknown errors draw none."""
    _, (axes,) = backend.blank(1)
    draw_bins(axes, np.linspace(0.0, 1.0, 4), [Series("", np.array([1.0, 2.0, 3.0]), np.array([0.1, np.nan, 0.1]))])
    assert len(axes.patches) == 2
    assert len(axes.containers) == 1
    assert axes.get_ylim()[0] == 0.0


def test_map_leaves_empty_bins_white() -> None:
    """A map over many decades is coloured logarithmically and empty bins are left out."""
    figure, (axes,) = backend.blank(1)
    edges = (np.linspace(0.0, 1.0, 3), np.linspace(0.0, 2.0, 4))
    draw_map(figure, axes, edges, np.array([[0.0, 1.0, 10.0], [100.0, 1e3, np.nan]]), "label")
    mesh = axes.collections[0]
    assert mesh.get_array().mask.sum() == 2
    assert type(mesh.norm).__name__ == "LogNorm"


def test_curve_of_a_scan() -> None:
    """A scan with logarithmic steps gets a logarithmic axis and one line a series."""
    _, (axes,) = backend.blank(1)
    places = np.geomspace(1.0, 1000.0, 10)
    draw_curve(axes, places, [Series("a", 1e4 / places**2, 0.1 / places), Series("b", 2e4 / places**2, 0.1 / places)])
    assert (axes.get_xscale(), axes.get_yscale()) == ("log", "log")
    assert len(axes.lines) == 2


def test_map_without_any_value_can_be_drawn() -> None:
    """A histogram in which nothing passed gives an empty picture, not an error."""
    figure, (axes,) = backend.blank(1)
    draw_map(figure, axes, (np.linspace(0.0, 1.0, 3), np.linspace(0.0, 1.0, 3)), np.zeros((2, 2)), "label")
    assert backend.encode(figure, "png").startswith(b"\x89PNG")


@pytest.mark.parametrize(
    ("over", "message"),
    [
        ({"a.b": [1.0], "c.d": [1.0], "e.f": [1.0]}, r"over: got 3 keys, expected one or two keys"),
        ({"parameters.scheme": ["alpha", "fermi"]}, r"over\.parameters\.scheme: got 'alpha', expected numbers"),
    ],
)
def test_scans_that_cannot_be_drawn(over: dict[str, list[object]], message: str) -> None:
    """More than two keys, and words along an axis, are refused."""
    with pytest.raises(RequestError, match=message):
        check_axes(over)


def test_scan_over_two_keys_is_curves_or_a_map() -> None:
    """A second key with few values becomes lines of one picture, with many values a map."""
    few = {"beams.sqrt_s": [1.0, 2.0, 3.0], "parameters.scheme": ["alpha", "fermi"]}
    lines = draw_scan(np.arange(1.0, 7.0), np.zeros(6), few, "pb", "title").axes[0]
    assert [line.get_ydata().tolist() for line in lines.lines] == [[1.0, 3.0, 5.0], [2.0, 4.0, 6.0]]
    many = {"beams.energies.e-": [1.0, 2.0], "masses.mu-": [0.1 * number for number in range(9)]}
    cells = draw_scan(np.arange(1.0, 19.0), np.zeros(18), many, "pb", "title").axes[0]
    assert cells.get_xlabel() == "$E$ of $e^{-}$ [GeV]"
    assert cells.get_ylabel() == r"$m$ of $\mu^{-}$ [GeV]"
    assert cells.collections[0].get_array().shape == (9, 2)


def test_prediction_is_drawn_with_its_variations() -> None:
    """Every histogram has a panel, one- and two-dimensional, with the variations as further lines."""
    prediction = barnwright.predict(
        process="qed/muon-pair",
        beams={"kind": "collider", "sqrt_s": 10.0},
        histograms=[
            {"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 4, "low": -1, "high": 1}]},
            {
                "name": "map",
                "observables": ["cos_theta(mu-)", "pt(mu-)"],
                "bins": [{"count": 4, "low": -1, "high": 1}, {"count": 3, "low": 0, "high": 5}],
            },
        ],
        variations=[{"name": "stronger", "parameters": {"alpha": 0.0078}}],
    )
    first, second = (axes for axes in draw(prediction).axes if axes.get_title())
    assert first.get_ylabel() == r"$\mathrm{d}\sigma/\mathrm{d}\cos\,\theta(\mu^{-})$ [pb]"
    assert [text.get_text() for text in first.get_legend().get_texts()] == ["as requested", "stronger"]
    assert second.get_ylabel() == r"$p_\mathrm{T}(\mu^{-})$ [GeV]"


def test_unknown_format_names_the_nearest() -> None:
    """A suffix that is no picture is refused with the nearest one."""
    with pytest.raises(
        RequestError, match=r"--plot: got 'angle\.pgn', expected a picture: png, pdf or svg; nearest: png"
    ):
        backend.check_format("angle.pgn", "--plot")


def test_missing_matplotlib_names_the_extra(monkeypatch: pytest.MonkeyPatch) -> None:
    """Without matplotlib the error says which extra brings it."""
    monkeypatch.setitem(sys.modules, "matplotlib", None)
    with pytest.raises(BarnwrightError, match="a picture needs matplotlib: install barnwright with its extra 'plot'"):
        backend.matplotlib()
