"""What a process declares, checked when it is made: all findings at once, each with its field.

Rules of this file
------------------
- Only what can be seen without calling a law: names, types, legs, parameters. Laws are tried when a plugin is loaded.
- Fields of the wrong type are told first and alone, since every other check counts on the types.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Mapping
from typing import TYPE_CHECKING, Any

from barnwright.errors import PluginError, Violation, show
from barnwright.peaks import Peak
from barnwright.process.claims import Claims
from barnwright.process.closed_form import ClosedForm
from barnwright.process.cross_sections import AngularCrossSection, TotalCrossSection
from barnwright.process.helicity_amplitudes import HelicityAmplitudes
from barnwright.process.laws import Expression, SquaredAmplitude
from barnwright.process.parameters import Parameters, facts_of
from barnwright.process.statements import statement_findings
from barnwright.process.validity import Validity
from barnwright.reaction import Reaction, ReactionError, parse_reaction

if TYPE_CHECKING:
    from barnwright.process.process import Process

_NAME = re.compile(r"[a-z0-9]+(-[a-z0-9]+)*")
_TUPLES: dict[str, tuple[tuple[type[Any], ...], str]] = {
    "laws": (
        (SquaredAmplitude, HelicityAmplitudes, Expression, AngularCrossSection, TotalCrossSection),
        "SquaredAmplitude, HelicityAmplitudes, Expression, AngularCrossSection and TotalCrossSection",
    ),
    "closed_forms": ((ClosedForm,), "ClosedForm"),
    "peaks": ((Peak,), "Peak"),
    "references": ((str,), "text"),
    "cautions": ((str,), "text"),
    "singular": ((str,), "text"),
    "derived": ((Mapping,), "tables"),
}
_NUMBERS = (int, float, complex)
_OTHERS: dict[str, tuple[tuple[type[Any], ...], str]] = {
    "valid": ((Validity, type(None)), "Validity(...) or None"),
    "claims": ((Claims, type(None)), "Claims(...) or None"),
    "masses": ((Mapping,), "a table of masses by leg"),
    "contributions": ((Mapping,), "a table of keywords by name"),
    "alternatives": ((Mapping,), "a table of parameter sets by name"),
    "example": ((Mapping,), "a table of parameter values"),
    "needs": ((frozenset,), "a frozenset of names"),
}


class DeclarationError(PluginError):
    """A declaration that does not hold together; `violations` has every finding.

    Parameters
    ----------
    process
        The process's name.
    violations
        The findings, each with its field.
    """

    def __init__(self, process: str, violations: Iterable[Violation]) -> None:
        self.violations = tuple(violations)
        super().__init__("", process, "\n".join(map(str, self.violations)))
        self.args = (process, self.violations)


def checked_reaction(process: Process) -> Reaction:
    """The reaction of a process whose declaration holds together.

    Raises
    ------
    DeclarationError
        Naming the process, and every field that is wrong.
    """
    try:
        reaction = parse_reaction(process.reaction)
    except ReactionError as error:
        raise DeclarationError(str(process.name), error.violations("reaction")) from None
    findings = [*_types(process)] or [*statement_findings(process, reaction)]
    if findings:
        raise DeclarationError(str(process.name), findings)
    return reaction


def _types(process: Process) -> Iterator[Violation]:
    if not (isinstance(process.name, str) and _NAME.fullmatch(process.name)):
        yield Violation("name", show(process.name), "lower case words and digits joined by hyphens")
    for name, (kinds, what) in _TUPLES.items():
        value = getattr(process, name)
        if not (isinstance(value, tuple) and all(isinstance(entry, kinds) for entry in value)):
            yield Violation(name, show(value), f"a tuple of {what}")
    for name, (kinds, what) in _OTHERS.items():
        if not isinstance(getattr(process, name), kinds):
            yield Violation(name, show(getattr(process, name)), what)
    if isinstance(process.laws, tuple) and isinstance(process.closed_forms, tuple):
        yield from _law_types(process)
    yield from _table_types(process)
    yield from _parameter_types(process.parameters)


def _law_types(process: Process) -> Iterator[Violation]:
    for field in ("laws", "closed_forms"):
        for index, law in enumerate(getattr(process, field)):
            massless = getattr(law, "massless", ())
            if not isinstance(massless, tuple):
                yield Violation(f"{field}[{index}].massless", show(massless), "a tuple of legs")
            if isinstance(law, HelicityAmplitudes):
                yield from _helicity_types(f"{field}[{index}]", law)


def _helicity_types(field: str, law: HelicityAmplitudes) -> Iterator[Violation]:
    """Tuples of tuples, of whole numbers and of numbers: whatever else comes of them is looked at later."""
    helicities = () if law.helicities is None else law.helicities
    tables = (("helicities", helicities, (int,), "whole numbers"), ("colour", law.colour, _NUMBERS, "numbers"))
    for name, table, kinds, what in tables:
        rows = table if isinstance(table, tuple) else (None,)
        if not all(isinstance(row, tuple) and all(isinstance(entry, kinds) for entry in row) for row in rows):
            yield Violation(f"{field}.{name}", show(table), f"a tuple of tuples of {what}")


def _table_types(process: Process) -> Iterator[Violation]:
    """Contributions are texts by name, a claimed exchange is a pair."""
    if isinstance(process.contributions, Mapping):
        for name, keyword in process.contributions.items():
            if not (isinstance(name, str) and name and isinstance(keyword, str)):
                yield Violation(f"contributions.{name}", show(keyword), "a keyword, as text, by a name")
    if isinstance(process.claims, Claims):
        for pair in process.claims.exchange:
            if not (isinstance(pair, tuple) and len(pair) == 2):
                yield Violation("claims.exchange", show(process.claims.exchange), "a tuple of pairs of legs")
                return


def _parameter_types(model: Any) -> Iterator[Violation]:
    if not (isinstance(model, type) and issubclass(model, Parameters)):
        yield Violation("parameters", show(model), "a subclass of Parameters")
        return
    try:
        facts_of(model)
    except TypeError as error:
        yield Violation("parameters", model.__name__, str(error))
