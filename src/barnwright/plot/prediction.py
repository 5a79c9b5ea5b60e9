"""The picture of a prediction: a block for every histogram."""

from __future__ import annotations

from collections.abc import Iterator, Sized
from typing import TYPE_CHECKING

from barnwright.documents import DecayBeams, EnvelopeRequest
from barnwright.documents.arrays import axes_of
from barnwright.errors import RequestError, Violation
from barnwright.plot.compose import Block, compose
from barnwright.plot.labels import density_label, name_label, observable_label, plain, reaction_label
from barnwright.plot.map import Map
from barnwright.plot.quantity import Derived, Numbers, Quantity, chart_of
from barnwright.plot.strokes import Steps

if TYPE_CHECKING:
    from collections.abc import Iterable

    from matplotlib.figure import Figure

    from barnwright.documents.estimate import Total
    from barnwright.documents.histogram import Histogram
    from barnwright.documents.prediction import Prediction
    from barnwright.documents.request import Request
    from barnwright.documents.results import Part

#: More histograms than this are no picture.
MOST = 40


def draw(prediction: Prediction) -> Figure:
    """A matplotlib figure with a block for every histogram.

    One observable: steps with bands and bars of their errors, the lines of contributions, processes and variations,
    envelopes as bands in place of their variations; below it the ratio of the variations to the nominal values, and
    what is derived bin by bin. Two observables: a map of the nominal values, and one of every derived quantity; none of
    parts and variations. Axes are linear or logarithmic by what the numbers span, units stand in brackets.

    Raises RequestError when there is no histogram or there are too many, and BarnwrightError when matplotlib (extra
    ``plot``) is missing.
    """
    check_drawable(prediction.histograms)
    blocks = [block for histogram in prediction.histograms for block in _blocks(prediction, histogram)]
    return compose(heading(prediction, f"{_total(prediction.total)} ({prediction.status})"), blocks)


def check_drawable(histograms: object) -> None:
    """Refuse a request whose histograms are none, or too many for a picture. Raises RequestError."""
    if not histograms:
        expected = "at least one histogram, since a picture is wanted"
        raise RequestError([Violation("histograms", "nothing", expected)])
    if isinstance(histograms, Sized) and len(histograms) > MOST:
        expected = f"at most {MOST} of them, since a picture is wanted"
        raise RequestError([Violation("histograms", f"{len(histograms)} histograms", expected)])


def heading(prediction: Prediction, ending: str = "") -> str:
    """What a picture shows, in one line, or in two where it is long."""
    formula = prediction.request.formula
    name = plain(prediction.title, 80) if formula is None else reaction_label(formula.reaction)
    if not ending:
        return name
    return f"{name}: {ending}" if len(name) + len(ending) < 64 else f"{name}\n{ending}"


def letter(prediction: Prediction) -> str:
    """The letter of the total: "Gamma" for a width, "sigma" for a cross section."""
    return "Gamma" if isinstance(prediction.request.beams, DecayBeams) else "sigma"


def enveloped(request: Request) -> set[str]:
    """The names of the variations that an envelope shows."""
    return {name for entry in request.derived if isinstance(entry, EnvelopeRequest) for name in entry.of}


def _total(total: Total) -> str:
    """The total with its error; six digits where the error lies far behind them."""
    if total.value is None or total.error is None or total.error > 1e-7 * abs(total.value):
        return str(total)
    return f"{total.value:.6g} {total.unit}"


def _blocks(prediction: Prediction, histogram: Histogram) -> Iterator[Block]:
    units = histogram.axis_units or ("",) * len(histogram.observables)
    observed = list(zip(histogram.observables, units, strict=True))
    density = density_label(observed, histogram.per, histogram.unit, letter(prediction))
    labels = [observable_label(*axis) for axis in observed]
    title, quantity = plain(histogram.name, 60), _quantity(prediction, histogram)
    if len(labels) == 1:
        yield chart_of(quantity, Steps(axes_of(histogram.edges)[0]), title, (labels[0], density))
        return
    first, second = axes_of(histogram.edges)
    yield Map(title, (labels[0], labels[1], density), (first, second), histogram.values)
    for name, entry in quantity.derived.items():
        label = name_label(name)
        yield Map(f"{label}, {title}", (labels[0], labels[1], label), (first, second), entry.nominal.values, True)


def _quantity(prediction: Prediction, histogram: Histogram) -> Quantity:
    """The numbers of one histogram, everywhere in the prediction."""
    name = histogram.name
    found: dict[str, Derived] = {}
    envelopes = {}
    for derived in prediction.derived:
        bins = derived.histograms.get(name)
        if bins is None:
            continue
        if bins.low is None or bins.high is None:
            found[derived.name] = Derived("", Numbers(bins.values, bins.errors))
        else:
            envelopes[derived.name] = (bins.low, bins.high)
    parts = _parts([*prediction.contributions, *prediction.processes], name)
    spread = enveloped(prediction.request)
    variations = _parts((part for part in prediction.variations if part.name not in spread), name)
    return Quantity(Numbers(histogram.values, histogram.errors), parts, variations, envelopes, found)


def _parts(parts: Iterable[Part], name: str) -> dict[str, Numbers]:
    found = ((part.name, part.histograms.get(name)) for part in parts)
    return {key: Numbers(one.values, one.errors) for key, one in found if one is not None}
