"""Documents as tables for people. What may differ between equal predictions (`run`) is left out, so equal ones print
equally."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from itertools import pairwise, product
from typing import TYPE_CHECKING, Literal

import numpy as np
from rich import box
from rich.console import Group, RenderableType
from rich.padding import Padding
from rich.table import Table
from rich.text import Text

from barnwright.documents.arrays import Array, axes_of
from barnwright.units import Quantity

if TYPE_CHECKING:
    from barnwright.documents.histogram import Histogram
    from barnwright.documents.prediction import Prediction
    from barnwright.documents.results import Derived, Part, Results


def prediction_view(prediction: Prediction) -> RenderableType:
    """A prediction: what was asked, the total with its error, status, notes, parts, derived quantities, histograms."""
    return Group(*_prediction(prediction))


def _prediction(prediction: Prediction) -> Iterator[RenderableType]:
    yield Text(prediction.title, style="bold")
    yield pairs(_facts(prediction))
    yield Text("")
    for title in ("processes", "contributions", "variations"):
        parts: Iterable[Part] = getattr(prediction, title)
        if parts:
            yield _parts_titled(title, parts)
    yield from _results(prediction)


def _facts(prediction: Prediction) -> Iterator[tuple[str, str]]:
    yield "beams", _beams(prediction)
    yield "total", str(prediction.total)
    yield "error", _error(prediction)
    yield "status", prediction.status
    yield "method", prediction.method.replace("_", " ")
    yield "order", prediction.order
    if prediction.scheme is not None:
        yield "scheme", prediction.scheme
    for note in prediction.notes:
        yield "note", f"{note.text} ({note.code})"


def _beams(prediction: Prediction) -> str:
    """What was collided, at which energies: ``e- 7 GeV, e+ 4 GeV``, ``kinetic energy 0.001 GeV on e- at rest``."""
    beams = prediction.request.beams
    if beams.kind == "decay":
        return "a decay"
    polarised = [f"{name} polarised {value:+g}" for name, value in sorted(beams.polarisation.items()) if value]
    if beams.kind == "collider":
        energies = [f"{n} {e:g} GeV" for n, e in sorted((beams.energies or {}).items())]
        crossing = [f"crossing at {beams.crossing_angle:g} rad"] if beams.crossing_angle else []
        return ", ".join([*(energies or [f"sqrt_s = {beams.sqrt_s:g} GeV"]), *crossing, *polarised])
    given = {"energy": beams.energy, "kinetic energy": beams.kinetic_energy, "momentum": beams.momentum}
    what, value = next((what, value) for what, value in given.items() if value is not None)
    target = f"{what} {value:g} GeV on {beams.target or 'the second particle'} at rest"
    return ", ".join([target, *polarised])


def _error(prediction: Prediction) -> str:
    """How large the error is, and of which kind."""
    total = prediction.total
    kind = "a statistical error" if total.error_kind == "statistical" else "a numerical bound"
    return kind if total.error is None else f"{total.error:.0e} {total.unit}, {kind}"


def _parts_titled(title: str, parts: Iterable[Part]) -> Table:
    table = titled(title, ("name", "total"))
    for part in parts:
        signed = " (may be negative)" if any(note.code == "signed" for note in part.notes) else ""
        table.add_row(Text(f"{part.name}{signed}"), Text(str(part.total)))
    return table


def _results(results: Results) -> Iterator[RenderableType]:
    if results.derived:
        yield derived_table(results.derived)
    for histogram in results.histograms:
        yield histogram_table(histogram)


def derived_table(derived: Iterable[Derived]) -> Table:
    """Asymmetries, ratios and envelopes of the totals; those bin by bin are in the document."""
    table = titled("derived quantities", ("name", "value"))
    for entry in derived:
        value = "not known" if entry.value is None else str(Quantity(entry.value, entry.error, entry.unit))
        table.add_row(Text(entry.name), Text(value + entry.spread))
    return table


def histogram_table(histogram: Histogram) -> Table:
    """One row a bin, then underflow and overflow as contents; the last edge of an axis belongs to its last bin."""
    units = histogram.axis_units or ("",) * len(histogram.observables)
    columns = [_with_unit(text, unit) for text, unit in zip(histogram.observables, units, strict=True)]
    per = {"value": "density", "bin": "content", "solid_angle": "density"}[histogram.per]
    table = titled(f"histogram {histogram.name}", (*columns, f"{per} [{histogram.unit}]"))
    ranges = [_ranges(edges) for edges in axes_of(histogram.edges)]
    values, errors = np.ravel(histogram.values), np.ravel(histogram.errors)
    for labels, value, error in zip(product(*ranges), values, errors, strict=True):
        table.add_row(*map(Text, labels), Text(bare(float(value), float(error))))
    spare = [Text("")] * (len(ranges) - 1)
    for name in ("underflow", "overflow"):
        content = getattr(histogram, name)
        if content:
            table.add_row(Text(name), *spare, Text(f"{bare(content, getattr(histogram, f'{name}_error'))} (content)"))
    return table


def _with_unit(observable: str, unit: str) -> str:
    """``pt(mu-) [GeV]``; what is divided by its unit is in that unit: ``kinetic_energy(e-) [keV]``."""
    return f"{observable.removesuffix(f' / {unit}')} [{unit}]" if unit else observable


def bare(value: float, error: float | None) -> str:
    """A number with its error, ``84.32(7)``, whose unit stands above the column; "not known" for NaN."""
    if np.isnan(value):
        return "not known"
    known = error is not None and not np.isnan(error)
    return str(Quantity(value, error if known else None, "")).strip()


def _ranges(edges: Array) -> list[str]:
    """The bins of an axis as half-open intervals, the last one closed."""
    ranges = [f"[{low:.6g}, {high:.6g})" for low, high in pairwise(edges.tolist())]
    return [*ranges[:-1], f"{ranges[-1][:-1]}]"]


def pairs(facts: Iterable[tuple[str, str]]) -> Table:
    """Names on the left, what there is to say about them on the right."""
    table = Table(box=None, show_header=False, pad_edge=False, padding=(0, 2, 0, 0))
    table.add_column(no_wrap=True)
    table.add_column(overflow="fold")
    for name, text in facts:
        table.add_row(Text(name), Text(text))
    return table


def bullets(title: str, entries: Iterable[str]) -> Group:
    """A title with one line an entry."""
    lines = (Padding(Text(entry), (0, 0, 0, 2)) for entry in entries)
    return Group(Text(title, style="bold"), *lines, Text(""))


def titled(title: str, columns: Iterable[str], *, numbers: bool = True) -> Table:
    """An empty table with a title; with ``numbers`` every column but the first is set flush right."""
    heading = Text(title) if title else None
    table = Table(box=box.SIMPLE_HEAD, title=heading, title_justify="left", title_style="bold", pad_edge=False)
    for number, column in enumerate(columns):
        justify: Literal["left", "right"] = "right" if numbers and number > 0 else "left"
        table.add_column(Text(column), justify=justify, overflow="fold")
    return table
