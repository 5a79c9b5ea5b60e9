"""Which of a process's laws answers: the cheapest that is valid for the masses, or the one that the request forces."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

from barnwright.documents import Request
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.masses import Inputs
from barnwright.process import Process


@dataclass(frozen=True, slots=True)
class Method:
    """The rule, and the numbers of the closed form and of the law that serve it."""

    rule: Literal["closed_form", "quadrature"]
    closed_form: int | None
    law: int | None


def resolve_method(process: Process, request: Request, inputs: Inputs, findings: Findings) -> Method | None:
    """The cheapest valid road: closed form, then squared amplitude; None and a finding where there is none."""
    closed_form = _first_valid(process, process.closed_forms, inputs.masses)
    law = _first_valid(process, process.laws, inputs.masses)
    forced = request.accuracy.method
    roads = [name for name, found in (("closed_form", closed_form), ("quadrature", law)) if found is not None]
    if forced == "monte_carlo":
        return None
    if forced is not None and forced not in roads:
        why = f"one of the methods that {process.name} has for these masses: {', '.join(roads) or 'none'}"
        findings.add("accuracy.method", forced, why, roads[0] if roads else None)
        return None
    if not roads:
        findings.add("masses", dict(request.masses), f"masses for which {process.name} has a valid law")
        return None
    chosen: Literal["closed_form", "quadrature"] = (
        "closed_form" if (forced or roads[0]) == "closed_form" else "quadrature"
    )
    return Method(chosen, closed_form if chosen == "closed_form" else None, law)


def _first_valid(process: Process, laws: tuple[object, ...], masses: Mapping[int, float]) -> int | None:
    """The first law none of whose massless legs has a mass."""
    for number, law in enumerate(laws):
        names: tuple[str, ...] = getattr(law, "massless", ())
        if all(masses[code] == 0 for name in names for code in process.codes_of(name)):
            return number
    return None


def resolve_peaks(process: Process, inputs: Inputs) -> tuple[tuple[str, float], ...]:
    """Declared peaks in t and u with the masses in GeV of what is exchanged."""
    return tuple((p.of, _mass(p.at, process, inputs)) for p in process.peaks if p.of in ("t", "u"))


def _mass(at: str | float | None, process: Process, inputs: Inputs) -> float:
    if at is None:
        return 0.0
    if isinstance(at, str):
        if at in inputs.parameters:
            return float(inputs.parameters[at])
        return inputs.masses[process.codes_of(at)[0]]
    return float(at)
