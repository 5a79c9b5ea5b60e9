"""What is installed, as documents: the list of processes, and one process in full."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

from barnwright.documents import ByName
from barnwright.documents.description import ParameterDescription, ProcessDescription, ProcessSummary
from barnwright.errors import PluginError
from barnwright.process import Law, Process, facts_of
from barnwright.reaction import Reaction
from barnwright.registry import LoadedProcess, ProcessIdentity, catalogue
from barnwright.run.ready_request import mass_in, ready_request
from barnwright.run.useful_observables import useful_observables


def summaries() -> list[ProcessSummary]:
    """Every installed process by name; one that cannot be loaded is listed with its cause."""
    known = catalogue()
    return [summary(entry.name, entry.distribution, entry.version) for entry in known.entries()]


def describe(name: str) -> ProcessDescription:
    """All that a user needs to know of the process ``plugin/name``; masses and sqrt_s in GeV.

    Raises
    ------
    UnknownProcessError
        With the nearest name.
    PluginError
        When it is broken, with the cause.
    """
    loaded = catalogue().load(name)
    process = loaded.process
    low, high = process.valid.sqrt_s if process.valid is not None and process.valid.sqrt_s is not None else (None, None)
    return ProcessDescription.build(
        **_common(loaded),
        laws=tuple(_laws(process)),
        parameters=ByName(_parameters(process)),
        masses=dict(_masses(process)),
        contributions=tuple(process.contributions),
        derived=tuple(_derived_text(entry) for entry in process.derived),
        singular=process.singular,
        validity=process.valid.text if process.valid is not None else "",
        sqrt_s_min=low,
        sqrt_s_max=high,
        cautions=process.cautions,
        references=process.references,
        observables=useful_observables(process.legs),
        request=ready_request(name, process),
    )


def summary(name: str, distribution: str, version: str) -> ProcessSummary:
    """The short line of one installed process; where it cannot be loaded, with the cause."""
    try:
        loaded = catalogue().load(name)
    except PluginError as error:
        plugin = name.partition("/")[0]
        return ProcessSummary.build(
            name=name, plugin=plugin, distribution=distribution, version=version, broken=error.cause
        )
    return ProcessSummary.build(**_common(loaded))


def _common(loaded: LoadedProcess) -> dict[str, Any]:
    process, identity = loaded.process, loaded.identity
    return {
        "name": identity.name,
        "plugin": _plugin(identity),
        "distribution": identity.distribution,
        "version": identity.version,
        "reaction": process.legs.text,
        "summary": process.summary,
        "order": process.order,
    }


def _plugin(identity: ProcessIdentity) -> str:
    return identity.name.partition("/")[0]


def _laws(process: Process) -> Iterator[str]:
    """The kinds of laws, the cheapest first, each with the masses that must be 0 for it."""
    for form in process.closed_forms:
        yield f"closed form in {form.observable}{_massless(form.massless)}"
    for law in process.laws:
        yield f"{_kind(law)}{_massless(law.massless)}"


def _kind(law: Law) -> str:
    return law.kind.replace("_", " ")


def _massless(legs: tuple[str, ...]) -> str:
    return f" (for massless {', '.join(legs)})" if legs else ""


def _parameters(process: Process) -> Iterator[ParameterDescription]:
    for fact in facts_of(process.parameters):
        yield ParameterDescription.build(
            name=fact.name,
            type=fact.type,
            choices=fact.choices,
            unit=fact.unit,
            default=fact.default,
            meaning=fact.meaning,
            source=fact.source,
            required=fact.required,
        )


def _masses(process: Process) -> Iterator[tuple[str, float]]:
    """The mass in GeV of every particle of the reaction, as a request that says nothing about it gets it."""
    legs = process.legs
    for code in _codes(legs):
        yield legs.name_of(code), mass_in(process, code)


def _codes(legs: Reaction) -> Iterator[int]:
    yield from (-1 - index for index in range(len(legs.incoming)))
    if not legs.inclusive:
        yield from range(1, len(legs.outgoing) + 1)


def _derived_text(entry: Any) -> str:
    return ", ".join(f"{key} = {value}" for key, value in entry.items())
