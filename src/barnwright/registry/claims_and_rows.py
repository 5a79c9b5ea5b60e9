"""Claims and choices that a conformance check tries: exchanged legs, and rows of helicities asked for one by one."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import numpy as np

from barnwright.engine.resolve.masses import Inputs
from barnwright.event import Event
from barnwright.process import HelicityAmplitudes, Parameters, Process, is_interference
from barnwright.process.contributions import takes

from .check_points import COSINES, CheckPoints
from .checks import masses_for, part_sets
from .densities import density, distributions
from .trials import ALL

AGREEMENT = 1e-8


def broken_exchange(process: Process, inputs: Inputs) -> Iterator[str]:
    """A claimed exchange of legs 1 and 2 that have one mass: every law must be the same at −cos θ."""
    pairs = process.claims.exchange if process.claims is not None else ()
    if not any({process.legs.leg(leg) for leg in pair} == {1, 2} for pair in pairs):
        return
    parameters, parts = process.parameters_of(inputs.parameters), part_sets(process)[0][0]
    for index, law in distributions(process):
        points = CheckPoints.of(process, masses_for(process, inputs, law))
        here, there = (density(law, points, side * COSINES, parameters, parts) for side in (1, -1))
        if points.masses[2] == points.masses[3] and not np.allclose(here, there, rtol=AGREEMENT, atol=0):
            yield f"laws[{index}]: claims.exchange names legs 1 and 2, but |M|² differs at cos_theta and -cos_theta"


def wrong_rows(process: Process, inputs: Inputs) -> Iterator[str]:
    """Amplitudes that are asked for some helicities only must return those rows, in the order asked."""
    parameters = process.parameters_of(inputs.parameters)
    for index, law in enumerate(process.laws):
        if not (isinstance(law, HelicityAmplitudes) and takes(law.amplitudes, "helicities")):
            continue
        points = CheckPoints.of(process, masses_for(process, inputs, law))
        rows = law.combinations(process.legs)
        some = rows[::-2]
        whole, chosen = (_rows(process, law, points.event(ALL), parameters, asked) for asked in (rows, some))
        shown = ", ".join(map(str, some[:2]))
        if chosen.shape[0] != len(some):
            yield f"laws[{index}]: asked for {len(some)} helicities ({shown}, …), got {chosen.shape[0]} rows"
        elif not np.allclose(chosen, whole[::-2], rtol=AGREEMENT, atol=AGREEMENT * float(np.abs(whole).max())):
            yield f"laws[{index}]: asked for the helicities {shown}, … alone, expected the same rows as among all"


def _rows(process: Process, law: HelicityAmplitudes, event: Event, parameters: Parameters, asked: Any) -> Any:
    """The amplitudes of these helicities, of one contribution where there are several; (helicity, flow, 3, 4)."""
    plain = [key for key in process.contributions.values() if not is_interference(key)]
    keywords: dict[str, Any] = {"parts": frozenset(plain[:1])} if plain else {}
    found = np.asarray(law.amplitudes(event, parameters, helicities=asked, **keywords), dtype=complex)
    return np.broadcast_to(found, (*found.shape[:2], *event.shape))
