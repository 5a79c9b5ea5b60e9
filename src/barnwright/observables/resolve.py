"""From the tree of a text to the tree of an observable: rows of the table with the legs of a reaction.

All findings are collected, none raised.
"""

from __future__ import annotations

import math
from itertools import combinations
from typing import cast

from barnwright.grammar import Binary, Call, LegName, Name, Negation, Node, Number, Selection
from barnwright.observables.legs import Legs
from barnwright.observables.rows import ROWS, Row
from barnwright.observables.tree import Constant, Function, Leading, Leaf, Leg, Operation, Tree, with_leg

_CONSTANTS = {"pi": math.pi}
_OF_AZIMUTH = frozenset({"phi", "delta_phi", "acoplanarity", "delta_r"})


def depth_of(node: Node) -> int:
    """How deep a tree is, found without recursion: a long sum leans to one side."""
    deepest, waiting = 0, [(node, 1)]
    while waiting:
        current, depth = waiting.pop()
        deepest = max(deepest, depth)
        waiting.extend((child, depth + 1) for child in _children(current))
    return deepest


def _children(node: object) -> tuple[Node, ...]:
    if isinstance(node, Binary):
        return node.left, node.right
    if isinstance(node, Negation):
        return (node.operand,)
    if isinstance(node, Call):
        return tuple(a for a in node.arguments if not isinstance(a, (LegName, Selection)))
    return ()


class Resolver:
    """Resolves one text; what it finds goes to ``legs``."""

    def __init__(self, legs: Legs) -> None:
        self.legs = legs

    def tree(self, node: Node) -> Tree | None:
        """The tree of a node, or None and findings."""
        if isinstance(node, Number):
            return Constant(node.value)
        if isinstance(node, Name):
            return Constant(_CONSTANTS[node.name]) if node.name in _CONSTANTS else Leaf(node.name, ())
        if isinstance(node, Negation):
            return self._operation("negative", (node.operand,))
        if isinstance(node, Binary):
            return self._operation(node.operator, (node.left, node.right))
        return self._leaf(node) if node.function in ROWS else self._arithmetic(node)

    def _operation(self, function: Function, operands: tuple[Node, ...]) -> Tree | None:
        trees = [self.tree(operand) for operand in operands]
        if any(tree is None for tree in trees):
            return None
        return Operation(function, tuple(tree for tree in trees if tree is not None))

    def _arithmetic(self, node: Call) -> Tree | None:
        operands = cast("tuple[Node, ...]", node.arguments)
        function = cast("Function", node.function)
        if function in ("min", "max") and len(operands) == 1:
            return self._over_identical(function, node, operands[0])
        return self._operation(function, operands)

    def _over_identical(self, function: Function, node: Call, operand: Node) -> Tree | None:
        """min(…) or max(…) of one argument: over the identical particles that it names."""
        if self.legs.gathered is not None:
            self.legs.find(node.position, f"no {function} over identical particles within another one")
            return None
        found = self.legs.gathered = []
        tree = self.tree(operand)
        self.legs.gathered = None
        if tree is None:
            return None
        if len(set(found)) != 1:
            several = "identical particles of one kind" if found else "at least two quantities, or identical particles"
            self.legs.find(node.position, f"{function} of {several}")
            return None
        return Operation(function, tuple(with_leg(tree, found[0], code) for code in found[0].codes))

    def _leaf(self, node: Call) -> Tree | None:
        row = ROWS[node.function]
        arguments = cast("tuple[LegName | Selection, ...]", node.arguments)
        legs = [self.legs.leg(argument) for argument in arguments]
        frame = self.legs.frame(node.frame, row)
        of = self.legs.system(node.of)
        if any(leg is None for leg in legs) or frame is False or of is None:
            return None
        leaf = Leaf(node.function, tuple(leg for leg in legs if leg is not None), frame or None, of)
        return leaf if self._fits(leaf, node, row) else None

    def _fits(self, leaf: Leaf, node: Call, row: Row) -> bool:
        before = len(self.legs.findings)
        self._check_beams(leaf, node, row)
        if any(_may_be_one(first, second) for first, second in combinations(leaf.legs, 2)):
            self.legs.find(node.position, f"{row.name} of different particles")
        if row.shape == "within":
            self._check_system(leaf, node)
        return len(self.legs.findings) == before

    def _check_beams(self, leaf: Leaf, node: Call, row: Row) -> None:
        beams = [leg for leg in leaf.legs if isinstance(leg, int) and leg < 0]
        if row.shape == "transfer" and (len(beams) != 1 or leaf.legs[0] != beams[0]):
            expected = f"{row.name}(beam_a, x) or {row.name}(beam_b, x) with an outgoing particle"
            self.legs.find(node.position, expected)
        if row.shape == "several" and beams:
            self.legs.find(node.position, f"{row.name} of outgoing particles")
        if row.name in _OF_AZIMUTH and beams and leaf.frame is not None and leaf.frame.kind != "rest":
            self.legs.find(node.position, f"{row.name} of outgoing particles; a beam has no azimuth")

    def _check_system(self, leaf: Leaf, node: Call) -> None:
        if leaf.legs[0] not in leaf.of or len(leaf.of) < 2:
            self.legs.find(node.position, "helicity_angle(x, of=(x, y)) with x among the particles of the system")
        elif len(leaf.of) == len(self.legs.reaction.outgoing):
            expected = "a system that flies: all outgoing particles together are at rest in the cm"
            self.legs.find(node.position, expected, "cos_theta(…, frame=cm)")


def _may_be_one(first: Leg, second: Leg) -> bool:
    """Whether two legs of one row can be the same particle in some event."""
    if isinstance(first, Leading) and isinstance(second, Leading) and first.by == second.by:
        return first == second
    return not set(_codes(first)).isdisjoint(_codes(second))


def _codes(leg: Leg) -> tuple[int, ...]:
    return (leg,) if isinstance(leg, int) else leg.codes
