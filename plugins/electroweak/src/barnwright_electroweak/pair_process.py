"""What the processes e- e+ -> f f~ have in common."""

from __future__ import annotations

from collections.abc import Mapping
from itertools import product
from typing import Any, NamedTuple

from barnwright.amplitudes import converted_width
from barnwright.plugin import (
    Claims,
    ClosedForm,
    HelicityAmplitudes,
    Peak,
    Process,
    SquaredAmplitude,
    Validity,
    mass_of,
    width_of,
)
from barnwright_electroweak import cautions
from barnwright_electroweak.exchange import CONTRIBUTIONS, Fermion
from barnwright_electroweak.fermion_pairs import FermionPair
from barnwright_electroweak.inputs import ElectroweakInputs

REFERENCES = (
    "ALEPH, DELPHI, L3, OPAL, SLD and their electroweak groups, Phys. Rept. 427 (2006) 257, section 1.5",
    "F. A. Berends, R. Kleiss, S. Jadach, Nucl. Phys. B 202 (1982) 63",
    "D. Bardin, A. Leike, T. Riemann, M. Sachwitz, Phys. Lett. B 206 (1988) 539 (forms of the width)",
)
FIXED_MASS, FIXED_WIDTH = map(float, converted_width(mass_of("Z0"), width_of("Z0"), "running", "fixed"))
"""GeV; the same line of the Z in the form of a fixed width has a mass 34 MeV lower."""
ALTERNATIVES: dict[str, dict[str, float | str]] = {
    "fermi": {"scheme": "fermi"},
    "on-shell": {"scheme": "on_shell"},
    "fixed-width": {"width_scheme": "fixed", "z_mass": FIXED_MASS, "z_width": FIXED_WIDTH},
}
ASYMMETRY = {"name": "A_FB", "kind": "asymmetry", "observable": "cos_theta(1, frame=cm)", "at": 0.0}

Line = tuple[tuple[int, int], ...]
Choice = tuple[Line, Line, tuple[str, ...]]
OPPOSITE, EQUAL, LEFT_HANDED = ((-1, 1), (1, -1)), ((-1, -1), (1, 1)), ((-1, 1),)


class Kind(NamedTuple):
    """A fermion f: its name and its antiparticle's, what the sentences call it, and what it couples to."""

    name: str
    other: str
    word: str
    fermion: Fermion
    lowest: float
    """√s in GeV above which the process may be trusted."""


def pair(name: str, kind: Kind, masses: Mapping[str, float | str], notes: tuple[str, ...], **more: Any) -> Process:
    """The process e- e+ -> f f~; ``masses`` are those beside the electron's, ``notes`` its own cautions."""
    laws = FermionPair(kind.fermion)
    charged = kind.fermion.charge != 0
    return Process(
        name=name,
        reaction=f"e- e+ -> {kind.name} {kind.other}",
        summary=f"{kind.word} pairs from e- e+ through {'photon and ' if charged else 'the '}Z, beams polarised",
        references=REFERENCES,
        laws=(SquaredAmplitude(laws.squared), *_roads(laws, kind)),
        closed_forms=(ClosedForm(laws.cumulative, observable="cos_theta(1, frame=cm)"),),
        masses={"e-": 0.0, **masses},
        contributions=CONTRIBUTIONS if charged else {},
        derived=(ASYMMETRY,) if charged else (),
        peaks=(Peak(of=f"{kind.name} {kind.other}", shape="resonance", at="z_mass", width="z_width"),),
        claims=Claims(limits=_limits(kind.fermion)),
        valid=Validity(
            sqrt_s=(kind.lowest, 500.0),
            text="lowest order with couplings as at the Z: away from hadronic resonances, and below the energies where "
            "boxes of W and Z exceed several per cent",
        ),
        cautions=(cautions.BEAM_RADIATION, cautions.WEAK_CORRECTIONS, *notes, cautions.HEAVY_BEAMS, cautions.RADIATION),
        alternatives=ALTERNATIVES,
        **{"parameters": ElectroweakInputs, **more},
    )


def _roads(laws: FermionPair, kind: Kind) -> tuple[HelicityAmplitudes, ...]:
    """The same amplitudes with fewer rows where masses are 0; a neutrino has one helicity."""
    every, light = (*OPPOSITE, *EQUAL), kind.name
    choices: tuple[Choice, ...] = (
        (OPPOSITE, OPPOSITE, ("e-", light)),
        (OPPOSITE, every, ("e-",)),
        (every, every, ()),
    )
    if kind.fermion.charge == 0:
        choices = ((OPPOSITE, LEFT_HANDED, ("e-", light)), (every, LEFT_HANDED, (light,)))
    return tuple(
        HelicityAmplitudes(
            laws.amplitudes,
            helicities=tuple((*one, *other) for one, other in product(before, after)),
            colour=((float(kind.fermion.colours),),),
            massless=massless,
        )
        for before, after, massless in choices
    )


def _limits(fermion: Fermion) -> tuple[str, ...]:
    """Known limits, each with its source."""
    peak = "at √s = M_Z without the photon A_LR = A_e and A_FB = ¾ A_e A_f (Phys. Rept. 427 (2006) 257, section 1.5)"
    if fermion.charge == 0:
        return ("at √s = M_Z A_LR = A_e (Phys. Rept. 427 (2006) 257, section 1.5)",)
    return ("the photon alone gives 4πα²Q²N/3s for massless fermions of N colours (Peskin and Schroeder, 5.16)", peak)
