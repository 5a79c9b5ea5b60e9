"""Laws of different kinds at the check points as one quantity, so that they can be compared: dσ/dcos θ in GeV⁻²."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import flux
from barnwright.phase_space import two_body_density
from barnwright.process import (
    AngularCrossSection,
    ClosedForm,
    Law,
    MomentaLaw,
    Parameters,
    Parts,
    Process,
    TotalCrossSection,
)

from .check_points import CheckPoints, Masses
from .trials import ALL

Array = NDArray[np.float64]
Distribution = MomentaLaw | AngularCrossSection


def distributions(process: Process) -> list[tuple[int, Distribution]]:
    """The laws that have an angular distribution, with their numbers."""
    return [(index, law) for index, law in enumerate(process.laws) if not isinstance(law, TotalCrossSection)]


def density(
    law: Distribution, points: CheckPoints, cosines: Array, parameters: Parameters, parts: Parts | None
) -> Array:
    """dσ/dcos θ of leg 1 in GeV⁻² in the cm, identical particles counted once; cosines (1, node), answer (3, node)."""
    symmetry = points.process.legs.symmetry_factor
    with np.errstate(all="ignore"):
        if isinstance(law, AngularCrossSection):
            found: Any = law.density(points.point(ALL), cosines, parameters, parts)
            factor: Any = 2 * np.pi * symmetry
        else:
            found = law.squared(points.event(ALL, cosines), parameters, parts)
            collision = points.collision(ALL)
            factor = symmetry * two_body_density(collision, points.masses[2:]) / flux(collision, points.masses[:2])
        return np.broadcast_to(np.asarray(found, dtype=float) * factor, (3, cosines.shape[1]))


def heights(form: ClosedForm, points: CheckPoints, x: Array, parameters: Parameters, parts: Parts | None) -> Array:
    """The antiderivative in GeV⁻² at x of shape (1, edge), for every point: (3, edge)."""
    there = np.broadcast_to(x, (3, x.shape[1]))
    with np.errstate(all="ignore"):
        return np.broadcast_to(np.asarray(form.heights(there, points.point(ALL), parameters, parts)), there.shape)


def is_valid(process: Process, law: Law, masses: Masses) -> bool:
    """Whether the legs that must be massless for a law of a 2 → 2 process are."""
    by_code = dict(zip((-1, -2, 1, 2), masses, strict=True))
    return all(by_code[code] == 0 for leg in law.massless for code in process.codes_of(leg))
