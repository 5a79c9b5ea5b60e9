"""Legs of a reaction in place of the names in a text; all findings are collected, none raised."""

from __future__ import annotations

from typing import Literal, cast

from barnwright.grammar import Binary, Call, Finding, FrameName, LegName, Name, Negation, Node, Number, Selection
from barnwright.kinematics import CM, LAB, Frame
from barnwright.observables.rows import ROWS, Row
from barnwright.observables.tree import Constant, Each, Function, Leading, Leaf, Leg, Operation, Tree, with_leg
from barnwright.reaction import LegError, Reaction

_CONSTANTS = {"pi": 3.141592653589793}


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
        return tuple(a for a in node.arguments if isinstance(a, (Number, Name, Negation, Binary, Call)))
    return ()


class Resolver:
    """Resolves one text.

    Attributes
    ----------
    findings : list of Finding
    quantifier : "each", "any" or None
    each : Each or None
        The identical particles that the quantifier runs over.
    """

    def __init__(self, reaction: Reaction, numbered: bool = False) -> None:
        self.reaction = reaction
        self.numbered = numbered
        self.findings: list[Finding] = []
        self.quantifier: Literal["each", "any"] | None = None
        self.each: Each | None = None
        self._gathering: list[Each] | None = None

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
        outer, self._gathering = self._gathering, []
        tree = self.tree(operand)
        found, self._gathering = self._gathering, outer
        if tree is None:
            return None
        if not found:
            self._find(node.position, f"{function} of at least two quantities, or of one of identical particles")
            return None
        return Operation(function, tuple(with_leg(tree, found[0], code) for code in found[0].codes))

    def _leaf(self, node: Call) -> Tree | None:
        row = ROWS[node.function]
        arguments = cast("tuple[LegName | Selection, ...]", node.arguments)
        legs = [self._leg(argument) for argument in arguments]
        frame = self._frame(node.frame, row)
        of = self._codes(node.of)
        if any(leg is None for leg in legs) or frame is False or of is None:
            return None
        leaf = Leaf(node.function, tuple(leg for leg in legs if leg is not None), frame or None, of)
        return leaf if self._fits(leaf, node, row) else None

    def _fits(self, leaf: Leaf, node: Call, row: Row) -> bool:
        beams = [leg for leg in leaf.legs if isinstance(leg, int) and leg < 0]
        before = len(self.findings)
        if row.shape == "transfer" and (len(beams) != 1 or leaf.legs[0] != beams[0]):
            self._find(node.position, f"{row.name}(beam_a, x) or {row.name}(beam_b, x) with an outgoing particle")
        if row.shape == "several" and beams:
            self._find(node.position, f"{row.name} of outgoing particles")
        if len(set(leaf.legs)) < len(leaf.legs):
            self._find(node.position, f"{row.name} of different particles")
        if row.shape == "within":
            self._check_system(leaf, node)
        return len(self.findings) == before

    def _check_system(self, leaf: Leaf, node: Call) -> None:
        outgoing = len(self.reaction.outgoing)
        if leaf.legs[0] not in leaf.of or not len(set(leaf.of)) >= 2:
            self._find(node.position, "helicity_angle(x, of=(x, y)) with x among the particles of the system")
        elif len(set(leaf.of)) >= outgoing:
            expected = "a system that flies: all outgoing particles together are at rest in the cm"
            self._find(node.position, expected, "cos_theta(…, frame=cm)")

    def _frame(self, frame: FrameName | None, row: Row) -> Frame | Literal[False] | None:
        """The frame, None where the row has none, False where it is wrong."""
        if row.frame is None:
            return None
        if frame is None:
            return LAB if row.frame == "lab" else CM
        if frame.kind != "rest":
            return LAB if frame.kind == "lab" else CM
        codes = self._codes(frame.legs)
        if codes is None:
            return False
        if all(self._massless(code) for code in codes) and len(codes) == 1:
            self._find(frame.position, "particles that can be at rest; one without mass cannot")
            return False
        return Frame("rest", tuple(sorted(codes)))

    def _massless(self, code: int) -> bool:
        return self.reaction.name_of(code) in ("gamma", "g")

    def _codes(self, legs: tuple[LegName, ...]) -> tuple[int, ...] | None:
        codes = [self._code(leg) for leg in legs]
        if any(code is None for code in codes):
            return None
        found = tuple(code for code in codes if code is not None)
        if any(code < 0 for code in found):
            self._find(legs[0].position, "outgoing particles")
            return None
        return found

    def _code(self, leg: LegName) -> int | None:
        group = self._identical(leg)
        if group:
            advice = f"leading({leg.name}), each({leg.name}), any({leg.name}), min(…) or max(…)"
            self._find(leg.position, f"{advice}: there are {len(group)} {leg.name}")
            return None
        try:
            return self.reaction.leg(int(leg.name) if leg.name.isdigit() else leg.name)
        except LegError as error:
            self._find(leg.position, error.expected, error.nearest)
            return None

    def _identical(self, leg: LegName) -> tuple[int, ...]:
        """The codes of several identical particles of this name, or by the number of one of them."""
        if self.numbered and leg.name.isdigit():
            return ()
        for group in self.reaction.identical_groups:
            names = {self.reaction.name_of(code) for code in group}
            if leg.name in names or (leg.name.isdigit() and int(leg.name) in group):
                return group
        return ()

    def _leg(self, argument: LegName | Selection) -> Leg | None:
        if isinstance(argument, LegName):
            group = self._identical(argument)
            if group and self._gathering is not None:
                self._gathering.append(Each(group))
                return Each(group)
            return self._code(argument)
        group = self._identical(argument.leg)
        if not group:
            self._find(argument.position, f"{argument.kind}(…) of identical particles; {argument.leg.name} is not one")
            return None
        if argument.kind == "leading":
            return self._leading(argument, group)
        return self._quantified(argument, group)

    def _leading(self, argument: Selection, group: tuple[int, ...]) -> Leading | None:
        if argument.rank > len(group):
            self._find(argument.position, f"a rank of at most {len(group)}")
            return None
        if argument.by == "pt" and len(self.reaction.outgoing) == 2:
            expected = "an order that decides: two bodies share their pt exactly; each(…), any(…), min(…) or max(…)"
            self._find(argument.position, expected)
            return None
        return Leading(group, cast("Literal['energy', 'pt']", argument.by), argument.rank)

    def _quantified(self, argument: Selection, group: tuple[int, ...]) -> Each | None:
        kind = cast("Literal['each', 'any']", argument.kind)
        if self.quantifier not in (None, kind) or self.each not in (None, Each(group)):
            self._find(argument.position, "one each(…) or any(…) over the same particles")
            return None
        self.quantifier, self.each = kind, Each(group)
        return self.each

    def _find(self, position: int, expected: str, nearest: str | None = None) -> None:
        self.findings.append(Finding(position, expected, nearest))
