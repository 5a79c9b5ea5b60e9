"""A sympy expression as text of the formula language: symbols by name, ``dot``, ``invariant_mass`` and ``rest_mass`` as
functions of symbols that are named like legs."""

from __future__ import annotations

from typing import Any, NoReturn

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
    if node.is_number and not node.args:
        return _number(node, sympy)
    if node.is_Add or node.is_Mul:
        return "(" + (" + " if node.is_Add else " * ").join(_text(a, sympy) for a in node.args) + ")"
    if node.is_Pow:
        return f"({_text(node.base, sympy)})**({_text(node.exp, sympy)})"
    return _function(node, sympy)


def _number(node: Any, sympy: Any) -> str:
    words = {sympy.pi: "pi", sympy.E: "exp(1)"}
    if node in words:
        return words[node]
    if node.is_Rational:
        return f"({node.p}/{node.q})" if node.q != 1 else f"({node.p})"
    return f"({float(node)!r})" if node.is_Float else _refuse(node)


def _function(node: Any, sympy: Any) -> str:
    name = {"Abs": "abs"}.get(type(node).__name__, type(node).__name__)
    if name not in ELEMENTARY and name not in OF_LEGS:
        _refuse(node)
    return f"{name}({', '.join(_text(a, sympy) for a in node.args)})"


def _refuse(node: Any) -> NoReturn:
    expected = f"numbers, symbols, + * ** and the functions {', '.join((*OF_LEGS, *ELEMENTARY))}"
    raise FormulaError(str(node), (Finding(0, expected),))
