"""From the numbers of one quantity to a chart: the nominal line, parts, variations, ratios, derived quantities."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field

import numpy as np

from barnwright.plot.chart import LOWER, MAIN, Band, Chart, Panel, Series
from barnwright.plot.labels import name_label, plain, unit_label
from barnwright.plot.looks import NOMINAL, REST, Look, Looks
from barnwright.plot.scales import Array
from barnwright.plot.strokes import Stroke

#: More derived quantities than this share one panel.
APART = 3
#: Values below this share of the largest one are rounding: nothing is divided by them.
NOTHING = 1e-12


@dataclass(frozen=True, slots=True)
class Numbers:
    """Values and errors of one shape; NaN where not known."""

    values: Array
    errors: Array


@dataclass(frozen=True, slots=True)
class Derived:
    """A derived quantity: the nominal numbers, and those of variations by name where there are any."""

    unit: str
    nominal: Numbers
    variations: Mapping[str, Numbers] = field(default_factory=dict)


@dataclass(frozen=True, slots=True)
class Quantity:
    """What a picture shows of one quantity, everything by name.

    ``parts`` are contributions and processes, which add up to the nominal numbers; ``envelopes`` are pairs of the
    lowest and the highest.
    """

    nominal: Numbers
    parts: Mapping[str, Numbers] = field(default_factory=dict)
    variations: Mapping[str, Numbers] = field(default_factory=dict)
    envelopes: Mapping[str, tuple[Array, Array]] = field(default_factory=dict)
    derived: Mapping[str, Derived] = field(default_factory=dict)


def chart_of(quantity: Quantity, stroke: Stroke, title: str, labels: tuple[str, str]) -> Chart:
    """The chart of a quantity; ``labels`` are those of the horizontal and of the main panel's vertical axis."""
    looks = Looks()
    varied = bool(quantity.variations or quantity.envelopes)
    nominal = Series("nominal" if varied else "total", quantity.nominal.values, quantity.nominal.errors)
    named = [(plain(name, 30), entry) for name, entry in (*quantity.parts.items(), *quantity.variations.items())]
    others = _lines(named, looks, with_bars=len(quantity.parts))
    variations = dict(zip(quantity.variations, others[len(quantity.parts) :], strict=True))
    bands = tuple(Band(plain(name, 30), low, high, looks.band()) for name, (low, high) in quantity.envelopes.items())
    main = Panel(labels[1], (nominal, *others), bands, from_zero=True, height=MAIN, legend=bool(others or bands))
    lower = [*_ratios(nominal, list(variations.values()), bands), *_derived(quantity.derived, variations)]
    return Chart(title, labels[0], stroke, main, tuple(lower))


def family_of(
    members: Sequence[tuple[str, Numbers]],
    derived: Mapping[str, Sequence[Numbers]],
    stroke: Stroke,
    labels: tuple[str, str],
) -> Chart:
    """The chart of several quantities of equal standing, not more than colours, with what is derived from each."""
    looks = Looks()
    (name, numbers), *rest = members
    lines = (Series(name, numbers.values, numbers.errors), *_lines(rest, looks, len(rest)))
    main = Panel(labels[1], lines, from_zero=True, height=MAIN, legend=True)
    lower = [
        Panel(name_label(name), tuple(_unnamed(entry, line.look) for entry, line in zip(found, lines, strict=True)))
        for name, found in derived.items()
    ]
    return Chart("", labels[0], stroke, main, tuple(lower))


def _unnamed(numbers: Numbers, look: Look = NOMINAL) -> Series:
    return Series("", numbers.values, numbers.errors, look)


def _lines(named: Sequence[tuple[str, Numbers]], looks: Looks, with_bars: int) -> list[Series]:
    """A line each, the first ones with bars; what no colour is left for is thin and grey, and one entry counts it."""
    found: list[Series] = []
    for number, (name, numbers) in enumerate(named):
        look, label = looks.line(), name
        if look is REST:
            label = "" if found and found[-1].look is REST else f"and {len(named) - number} more"
        found.append(Series(label, numbers.values, numbers.errors, look, number < with_bars))
    return found


def _ratios(nominal: Series, variations: Sequence[Series], bands: Sequence[Band]) -> list[Panel]:
    """Variations and envelopes over the nominal values, whose own error is the band around 1; none where all is 0."""
    sizes = np.abs(nominal.values)
    known = sizes > NOTHING * np.nanmax(sizes, initial=0.0)
    if not known.any() or not (variations or bands):
        return []
    below = np.where(known, nominal.values, np.nan)
    unknown = np.full(below.shape, np.nan)
    lines = [Series("", one.values / below, unknown, one.look) for one in (nominal, *variations)]
    half = nominal.errors / np.abs(below)
    ends = (np.sort([band.low / below, band.high / below], axis=0) for band in bands)
    ratios = [Band("", low, high, band.look) for (low, high), band in zip(ends, bands, strict=True)]
    ratios.append(Band("", 1 - half, 1 + half, Look(NOMINAL.colour)))
    return [Panel(f"ratio to\n{nominal.label}", tuple(lines), tuple(ratios), reference=1.0)]


def _derived(derived: Mapping[str, Derived], variations: Mapping[str, Series]) -> list[Panel]:
    """A panel for each derived quantity, the variations in the looks of their lines; one panel where they are many."""
    if len(derived) > APART:
        looks = Looks()
        first, *rest = [(name_label(name), entry.nominal) for name, entry in derived.items()]
        lines = (Series(first[0], first[1].values, first[1].errors), *_lines(rest, looks, len(rest)))
        return [Panel("derived", lines, legend=True, height=2 * LOWER)]
    panels = []
    for name, entry in derived.items():
        others = (_unnamed(numbers, variations[key].look) for key, numbers in entry.variations.items())
        unit = f" [{unit_label(entry.unit)}]" if entry.unit else ""
        panels.append(Panel(f"{name_label(name)}{unit}", (_unnamed(entry.nominal), *others)))
    return panels
