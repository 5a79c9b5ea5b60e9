"""A sympy expression as text of the formula language: symbols by name, ``dot``, ``invariant_mass`` and ``rest_mass`` as
functions of symbols that are named like legs."""

from __future__ import annotations

from typing import Any

from barnwright.formula.errors import FormulaError
from barnwright.formula.language import ELEMENTARY, OF_LEGS
from barnwright.grammar import Finding


def text_of(expression: Any) -> str:
    """The text of a sympy expression.

    Raises
    ------
    FormulaError
        For functions and objects that the language does not have.
    """
    import sympy

    expression = sympy.sympify(expression, evaluate=False) if not isinstance(expression, sympy.Basic) else expression
    return _text(expression, sympy)


def _text(node: Any, sympy: Any) -> str:
    if node.is_Symbol:
        return str(node.name)
    if node is sympy.pi:
        return "pi"
    if node.is_Rational and not node.is_Integer:
        return f"({node.p}/{node.q})"
    if node.is_Number and node.is_finite:
        return f"({float(node)!r})" if not node.is_Integer else f"({int(node)})"
    if node is sympy.E:
        return "exp(1)"
    if node.is_Add or node.is_Mul:
        return "(" + (" + " if node.is_Add else " * ").join(_text(a, sympy) for a in node.args) + ")"
    if node.is_Pow:
        return f"({_text(node.base, sympy)})**({_text(node.exp, sympy)})"
    name = {"Abs": "abs"}.get(type(node).__name__, type(node).__name__)
    if name in ELEMENTARY or name in OF_LEGS:
        return f"{name}({', '.join(_text(a, sympy) for a in node.args)})"
    expected = f"numbers, symbols, + * ** and the functions {', '.join((*OF_LEGS, *ELEMENTARY))}"
    raise FormulaError(str(node), (Finding(0, expected),))
