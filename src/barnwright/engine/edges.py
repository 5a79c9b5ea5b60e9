"""Where observables cross their edges and cut thresholds on the polar axis.

Polar observables of the cm have their crossings in closed form, the same for every point of a scan; all others are
searched.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from functools import lru_cache

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.setting import Layout
from barnwright.integrate.extrema import EPSILON
from barnwright.integrate.polar_axis import BACKWARD, FORWARD, Ends, Integers
from barnwright.integrate.roots import Crossings, crossings
from barnwright.kinematics import Collision
from barnwright.observables import AxisForm, Cut, Observable

Array = NDArray[np.float64]


@lru_cache(maxsize=256)
def levels_by_observable(cuts: tuple[Cut, ...], layout: Layout) -> Mapping[Observable, Array]:
    """Every value at which an answer changes: bin edges, cut thresholds, asymmetry points; sorted, each once."""
    found: dict[Observable, set[float]] = {}
    for observable, values in _all_levels(cuts, layout):
        found.setdefault(observable, set()).update(v for v in values if v is not None and np.isfinite(v))
    return {observable: np.array(sorted(values)) for observable, values in found.items()}


def _all_levels(cuts: tuple[Cut, ...], layout: Layout) -> Iterator[tuple[Observable, tuple[float | None, ...]]]:
    for cut in cuts:
        yield cut.observable, (cut.min, cut.max, *(cut.outside or ()))
    binned = layout.binned
    for histogram in (*layout.histograms, *(one.histogram for one in binned)):
        yield from zip(histogram.observables, histogram.edges, strict=True)
    for asymmetry in (*layout.asymmetries, *(one.asymmetry for one in binned)):
        yield asymmetry.observable, (asymmetry.at,)


def is_polar(observable: Observable, lab_is_cm: bool) -> bool:
    """Whether all its values are polar angles of the cm, or their cosines; of the lab, where that is the cm."""
    return bool(observable.axes) and (lab_is_cm or all(axis.frame.kind == "cm" for axis in observable.axes))


def polar_sign(axis: AxisForm, orientation: int) -> int:
    """+1 when the polar angle is that of leg 1 to beam a, −1 when it is its supplement."""
    return orientation if axis.leg == 1 else -orientation


def polar_values(observable: Observable, orientation: int, ends: Ends) -> Array:
    """The values of a polar observable at locations on the axis, entries first where it has a quantifier."""
    found = [_polar_values(axis, orientation, ends) for axis in observable.axes]
    return found[0] if observable.quantifier is None else np.stack(found)


def _polar_values(axis: AxisForm, orientation: int, ends: Ends) -> Array:
    forward = polar_sign(axis, orientation) > 0
    minus, plus = (ends.one_minus, ends.one_plus) if forward else (ends.one_plus, ends.one_minus)
    if axis.kind == "angle":
        return 2 * np.arctan2(np.sqrt(minus), np.sqrt(plus))
    cosine = Ends(minus, plus).c
    return np.abs(cosine) if axis.folded else cosine


def polar_crossings(observable: Observable, orientation: int, levels: Array) -> Crossings:
    """The crossings of a polar observable, in closed form, as those of row 0."""
    return Crossings.join([_polar_crossings(axis, orientation, levels) for axis in observable.axes])


def _polar_crossings(axis: AxisForm, orientation: int, levels: Array) -> Crossings:
    if axis.kind == "angle":
        inside = levels[(levels > 0) & (levels < np.pi)]
        forward = inside <= 0.5 * np.pi
        x = np.where(forward, 2 * np.sin(0.5 * inside) ** 2, 2 * np.cos(0.5 * inside) ** 2)
        wobble = 4 * EPSILON * inside * np.sin(inside)
    else:
        inside = levels[np.abs(levels) <= 1.0]
        if axis.folded:
            inside = np.concatenate([inside[inside >= 0], -inside[inside > 0]])
        forward = inside >= 0
        x = 1.0 - np.abs(inside)
        wobble = np.abs(np.abs(inside) - (1.0 - x))  # 1 − |edge| is exact from a half on; what is lost below is known
    side = np.where(forward == (polar_sign(axis, orientation) > 0), FORWARD, BACKWARD)
    return Crossings(np.zeros(x.size, dtype=np.intp), side, x, wobble, np.zeros(x.size, dtype=bool))


def axis_crossings(
    wanted: Mapping[Observable, Array],
    collision: Collision,
    values: Callable[[Observable, Integers, Ends], Array],
    rows: int,
) -> tuple[Crossings, int]:
    """All crossings, and for how many rows they are given: 1 when they are the same for all.

    Parameters
    ----------
    wanted : the levels of each observable
    values : function of observable, row numbers and locations, both of one shape
    """
    parts: list[Crossings] = []
    shared: list[Crossings] = []
    for observable, levels in wanted.items():
        if is_polar(observable, collision.lab_is_cm):
            shared.append(polar_crossings(observable, collision.orientation, levels))
        else:
            parts.extend(searched_crossings(observable, levels, values, rows))
    if not parts:
        return Crossings.join(shared), 1
    return Crossings.join([*(_for_every_row(s, rows) for s in shared), *parts]), rows


def searched_crossings(
    observable: Observable, levels: Array, values: Callable[[Observable, Integers, Ends], Array], rows: int
) -> Iterator[Crossings]:
    """The crossings of an observable that has to be asked, one after another for each of its entries."""
    for entry in range(observable.entries):

        def one(row: Integers, ends: Ends, entry: int = entry) -> Array:
            found = values(observable, row, ends)
            return found[entry] if observable.quantifier is not None else found

        yield crossings(one, rows, levels)


def _for_every_row(shared: Crossings, rows: int) -> Crossings:
    count = shared.x.size
    return Crossings(
        np.repeat(np.arange(rows), count),
        np.tile(shared.side, rows),
        np.tile(shared.x, rows),
        np.tile(shared.uncertainty, rows),
        np.tile(shared.grazing, rows),
    )
