"""The functions that laws are made of, and whether they can be called as their kind of law is."""

from __future__ import annotations

import inspect
from typing import Any

from barnwright.errors import show
from barnwright.process import (
    AngularCrossSection,
    ClosedForm,
    Expression,
    HelicityAmplitudes,
    Law,
    SquaredAmplitude,
    TotalCrossSection,
)
from barnwright.process.contributions import takes


def function_of(law: Law | ClosedForm) -> Any:
    """The plugin's own function; None for an expression, which has none."""
    if isinstance(law, SquaredAmplitude):
        return law.function
    if isinstance(law, HelicityAmplitudes):
        return law.amplitudes
    if isinstance(law, AngularCrossSection | TotalCrossSection):
        return law.cross_section
    return law.cumulative if isinstance(law, ClosedForm) else None


def arguments_of(law: Law | ClosedForm) -> tuple[str, ...]:
    """What a law of this kind is called with, besides ``parts``."""
    if isinstance(law, ClosedForm):
        return ("x", "point", "parameters")
    if isinstance(law, AngularCrossSection):
        return ("point", "cos_theta", "parameters")
    return ("point", "parameters") if isinstance(law, TotalCrossSection) else ("event", "parameters")


def name_of(law: Law | ClosedForm) -> str:
    """What a finding calls it: the name of its function."""
    return "expression" if isinstance(law, Expression) else named(function_of(law))


def named(function: Any) -> str:
    """The name of a function, or how another object is shown."""
    return getattr(function, "__name__", show(function))


def signature_finding(law: Law | ClosedForm, with_parts: bool) -> str | None:
    """What is wrong with the signature, if anything; a built-in function has none to look at."""
    if isinstance(law, Expression):
        return None
    function, names = function_of(law), arguments_of(law)
    keywords = {"parts": "parts"} if with_parts else {}
    if isinstance(law, HelicityAmplitudes) and takes(function, "helicities"):
        keywords["helicities"] = "helicities"
    wanted = f"({', '.join((*names, *keywords))})"
    if not callable(function):
        return f"expected a function {wanted}, got {show(function)}"
    try:
        signature = inspect.signature(function)
    except ValueError:
        return None
    try:
        signature.bind(*names, **keywords)
    except TypeError:
        return f"expected a function {wanted}, got {named(function)}{signature}"
    return None
