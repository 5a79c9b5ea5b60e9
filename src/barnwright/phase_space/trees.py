"""From a family of demands to trees of splittings, every choice of maps a tree of its own.

`docs/channels.md` tells the rules.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import permutations, product

from barnwright.phase_space.demands import Demand, Scene
from barnwright.phase_space.families import Family
from barnwright.phase_space.flat import part_of, splitting_order
from barnwright.phase_space.parts import AngleMap, InvariantMap, Part, Splitting

Legs = tuple[int, ...]
Tree = tuple[Splitting, ...]
Used = tuple[int, ...] | None


@dataclass(frozen=True, slots=True)
class Grower:
    """Grows the trees of one family."""

    family: Family
    demands: tuple[Demand, ...]
    scene: Scene

    def trees(self) -> Iterator[Tree]:
        """All trees; the declared order of outer legs and of maps first."""
        outer = [item.legs for item in self.family if item.outer]
        everything = tuple(range(1, len(self.scene.outgoing) + 1))
        for order in self._orders(outer):
            yield from self._split(everything, self._children(everything, order), ())

    def _orders(self, outer: Sequence[Legs]) -> Iterator[tuple[Legs, ...]]:
        """Orders in which outer legs leave: only identical ones, or rivals for a beam, change places."""
        places = {legs: place for place, legs in enumerate(outer)}
        for order in permutations(outer):
            swapped = ((a, b) for i, a in enumerate(order) for b in order[i + 1 :] if places[a] > places[b])
            if all(self._same(a, b) or self._rivals(a, b) for a, b in swapped):
                yield order

    def _same(self, one: Legs, other: Legs) -> bool:
        names = self.scene.reaction.outgoing
        return sorted(names[leg - 1] for leg in one) == sorted(names[leg - 1] for leg in other)

    def _rivals(self, one: Legs, other: Legs) -> bool:
        return bool({d.beam for d in self._transfers(one)} & {d.beam for d in self._transfers(other)})

    def _children(self, legs: Legs, order: tuple[Legs, ...]) -> tuple[Legs, ...]:
        """What a mother consists of: outer legs in order, then soft ones, then free legs, then systems."""
        inside = [item.legs for item in self.family if not item.outer and set(item.legs) < set(legs)]
        inside = [system for system in inside if not any(set(system) <= set(other) for other in order)]
        systems = [system for system in inside if not any(set(system) < set(other) for other in inside)]
        taken = {leg for system in (*systems, *order) for leg in system}
        free = splitting_order([leg for leg in legs if leg not in taken], self.scene.limits)
        singles = sorted(((leg,) for leg in free), key=lambda one: not self._soft(one))
        return (*order, *singles, *systems)

    def _split(self, mother: Legs, children: tuple[Legs, ...], used: Used) -> Iterator[Tree]:
        """All trees below a mother; ``used`` are the beams that earlier outer legs came from, None inside a system."""
        first, rest = children[0], children[1:]
        second = tuple(sorted(leg for child in rest for leg in child))
        whole = len(mother) == len(self.scene.outgoing)
        auxiliary = len(rest) > 1
        for angle, swapped in self._angles(first, second if not auxiliary else None, whole, used):
            left = used if used is None or angle.shape != "transfer" else (*used, "ab".index(angle.axis))
            more = self._below(second, rest, left) if auxiliary else self._below(second)
            below = list(self._below(first)), list(more)
            maps = self._maps(first, second, False), self._maps(second, first, auxiliary)
            for one, two, tree, other in product(*maps, *below):
                parts = self._part(first, one), self._part(second, two)
                yield (Splitting(mother, parts[swapped], parts[not swapped], angle), *tree, *other)

    def _below(self, legs: Legs, rest: tuple[Legs, ...] = (), used: Used = None) -> Iterator[Tree]:
        """All trees of a part: a leg, a system, or the ``rest`` of children that have yet to leave."""
        if len(legs) == 1:
            yield ()
        else:
            yield from self._split(legs, rest or self._children(legs, ()), used)

    def _part(self, legs: Legs, chosen: InvariantMap | None) -> Part:
        return part_of(legs, self.scene.outgoing, self.scene.limits, chosen)

    def _maps(self, legs: Legs, other: Legs, auxiliary: bool) -> list[InvariantMap | None]:
        """The maps of a system's invariant: the declared ones, and that of a soft leg beside it."""
        if len(legs) == 1:
            return [None]
        found: list[InvariantMap | None] = []
        if not auxiliary:
            found += [d.map for d in self.demands if d.legs == legs and d.map]
        if self._soft(other):
            found.append(InvariantMap("soft"))
        return found or [None]

    def _angles(self, first: Legs, second: Legs | None, whole: bool, used: Used) -> list[tuple[AngleMap, bool]]:
        """The maps of the angle, and whether the second part is the one that they tell of."""
        found = [(angle, False) for angle in self._of_part(first, whole, used)]
        if second is not None:
            found += [(angle, True) for angle in self._of_part(second, whole, used)]
        return found or [(AngleMap(), False)]

    def _of_part(self, legs: Legs, whole: bool, used: Used) -> list[AngleMap]:
        radiated = [d for d in self.demands if d.kind == "beam" and d.radiation and d.legs == legs and used is not None]
        found = []
        if whole and {d.beam for d in radiated} == {0, 1}:
            masses = {d.beam: d.mass for d in radiated}
            found.append(AngleMap("two_sided", masses=(masses[0], masses[1])))
        else:
            found += [_along(d) for d in radiated]
        found += [_along(d) for d in self._transfers(legs) if used is not None and d.beam not in used]
        if self._soft(legs) and not whole:
            found.append(AngleMap("soft"))
        return found

    def _transfers(self, legs: Legs) -> list[Demand]:
        return [d for d in self.demands if d.kind == "beam" and not d.radiation and d.legs == legs]

    def _soft(self, legs: Legs) -> bool:
        return any(d.kind == "soft" and d.legs == legs for d in self.demands)


def _along(demand: Demand) -> AngleMap:
    """The map of a transfer from one beam."""
    masses = (demand.mass, 0.0) if demand.beam == 0 else (0.0, demand.mass)
    return AngleMap("transfer", "b" if demand.beam else "a", masses, demand.power)
