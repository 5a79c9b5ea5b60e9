"""A request for a process that runs as it stands: beams where it is valid, one histogram, the cuts it needs."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from typing import Any

from barnwright.documents import Request
from barnwright.engine import resolve
from barnwright.errors import RequestError
from barnwright.particles import find
from barnwright.process import Process, TotalCrossSection, facts_of
from barnwright.run.closing_cuts import ClosingCut, closing_cuts, polar_angle
from barnwright.run.objects import loaded_object

USUAL = 10.0
"""GeV; sqrt(s) of two beams where the process allows it."""
ABOVE = 2.0
"""sqrt(s) over the threshold where `USUAL` is outside the range of validity, and for a beam on a target."""


def ready_request(name: str, process: Process) -> str:
    """TOML text of a request for the process ``plugin/name``."""
    bare = _text(name, process, ())
    return bare if _stands(bare, process) else _text(name, process, closing_cuts(process))


def mass_in(process: Process, code: int) -> float:
    """The default mass of a leg in GeV: declared, the value of a parameter, or the particle table's."""
    declared = process.mass_of(code)
    if declared is None:
        return find(process.legs.name_of(code)).mass
    if isinstance(declared, str):
        return float(_default(process, declared))
    return float(declared)


def has_final_state(process: Process) -> bool:
    """Whether a request may ask about what comes out: not where all that the process has is σ(s)."""
    return bool(process.closed_forms) or not all(isinstance(law, TotalCrossSection) for law in process.laws)


def _stands(text: str, process: Process) -> bool:
    """Whether a request needs no cuts; asked of the engine, which knows whether a pole is reached at these masses."""
    if not process.singular:
        return True
    try:
        resolve(Request.from_toml(text), lambda _: loaded_object(process))
    except RequestError:
        return False
    return True


def _text(name: str, process: Process, cuts: Sequence[ClosingCut]) -> str:
    sections = [
        [
            "# a request to start from; energies and masses in GeV, angles in rad",
            f'process = "{name}"',
            *_contributions(process),
        ],
        ["[beams]", *_beams(process)],
        _parameters(process),
        *(_cut(cut) for cut in cuts),
        _histogram(process),
    ]
    return "\n\n".join("\n".join(section) for section in sections if section) + "\n"


def _contributions(process: Process) -> Iterator[str]:
    if process.contributions:
        names = ", ".join(f'"{name}"' for name in process.contributions)
        yield f"# contributions = [{names}]  # all, unless some are named"


def _default(process: Process, name: str) -> Any:
    defaults = {fact.name: fact.default for fact in facts_of(process.parameters)}
    return process.example.get(name, defaults[name]) if defaults[name] is None else defaults[name]


def _beams(process: Process) -> Iterator[str]:
    """A decay; a light beam on a target at rest; else two beams."""
    if len(process.legs.incoming) == 1:
        yield 'kind = "decay"'
        return
    target = _target(process)
    if target is None:
        yield 'kind = "collider"'
        yield f"sqrt_s = {_rounded(_sqrt_s(process, USUAL))}"
        return
    light, heavy = mass_in(process, -3 - target), mass_in(process, target)
    sqrt_s = _sqrt_s(process, 0.0)
    yield 'kind = "fixed_target"'
    yield f"energy = {_rounded(((sqrt_s - heavy) * (sqrt_s + heavy) - light * light) / (2 * heavy))}"
    yield f'target = "{process.legs.name_of(target)}"'


def _target(process: Process) -> int | None:
    """The beam that is at rest: one with mass that meets a massless particle, or a nucleon that meets a lighter one."""
    masses = {code: mass_in(process, code) for code in (-1, -2)}
    light, heavy = sorted(masses, key=lambda code: masses[code])
    nucleon = find(process.legs.name_of(heavy)).baryon_number > 0
    return heavy if masses[light] < masses[heavy] and (masses[light] == 0 or nucleon) else None


def _sqrt_s(process: Process, usual: float) -> float:
    """GeV: at a resonance of the collision, at the usual value where that is well above threshold and valid, or where
    it is valid.
    """
    legs = process.legs
    valid = process.valid.sqrt_s if process.valid is not None else None
    low, high = valid if valid is not None else (0.0, math.inf)
    outgoing = () if legs.inclusive else range(1, len(legs.outgoing) + 1)
    before = sum(mass_in(process, code) for code in (-1, -2))
    threshold = max(low, before, sum(mass_in(process, code) for code in outgoing))
    for mass in _resonances(process):
        if threshold < mass < high:
            return mass
    if ABOVE * threshold <= usual <= high or threshold == 0:
        return min(USUAL, high)
    return min(ABOVE * threshold, 0.5 * (threshold + high))


def _resonances(process: Process) -> Iterator[float]:
    """Masses in GeV of what resonates in the whole collision."""
    legs = process.legs
    wholes = ((), ("beam_a", "beam_b"), legs.incoming, legs.outgoing)
    for peak in process.peaks:
        if peak.shape == "resonance" and peak.at is not None and tuple(peak.of.split()) in wholes:
            named = isinstance(peak.at, str) and peak.at in process.parameters.model_fields
            if named or not isinstance(peak.at, str):
                yield float(_default(process, str(peak.at)) if named else peak.at)


def _rounded(value: float) -> str:
    """Four digits, always with a decimal point or an exponent, as TOML writes a float."""
    text = f"{value:.4g}"
    return text if any(sign in text for sign in ".e") else f"{text}.0"


def _parameters(process: Process) -> list[str]:
    """Values for the parameters that have no default."""
    required = [fact.name for fact in facts_of(process.parameters) if fact.required]
    return ["[parameters]", *(f"{name} = {_toml(process.example[name])}" for name in required)] if required else []


def _toml(value: Any) -> str:
    if isinstance(value, bool):
        return "true" if value else "false"
    return f'"{value}"' if isinstance(value, str) else repr(value)


def _cut(cut: ClosingCut) -> list[str]:
    name = f"away from {', '.join(cut.regions)}"
    return ["[[cuts]]", f'name = "{name}"', f'observable = "{cut.observable}"', f"{cut.side} = {cut.limit}"]


def _histogram(process: Process) -> list[str]:
    legs = process.legs
    if legs.inclusive or len(legs.incoming) == 1 or not has_final_state(process):
        return []
    bins = "bins = [{ count = 20, low = -1.0, high = 1.0 }]"
    return ["[[histograms]]", 'name = "angle"', f'observables = ["{polar_angle(legs)}"]', bins]
