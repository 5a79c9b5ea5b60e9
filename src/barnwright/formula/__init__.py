"""Formulas: |M|² as text or sympy, evaluated on batches; nothing is turned into code."""

from barnwright.formula.compile import compile_formula
from barnwright.formula.errors import FormulaError
from barnwright.formula.formula import Formula

__all__ = ["Formula", "FormulaError", "compile_formula"]
