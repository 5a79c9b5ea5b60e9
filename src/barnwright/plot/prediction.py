"""The picture of a prediction: one panel a histogram, the variations as further lines."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

from barnwright.documents import DecayBeams
from barnwright.documents.arrays import axes_of
from barnwright.errors import RequestError, Violation
from barnwright.plot.backend import COLOURS, blank
from barnwright.plot.labels import density_label, observable_label
from barnwright.plot.panels import Series, draw_bins, draw_map

if TYPE_CHECKING:
    from matplotlib.figure import Figure

    from barnwright.documents.histogram import Histogram
    from barnwright.documents.prediction import Prediction


def draw(prediction: Prediction) -> Figure:
    """A matplotlib figure with every histogram: steps with bands and bars of their errors, maps for two observables.

    One-dimensional histograms show the first variations too, as many as there are colours. Axes are linear or
    logarithmic by what the numbers span, units stand in brackets. Raises RequestError when there is no histogram, and
    BarnwrightError when matplotlib (extra ``plot``) is missing.
    """
    check_drawable(prediction.histograms)
    figure, panels = blank(len(prediction.histograms))
    figure.suptitle(f"{prediction.title}: {prediction.total} ({prediction.status})")
    letter = "Gamma" if isinstance(prediction.request.beams, DecayBeams) else "sigma"
    for axes, histogram in zip(panels, prediction.histograms, strict=True):
        axes.set_title(histogram.name)
        label = density_label(histogram.observables, histogram.per, histogram.unit, letter)
        if len(histogram.observables) == 1:
            _bins(axes, prediction, histogram, label)
        else:
            first, second = axes_of(histogram.edges)
            draw_map(figure, axes, (first, second), histogram.values, label)
        _label(axes, histogram)
    return figure


def check_drawable(histograms: object) -> None:
    """Refuse a request whose histograms are none. Raises RequestError."""
    if not histograms:
        expected = "at least one histogram, since a picture is wanted"
        raise RequestError([Violation("histograms", "nothing", expected)])


def _bins(axes: Any, prediction: Prediction, histogram: Histogram, label: str) -> None:
    varied = list(prediction.variations)[: len(COLOURS) - 1]
    series = [Series("as requested", histogram.values, histogram.errors)]
    for variation in varied:
        other = variation.histograms[histogram.name]
        series.append(Series(variation.name, other.values, other.errors))
    draw_bins(axes, axes_of(histogram.edges)[0], series)
    axes.set_ylabel(label)


def _label(axes: Any, histogram: Histogram) -> None:
    units = histogram.axis_units or ("",) * len(histogram.observables)
    axes.set_xlabel(observable_label(histogram.observables[0], units[0]))
    if len(histogram.observables) == 2:
        axes.set_ylabel(observable_label(histogram.observables[1], units[1]))
