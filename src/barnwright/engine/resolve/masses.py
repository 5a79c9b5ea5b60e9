"""Parameters and masses of a request: defaults, what the request sets, and the masses that are tied to a parameter."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from pydantic import ValidationError

from barnwright.documents import violations_of
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.setting import ParameterValue
from barnwright.errors import Violation, nearest
from barnwright.particles import find
from barnwright.process import ParameterFacts, Parameters, Process, facts_of


@dataclass(frozen=True, slots=True)
class Inputs:
    """Resolved parameters that the laws read, and the mass in GeV of every leg by code with where it came from."""

    parameters: dict[str, ParameterValue]
    masses: dict[int, float]
    sources: dict[int, str]


def resolve_inputs(
    process: Process,
    parameters: Mapping[str, ParameterValue],
    masses: Mapping[str, float],
    findings: Findings,
    inherited: frozenset[str] = frozenset(),
) -> Inputs | None:
    """Parameters and masses, or None and findings.

    ``inherited`` are parameters that a variation has from the request it varies: they may be idle in it.

    A mass belongs to a species: setting that of mu- sets that of mu+. Where the process ties a mass to a parameter,
    the two are names of one number.
    """
    wanted, own = _sorted_masses(process, parameters, masses, findings)
    model = _validated(process, wanted, findings)
    if model is None:
        return None
    values: dict[str, ParameterValue] = model.model_dump()
    facts = facts_of(process.parameters)
    _check_use(facts, {name: value for name, value in wanted.items() if name not in inherited}, values, findings)
    used = {fact.name: values[fact.name] for fact in facts if fact.required or fact.is_used(values)}
    return Inputs(used, *_all_masses(process, values, own))


def _sorted_masses(
    process: Process, parameters: Mapping[str, ParameterValue], masses: Mapping[str, float], findings: Findings
) -> tuple[dict[str, ParameterValue], dict[int, float]]:
    """The parameters with those that masses are other names of, and the other masses by leg."""
    wanted = dict(parameters)
    own: dict[int, float] = {}
    for name, mass in masses.items():
        try:
            codes = process.codes_of(name)
        except LookupError:
            names = tuple(dict.fromkeys((*process.legs.incoming, *process.legs.outgoing)))
            findings.add(
                f"masses.{name}", mass, f"a particle of the reaction: {', '.join(names)}", nearest(name, names)
            )
            continue
        tied = _tied(process, codes[0])
        if tied is None:
            if own.get(codes[0], mass) != mass:
                expected = f"one mass for a species; {own[codes[0]]!r} is given under another name"
                findings.add(f"masses.{name}", mass, expected, f"{own[codes[0]]!r}")
            own.update(dict.fromkeys(codes, mass))
        elif tied in parameters and parameters[tied] != mass:
            expected = f"the value of parameters.{tied}, {parameters[tied]!r}: the two are one number"
            findings.add(f"masses.{name}", mass, expected, f"{parameters[tied]!r}")
        else:
            wanted[tied] = mass
    return wanted, own


def _check_use(
    facts: tuple[ParameterFacts, ...],
    wanted: Mapping[str, ParameterValue],
    values: Mapping[str, ParameterValue],
    findings: Findings,
) -> None:
    """Refuse a parameter that another one makes idle."""
    for fact in facts:
        if fact.name not in wanted or fact.is_used(values):
            continue
        name, allowed = next((key, words) for key, words in fact.used_with if values.get(key) not in words)
        words = " or ".join(f"{word!r}" for word in allowed)
        expected = f"nothing: with {name} = {values.get(name)!r} no law reads it; it is used with {name} = {words}"
        findings.add(f"parameters.{fact.name}", wanted[fact.name], expected, f"{name} = {allowed[0]!r}")


def _tied(process: Process, code: int) -> str | None:
    """The parameter that a leg's mass is tied to."""
    declared = process.mass_of(code)
    return declared if isinstance(declared, str) else None


def _validated(process: Process, wanted: Mapping[str, ParameterValue], findings: Findings) -> Parameters | None:
    known = process.parameters.model_fields
    accepted: dict[str, ParameterValue] = {}
    for name, value in wanted.items():
        if name in known:
            accepted[name] = value
        elif known:
            expected = f"a parameter of {process.name}: {', '.join(known)}"
            findings.add(f"parameters.{name}", value, expected, nearest(name, known))
        else:
            findings.add(f"parameters.{name}", value, f"nothing: {process.name} has no parameters")
    try:
        return process.parameters.model_validate(accepted)
    except ValidationError as error:
        for violation in violations_of(error, process.parameters):
            where = f"parameters.{violation.field}"
            findings.violations.append(
                Violation(where, violation.value, violation.expected, violation.nearest, violation.position)
            )
        return None


def _all_masses(
    process: Process, values: Mapping[str, ParameterValue], own: Mapping[int, float]
) -> tuple[dict[int, float], dict[int, str]]:
    masses, sources = {}, {}
    reaction = process.legs
    outgoing = () if reaction.inclusive else reaction.outgoing
    names = {**{-1 - i: p for i, p in enumerate(reaction.incoming)}, **dict(enumerate(outgoing, 1))}
    for code, particle in names.items():
        declared = process.mass_of(code)
        if code in own:
            masses[code], sources[code] = own[code], "request"
        elif isinstance(declared, str):
            masses[code], sources[code] = float(values[declared]), f"parameter {declared}"
        elif declared is not None:
            masses[code], sources[code] = float(declared), "default of the process"
        else:
            masses[code], sources[code] = find(particle).mass, "particle table"
    return masses, sources
