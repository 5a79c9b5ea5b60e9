"""Envelopes: the smallest and the largest of a quantity and its variations."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from functools import reduce
from typing import Any

import numpy as np

from barnwright.documents import ByName, Derived, DerivedBins, EnvelopeRequest, Histogram, Part, Total


def envelope(asked: EnvelopeRequest, nominal: Any, variations: ByName[Part]) -> Derived:
    """The nominal total with its ends, and the same for every bin of every histogram.

    Parameters
    ----------
    asked : EnvelopeRequest
    nominal : table with ``total`` and ``histograms``
        The request as it stands, which always belongs to its envelope.
    variations : ByName of Part

    An end is None (in bins: NaN) where one of the members is not known.
    """
    total: Total = nominal["total"]
    members = [variations[name] for name in asked.of]
    known = _known([total, *(member.total for member in members)])
    histograms = [
        _bins(histogram, [member.histograms[number] for member in members])
        for number, histogram in enumerate(nominal["histograms"])
    ]
    return Derived.build(
        name=asked.name,
        value=total.value,
        error=total.error,
        unit=total.unit,
        error_kind=total.error_kind,
        degrees_of_freedom=total.degrees_of_freedom,
        low=min(known, default=None),
        high=max(known, default=None),
        histograms=ByName(histograms),
    )


def _known(totals: Iterable[Total]) -> list[float]:
    """All values, or none where one of them is not known."""
    values = [total.value for total in totals]
    return [value for value in values if value is not None] if None not in values else []


def _bins(nominal: Histogram, members: Sequence[Histogram]) -> DerivedBins:
    values = [nominal.values, *(member.values for member in members)]
    low, high = reduce(np.minimum, values), reduce(np.maximum, values)
    return DerivedBins.build(name=nominal.name, values=nominal.values, errors=nominal.errors, low=low, high=high)
