"""Pictures: scales chosen from the numbers, labels in the field's notation, files that are what they say."""

from __future__ import annotations

import sys
from pathlib import Path

import numpy as np
import pytest

import barnwright
from barnwright import pictures
from barnwright.errors import BarnwrightError, RequestError
from barnwright.plot import backend, check_drawable, picture
from barnwright.plot.labels import (
    density_label,
    leg_label,
    name_label,
    observable_label,
    plain,
    reaction_label,
    unit_label,
)
from barnwright.plot.looks import COLOURS, REST, Looks
from barnwright.plot.scales import Scale, axis_scale, borders, centres, value_scale


def test_edges_that_grow_by_ratios_get_a_logarithmic_axis() -> None:
    """Equal ratios over a decade or more are drawn logarithmically, equal steps are not."""
    assert axis_scale(np.geomspace(1e-3, 10.0, 20)) == "log"
    assert axis_scale(np.linspace(1.0, 100.0, 20)) == "linear"
    assert axis_scale(np.geomspace(1.0, 5.0, 20)) == "linear"
    assert axis_scale(np.linspace(-1.0, 1.0, 20)) == "linear"


def test_values_over_many_decades_get_a_logarithmic_axis() -> None:
    """A wide span of positive values is drawn logarithmically; zeros and unknown values do not count."""
    assert value_scale(np.array([1.0, 1e4, 0.0])) == Scale("log")
    assert value_scale(np.array([1.0, 20.0])) == Scale("linear")
    assert value_scale(np.array([np.nan, 0.0])) == Scale("linear")
    assert value_scale() == Scale("linear")


def test_values_of_both_signs_are_never_lost() -> None:
    """Negative values of like size get a linear axis, a wide span one that is logarithmic on both sides of 0."""
    wave = np.sin(np.linspace(0.0, 6.0, 50))
    assert value_scale(wave) == Scale("linear")
    wide = value_scale(np.geomspace(1.0, 1e5, 50), -np.geomspace(0.1, 100.0, 50))
    assert wide.kind == "symlog"
    assert wide.threshold == pytest.approx(0.1)
    rounding = value_scale(np.array([1.0, -1e-15, 1e-15, 2e-15, 1e-14, 1.0]))
    assert rounding.kind == "linear"


def test_bin_centres_are_where_the_eye_sees_them() -> None:
    """On a logarithmic axis the middle of a bin is the geometric mean of its edges."""
    assert centres(np.array([1.0, 10.0, 100.0])) == pytest.approx([10**0.5, 10**1.5])
    assert centres(np.array([0.0, 1.0, 2.0])) == pytest.approx([0.5, 1.5])


def test_cells_of_a_map_lie_around_their_points() -> None:
    """Borders lie half-way between points, on a logarithmic axis at their geometric mean; one point has a cell too."""
    assert borders(np.array([1.0, 2.0, 4.0])) == pytest.approx([0.5, 1.5, 3.0, 5.0])
    assert borders(np.array([1.0, 10.0, 100.0])) == pytest.approx([10**-0.5, 10**0.5, 10**1.5, 10**2.5])
    assert borders(np.array([4.0])) == pytest.approx([2.0, 6.0])


