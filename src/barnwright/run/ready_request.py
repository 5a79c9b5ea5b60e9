"""A request for a process that runs as it stands: beams where it is valid, one histogram, the cuts it needs."""

from __future__ import annotations

import math
from collections.abc import Iterator
from typing import Any

from barnwright.particles import find
from barnwright.process import Process, facts_of
from barnwright.reaction import Reaction

USUAL = 10.0
"""GeV; sqrt(s) of two beams where the process allows it."""
ABOVE = 2.0
"""sqrt(s) over the threshold where `USUAL` is outside the range of validity, and for a beam on a target."""


def ready_request(name: str, process: Process) -> str:
    """TOML text of a request for the process ``plugin/name``."""
    legs = process.legs
    sections = [
        ["# a request to start from; energies and masses in GeV, angles in rad", f'process = "{name}"'],
        ["[beams]", *_beams(process)],
        _parameters(process),
        _cuts(process),
        _histogram(legs),
    ]
    return "\n\n".join("\n".join(section) for section in sections if section) + "\n"


def mass_in(process: Process, code: int) -> float:
    """The default mass of a leg in GeV: declared, the value of a parameter, or the particle table's."""
    declared = process.mass_of(code)
    if declared is None:
        return find(process.legs.name_of(code)).mass
    if isinstance(declared, str):
        return float(_default(process, declared))
    return float(declared)


def _default(process: Process, name: str) -> Any:
    defaults = {fact.name: fact.default for fact in facts_of(process.parameters)}
    return process.example.get(name, defaults[name]) if defaults[name] is None else defaults[name]


def _beams(process: Process) -> Iterator[str]:
    """A decay; a massless beam on a target at rest; else two beams."""
    legs = process.legs
    if len(legs.incoming) == 1:
        yield 'kind = "decay"'
        return
    light, heavy = sorted((mass_in(process, -1), mass_in(process, -2)))
    on_target = light == 0 < heavy
    sqrt_s = _sqrt_s(process, 0.0 if on_target else USUAL)
    if on_target:
        target = -1 if mass_in(process, -1) == heavy else -2
        yield 'kind = "fixed_target"'
        yield f"energy = {_rounded((sqrt_s - heavy) * (sqrt_s + heavy) / (2 * heavy))}"
        yield f'target = "{legs.name_of(target)}"'
    else:
        yield 'kind = "collider"'
        yield f"sqrt_s = {_rounded(sqrt_s)}"


def _sqrt_s(process: Process, usual: float) -> float:
    """GeV: the usual value where that is well above threshold and valid, else a value that is."""
    legs = process.legs
    valid = process.valid.sqrt_s if process.valid is not None else None
    low, high = valid if valid is not None else (0.0, math.inf)
    outgoing = () if legs.inclusive else range(1, len(legs.outgoing) + 1)
    before = sum(mass_in(process, code) for code in (-1, -2))
    threshold = max(low, before, sum(mass_in(process, code) for code in outgoing))
    if ABOVE * threshold <= usual <= high or threshold == 0:
        return min(USUAL, high)
    return min(ABOVE * threshold, 0.5 * (threshold + high))


def _rounded(value: float) -> str:
    """Three digits, always with a decimal point or an exponent, as TOML writes a float."""
    text = f"{value:.3g}"
    return text if any(sign in text for sign in ".e") else f"{text}.0"


def _parameters(process: Process) -> list[str]:
    """Values for the parameters that have no default."""
    required = [fact.name for fact in facts_of(process.parameters) if fact.required]
    return ["[parameters]", *(f"{name} = {_toml(process.example[name])}" for name in required)] if required else []


def _toml(value: Any) -> str:
    if isinstance(value, bool):
        return "true" if value else "false"
    return f'"{value}"' if isinstance(value, str) else repr(value)


def _cuts(process: Process) -> list[str]:
    """What keeps a two-body process away from t = 0 and u = 0."""
    if not {"t", "u"} & set(process.singular):
        return []
    return ["[[cuts]]", 'name = "away from the beams"', f'observable = "abs({_angle(process.legs)})"', "max = 0.9"]


def _histogram(legs: Reaction) -> list[str]:
    if legs.inclusive or len(legs.incoming) == 1:
        return []
    bins = "bins = [{ count = 20, low = -1.0, high = 1.0 }]"
    return ["[[histograms]]", 'name = "angle"', f'observables = ["{_angle(legs)}"]', bins]


def _angle(legs: Reaction) -> str:
    """The polar angle of the first outgoing particle; of each of its kind where there are several."""
    first = legs.outgoing[0]
    return f"cos_theta({f'each({first})' if legs.outgoing.count(first) > 1 else first}, frame=cm)"
