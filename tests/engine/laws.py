"""Processes made for the tests of the engine: small laws of every kind, with known integrals."""

from __future__ import annotations

from typing import Any

import numpy as np

from barnwright.plugin import (
    AngularCrossSection,
    HelicityAmplitudes,
    Parameters,
    Peak,
    Process,
    SquaredAmplitude,
    TotalCrossSection,
    parameter,
)

PICOBARN = 0.3893793721718592e9
"""GeV⁻² in pb: (ħc)² of the SI's exact constants."""


class Strength(Parameters):
    """One number."""

    strength: float = parameter(1.0)


ALLOWED = ((-1, 1, -1, 1), (-1, 1, 1, -1), (1, -1, -1, 1), (1, -1, 1, -1))
WEIGHTS = np.array([1.2, -0.3, -0.3, 1.5])[:, None, None, None]


def amplitudes(event: Any, parameters: Any, parts: frozenset[str]) -> Any:
    """Massless s-channel exchange of a photon-like and a Z-like boson."""
    forward, backward = -2 * event.u / event.s, -2 * event.t / event.s
    angles = np.stack([forward, backward, backward, forward])[:, None]
    photon = parameters.charge**2 * angles
    boson = WEIGHTS * parameters.other * angles * event.s / (event.s - parameters.mass**2 + 2.5j * parameters.mass)
    return ("photon" in parts) * photon + ("z" in parts) * boson


class Plain(Parameters):
    """Two exchanged bosons."""

    charge: float = parameter(0.3)
    other: float = parameter(0.2)
    mass: float = parameter(91.0, unit="GeV")


two_bosons = Process(
    name="two-bosons",
    reaction="e- e+ -> mu- mu+",
    laws=(HelicityAmplitudes(amplitudes, helicities=ALLOWED, massless=("e-", "mu-")),),
    parameters=Plain,
    masses={"e-": 0.0, "mu-": 0.0},
    contributions={"photon": "photon", "z": "z", "interference": "photon*z"},
)

falling = Process(
    name="falling",
    reaction="e- e+ -> X",
    laws=(TotalCrossSection(lambda point, parameters: parameters.strength / point.s),),
    parameters=Strength,
)

partial_wave = Process(
    name="partial-wave",
    reaction="pi+ p -> pi+ p",
    laws=(AngularCrossSection(lambda point, cosine, parameters: (1 + 3 * cosine**2) / point.momentum**2),),
)

exchange = Process(
    name="exchange",
    reaction="e- mu- -> e- mu-",
    laws=(SquaredAmplitude(lambda event, parameters: (event.s**2 + event.u**2) / event.t**2),),
    singular=("t",),
    peaks=(Peak(of="t", shape="power", at=0.0),),
)
