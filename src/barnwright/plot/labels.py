"""Observables and units as they are printed in papers: p_T(mu-) in GeV, cos theta* in the cm."""

from __future__ import annotations

import re

_SYMBOLS = {
    "energy": "E",
    "kinetic_energy": r"E_\mathrm{kin}",
    "momentum": "p",
    "pt": r"p_\mathrm{T}",
    "theta": r"\theta",
    "cos_theta": r"\cos\,\theta",
    "phi": r"\phi",
    "rapidity": "y",
    "pseudorapidity": r"\eta",
    "mass": "m",
    "transfer": "t",
    "q2": "Q^2",
    "angle": r"\angle",
    "delta_phi": r"\Delta\phi",
    "delta_r": r"\Delta R",
    "delta_eta": r"\Delta\eta",
    "delta_rapidity": r"\Delta y",
    "energy_fraction": "x_E",
    "recoil_mass": r"m_\mathrm{recoil}",
    "sqrt_s": r"\sqrt{s}",
}
_CALL = re.compile(r"^(abs\()?([a-z_0-9]+)\((.*?)(?:,\s*frame\s*=\s*(lab|cm))?\)(?(1)\))$")
_UNITS = {"ub": "µb", "cm2": "cm²", "m2": "m²", "GeV^2": "GeV²", "GeV^-2": "GeV⁻²"}


def observable_label(text: str, unit: str) -> str:
    """An axis label: the observable in symbols where it is one known function, else its own text; unit in brackets."""
    symbols = observable_symbols(text)
    label = f"${symbols}$" if symbols is not None else text.replace("$", r"\$")
    return f"{label} [{unit_label(unit)}]" if unit else label


def observable_symbols(text: str) -> str | None:
    """The mathematical text of a single observable such as abs(cos_theta(mu-, frame=cm)); None for anything else."""
    compact = text.strip()
    if compact in ("sqrt_s", "thrust"):
        compact += "()"
    match = _CALL.match(compact)
    if match is None or match.group(2) not in _SYMBOLS:
        return None
    absolute, name, arguments, frame = match.groups()
    legs = [leg.strip() for leg in arguments.split(",") if leg.strip()]
    names = [_leg(leg) for leg in legs]
    if any(name is None for name in names):
        return None
    star = "^{*}" if frame == "cm" else ""
    separator = r",\,"
    inside = f"({separator.join(str(name) for name in names)})" if names else ""
    symbols = f"{_SYMBOLS[name]}{star}{inside}"
    return f"|{symbols}|" if absolute else symbols


def density_label(observables: tuple[str, ...], per: str, unit: str, letter: str) -> str:
    """The label of what a histogram holds; letter is "sigma" for a cross section, "Gamma" for a width."""
    quantity = rf"\{letter}"
    if per == "bin":
        return f"${quantity}$ per bin [{unit_label(unit)}]"
    if per == "solid_angle":
        return rf"$\mathrm{{d}}{quantity}/\mathrm{{d}}\Omega$ [{unit_label(unit)}]"
    power = "" if len(observables) == 1 else f"^{len(observables)}"
    below = [observable_symbols(text) for text in observables]
    if any(symbols is None for symbols in below):
        below = ["x"] if len(below) == 1 else [f"x_{number}" for number in range(1, len(below) + 1)]
    inside = r"\,".join(rf"\mathrm{{d}}{symbols}" for symbols in below)
    return rf"$\mathrm{{d}}{power}{quantity}/{inside}$ [{unit_label(unit)}]"


def unit_label(unit: str) -> str:
    """A unit for print: "ub/GeV" becomes "µb/GeV", a dimensionless unit stays as it is."""
    parts = re.split(r"(/| |\*)", unit)
    return "".join(_UNITS.get(part, part) for part in parts)


def reaction_label(reaction: str) -> str:
    """A reaction in symbols: "e- e+ -> mu- mu+" with an arrow and the particles' own letters."""
    sides = [[_leg(name) for name in side.split()] for side in reaction.split("->")]
    if len(sides) != 2 or any(name is None for side in sides for name in side):
        return reaction
    before, after = (r"\,".join(str(name) for name in side) for side in sides)
    return rf"${before} \to {after}$"


def leg_label(name: str) -> str:
    """A particle or leg in its own letters, its name where it has none."""
    letters = _leg(name)
    return name if letters is None else f"${letters}$"


def _leg(name: str) -> str | None:
    """The letters of a leg; None where it is not a plain leg (a frame, a selection, arithmetic)."""
    if name.isdigit() or name == "X":
        return name
    if name in ("beam_a", "beam_b"):
        return rf"\mathrm{{{name[0:4]}}}_{name[-1]}"
    from barnwright.particles import find

    try:
        return find(name).latex
    except LookupError:
        return None
