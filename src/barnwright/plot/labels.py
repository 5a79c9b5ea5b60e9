"""Observables, units and names as they are printed in papers: p_T(mu-) in GeV, cos theta* in the cm, A_FB."""

from __future__ import annotations

import re
from collections.abc import Sequence

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
    "acollinearity": r"\pi-\angle",
    "delta_phi": r"\Delta\phi",
    "acoplanarity": r"\pi-|\Delta\phi|",
    "delta_r": r"\Delta R",
    "delta_eta": r"\Delta\eta",
    "delta_rapidity": r"\Delta y",
    "energy_fraction": "x_E",
    "recoil_mass": r"m_\mathrm{recoil}",
    "sqrt_s": r"\sqrt{s}",
    "thrust": "T",
}
_CALL = re.compile(r"^(abs\()?([a-z_0-9]+)\((.*?)(?:,\s*frame\s*=\s*(lab|cm))?\)(?(1)\))$")
_ORDERED = re.compile(r"^(leading|each|any|min|max)\((.+)\)$")
_IN_UNIT = re.compile(r"^(.+?)\s*/\s*(deg|eV|keV|MeV|GeV|TeV)$")
_UNITS = {"ub": "µb", "cm2": "cm²", "m2": "m²", "deg": "°"}
_RAISED = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")
_NAME = re.compile(r"^([A-Za-z])(?:_([A-Za-z0-9]+))?$")


def observable_label(text: str, unit: str) -> str:
    """An axis label: the observable in symbols where it is one known function, else its own text; unit in brackets.

    ``theta(mu-)/deg``, whose unit is deg, is θ in degrees.
    """
    symbols = observable_symbols(_without_unit(text, unit))
    label = f"${symbols}$" if symbols is not None else plain(text, 60)
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


def density_label(axes: Sequence[tuple[str, str]], per: str, unit: str, letter: str) -> str:
    """The label of what a histogram in ``axes``, observables and their units, holds, in ``unit``.

    The letter is "sigma" for a cross section, "Gamma" for a width.
    """
    quantity = rf"\{letter}"
    if per == "bin":
        return f"${quantity}$ per bin [{unit_label(unit)}]"
    if per == "solid_angle":
        return rf"$\mathrm{{d}}{quantity}/\mathrm{{d}}\Omega$ [{unit_label(unit)}]"
    power = "" if len(axes) == 1 else f"^{len(axes)}"
    below = [observable_symbols(_without_unit(*axis)) for axis in axes]
    if any(symbols is None for symbols in below):
        below = ["x"] if len(below) == 1 else [f"x_{number}" for number in range(1, len(below) + 1)]
    inside = r"\,".join(rf"\mathrm{{d}}{_apart(str(symbols))}" for symbols in below)
    return rf"$\mathrm{{d}}{power}{quantity}/{inside}$ [{unit_label(unit)}]"


def unit_label(unit: str) -> str:
    """A unit for print: "ub/GeV^2" becomes "µb/GeV²", a dimensionless unit stays as it is."""
    named = re.sub(r"\b(ub|cm2|m2|deg)\b", lambda match: _UNITS[match.group(1)], unit)
    return re.sub(r"\^(-?\d+)(?![.\d])", lambda match: match.group(1).translate(_RAISED), named)


def reaction_label(reaction: str) -> str:
    """A reaction in symbols: "e- e+ -> mu- mu+" with an arrow and the particles' own letters."""
    sides = [[_leg(name) for name in side.split()] for side in reaction.split("->")]
    if len(sides) != 2 or any(name is None for side in sides for name in side):
        return plain(reaction, 60)
    before, after = (r"\,".join(str(name) for name in side) for side in sides)
    return rf"${before} \to {after}$"


def leg_label(name: str) -> str:
    """A particle or leg in its own letters, its name where it has none."""
    letters = _leg(name)
    return plain(name, 30) if letters is None else f"${letters}$"


def name_label(name: str, width: int = 30) -> str:
    """A name for print: "A_FB" with FB below the line, a single letter in italics, anything else as it was given."""
    match = _NAME.match(name)
    if match is None:
        return plain(name, width)
    return f"${match[1]}$" if match[2] is None else rf"${match[1]}_\mathrm{{{match[2]}}}$"


def plain(text: str, width: int) -> str:
    """A text as it is, but at most ``width`` characters of it, and no sign in it starts mathematics."""
    short = text if len(text) <= width else f"{text[: width - 1].rstrip()}…"
    return short.replace("$", r"\$")


def _without_unit(text: str, unit: str) -> str:
    """An observable without the unit that it is divided by, where that is its own: the label says it in brackets."""
    match = _IN_UNIT.match(text.strip())
    return match[1] if match is not None and match[2] == unit else text


def _apart(symbols: str) -> str:
    """Symbols that may follow an upright d: a function's name keeps its distance."""
    return rf"\,{symbols}" if symbols.startswith(r"\cos") else symbols


def _leg(name: str) -> str | None:
    """The letters of a leg; None where it is not a plain leg (a frame, arithmetic)."""
    if name.isdigit() or name == "X":
        return name
    if name in ("beam_a", "beam_b"):
        return rf"\mathrm{{{name[0:4]}}}_{name[-1]}"
    ordered = _ORDERED.match(name)
    if ordered is not None:
        inner = _leg(ordered[2].strip())
        return None if inner is None else rf"\mathrm{{{ordered[1]}}}\,{inner}"
    from barnwright.particles import find

    try:
        return find(name).latex
    except LookupError:
        return None
