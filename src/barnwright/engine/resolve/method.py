"""Which of a process's laws answers: the cheapest that can, or the one that the request forces.

Rules of this file
------------------
- A law can answer when its massless legs are massless, when it has helicities for beams that are polarised, and when
  it has an angular distribution for questions about the final state.
- The cheapest first: closed form or total law, then |M|² and dσ/dΩ, then helicity amplitudes; among equals in the
  order of the process.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import Literal

from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.masses import Inputs
from barnwright.process import ClosedForm, HelicityAmplitudes, Law, Process, TotalCrossSection

Rule = Literal["closed_form", "quadrature"]


@dataclass(frozen=True, slots=True)
class Method:
    """The rule, and the numbers of the closed form and of the law that serve it."""

    rule: Rule
    closed_form: int | None
    law: int | None


@dataclass(frozen=True, slots=True)
class Demand:
    """What a law must be able to do.

    Attributes
    ----------
    forced : word or None
        The method that the request asks for.
    polarised : fields and values of the beams that are polarised
    final_state : fields and texts of the questions about the final state
    """

    forced: str | None
    polarised: Mapping[str, float]
    final_state: Mapping[str, str]


def resolve_method(process: Process, demand: Demand, inputs: Inputs, findings: Findings) -> Method | None:
    """The cheapest valid road; None and a finding where there is none."""
    roads = dict(_roads(process, demand, inputs.masses))
    if demand.forced == "monte_carlo":
        return None
    if not roads:
        _refuse(process, demand, inputs, findings)
        return None
    if demand.forced is not None and demand.forced not in roads:
        expected = f"one of the methods that {process.name} has for this request: {', '.join(roads)}"
        findings.add("accuracy.method", demand.forced, expected, next(iter(roads)))
        return None
    return roads[demand.forced] if demand.forced is not None else next(iter(roads.values()))


def _roads(process: Process, demand: Demand, masses: Mapping[int, float]) -> Iterator[tuple[str, Method]]:
    """The methods that can answer, the cheapest first."""
    form = _first_valid(process, list(enumerate(process.closed_forms)), masses)
    total = _first_valid(process, [(k, law) for k, law in enumerate(process.laws) if _is_total(law)], masses)
    law = _first_valid(process, _differential(process, demand), masses)
    if not demand.polarised:
        if form is not None:
            yield "closed_form", Method("closed_form", form, law)
        elif total is not None and not demand.final_state:
            yield "closed_form", Method("closed_form", None, total)
    if law is not None:
        yield "quadrature", Method("quadrature", None, law)


def _is_total(law: Law) -> bool:
    return isinstance(law, TotalCrossSection)


def _differential(process: Process, demand: Demand) -> list[tuple[int, Law]]:
    """The laws with an angular distribution, and their numbers: those without helicities where one of them will do."""
    laws = [(number, law) for number, law in enumerate(process.laws) if not _is_total(law)]
    helicity = [entry for entry in laws if isinstance(entry[1], HelicityAmplitudes)]
    return helicity if demand.polarised else [*(entry for entry in laws if entry not in helicity), *helicity]


def _first_valid(
    process: Process, laws: Sequence[tuple[int, Law | ClosedForm]], masses: Mapping[int, float]
) -> int | None:
    """The number of the first law none of whose massless legs has a mass."""
    for number, law in laws:
        if all(masses[code] == 0 for name in law.massless for code in process.codes_of(name)):
            return number
    return None


def _refuse(process: Process, demand: Demand, inputs: Inputs, findings: Findings) -> None:
    """Say what no law of the process can do."""
    if demand.final_state and all(map(_is_total, process.laws)) and not process.closed_forms:
        for where, text in demand.final_state.items():
            expected = f"nothing about the final state: {process.name} is a total cross section; sqrt_s can be asked"
            findings.add(where, text, expected, "sqrt_s")
        return
    if demand.polarised and not any(isinstance(law, HelicityAmplitudes) for law in process.laws):
        for where, value in demand.polarised.items():
            laws = "a formula has" if process.name == "formula" else f"the laws of {process.name} have"
            expected = f"0: {laws} no helicities, so its beams are unpolarised"
            findings.add(where, value, expected, "0")
        return
    heavy = ", ".join(f"{process.legs.name_of(code)} {mass:g} GeV" for code, mass in inputs.masses.items() if mass)
    why = " and polarised beams" if demand.polarised else ""
    findings.add("masses", heavy or "all 0", f"masses for which {process.name} has a law{why}: {_conditions(process)}")


def _conditions(process: Process) -> str:
    """For which masses each law holds."""
    texts = (
        f"{law.kind.replace('_', ' ')} with {', '.join(law.massless) or 'any masses'}{' massless' * bool(law.massless)}"
        for law in process.laws
    )
    return "; ".join(texts)


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
