"""What a conformance check tries beyond the load: closed forms against laws, and claimed symmetries.

Rules of this file
------------------
- A closed form's differences between the check angles must be the law's integral there: same flux, same averages,
  identical particles counted once in both.
- Only closed forms in the cosine of leg 1 in the cm are compared; others are compared by the engine's own quadrature.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import flux
from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.masses import Inputs, resolve_inputs
from barnwright.phase_space import two_body_density
from barnwright.process import ClosedForm, Process

from .check_points import COSINES, CheckPoints
from .checks import ALL, is_two_to_two, masses_for

Array = NDArray[np.float64]

AGREEMENT = 1e-8
_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(64)


def second_road_findings(process: Process) -> list[str]:
    """Where closed forms and laws, or a law and its claims, contradict; the process passed the load checks already."""
    inputs = resolve_inputs(process, dict(process.example), {}, Findings())
    if inputs is None or not is_two_to_two(process):
        return []
    found = _broken_exchange(process, inputs)
    for index, form in enumerate(process.closed_forms):
        if process.laws and _in_cosine(process, form):
            found += [f"closed_forms[{index}]: {text}" for text in _disagreement(process, form, inputs)]
    return found


def _in_cosine(process: Process, form: ClosedForm) -> bool:
    axis = form.axis(process.legs).axis
    return axis is not None and axis.kind == "cosine" and axis.leg == 1 and not axis.folded


def _disagreement(process: Process, form: ClosedForm, inputs: Inputs) -> list[str]:
    points = CheckPoints.of(process, masses_for(process, form, inputs))
    parameters = process.parameters_of(inputs.parameters)
    x = np.broadcast_to(COSINES, (3, COSINES.size))
    closed = np.diff(np.broadcast_to(form.cumulative(x, points.point(ALL), parameters), x.shape), axis=1)
    middle, half = (COSINES[:, 1:] + COSINES[:, :-1]) / 2, np.diff(COSINES, axis=1) / 2
    cosines = (middle[..., None] + half[..., None] * _NODES).reshape(1, -1)
    squared = np.asarray(process.laws[0].squared(points.event(ALL, cosines), parameters), dtype=float)
    shaped = np.broadcast_to(squared, (3, cosines.size)).reshape(3, -1, _NODES.size)
    integral = (shaped * _WEIGHTS).sum(axis=-1) * half * _factor(points)
    wrong = np.abs(closed - integral) > AGREEMENT * np.abs(integral).sum(axis=1, keepdims=True)
    if not wrong.any():
        return []
    row, panel = (int(k) for k in np.argwhere(wrong)[0])
    between = f"between cos_theta = {COSINES[0, panel]:g} and {COSINES[0, panel + 1]:g}"
    got = f"{closed[row, panel]:.10g} {between} at sqrt_s = {points.sqrt_s[row]:.6g} GeV"
    return [f"expected the integral of laws[0], {integral[row, panel]:.10g} GeV^-2, got {got}"]


def _factor(points: CheckPoints) -> Array:
    """What turns |M|² into dσ/dcos θ in GeV⁻², shape (3, 1)."""
    collision = points.collision(ALL)
    density = two_body_density(collision, points.masses[2:]) / flux(collision, points.masses[:2])
    return np.asarray(density * points.process.legs.symmetry_factor)


def _broken_exchange(process: Process, inputs: Inputs) -> list[str]:
    """A claimed exchange of legs 1 and 2 that have one mass: |M|² must be the same at −cos θ."""
    pairs = process.claims.exchange if process.claims is not None else ()
    claimed = any({process.legs.leg(leg) for leg in pair} == {1, 2} for pair in pairs)
    found = []
    for index, law in enumerate(process.laws if claimed else ()):
        points = CheckPoints.of(process, masses_for(process, law, inputs))
        parameters = process.parameters_of(inputs.parameters)
        here, there = (
            np.asarray(law.squared(points.event(ALL, side * COSINES), parameters), dtype=float) for side in (1, -1)
        )
        if points.masses[2] == points.masses[3] and not np.allclose(here, there, rtol=AGREEMENT, atol=0):
            found.append(
                f"laws[{index}]: claims.exchange names legs 1 and 2, but |M|² differs at cos_theta and -cos_theta"
            )
    return found