@pytest.mark.parametrize(
    ("text", "unit", "label"),
    [
        ("cos_theta(mu-)", "", r"$\cos\,\theta(\mu^{-})$"),
        ("cos_theta(mu-, frame=cm)", "", r"$\cos\,\theta^{*}(\mu^{-})$"),
        ("abs(cos_theta(mu-, frame=cm))", "", r"$|\cos\,\theta^{*}(\mu^{-})|$"),
        ("pt(gamma)", "GeV", r"$p_\mathrm{T}(\gamma)$ [GeV]"),
        ("pt(leading(gamma))", "GeV", r"$p_\mathrm{T}(\mathrm{leading}\,\gamma)$ [GeV]"),
        ("mass(mu-, mu+)", "GeV", r"$m(\mu^{-},\,\mu^{+})$ [GeV]"),
        ("sqrt_s", "GeV", r"$\sqrt{s}$ [GeV]"),
        ("theta(mu-)", "rad", r"$\theta(\mu^{-})$ [rad]"),
        ("theta(mu-)/deg", "deg", r"$\theta(\mu^{-})$ [°]"),
        ("energy(e-) / keV", "keV", "$E(e^{-})$ [keV]"),
        ("transfer(beam_a, mu-)/MeV", "GeV", "transfer(beam_a, mu-)/MeV [GeV]"),
        ("pt(mu-) + 2*pt(mu+)", "GeV", "pt(mu-) + 2*pt(mu+) [GeV]"),
        ("transfer(beam_a, mu-)", "GeV^2", r"$t(\mathrm{beam}_a,\,\mu^{-})$ [GeV²]"),
        ("pt(nothing)", "GeV", "pt(nothing) [GeV]"),
        ("pt(leading(nothing))", "GeV", "pt(leading(nothing)) [GeV]"),
    ],
)
def test_axis_labels(text: str, unit: str, label: str) -> None:
    """A known observable becomes symbols with its unit in brackets; anything else keeps its own text."""
    assert observable_label(text, unit) == label


def test_density_labels_say_what_is_divided_by_what() -> None:
    """The vertical axis names the density, the content of a bin, or the solid angle, with the unit."""
    one, density = [("pt(mu-)", "GeV")], r"$\mathrm{d}\sigma/\mathrm{d}p_\mathrm{T}(\mu^{-})$"
    assert density_label(one, "value", "pb/GeV", "sigma") == f"{density} [pb/GeV]"
    assert density_label(one, "bin", "ub", "sigma") == r"$\sigma$ per bin [µb]"
    assert density_label(one, "solid_angle", "mb/sr", "sigma") == r"$\mathrm{d}\sigma/\mathrm{d}\Omega$ [mb/sr]"
    two = [("pt(mu-) + 1", "GeV"), ("cos_theta(mu-)", "")]
    expected = r"$\mathrm{d}^2\Gamma/\mathrm{d}x_1\,\mathrm{d}x_2$ [GeV]"
    assert density_label(two, "value", "GeV", "Gamma") == expected


def test_densities_in_degrees_are_per_degree() -> None:
    """An observable in degrees has its symbol, and the density is one per degree."""
    angle = ("theta(mu-)/deg", "deg")
    assert density_label([angle], "value", "pb/deg", "sigma") == r"$\mathrm{d}\sigma/\mathrm{d}\theta(\mu^{-})$ [pb/°]"
    assert density_label([angle, angle], "value", "pb/deg^2", "sigma").endswith("[pb/°²]")


def test_units_and_names_are_printed_as_in_papers() -> None:
    """Powers are raised, micro is µ, an index stands below the line; odd names say what they say."""
    assert [unit_label(unit) for unit in ("ub/GeV^2", "pb/(GeV rad)", "GeV^-2", "cm2/deg", "GeV^0.5")] == [
        "µb/GeV²",
        "pb/(GeV rad)",
        "GeV⁻²",
        "cm²/°",
        "GeV^0.5",
    ]
    assert [name_label(name) for name in ("A_FB", "R", "left - right")] == [r"$A_\mathrm{FB}$", "$R$", "left - right"]
    assert plain("costs 5$ and $x^2$", 30) == r"costs 5\$ and \$x^2\$"
    assert plain("x" * 50, 10) == f"{'x' * 9}…"
    assert leg_label("nobody") == "nobody"


def test_reaction_label_has_an_arrow() -> None:
    """A reaction is printed with the particles' own letters, in its own words where one has none."""
    assert reaction_label("e- e+ -> mu- mu+") == r"$e^{-}\,e^{+} \to \mu^{-}\,\mu^{+}$"
    assert reaction_label("e- nobody -> mu- mu+") == "e- nobody -> mu- mu+"


