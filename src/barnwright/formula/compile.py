"""From a text, or a sympy expression, to the program of a formula."""

from __future__ import annotations

import math
from functools import lru_cache
from typing import Any

from barnwright.errors import nearest
from barnwright.formula.errors import FormulaError
from barnwright.formula.formula import Formula, Step, last_uses
from barnwright.formula.language import ELEMENTARY, INVARIANTS, LANGUAGE, OF_LEGS, RESERVED
from barnwright.grammar import (
    MOST_FINDINGS,
    Binary,
    Call,
    Finding,
    GrammarError,
    LegName,
    Name,
    Negation,
    Node,
    Number,
    Selection,
    parse,
)
from barnwright.reaction import LegError, Reaction


def compile_formula(expression: Any, reaction: Reaction, parameter_names: tuple[str, ...]) -> Formula:
    """The formula of a text or a sympy expression.

    Parameters
    ----------
    expression : str or sympy expression
    reaction : Reaction
    parameter_names : tuple of str
        The only names that it may use besides s, t, u and pi; t and u are there for two outgoing particles.

    Raises
    ------
    FormulaError
        With every unknown name and leg, or the first thing that is no grammar; columns count in the text.
    """
    if isinstance(expression, str):
        return _of_text(expression, reaction, parameter_names)
    from barnwright.formula.sympy_text import text_of

    return _of_text(text_of(expression), reaction, parameter_names)


@lru_cache(maxsize=256)
def _of_text(text: str, reaction: Reaction, parameter_names: tuple[str, ...]) -> Formula:
    taken = tuple(name for name in parameter_names if name in RESERVED)
    if taken:
        expected = f"parameters of other names than {', '.join(taken)}, which the language has already"
        raise FormulaError(text, (Finding(0, expected),))
    try:
        node = parse(text, LANGUAGE)
    except GrammarError as error:
        raise FormulaError(error.text, error.findings) from None
    compiler = _Compiler(reaction, parameter_names)
    compiler.compile(node)
    if compiler.findings:
        raise FormulaError(text, tuple(sorted(compiler.findings, key=lambda finding: finding.position)))
    program = tuple(compiler.steps)
    return Formula(text, program, last_uses(program))


class _Compiler:
    """Walks a tree without recursion, so that the longest sum is no deeper than the shortest."""

    def __init__(self, reaction: Reaction, names: tuple[str, ...]) -> None:
        self.reaction, self.names = reaction, names
        self.steps: list[Step] = []
        self.findings: list[Finding] = []
        self._known: dict[Step, int] = {}

    def compile(self, root: Node) -> None:
        """Put the steps of a tree behind one another, children first."""
        results: list[int] = []
        waiting: list[tuple[Node, bool]] = [(root, False)]
        while waiting:
            node, ready = waiting.pop()
            children = _children(node)
            if children and not ready:
                waiting.append((node, True))
                waiting.extend((child, False) for child in reversed(children))
            else:
                operands = tuple(results[len(results) - len(children) :]) if children else ()
                del results[len(results) - len(children) :]
                results.append(self._number_of(self._step(node, operands)))

    def _number_of(self, step: Step) -> int:
        """The number of a step, which is an earlier one's where it is the same."""
        number = self._known.setdefault(step, len(self.steps))
        if number == len(self.steps):
            self.steps.append(step)
        return number

    def _find(self, position: int, expected: str, nearest: str | None = None) -> None:
        if len(self.findings) < MOST_FINDINGS:
            self.findings.append(Finding(position, expected, nearest))

    def _step(self, node: Node, operands: tuple[int, ...]) -> Step:
        match node:
            case Number(value=value):
                return "number", (value,)
            case Name():
                return self._name(node)
            case Negation():
                return "negative", operands
            case Binary(operator=operator):
                return operator, operands
            case Call(function=function) if function in ELEMENTARY:
                return function, operands
            case _:
                return self._of_legs(node)

    def _name(self, node: Name) -> Step:
        if node.name in self.names:
            return "parameter", (node.name,)
        if node.name in INVARIANTS:
            if node.name != "s" and len(self.reaction.outgoing) != 2:
                expected = f"four-products: {node.name} belongs to two outgoing particles"
                self._find(node.position, expected, "dot(beam_a, 1)")
            return node.name, ()
        if node.name == "pi":
            return "number", (math.pi,)
        choices = (*self.names, *INVARIANTS, "pi", *OF_LEGS, *ELEMENTARY)
        declared = f"a declared parameter ({', '.join(self.names)})" if self.names else "a declared parameter"
        self._find(node.position, f"s, t, u, pi or {declared}", nearest(node.name, choices))
        return "number", (0.0,)

    def _of_legs(self, node: Call) -> Step:
        legs = [leg for leg in node.arguments if isinstance(leg, LegName)]
        codes = [self._leg(leg) for leg in legs]
        if node.function == "invariant_mass" and None not in codes and len(set(codes)) < len(codes):
            self._find(node.position, "invariant_mass of different particles")
        return node.function, tuple({-1: "beam_a", -2: "beam_b"}.get(code or 0, code) for code in codes)

    def _leg(self, leg: LegName) -> int | None:
        if len(self.findings) >= MOST_FINDINGS:
            return None
        try:
            return self.reaction.leg(leg.key)
        except LegError as error:
            numbers = [str(k) for k, name in enumerate(self.reaction.outgoing, 1) if name == leg.name]
            if len(numbers) > 1:
                expected = f"the number of one of the {len(numbers)} {leg.name}: {' or '.join(numbers)}"
                self._find(leg.position, expected, numbers[0])
            else:
                self._find(leg.position, error.expected, error.nearest)
            return None


def _children(node: Node) -> tuple[Node, ...]:
    if isinstance(node, Binary):
        return node.left, node.right
    if isinstance(node, Negation):
        return (node.operand,)
    if isinstance(node, Call) and node.function in ELEMENTARY:
        return tuple(a for a in node.arguments if not isinstance(a, (LegName, Selection)))
    return ()
