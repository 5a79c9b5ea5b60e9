"""What a process declares, checked when it is made: all findings at once, each with its field.

Rules of this file
------------------
- Only what can be seen without calling a law: names, legs, parameters, types. Laws are tried when a plugin is loaded.
"""

from __future__ import annotations

import math
import re
from collections.abc import Iterator
from typing import TYPE_CHECKING, Any

from pydantic import ValidationError

from ..errors import PluginError, Violation, nearest, show
from ..observables import ObservableError, compile_observable
from ..peaks import Peak
from ..reaction import Reaction, ReactionError, parse_reaction
from .claims import Claims
from .closed_form import ClosedForm
from .laws import Expression, SquaredAmplitude
from .parameters import Parameters, facts_of
from .species import codes_of, leg_choices
from .validity import Validity

if TYPE_CHECKING:
    from .process import Process

NAME = re.compile(r"[a-z0-9]+(-[a-z0-9]+)*")
_SINGULAR = re.compile(r"t|u|(soft|collinear)\((.+)\)")
_TUPLES: dict[str, tuple[type[Any] | tuple[type[Any], ...], str]] = {
    "laws": ((SquaredAmplitude, Expression), "SquaredAmplitude and Expression"),
    "closed_forms": (ClosedForm, "ClosedForm"),
    "peaks": (Peak, "Peak"),
    "references": (str, "text"),
    "cautions": (str, "text"),
    "singular": (str, "text"),
    "derived": (dict, "tables"),
}
_OPTIONAL: dict[str, type[Any]] = {"valid": Validity, "claims": Claims}


def checked_reaction(process: Process) -> Reaction:
    """The reaction of a process whose declaration holds together.

    Raises
    ------
    PluginError
        Naming the process, and every field that is wrong.
    """
    try:
        reaction = parse_reaction(process.reaction)
    except ReactionError as error:
        found = Violation("reaction", show(process.reaction), error.expected, error.nearest, error.position)
        raise _refusal(process, [found]) from None
    findings = list(_types(process)) or [
        *_physics(process, reaction),
        *_legs(process, reaction),
        *_parameter_sets(process),
    ]
    if findings:
        raise _refusal(process, findings)
    return reaction


def _refusal(process: Process, findings: list[Violation]) -> PluginError:
    return PluginError(plugin="", process=str(process.name), cause="\n".join(map(str, findings)))


def _types(process: Process) -> Iterator[Violation]:
    """Fields of the wrong Python type; the other checks count on these."""
    if not (isinstance(process.name, str) and NAME.fullmatch(process.name)):
        yield Violation("name", show(process.name), "lower case words and digits joined by hyphens")
    for name, (kinds, what) in _TUPLES.items():
        value = getattr(process, name)
        if not (isinstance(value, tuple) and all(isinstance(entry, kinds) for entry in value)):
            yield Violation(name, show(value), f"a tuple of {what}")
    for name, kind in _OPTIONAL.items():
        value = getattr(process, name)
        if not (value is None or isinstance(value, kind)):
            yield Violation(name, show(value), f"{kind.__name__}(...) or None")
    if not (isinstance(process.parameters, type) and issubclass(process.parameters, Parameters)):
        yield Violation("parameters", show(process.parameters), "a subclass of Parameters")
    else:
        yield from _parameter_types(process.parameters)


def _parameter_types(model: type[Parameters]) -> Iterator[Violation]:
    try:
        facts_of(model)
    except TypeError as error:
        yield Violation("parameters", show(model.__name__), str(error))


def _physics(process: Process, reaction: Reaction) -> Iterator[Violation]:
    if not (process.laws or process.closed_forms):
        yield Violation("laws", "none", "at least one law or closed form")
    if process.valid is not None and process.valid.sqrt_s is not None:
        low, high = process.valid.sqrt_s
        if not 0 <= low < high:
            yield Violation("valid.sqrt_s", show(process.valid.sqrt_s), "(low, high) in GeV with 0 <= low < high")
    for index, form in enumerate(process.closed_forms):
        try:
            compile_observable(form.observable, reaction)
        except ObservableError as error:
            yield from error.violations(f"closed_forms[{index}].observable")
    for index, entry in enumerate(process.singular):
        match = _SINGULAR.fullmatch(entry)
        if match is None:
            yield Violation(f"singular[{index}]", show(entry), "t, u, soft(leg) or collinear(leg, leg)")
        else:
            for leg in (match[2] or "").split(",") if match[2] else ():
                yield from _leg(f"singular[{index}]", leg.strip(), reaction)


def _legs(process: Process, reaction: Reaction) -> Iterator[Violation]:
    """Legs and parameters that masses, laws, peaks and claims speak of."""
    for leg, mass in process.masses.items():
        yield from _leg(f"masses.{leg}", leg, reaction)
        yield from _mass(f"masses.{leg}", mass, process)
    for field in ("laws", "closed_forms"):
        for index, law in enumerate(getattr(process, field)):
            for leg in law.massless:
                yield from _leg(f"{field}[{index}].massless", leg, reaction)
    for index, peak in enumerate(process.peaks):
        if isinstance(peak.at, str) and peak.at not in process.parameters.model_fields:
            yield from _leg(f"peaks[{index}].at", peak.at, reaction, tuple(process.parameters.model_fields))
        if isinstance(peak.width, str):
            yield from _mass(f"peaks[{index}].width", peak.width, process)
    if process.claims is not None:
        for first, second in process.claims.exchange:
            yield from _leg("claims.exchange", first, reaction)
            yield from _leg("claims.exchange", second, reaction)
        for leg in process.claims.gauge_legs:
            yield from _leg("claims.gauge_legs", leg, reaction)


def _leg(field: str, leg: str | int, reaction: Reaction, also: tuple[str, ...] = ()) -> Iterator[Violation]:
    try:
        codes_of(reaction, leg)
    except LookupError:
        choices = (*also, *leg_choices(reaction))
        yield Violation(field, show(leg), f"one of {', '.join(choices)}", nearest(str(leg), choices))


def _mass(field: str, mass: float | str, process: Process) -> Iterator[Violation]:
    """A number of GeV, or the name of a float parameter."""
    floats = [fact.name for fact in facts_of(process.parameters) if fact.type == "float"]
    if isinstance(mass, str):
        if mass not in floats:
            yield Violation(
                field, show(mass), f"a float parameter: {', '.join(floats) or 'there is none'}", nearest(mass, floats)
            )
    elif not (math.isfinite(mass) and mass >= 0):
        yield Violation(field, show(mass), "a finite number of at least 0 (GeV), or the name of a parameter")


def _parameter_sets(process: Process) -> Iterator[Violation]:
    """Sets of parameter values that the process hands out itself; without an example the defaults must do."""
    sets = {f"alternatives.{name}": {**process.example, **values} for name, values in process.alternatives.items()}
    for field, values in {"example": process.example, **sets}.items():
        try:
            process.parameters.model_validate(dict(values))
        except ValidationError as error:
            for details in error.errors(include_url=False):
                name = ".".join(map(str, details["loc"]))
                missing = details["type"] == "missing"
                value = "nothing" if missing else show(details["input"])
                expected = "a value for the load checks" if missing else f"a parameter value ({details['msg']})"
                yield Violation(f"{field}.{name}", value, expected)
