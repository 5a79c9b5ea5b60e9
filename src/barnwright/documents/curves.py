"""The quantities of a scan as arrays over its grid: totals, parts, derived quantities."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass, field

import numpy as np

from barnwright.documents.arrays import Array, read_only
from barnwright.documents.by_name import ByName
from barnwright.documents.estimate import Estimate
from barnwright.documents.prediction import Prediction
from barnwright.documents.results import Derived, Part


@dataclass(frozen=True, slots=True)
class Curve:
    """One quantity at every point of a grid.

    ``values`` and ``errors`` are shaped like the grid, in ``unit``, NaN where not known; an envelope has ``low`` and
    ``high`` as well. A total has the quantities that are derived from it in ``derived``, by name.
    """

    name: str
    unit: str
    values: Array
    errors: Array
    low: Array | None = None
    high: Array | None = None
    derived: ByName[Curve] = field(default_factory=ByName)


@dataclass(frozen=True, slots=True)
class Curves:
    """All quantities of a scan: the total (with what is derived from it) and those of the parts, by name."""

    total: Curve
    contributions: ByName[Curve]
    processes: ByName[Curve]
    variations: ByName[Curve]

    @classmethod
    def of(cls, predictions: Iterable[Prediction], shape: tuple[int, ...]) -> Curves:
        """The curves of at least one prediction, in the order of the grid, the first key slowest."""
        rows, first = [], None
        for prediction in predictions:
            first = first or prediction
            rows.append([_numbers(entry) for entry in _entries(prediction)])
        if first is None:
            raise ValueError("a scan has at least one point")
        table = np.moveaxis(np.array(rows, dtype=np.float64), 0, -1)
        columns = iter(table.reshape(*table.shape[:2], *shape))
        total = _total("total", first, columns)
        contributions, processes, variations = (
            ByName(_total(part.name, part, columns) for part in group)
            for group in (first.contributions, first.processes, first.variations)
        )
        return cls(total, contributions, processes, variations)


def _entries(prediction: Prediction) -> Iterator[Estimate]:
    """Every estimate of a prediction, in the order in which the curves are made of them."""
    for results in (prediction, *prediction.contributions, *prediction.processes, *prediction.variations):
        yield results.total
        yield from results.derived


def _numbers(entry: Estimate) -> list[float]:
    """Value, error, and the ends of an envelope."""
    found = [entry.value, entry.error]
    found += [entry.low, entry.high] if isinstance(entry, Derived) else [None, None]
    return [np.nan if number is None else number for number in found]


def _total(name: str, results: Prediction | Part, columns: Iterator[Array]) -> Curve:
    values, errors, *_ = map(read_only, next(columns))
    derived = ByName(_derived(entry, next(columns)) for entry in results.derived)
    return Curve(name, results.total.unit, values, errors, derived=derived)


def _derived(entry: Derived, columns: Array) -> Curve:
    values, errors, low, high = map(read_only, columns)
    if np.isnan(low).all():
        return Curve(entry.name, entry.unit, values, errors)
    return Curve(entry.name, entry.unit, values, errors, low, high)