def test_looks_run_out_into_grey() -> None:
    """Each line has its own colour and its own dashes; when the colours are used up the rest is thin and grey."""
    looks = Looks()
    given = [looks.line() for _ in range(len(COLOURS) + 1)]
    assert len({look.colour for look in given[:-2]}) == len({str(look.dash) for look in given[:-2]}) == len(COLOURS) - 1
    assert given[-2:] == [REST, REST]
    assert len({looks.band().hatch for _ in range(4)}) == 4


def prediction() -> barnwright.Prediction:
    """A prediction with one histogram."""
    return barnwright.predict(
        process="qed/muon-pair",
        beams={"kind": "collider", "sqrt_s": 10.0},
        histograms=[{"name": "angle", "observables": ["cos_theta(mu-)"], "bins": [{"count": 4, "low": -1, "high": 1}]}],
    )


@pytest.mark.parametrize(("form", "start"), [("png", b"\x89PNG"), ("pdf", b"%PDF"), ("svg", b"<?xml")])
def test_the_same_prediction_gives_the_same_bytes(form: str, start: bytes, tmp_path: Path) -> None:
    """Each format is what its name says and holds no date; `plot` writes the file that it is given."""
    written = [tmp_path / f"{name}.{form}" for name in ("one", "two")]
    for path in written:
        prediction().plot(path)
    assert written[0].read_bytes().startswith(start)
    assert written[0].read_bytes() == written[1].read_bytes()


def test_a_notebook_shows_the_figure_that_plot_returns() -> None:
    """`plot` without a path writes nothing and returns matplotlib's figure, which a notebook shows by itself."""
    from matplotlib.figure import Figure

    figure = prediction().plot()
    assert isinstance(figure, Figure)
    assert figure._repr_png_().startswith(b"\x89PNG")
    assert "matplotlib.pyplot" not in sys.modules


def test_the_style_of_the_user_does_not_matter() -> None:
    """A picture looks the same whatever a notebook has set for its own ones."""
    import matplotlib

    plain_bytes = backend.encode(prediction().plot(), "png")
    with matplotlib.rc_context({"font.size": 20, "axes.grid": True}):
        assert backend.encode(prediction().plot(), "png") == plain_bytes


def test_unknown_format_names_the_nearest(tmp_path: Path) -> None:
    """A suffix that is no picture is refused with the nearest one, before anything is drawn."""
    with pytest.raises(
        RequestError, match=r"--plot: got 'angle\.pgn', expected a picture: png, pdf or svg; nearest: png"
    ):
        backend.check_format("angle.pgn", "--plot")
    with pytest.raises(RequestError, match=r"path: got '.*', expected a picture: png, pdf or svg"):
        picture(prediction(), tmp_path / "angle.jpeg")


@pytest.mark.parametrize(("number", "message"), [(0, "got nothing"), (41, "got 41 histograms, expected at most 40")])
def test_requests_that_are_no_picture(number: int, message: str) -> None:
    """Without a histogram there is nothing to draw, and too many of them are no picture."""
    with pytest.raises(RequestError, match=message):
        check_drawable([None] * number)
    check_drawable(7)  # what is no list at all is for the check of the document to say


def test_missing_matplotlib_names_the_extra(monkeypatch: pytest.MonkeyPatch) -> None:
    """Without matplotlib the error says which extra brings it."""
    monkeypatch.setitem(sys.modules, "matplotlib", None)
    with pytest.raises(BarnwrightError, match="a picture needs matplotlib: install barnwright with its extra 'plot'"):
        prediction().plot()


def test_who_draws_is_said_by_the_package(monkeypatch: pytest.MonkeyPatch) -> None:
    """The last drawer that was named is asked; without one the error says so."""
    monkeypatch.setattr(pictures, "_loaders", [])
    with pytest.raises(BarnwrightError, match="nobody draws pictures here"):
        pictures.picture("result")
    pictures.drawn_by(lambda: lambda result, path: (result, path))  # type: ignore[arg-type, return-value]
    assert pictures.picture("result", "a.png") == ("result", "a.png")
