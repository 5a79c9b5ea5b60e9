"""What a declaration says about its parameters: sets of values that it hands out, and when a parameter is used."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import TYPE_CHECKING

from pydantic import ValidationError

from barnwright.errors import Violation, nearest, show
from barnwright.process.parameters import ParameterFacts, ParameterValue, facts_of

if TYPE_CHECKING:
    from barnwright.process.process import Process


def parameter_findings(process: Process) -> Iterator[Violation]:
    """Every statement about parameters that does not hold; where the process gives no example, the defaults must do."""
    facts = {fact.name: fact for fact in facts_of(process.parameters)}
    for fact in facts.values():
        yield from _conditions(fact, facts)
    yield from _unfit("example", process.example, process)
    for name, values in process.alternatives.items():
        yield from _unfit(f"alternatives.{name}", {**process.example, **values}, process)


def _conditions(fact: ParameterFacts, facts: Mapping[str, ParameterFacts]) -> Iterator[Violation]:
    """``used_with`` names other parameters, and values that these can have."""
    field = f"parameters.{fact.name}.used_with"
    others = [name for name in facts if name != fact.name]
    for name, values in fact.used_with:
        if name not in others:
            expected = f"another parameter: {', '.join(others) or 'there is none'}"
            yield Violation(field, show(name), expected, nearest(name, others))
            continue
        if not values:
            yield Violation(f"{field}.{name}", "nothing", f"the values of {name} with which it is used")
        for value in values:
            if not _fits(value, facts[name]):
                choices = facts[name].choices
                expected = f"a value of {name}: {', '.join(choices) or f'a value of type {facts[name].type}'}"
                yield Violation(f"{field}.{name}", show(value), expected, nearest(str(value), choices))


def _fits(value: ParameterValue, fact: ParameterFacts) -> bool:
    if fact.type == "word":
        return value in fact.choices
    kinds: dict[str, tuple[type, ...]] = {"float": (float, int), "int": (int,), "bool": (bool,)}
    return isinstance(value, kinds[fact.type]) and isinstance(value, bool) == (fact.type == "bool")


def _unfit(field: str, values: Mapping[str, ParameterValue], process: Process) -> Iterator[Violation]:
    try:
        process.parameters_of(values)
    except ValidationError as error:
        for details in error.errors(include_url=False):
            name = ".".join(map(str, details["loc"]))
            if details["type"] == "missing":
                yield Violation(f"{field}.{name}", "nothing", "a value, since this parameter has no default")
            else:
                expected = f"a value of this parameter ({details['msg']})"
                yield Violation(f"{field}.{name}", show(details["input"]), expected)
