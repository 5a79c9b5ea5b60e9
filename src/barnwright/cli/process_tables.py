"""Lists and descriptions of processes for people."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from typing import TYPE_CHECKING, Any

from rich.console import Group, RenderableType
from rich.table import Table
from rich.text import Text

from barnwright.cli.tables import bullets, pairs, titled
from barnwright.observables import compile_observable
from barnwright.reaction import parse_reaction

if TYPE_CHECKING:
    from barnwright.documents.description import ParameterDescription, ProcessDescription, ProcessSummary

CAUTION = (
    "Predictions hold at the stated order and range of validity; work that can hurt someone follows local rules and "
    "a qualified radiation-protection expert."
)


def summaries_view(summaries: Sequence[ProcessSummary], choice: Mapping[str, Any] | None = None) -> RenderableType:
    """The list of processes, and below it the broken ones with their causes; ``choice`` is what was asked for."""
    healthy = [entry for entry in summaries if entry.broken is None]
    broken = [entry for entry in summaries if entry.broken is not None]
    parts: list[RenderableType] = []
    if healthy:
        table = titled("", ("process", "reaction", "order", "summary"), numbers=False)
        for entry in healthy:
            table.add_row(*(Text(text or "") for text in (entry.name, entry.reaction, entry.order, entry.summary)))
        parts.append(table)
    if broken:
        table = titled("broken", ("process", "from", "cause"), numbers=False)
        for entry in broken:
            table.add_row(*map(Text, (entry.name, f"{entry.distribution} {entry.version}", entry.broken or "")))
        parts.append(table)
    if choice and not healthy:
        parts.insert(0, Text(f"no process fits: {_written(choice)}"))
    return Group(*parts) if parts else Text("no process is installed: install a plugin, such as barnwright-qed")


def _written(choice: Mapping[str, Any]) -> str:
    """``particle mu- and gamma, kind total``."""
    values = {name: value if isinstance(value, str) else " and ".join(value) for name, value in choice.items()}
    return ", ".join(f"{name} {value}" for name, value in values.items())


def description_view(description: ProcessDescription) -> RenderableType:
    """One process in full, the ready request last so that it can be copied."""
    return Group(*_description(description))


def _description(description: ProcessDescription) -> Iterator[RenderableType]:
    yield Text(description.name, style="bold")
    yield pairs(_facts(description))
    yield Text("")
    if description.parameters:
        yield _parameters(description.parameters)
    if description.masses:
        yield _masses(description.masses, (description.reaction or "").split())
    lists: dict[str, Iterable[str]] = {
        "singular regions, and a cut that closes each where the masses leave it open": description.closing_cuts,
        "observables": tuple(_with_unit(text, description.reaction) for text in description.observables),
        "derived quantities": description.derived,
        "claims": description.claims,
        "alternatives (named sets of parameters)": tuple(map(str, description.alternatives)),
        "cautions": _cautions(description.cautions),
        "references": description.references,
    }
    for title, entries in lists.items():
        if entries:
            yield bullets(title, entries)
    yield Text(description.request.rstrip())


def _facts(description: ProcessDescription) -> Iterator[tuple[str, str]]:
    yield "reaction", description.reaction or ""
    yield "summary", description.summary or ""
    yield "order", description.order or ""
    yield "from", f"{description.distribution} {description.version}"
    yield "kinds", ", ".join(description.kinds)
    yield "laws", ", ".join(description.laws)
    yield "polarised", _polarised(description.polarised_beams)
    if description.contributions:
        signed = description.signed_contributions
        names = (f"{name} (may be negative)" if name in signed else name for name in description.contributions)
        yield "contributions", ", ".join(names)
    yield "singular", ", ".join(description.singular) or "nowhere"
    yield "validity", validity_text(description)


def _polarised(beams: tuple[str, ...]) -> str:
    """Which beams may be, and what their sign means."""
    if not beams:
        return "no beam: the laws have no helicities"
    return f"{', '.join(beams)}; +1 is positive helicity in the cm, for a target at rest its spin along -z"


def _cautions(own: tuple[str, ...]) -> tuple[str, ...]:
    """The process's own cautions, and the general one unless it says so itself."""
    return own if any("radiation-protection expert" in caution for caution in own) else (*own, CAUTION)


def _with_unit(observable: str, reaction: str | None) -> str:
    unit = compile_observable(observable, parse_reaction(reaction)).unit if reaction else ""
    return f"{observable} [{unit}]" if unit else observable


def validity_text(description: ProcessDescription) -> str:
    """The range of sqrt(s) in GeV and the sentence that goes with it."""
    limits = (("from", description.sqrt_s_min), ("up to", description.sqrt_s_max))
    span = " ".join(f"{word} {limit:g} GeV" for word, limit in limits if limit is not None)
    return "; ".join(text for text in (f"sqrt_s {span}" if span else "", description.validity) if text) or "not stated"


def _parameters(parameters: Iterable[ParameterDescription]) -> Table:
    table = titled("parameters", ("name", "default", "unit", "meaning", "source"), numbers=False)
    for entry in parameters:
        default = "required" if entry.required else str(entry.default)
        meaning = entry.meaning + (f" (one of {', '.join(entry.choices)})" if entry.choices else "")
        if entry.used_with:
            meaning += f"; used with {' and '.join(map(str, entry.used_with))}"
        table.add_row(*map(Text, (entry.name, default, entry.unit, meaning, entry.source)))
    return table


def _masses(masses: dict[str, float], legs: list[str]) -> Table:
    """In the order in which the legs stand in the reaction."""
    table = titled("masses", ("leg", "GeV"), numbers=False)
    for name in sorted(masses, key=lambda name: (legs.index(name) if name in legs else len(legs), name)):
        table.add_row(Text(name), Text(f"{masses[name]:.10g}"))
    return table
