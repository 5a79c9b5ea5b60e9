"""The picture of a scan: the total against what was varied."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import TYPE_CHECKING, Any

import numpy as np

from barnwright.errors import RequestError, Violation, show
from barnwright.plot.backend import COLOURS, blank
from barnwright.plot.labels import leg_label
from barnwright.plot.panels import Series, draw_curve, draw_map
from barnwright.plot.scales import Array

if TYPE_CHECKING:
    from matplotlib.figure import Figure

_ENERGIES = {
    "beams.sqrt_s": r"$\sqrt{s}$",
    "beams.energy": r"$E$ of the beam",
    "beams.kinetic_energy": r"$E_\mathrm{kin}$ of the beam",
    "beams.momentum": r"$p$ of the beam",
}


def draw_scan(values: Array, errors: Array, over: Mapping[str, Sequence[Any]], unit: str, title: str) -> Figure:
    """A matplotlib figure of totals over one key (a curve) or two keys (curves, or a map where they are many).

    ``values`` and ``errors`` have one entry a point of the grid, the first key slowest, in ``unit``; NaN is left out.
    Raises RequestError for three keys and more or for keys without numbers, BarnwrightError without matplotlib.
    """
    check_axes(over)
    keys = list(over)
    shape = tuple(len(over[key]) for key in keys)
    table, widths = np.reshape(values, shape), np.reshape(errors, shape)
    figure, (axes,) = blank(1)
    axes.set_title(title)
    axes.set_xlabel(key_label(keys[0]))
    quantity = rf"$\sigma$ [{unit}]" if any(key.startswith("beams.") for key in keys) else f"total [{unit}]"
    places = np.array(over[keys[0]], dtype=float)
    if len(keys) == 2 and shape[1] > len(COLOURS):
        axes.set_ylabel(key_label(keys[1]))
        draw_map(figure, axes, (places, np.array(over[keys[1]], dtype=float)), table, quantity)
        return figure
    axes.set_ylabel(quantity)
    names = [f"{keys[1]} = {value}" for value in over[keys[1]]] if len(keys) == 2 else [""]
    columns = range(len(names))
    rows, spread = table.reshape(shape[0], -1), widths.reshape(shape[0], -1)
    draw_curve(axes, places, [Series(names[column], rows[:, column], spread[:, column]) for column in columns])
    return figure


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


def key_label(key: str) -> str:
    """The axis label of a scanned key: symbols and GeV for the energies of beams and for masses, else the key."""
    if key in _ENERGIES:
        return f"{_ENERGIES[key]} [GeV]"
    for table, letter in (("masses.", "m"), ("beams.energies.", "E")):
        if key.startswith(table):
            particle = leg_label(key.removeprefix(table).strip("\"'"))
            return f"${letter}$ of {particle} [GeV]"
    return key
