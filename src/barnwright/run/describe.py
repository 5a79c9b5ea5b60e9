"""What is installed, as documents: the list of processes, and one process in full."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import Any

from barnwright.documents import ByName
from barnwright.documents.description import ProcessDescription, ProcessSummary
from barnwright.errors import PluginError
from barnwright.process import Process
from barnwright.reaction import Reaction
from barnwright.registry import LoadedProcess, ProcessIdentity, catalogue
from barnwright.run import statements
from barnwright.run.choice import Choice
from barnwright.run.closing_cuts import closing_cuts
from barnwright.run.kinds import kinds_of, polarised_beams
from barnwright.run.ready_request import mass_in, ready_request
from barnwright.run.useful_observables import useful_observables


def summaries(
    particle: str | Sequence[str] | None = None, plugin: str | None = None, kind: str | None = None
) -> list[ProcessSummary]:
    """Every installed process by name, or those of a choice; one that cannot be loaded is listed with its cause.

    Raises
    ------
    RequestError
        For a particle, a plugin or a kind that does not exist, with the nearest that does.
    """
    entries = catalogue().entries()
    choice = Choice.of(particle, plugin, kind, (entry.plugin for entry in entries))
    asked = (entry for entry in entries if choice.plugin in ("", entry.plugin))
    found = (summary(entry.name, entry.distribution, entry.version) for entry in asked)
    return [one for one in found if choice.fits(one.model_dump())]


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
        laws=tuple(statements.laws(process)),
        parameters=ByName(statements.parameters(process)),
        masses=dict(_masses(process)),
        contributions=tuple(process.contributions),
        signed_contributions=tuple(statements.signed_contributions(process)),
        derived=tuple(_derived_text(entry) for entry in process.derived),
        singular=process.singular,
        closing_cuts=tuple(map(str, closing_cuts(process))),
        validity=process.valid.text if process.valid is not None else "",
        sqrt_s_min=low,
        sqrt_s_max=high,
        claims=tuple(statements.claims(process)),
        alternatives=ByName(statements.alternatives(process)),
        cautions=process.cautions,
        references=process.references,
        polarised_beams=polarised_beams(process),
        observables=useful_observables(process),
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
        "kinds": kinds_of(process),
    }


def _plugin(identity: ProcessIdentity) -> str:
    return identity.name.partition("/")[0]


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
