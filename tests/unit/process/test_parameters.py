"""Parameters: declared with unit, meaning and source; refused when unknown or of the wrong type."""

from __future__ import annotations

from typing import Any, Literal

import pytest
from pydantic import ValidationError

from barnwright.errors import RequestError
from barnwright.process import Parameters, facts_of, parameter, parameters_model


class Inputs(Parameters):
    """One parameter of each type."""

    mass: float = parameter(91.1876, unit="GeV", meaning="Z mass", source="PDG 2024")
    width: float = parameter(unit="GeV", meaning="Z width")
    flavours: int = parameter(5)
    running: bool = parameter(True)
    scheme: Literal["alpha", "fermi"] = parameter("alpha", meaning="which numbers are inputs")


def test_facts_are_what_was_declared() -> None:
    """Name, type, words, unit, default, meaning, source and whether a request must give it."""
    facts = {fact.name: fact for fact in facts_of(Inputs)}
    mass, width, scheme = facts["mass"], facts["width"], facts["scheme"]
    assert (mass.type, mass.unit, mass.default, mass.meaning, mass.source) == (
        "float",
        "GeV",
        91.1876,
        "Z mass",
        "PDG 2024",
    )
    assert (width.required, width.default) == (True, None)
    assert (scheme.type, scheme.choices) == ("word", ("alpha", "fermi"))
    assert [facts[name].type for name in ("flavours", "running")] == ["int", "bool"]


def test_an_undeclared_type_is_named() -> None:
    """A parameter that the wire cannot carry is refused with its name."""

    class Wrong(Parameters):
        """A list."""

        masses: list[float] = parameter([1.0])

    with pytest.raises(TypeError, match=r"parameter masses is a list.*expected float, int, bool or Literal of words"):
        facts_of(Wrong)


@pytest.mark.parametrize(
    "values",
    [
        {},
        {"width": "2.5"},
        {"width": float("nan")},
        {"width": float("inf")},
        {"width": 2.5, "flavours": 4.5},
        {"width": 2.5, "running": 1},
        {"width": 2.5, "scheme": "mass"},
        {"width": 2.5, "colour": 3},
    ],
)
def test_wrong_values_are_refused(values: dict[str, Any]) -> None:
    """A missing, unknown, infinite or wrongly typed value does not become a parameter."""
    with pytest.raises(ValidationError, match="1 validation error for Inputs"):
        Inputs.model_validate(values)


def test_a_whole_number_is_a_float() -> None:
    """TOML's 2 is accepted where 2.0 is meant, and parameters cannot be changed afterwards."""
    inputs = Inputs(width=2)
    assert inputs.width == 2.0
    assert isinstance(inputs.width, float)
    with pytest.raises(ValidationError, match="Instance is frozen"):
        inputs.width = 3.0


def test_a_formula_makes_a_model() -> None:
    """Names and defaults of a formula become float parameters, also where a name means something to pydantic."""
    model = parameters_model({"alpha": 0.1, "copy": 2.0, "lambda": 3.0})
    assert model().model_dump() == {"alpha": 0.1, "copy": 2.0, "lambda": 3.0}
    assert [fact.source for fact in facts_of(model)] == ["formula"] * 3


@pytest.mark.parametrize("name", ["_hidden", "model_config"])
def test_a_formula_cannot_use_every_name(name: str) -> None:
    """Names that a model cannot have are findings about the formula."""
    with pytest.raises(
        RequestError, match=f"formula.parameters.{name}: got '{name}', expected a name that begins with"
    ):
        parameters_model({name: 1.0})
