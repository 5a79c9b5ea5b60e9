"""From the beams of a request to beam settings: one entry a point of a scan."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace

from barnwright.beams import BeamSettings, kinetic_from_energy, kinetic_from_momentum
from barnwright.documents import ColliderBeams, DecayBeams, FixedTargetBeams
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.legs import beam_code
from barnwright.process import can_be_polarised
from barnwright.reaction import Reaction

LARGEST = 1e20
"""GeV; beyond it the squares and fourth powers in |M|² leave the range of floats."""

Columns = Mapping[str, Sequence[float]]
"""Values of scanned beam fields ("sqrt_s", "energies.e-", "momentum", …), one entry a point."""


@dataclass(frozen=True, slots=True)
class BeamContext:
    """What the beams are checked against: the reaction, and the masses in GeV of beam a and beam b."""

    reaction: Reaction
    masses: tuple[float, float]
    findings: Findings
    points: int = 1

    def mass(self, code: int) -> float:
        """The mass of a beam in GeV."""
        return self.masses[-1 - code]

    def name(self, code: int) -> str:
        """The particle of a beam."""
        return self.reaction.incoming[-1 - code]


def resolve_beams(
    beams: ColliderBeams | FixedTargetBeams | DecayBeams, columns: Columns, context: BeamContext
) -> BeamSettings | None:
    """Beam settings, or None and findings."""
    if isinstance(beams, DecayBeams):
        expected = "'collider' or 'fixed_target': the process has two incoming particles"
        context.findings.add("beams.kind", "decay", expected, "'collider'")
        return None
    polarisation = _polarisation(beams, context)
    if isinstance(beams, ColliderBeams):
        settings = _collider(beams, columns, context)
    else:
        settings = _fixed_target(beams, columns, context)
    return None if settings is None else replace(settings, polarisation=polarisation)


def _polarisation(beams: ColliderBeams | FixedTargetBeams, context: BeamContext) -> tuple[float, float]:
    """Of beam a and beam b, by helicity in the cm."""
    found, seen = {-1: 0.0, -2: 0.0}, list[int]()
    for name, value in beams.polarisation.items():
        where = f"beams.polarisation.{name}"
        code = beam_code(name, context.reaction, where, context.findings)
        if code is None:
            continue
        particle = context.name(code)
        if value != 0 and not can_be_polarised(particle):
            expected = f"0: {particle} has not two helicities; leptons, quarks, nucleons, photons and gluons have"
            context.findings.add(where, value, expected, "0")
        seen.append(code)
        _check_once(seen, where, value, context)
        found[code] = float(value)
    return found[-1], found[-2]


def _check_once(seen: list[int], where: str, value: float, context: BeamContext) -> None:
    """Refuse a second name of a beam that has been named already."""
    if seen.count(seen[-1]) > 1:
        context.findings.add(where, value, f"one number for each beam; {context.name(seen[-1])} is named twice")


def _collider(beams: ColliderBeams, columns: Columns, context: BeamContext) -> BeamSettings | None:
    findings = context.findings
    ahead = -1
    if beams.along_z is not None:
        ahead = beam_code(beams.along_z, context.reaction, "beams.along_z", findings) or -1
    orientation = 1 if ahead == -1 else -1
    if beams.energies is None:
        values = _column("sqrt_s", beams.sqrt_s, columns, context)
        least = sum(context.masses)
        what = f"√s above the rest masses of the beams, {least!r} GeV"
        _check("beams.sqrt_s", values, least, f"a number greater than {least!r} (GeV): {what}", findings)
        return BeamSettings("sqrt_s", values, (), orientation)
    kinetic: dict[int, tuple[float, ...]] = {}
    for name, energy in beams.energies.items():
        where = f"beams.energies.{name}"
        code = beam_code(name, context.reaction, where, findings)
        if code is None:
            continue
        _check_once([*kinetic, code], where, energy, context)
        values = _column(f"energies.{name}", energy, columns, context)
        mass = context.mass(code)
        crossed = bool(beams.crossing_angle)
        more = "greater than" if crossed else "not less than"
        why = ": beams that cross at an angle both move" if crossed else ""
        expected = f"a number {more} the mass of {context.name(code)}, {mass!r} (GeV){why}"
        _check(where, values, mass, expected, findings, closed=not crossed)
        kinetic[code] = tuple(kinetic_from_energy(v, mass) for v in values)
    if set(kinetic) != {-1, -2}:
        return None
    if any(a + b == 0 for a, b in zip(kinetic[-1], kinetic[-2], strict=True)):
        findings.add("beams.energies", beams.energies, "at least one beam that moves")
    return BeamSettings("kinetic", kinetic[-1], kinetic[-2], orientation, crossing_angle=beams.crossing_angle or 0.0)


def _fixed_target(beams: FixedTargetBeams, columns: Columns, context: BeamContext) -> BeamSettings | None:
    findings = context.findings
    target = -2
    if beams.target is not None:
        code = beam_code(beams.target, context.reaction, "beams.target", findings)
        target = code if code is not None else target
    moving = -3 - target
    if beams.along_z is not None:
        ahead = beam_code(beams.along_z, context.reaction, "beams.along_z", findings)
        if ahead == target:
            expected = f"the beam that moves, {context.name(moving)}; the target is at rest"
            findings.add("beams.along_z", beams.along_z, expected, context.name(moving))
    if context.mass(target) == 0:
        other = context.name(moving) if context.mass(moving) > 0 else None
        expected = f"a target with a mass; {context.name(target)} has none and cannot be at rest"
        findings.add("beams.target", context.name(target), expected, other)
        return None
    kinetic = _kinetic(beams, columns, context, moving)
    still = (0.0,) * context.points
    first, second = (kinetic, still) if moving == -1 else (still, kinetic)
    return BeamSettings("kinetic", first, second, 1 if moving == -1 else -1, target)


def _kinetic(beams: FixedTargetBeams, columns: Columns, context: BeamContext, moving: int) -> tuple[float, ...]:
    """Kinetic energies of the moving beam in GeV."""
    mass, name = context.mass(moving), context.name(moving)
    if beams.energy is not None:
        values = _column("energy", beams.energy, columns, context)
        expected = f"a number greater than the mass of {name}, {mass!r} (GeV)"
        _check("beams.energy", values, mass, expected, context.findings)
        return tuple(kinetic_from_energy(v, mass) for v in values)
    if beams.momentum is not None:
        values = _column("momentum", beams.momentum, columns, context)
        _check("beams.momentum", values, 0.0, "a number greater than 0 (GeV)", context.findings)
        return tuple(kinetic_from_momentum(v, mass) for v in values)
    values = _column("kinetic_energy", beams.kinetic_energy, columns, context)
    _check("beams.kinetic_energy", values, 0.0, "a number greater than 0 (GeV)", context.findings)
    return values


def _column(field: str, value: float | None, columns: Columns, context: BeamContext) -> tuple[float, ...]:
    if field in columns:
        return tuple(columns[field])
    assert value is not None
    return (value,) * context.points


def _check(
    where: str, values: Sequence[float], least: float, expected: str, findings: Findings, closed: bool = False
) -> None:
    """One finding for the first value that is too small, one for the first that is too large."""
    for value in values:
        if not (value >= least if closed else value > least):
            findings.add(where, value, expected)
            break
    for value in values:
        if value > LARGEST:
            findings.add(where, value, f"a number of at most {LARGEST:g} (GeV)")
            break
