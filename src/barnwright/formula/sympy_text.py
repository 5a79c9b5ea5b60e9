"""A sympy expression as text of the formula language: symbols by name, ``dot``, ``invariant_mass`` and ``rest_mass`` as
functions of symbols that are named like legs, or of leg numbers."""

from __future__ import annotations

import math
from itertools import islice
from numbers import Real
from typing import Any, NoReturn

from barnwright.errors import show
from barnwright.formula.errors import FormulaError
from barnwright.formula.language import ELEMENTARY, OF_LEGS
from barnwright.grammar import DEEPEST, MOST_NODES, Finding, is_leg, is_word

_EXACT = 2**53
_SHOWN = 50


def text_of(expression: Any) -> str:
    """The text of a sympy expression, or of a number.

    Raises
    ------
    FormulaError
        For functions and objects that the language does not have, and for expressions beyond its limits.
    """
    import sympy

    if isinstance(expression, Real) and not isinstance(expression, sympy.Basic):
        return repr(float(expression))
    if not isinstance(expression, sympy.Expr):
        raise FormulaError(show(expression), (Finding(0, "a text, a number or a sympy expression"),))
    return _Writer(sympy).text(expression, 0)


class _Writer:
    def __init__(self, sympy: Any) -> None:
        self.sympy = sympy
        self.nodes = 0

    def text(self, node: Any, depth: int) -> str:
        self.nodes += 1
        if self.nodes > MOST_NODES or depth > DEEPEST:
            expected = f"a sympy expression of at most {MOST_NODES} parts, {DEEPEST} inside one another"
            raise FormulaError(type(node).__name__, (Finding(0, expected),))
        if node.is_Symbol:
            return str(node.name) if is_word(node.name) else _refuse(node, "symbols whose names are single words")
        if node.is_number and not node.args:
            return self._number(node)
        parts = [self.text(part, depth + 1) for part in node.args] if self._of_values(node) else []
        if node.is_Add or node.is_Mul:
            return "(" + (" + " if node.is_Add else " * ").join(parts) + ")"
        return f"({parts[0]})**({parts[1]})" if node.is_Pow else self._function(node, parts)

    def _of_values(self, node: Any) -> bool:
        return bool(node.is_Add or node.is_Mul or node.is_Pow) or _name(node) in ELEMENTARY

    def _number(self, node: Any) -> str:
        words = {self.sympy.pi: "pi", self.sympy.E: "exp(1)"}
        if node in words:
            return words[node]
        if node.is_Rational and abs(node.p) < _EXACT and node.q < _EXACT:
            return f"({node.p}/{node.q})" if node.q != 1 else f"({node.p})"
        value = float(node) if node.is_Rational or node.is_Float else math.nan
        return f"({value!r})" if math.isfinite(value) else _refuse(node)

    def _function(self, node: Any, parts: list[str]) -> str:
        name = _name(node)
        if name in OF_LEGS:
            parts = [_leg(argument) for argument in node.args]
        elif name not in ELEMENTARY:
            _refuse(node)
        return f"{name}({', '.join(parts)})"


def _name(node: Any) -> str:
    name = type(node).__name__
    return {"Abs": "abs"}.get(name, name)


def _leg(node: Any) -> str:
    if node.is_Integer and 0 < node.p < 100:
        return str(node.p)
    return str(node.name) if node.is_Symbol and is_leg(node.name) else _refuse(node, "a symbol named like a leg")


def _refuse(node: Any, expected: str = "") -> NoReturn:
    known = f"numbers, symbols, + * ** and the functions {', '.join((*OF_LEGS, *ELEMENTARY))}"
    raise FormulaError(_shown(node), (Finding(0, expected or known),))


def _shown(node: Any) -> str:
    """The node as sympy writes it, if it is short; else its kind: writing it could take for ever."""
    import sympy

    parts = list(islice(sympy.preorder_traversal(node), _SHOWN))
    huge = any(part.is_Rational and max(abs(part.p), part.q) >= _EXACT**16 for part in parts)
    return str(node) if len(parts) < _SHOWN and not huge else type(node).__name__
