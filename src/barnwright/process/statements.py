"""What a declaration says about legs, masses, peaks, singularities and parameters, held against the reaction."""

from __future__ import annotations

import math
import re
from collections.abc import Iterator
from typing import TYPE_CHECKING

from barnwright.errors import Violation, nearest, show
from barnwright.formula import FormulaError
from barnwright.observables import ObservableError
from barnwright.process.claims import Claims
from barnwright.process.law_statements import law_findings
from barnwright.process.laws import Expression
from barnwright.process.parameter_statements import parameter_findings
from barnwright.process.parameters import facts_of
from barnwright.process.species import codes_of, leg_choices
from barnwright.reaction import LegError, Reaction

if TYPE_CHECKING:
    from barnwright.process.process import Process

_FULL_NAME = re.compile(r"[a-z0-9]+(-[a-z0-9]+)*/[a-z0-9]+(-[a-z0-9]+)*")
_SINGULAR = re.compile(r"[tu]|soft\((?P<soft>[^,]+)\)|collinear\((?P<first>[^,]+),(?P<second>[^,]+)\)")


def statement_findings(process: Process, reaction: Reaction) -> Iterator[Violation]:
    """Every statement that does not fit the reaction or the parameters; the types are right already."""
    if not (process.laws or process.closed_forms):
        yield Violation("laws", "none", "at least one law or closed form")
    yield from _validity(process)
    yield from law_findings(process, reaction)
    yield from _expressions(process, reaction)
    yield from _closed_forms(process, reaction)
    yield from _massless(process, reaction)
    yield from _masses(process, reaction)
    yield from _peaks(process, reaction)
    yield from _singular(process, reaction)
    if process.claims is not None:
        yield from _claims(process.claims, reaction)
    yield from parameter_findings(process)


def _validity(process: Process) -> Iterator[Violation]:
    if process.valid is not None and process.valid.sqrt_s is not None:
        low, high = process.valid.sqrt_s
        if not 0 <= low < high:
            yield Violation("valid.sqrt_s", show(process.valid.sqrt_s), "(low, high) in GeV with 0 <= low < high")


def _expressions(process: Process, reaction: Reaction) -> Iterator[Violation]:
    names = tuple(process.parameters.model_fields)
    for index, law in enumerate(process.laws):
        if isinstance(law, Expression):
            try:
                law.compile(reaction, names)
            except FormulaError as error:
                yield from error.violations(f"laws[{index}].squared_amplitude")


def _closed_forms(process: Process, reaction: Reaction) -> Iterator[Violation]:
    for index, form in enumerate(process.closed_forms):
        try:
            form.axis(reaction)
        except ObservableError as error:
            yield from error.violations(f"closed_forms[{index}].observable")


def _massless(process: Process, reaction: Reaction) -> Iterator[Violation]:
    for field, entries in (("laws", process.laws), ("closed_forms", process.closed_forms)):
        for index, entry in enumerate(entries):
            for leg in entry.massless:
                yield from _leg(f"{field}[{index}].massless", leg, reaction)


def _masses(process: Process, reaction: Reaction) -> Iterator[Violation]:
    for leg, mass in process.masses.items():
        yield from _leg(f"masses.{leg}", leg, reaction)
        yield from _size(f"masses.{leg}", mass, process)


def _peaks(process: Process, reaction: Reaction) -> Iterator[Violation]:
    parameters = tuple(process.parameters.model_fields)
    for index, peak in enumerate(process.peaks):
        for leg in peak.of.split() if peak.of not in ("t", "u") else ():
            yield from _leg(f"peaks[{index}].of", leg, reaction, ("t", "u"))
        if isinstance(peak.at, str) and peak.at not in parameters:
            yield from _leg(f"peaks[{index}].at", peak.at, reaction, parameters)
        if peak.width is not None:
            yield from _size(f"peaks[{index}].width", peak.width, process)


def _singular(process: Process, reaction: Reaction) -> Iterator[Violation]:
    if reaction.inclusive and process.singular:
        yield Violation("singular", show(process.singular), "nothing, since no cut can be made on a final state X")
    for index, entry in enumerate(process.singular if not reaction.inclusive else ()):
        match = _SINGULAR.fullmatch(entry)
        if match is None:
            yield Violation(f"singular[{index}]", show(entry), "t, u, soft(leg) or collinear(leg, leg)")
            continue
        for leg in filter(None, match.groups()):
            yield from _leg(f"singular[{index}]", leg.strip(), reaction)


def _claims(claims: Claims, reaction: Reaction) -> Iterator[Violation]:
    for pair in claims.exchange:
        if len(set(pair)) != 2:
            yield Violation("claims.exchange", show(pair), "two different legs")
    for name in claims.crossing:
        if not _FULL_NAME.fullmatch(name):
            yield Violation("claims.crossing", show(name), "the name of a process, plugin/name")
    named = [("claims.exchange", leg) for pair in claims.exchange for leg in pair]
    named += [("claims.gauge_legs", leg) for leg in claims.gauge_legs]
    for field, leg in named:
        try:
            reaction.leg(leg)
        except LegError as error:
            yield Violation(field, show(leg), error.expected, error.nearest)


def _leg(field: str, leg: str | int, reaction: Reaction, also: tuple[str, ...] = ()) -> Iterator[Violation]:
    try:
        codes_of(reaction, leg)
    except LookupError:
        choices = (*also, *leg_choices(reaction))
        yield Violation(field, show(leg), f"one of {', '.join(choices)}", nearest(str(leg), choices))


def _size(field: str, size: float | str, process: Process) -> Iterator[Violation]:
    """A number of GeV, or the name of a float parameter."""
    if isinstance(size, str):
        floats = [fact.name for fact in facts_of(process.parameters) if fact.type == "float"]
        if size not in floats:
            expected = f"a float parameter: {', '.join(floats) or 'there is none'}"
            yield Violation(field, show(size), expected, nearest(size, floats))
    elif not (math.isfinite(size) and size >= 0):
        yield Violation(field, show(size), "a finite number of at least 0 (GeV), or the name of a parameter")
