"""Which demands go into one tree: the largest groups that do not contradict each other, the most telling first."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import islice

from barnwright.phase_space.demands import Demand

Legs = tuple[int, ...]

MANY = 500
"""Groups looked at; only many identical particles have more."""


@dataclass(frozen=True, slots=True)
class Item:
    """Legs that a tree keeps together, or (``outer``) that leave the whole by themselves."""

    legs: Legs
    outer: bool


Family = tuple[Item, ...]


def families_of(demands: Sequence[Demand]) -> tuple[Family, ...]:
    """Groups of items that could take no other one: that which serves most demands not yet served comes first.

    An outer leg contradicts every system that holds it; systems contradict each other unless one holds the other or
    they share nothing.
    """
    items = tuple(dict.fromkeys(Item(demand.legs, demand.kind != "system") for demand in demands))
    found = list(islice(_maximal((), items, ()), MANY))
    ordered: list[Family] = []
    served: set[Item] = set()
    while found:
        best = max(found, key=lambda family: (len(set(family) - served), len(family)))
        found.remove(best)
        ordered.append(best)
        served |= set(best)
    return tuple(ordered)


def _maximal(chosen: Family, open_items: Family, closed: Family) -> Iterator[Family]:
    """Maximal cliques: C. Bron and J. Kerbosch, Commun. ACM 16 (1973) 575, from memory, in the order of the items."""
    if not open_items and not closed:
        yield chosen
        return
    left, done = open_items, closed
    for item in open_items:
        left = tuple(other for other in left if other != item)
        fits = tuple(other for other in left if _agree(item, other))
        yield from _maximal((*chosen, item), fits, tuple(other for other in done if _agree(item, other)))
        done = (*done, item)


def _agree(one: Item, other: Item) -> bool:
    first, second = set(one.legs), set(other.legs)
    if not first & second:
        return True
    if one.outer and other.outer:
        return False
    if one.outer or other.outer:
        outer, system = (first, second) if one.outer else (second, first)
        return system <= outer
    return first < second or second < first
