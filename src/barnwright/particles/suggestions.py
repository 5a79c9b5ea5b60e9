"""What somebody may have meant by a name that no particle has."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from barnwright.errors import nearest

if TYPE_CHECKING:
    from collections.abc import Sequence

_EVERYDAY = {
    "a": "gamma",
    "antimuon": "mu+",
    "antineutron": "n~",
    "antiproton": "p~",
    "bottom": "b",
    "charm": "c",
    "down": "d",
    "electron": "e-",
    "gluon": "g",
    "higgs": "H0",
    "muon": "mu-",
    "neutrino": "nu(e), nu(mu), nu(tau)",
    "neutron": "n",
    "nu": "nu(e), nu(mu), nu(tau)",
    "photon": "gamma",
    "pion": "pi+, pi-, pi0",
    "positron": "e+",
    "proton": "p",
    "strange": "s",
    "tauon": "tau-",
    "top": "t",
    "up": "u",
    "y": "gamma",
}
_LETTERS = str.maketrans(
    {"γ": "gamma", "μ": "mu", "µ": "mu", "τ": "tau", "π": "pi", "ν": "nu", "−": "-", "⁺": "+", "⁻": "-"}
)
_NEUTRINO = re.compile(r"(?:nu|v)_?\(?(e|mu|m|tau|t)\)?")
_FLAVOURS = {"e": "nu(e)", "mu": "nu(mu)", "m": "nu(mu)", "tau": "nu(tau)", "t": "nu(tau)"}
_BARRED = re.compile(r"(?:anti[-_]?(?P<after>.+)|(?P<before>.+?)(?:[-_]?bar|_?~))")
_LONGEST = 60
_COUNTED_CHARGES = 4


def suggest(name: str, names: Sequence[str]) -> str | None:
    """The name, or names with commas between them, that may have been meant; None when nothing is near.

    Parameters
    ----------
    name
        What was written.
    names
        All valid names.
    """
    plain = name.translate(_LETTERS)
    if len(name) > _LONGEST or not any(letter.isalpha() for letter in plain):
        return None
    known = frozenset(names)
    return (
        (plain if plain in known else None)
        or _meant(plain.casefold(), known)
        or _charges(plain, names)
        or nearest(plain, names)
    )


def _meant(word: str, known: frozenset[str]) -> str | None:
    """An everyday word or another notation of a name, and its antiparticle."""
    if (neutrino := _NEUTRINO.fullmatch(word)) is not None:
        return _FLAVOURS[neutrino[1]]
    if word in _EVERYDAY:
        return _EVERYDAY[word]
    if (barred := _BARRED.fullmatch(word)) is None:
        return None
    inner = barred["after"] or barred["before"]
    name = inner if inner in known else _meant(inner, known)
    return _anti(name, known) if name else None


def _anti(name: str, known: frozenset[str]) -> str | None:
    other = f"{name[:-1]}{'+' if name.endswith('-') else '-'}" if name.endswith(("-", "+")) else f"{name}~"
    return other if other in known else None


def _charges(name: str, names: Sequence[str]) -> str | None:
    """Where only the charge is missing or wrong: ``"e"`` gives ``"e-, e+"``, ``"Z"`` gives ``"Z0"``."""
    stem = name.rstrip("+-0~").casefold()
    found = [other for other in names if other.rstrip("+-0~").casefold() == stem]
    return ", ".join(found[:_COUNTED_CHARGES]) if found else None
