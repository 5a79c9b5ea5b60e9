"""Derived quantities with the bounds of their errors, and a note about those that would divide by 0."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping, Sequence
from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.documents import (
    AsymmetryRequest,
    ByName,
    Derived,
    DerivedBins,
    EnvelopeRequest,
    Note,
    Part,
    RatioRequest,
    Request,
    Total,
)
from barnwright.documents.derived import NOMINAL
from barnwright.engine.envelope import envelope
from barnwright.engine.setting import AsymmetryPlan, Layout

Array = NDArray[np.float64]
Quotient = Callable[[Array, Array, Array, Array], tuple[Array, Array]]


def asymmetry(first: Array, second: Array, first_error: Array, second_error: Array) -> tuple[Array, Array]:
    """(first − second)/(first + second), and the bound of its error from those of the two; NaN where both are 0."""
    total = first + second
    with np.errstate(divide="ignore", invalid="ignore"):
        value = (first - second) / total
        error = 2 * (np.abs(second) * first_error + np.abs(first) * second_error) / np.square(total)
    return value, error


def ratio(first: Array, second: Array, first_error: Array, second_error: Array) -> tuple[Array, Array]:
    """first/second, and the bound of its error; NaN where the second is 0."""
    with np.errstate(divide="ignore", invalid="ignore"):
        value = np.where(second == 0, np.nan, first / second)
        error = (first_error + np.abs(value) * second_error) / np.abs(second)
    return value, error


def point_asymmetries(layout: Layout, value: Array, error: Array) -> list[Derived]:
    """The asymmetries about a value of an observable, from their two components; in bins of other observables too."""
    found = []
    for index, plan in enumerate(layout.asymmetries):
        below = layout.asymmetry_start(index)
        above = below + 1
        numbers = asymmetry(value[above], value[below], error[above], error[below])
        found.append(_derived(plan.name, *numbers, ByName(_binned(layout, plan, value, error))))
    return found


def _binned(layout: Layout, plan: AsymmetryPlan, value: Array, error: Array) -> Iterator[DerivedBins]:
    """An asymmetry bin by bin."""
    for index, one in enumerate(layout.binned):
        if one.asymmetry is plan:
            first = layout.binned_start(index)
            places = slice(first, first + one.components)
            (below, above), errors = value[places].reshape(-1, 2).T, error[places].reshape(-1, 2).T
            values, bounds = asymmetry(above, below, errors[1], errors[0])
            shape = one.histogram.shape
            yield DerivedBins.build(name=one.histogram.name, values=values.reshape(shape), errors=bounds.reshape(shape))


def derived_quantities(
    asked: Sequence[AsymmetryRequest | RatioRequest | EnvelopeRequest],
    nominal: Mapping[str, Any],
    variations: ByName[Part],
) -> ByName[Derived]:
    """All derived quantities in the order of the request; those of variations bin by bin as well.

    ``nominal`` has the total, the histograms and the asymmetries at a point of the request as it stands.
    """
    found = []
    for request in asked:
        if isinstance(request, EnvelopeRequest):
            found.append(envelope(request, nominal, variations))
        elif request.between is None:
            found.append(nominal["derived"][request.name])
        else:
            first, second = (_compared(name, nominal, variations) for name in request.between)
            found.append(_between(request, first, second))
    return ByName(found)


def _compared(name: str, nominal: Mapping[str, Any], variations: ByName[Part]) -> Part:
    """A variation, or the request itself."""
    if name == NOMINAL and name not in variations.keys():  # noqa: SIM118  (a list of parts, found by name)
        return Part.build(name=name, **nominal)
    return variations[name]


def _between(request: AsymmetryRequest | RatioRequest, first: Part, second: Part) -> Derived:
    quotient: Quotient = ratio if isinstance(request, RatioRequest) else asymmetry
    bins = []
    for one, two in zip(first.histograms, second.histograms, strict=True):
        values, errors = quotient(one.contents, two.contents, one.content_errors, two.content_errors)
        bins.append(DerivedBins.build(name=one.name, values=values, errors=errors))
    totals = [_number(p.total.value) for p in (first, second)] + [_number(p.total.error) for p in (first, second)]
    return _derived(request.name, *quotient(*totals), ByName(bins))


def undefined_ratios(
    request: Request, derived: ByName[Derived], variations: ByName[Part], total: Total
) -> tuple[Note, ...]:
    """A note that names what is not known because it would be divided by 0; none where the totals are not known.

    Of an asymmetry about a value, which comes in the bins of all histograms unasked, empty bins are no news.
    """
    if total.value is None or any(part.total.value is None for part in variations):
        return ()
    found: list[str] = []
    for asked in request.derived:
        between = isinstance(asked, RatioRequest) or getattr(asked, "between", None) is not None
        found += _undefined(derived[asked.name], between)
    found += [f"{text} in variation {p.name}" for p in variations for e in p.derived for text in _undefined(e, False)]
    if not found:
        return ()
    text = f"not known, since what it is divided by is 0: {'; '.join(found)}"
    return (Note.build(code="undefined_ratio", text=text),)


def _undefined(derived: Derived, bin_by_bin: bool) -> Iterator[str]:
    if derived.value is None:
        yield derived.name
    for bins in derived.histograms if bin_by_bin else ():
        unknown = int(np.count_nonzero(~np.isfinite(bins.values)))
        if unknown:
            yield f"{derived.name} in {unknown} of {bins.values.size} bins of {bins.name}"


def _number(value: float | None) -> Array:
    return np.float64(np.nan if value is None else value)  # type: ignore[return-value]


def _derived(name: str, value: Any, error: Any, bins: ByName[DerivedBins]) -> Derived:
    known = bool(np.isfinite(value) and np.isfinite(error))
    return Derived.build(
        name=name,
        value=float(value) if known else None,
        error=float(error) if known else None,
        unit="",
        error_kind="numerical_bound",
        histograms=bins,
    )
