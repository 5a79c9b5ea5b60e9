"""Sums of processes: what they must agree on, and what of a request goes to which of them."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import replace
from typing import Any

from barnwright.documents import Request
from barnwright.engine.plan import Member, Note, Share
from barnwright.engine.resolve.findings import Findings
from barnwright.errors import Violation, nearest
from barnwright.process import Process
from barnwright.process.species import leg_choices


def check_agreement(request: Request, processes: Sequence[Process], findings: Findings) -> None:
    """Refuse other beams than those of the first process, and parameters and masses that none of them knows."""
    first = processes[0].legs
    for index, process in enumerate(processes[1:], 1):
        if process.legs.incoming != first.incoming:
            expected = f"a process with the beams of the first, {' '.join(first.incoming)}"
            findings.add(f"processes[{index}]", f"{process.name} ({process.legs.text})", expected)
    parameters = {name for process in processes for name in process.parameters.model_fields}
    _check_tables(request, "parameters", parameters, findings)
    legs = {name for process in processes for name in leg_choices(process.legs)}
    asked = {name for _, table in _tables(request, "masses") for name in table}
    _check_tables(request, "masses", legs | {n for n in asked if any(_has_leg(p, n) for p in processes)}, findings)


def _check_tables(request: Request, field: str, known: set[str], findings: Findings) -> None:
    """Refuse names of the request and of its variations that no process knows."""
    for where, table in _tables(request, field):
        for name, value in table.items():
            if name not in known:
                expected = f"a name that one of the processes knows: {', '.join(sorted(known))}"
                findings.add(f"{where}.{name}", value, expected, nearest(name, known))


def narrowed(request: Request, process: Process) -> Request:
    """The request as one member of a sum sees it: without the parameters and masses that only others know."""

    def own(table: Mapping[str, Any], knows: Callable[[str], bool]) -> dict[str, Any]:
        return {name: value for name, value in table.items() if knows(name)}

    def changed(document: Any) -> Any:
        tables = {
            "parameters": own(document.parameters, lambda name: name in process.parameters.model_fields),
            "masses": own(document.masses, lambda name: _has_leg(process, name)),
        }
        return document.model_copy(update=tables)

    one: Request = changed(request)
    return one.model_copy(update={"variations": tuple(changed(variation) for variation in request.variations)})


def united(found: Sequence[tuple[str, Findings]], findings: Findings) -> None:
    """Findings of all members: what all of them say once, what only some say with their names."""
    every: dict[str, tuple[Violation, list[str]]] = {}
    for name, own in found:
        for violation in own.violations:
            every.setdefault(str(violation), (violation, []))[1].append(name)
    for violation, names in every.values():
        if len(names) < len(found):
            violation = Violation(  # noqa: PLW2901
                violation.field,
                violation.value,
                f"{violation.expected} (in {', '.join(names)})",
                violation.nearest,
                violation.position,
            )
        findings.violations.append(violation)


Resolved = tuple[Member, tuple[Share, ...]]


def with_notes(found: Sequence[Resolved], processes: Sequence[Process]) -> list[Resolved | None]:
    """The members, each with a note where an earlier one has the same reaction: amplitudes are not added, or twice."""
    noted: list[Resolved | None] = []
    for index, (member, shares) in enumerate(found):
        earlier = [p.name for p in processes[:index] if p.legs.text == processes[index].legs.text]
        if earlier:
            text = (
                f"same reaction as {', '.join(earlier)}: cross sections are added, what both contain is counted twice"
            )
            shares = tuple(replace(share, notes=(*share.notes, Note("same_reaction", text))) for share in shares)  # noqa: PLW2901
        noted.append((member, shares))
    return noted


def alike(found: Sequence[Resolved]) -> list[Resolved]:
    """The members with one list of contributions: that of all of them, or none where they differ."""
    names = {tuple(name for name, _ in share.settings[0].parts) for _, shares in found for share in shares}
    if len(names) == 1:
        return list(found)
    whole = [tuple(_without_contributions(share) for share in shares) for _, shares in found]
    return [(member, shares) for (member, _), shares in zip(found, whole, strict=True)]


def _without_contributions(share: Share) -> Share:
    return replace(share, settings=tuple(replace(one, parts=one.parts[:1]) for one in share.settings))


def _tables(request: Request, name: str) -> Iterable[tuple[str, Mapping[str, Any]]]:
    yield name, getattr(request, name)
    for index, variation in enumerate(request.variations):
        yield f"variations[{index}].{name}", getattr(variation, name)


def _has_leg(process: Process, name: str) -> bool:
    try:
        process.codes_of(name)
    except LookupError:
        return False
    return True
