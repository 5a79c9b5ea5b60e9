"""The picture of a scan: lines against what was varied; over two keys a family of lines, or a map."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from typing import TYPE_CHECKING, Any

import numpy as np

from barnwright.documents import Curve, Curves
from barnwright.errors import RequestError, Violation, show
from barnwright.plot.compose import Block, compose
from barnwright.plot.keys import key_label, value_label
from barnwright.plot.labels import name_label, unit_label
from barnwright.plot.looks import COLOURS
from barnwright.plot.map import Map
from barnwright.plot.prediction import enveloped, heading, letter
from barnwright.plot.quantity import Derived, Numbers, Quantity, chart_of, family_of
from barnwright.plot.scales import Array, borders
from barnwright.plot.strokes import Points

if TYPE_CHECKING:
    from matplotlib.figure import Figure

    from barnwright.documents.prediction import Prediction


def draw_scan(over: Mapping[str, Sequence[Any]], curves: Curves, first: Prediction) -> Figure:
    """A matplotlib figure of a scan over one key or two; ``first`` is the prediction at any point.

    One key: the total with its contributions, processes, variations and envelopes, below it the ratio of the
    variations to the total, and the derived quantities. Two keys: a line for each value of the second one, or, where
    these are more than there are colours, a map; the derived quantities likewise. Raises RequestError for three keys
    and more or for keys without numbers, BarnwrightError without matplotlib.
    """
    check_axes(over)
    beams = any(key.startswith("beams.") for key in over)
    quantity = rf"$\{letter(first)}$" if beams else "total"
    label = f"{quantity} [{unit_label(curves.total.unit)}]"
    if len(over) == 1:
        blocks: list[Block] = [_curves(over, curves, first, label)]
    elif len(list(over.values())[1]) <= len(COLOURS):
        blocks = [_family(over, curves, first, label)]
    else:
        blocks = _maps(over, curves, first, label)
    return compose(heading(first), blocks)


def check_axes(over: Mapping[str, Sequence[Any]]) -> None:
    """Refuse what cannot be drawn: more than two keys, or words and truth values along an axis. Raises RequestError."""
    if not 1 <= len(over) <= 2:
        raise RequestError([Violation("over", f"{len(over)} keys", "one or two keys, since a picture is wanted")])
    for number, (key, values) in enumerate(over.items()):
        if number == 1 and len(values) <= len(COLOURS):
            continue
        for value in values:
            if isinstance(value, bool) or not isinstance(value, int | float):
                raise RequestError([Violation(f"over.{key}", show(value), "numbers, since a picture is wanted")])


def _curves(over: Mapping[str, Sequence[Any]], curves: Curves, first: Prediction, label: str) -> Block:
    """One key: everything in one chart."""
    ((key, values),) = over.items()
    places, order = _sorted(values)
    derived = {entry.name: entry for entry in curves.total.derived if entry.low is None}
    spread = enveloped(first.request)
    alone = [one for one in curves.variations if one.name not in spread]
    varied = {
        name: {one.name: _numbers(one.derived[name], order) for one in alone if name in one.derived.names}
        for name in derived
    }
    quantity = Quantity(
        nominal=_numbers(curves.total, order),
        parts=_named([*curves.contributions, *curves.processes], order),
        variations=_named(alone, order),
        envelopes={
            entry.name: (entry.low[order], entry.high[order])
            for entry in curves.total.derived
            if entry.low is not None and entry.high is not None
        },
        derived={name: Derived(entry.unit, _numbers(entry, order), varied[name]) for name, entry in derived.items()},
    )
    return chart_of(quantity, Points(places), "", (key_label(key, first.request), label))


def _family(over: Mapping[str, Sequence[Any]], curves: Curves, first: Prediction, label: str) -> Block:
    """Two keys, the second with few values: a line for each of them."""
    (key, values), (other, members) = over.items()
    places, order = _sorted(values)

    def columns(curve: Curve) -> list[Numbers]:
        return [Numbers(curve.values[order, k], curve.errors[order, k]) for k in range(len(members))]

    names = [value_label(other, member, first.request) for member in members]
    derived = {entry.name: columns(entry) for entry in curves.total.derived if entry.low is None}
    labels = (key_label(key, first.request), label)
    return family_of(list(zip(names, columns(curves.total), strict=True)), derived, Points(places), labels)


def _maps(over: Mapping[str, Sequence[Any]], curves: Curves, first: Prediction, label: str) -> list[Block]:
    """Two keys with many values: a map of the total, and one of each derived quantity."""
    sides = [_sorted(values) for values in over.values()]
    edges = (borders(sides[0][0]), borders(sides[1][0]))
    across, up = (key_label(key, first.request) for key in over)
    cells = np.ix_(sides[0][1], sides[1][1])
    maps: list[Block] = [Map("total", (across, up, label), edges, curves.total.values[cells])]
    for entry in curves.total.derived:
        if entry.low is None:
            name = name_label(entry.name)
            maps.append(Map(name, (across, up, name), edges, entry.values[cells], derived=True))
    return maps


def _sorted(values: Sequence[Any]) -> tuple[Array, Any]:
    """The numbers of a key as they increase, and the order in which they do."""
    places = np.array(values, dtype=float)
    order = np.argsort(places, kind="stable")
    return places[order], order


def _numbers(curve: Curve, order: Any) -> Numbers:
    return Numbers(curve.values[order], curve.errors[order])


def _named(curves: Iterable[Curve], order: Any) -> dict[str, Numbers]:
    return {curve.name: _numbers(curve, order) for curve in curves}
