"""A formula request as a process: the same object that a plugin would offer, made from text."""

from __future__ import annotations

import hashlib
import json
from dataclasses import replace
from functools import lru_cache
from typing import Any

from barnwright.documents import Formula
from barnwright.engine.plan import ProcessSource
from barnwright.errors import RequestError, Violation, show
from barnwright.formula import FormulaError
from barnwright.peaks import Peak
from barnwright.process import DeclarationError, Expression, Parameters, Process, parameters_model
from barnwright.reaction import ReactionError, parse_reaction

NAME = "formula"


def formula_source(formula: Formula) -> ProcessSource:
    """The identity of a formula: its text."""
    values = formula.model_dump(mode="json")
    text = json.dumps(values, sort_keys=True, separators=(",", ":"))
    return ProcessSource(NAME, "", "", hashlib.sha256(text.encode()).hexdigest(), values)


def formula_process(values: dict[str, Any]) -> Process:
    """The process of a formula's plain values, as the plan carries them.

    Raises
    ------
    RequestError
        With every finding about reaction and text, and their positions.
    """
    return _made(json.dumps(values, sort_keys=True))


@lru_cache(maxsize=64)
def _made(text: str) -> Process:
    formula = Formula.model_validate_json(text)
    try:
        reaction = parse_reaction(formula.reaction)
    except ReactionError as error:
        found = Violation("formula.reaction", show(formula.reaction), error.expected, error.nearest, error.position)
        raise RequestError([found]) from None
    try:
        law = Expression(formula.squared_amplitude, spin_colour=formula.spin_colour)
        law.compile(reaction, tuple(formula.parameters))
    except FormulaError as error:
        raise RequestError(error.violations("formula.squared_amplitude")) from None
    try:
        return Process(
            name=NAME,
            reaction=formula.reaction,
            summary="a formula of the request",
            order="as given",
            laws=(law,),
            parameters=parameters_model(formula.parameters) if formula.parameters else Parameters,
            peaks=tuple(Peak(p.of, p.shape, p.at, p.width, p.power) for p in formula.peaks),
        )
    except DeclarationError as error:
        raise RequestError(replace(v, field=f"formula.{v.field}") for v in error.violations) from None
