"""Four leptons and one photon: one function for lepton pairs and lepton-lepton scattering, by exchanged momenta.

Sources: M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995), sections 5.1 and 5.4; V. Berestetskii,
E. Lifshitz, L. Pitaevskii, Quantum Electrodynamics, 2nd ed. (1982), § 81, for two leptons of one kind. Masses exact.

Rules of this file
------------------
- All momenta are counted as incoming (see crossing.py). A line is the two legs of one lepton.
- With x and y the products of a leg of one line with both legs of the other, q² the photon's and m, M the masses,
  the square of one diagram is 8e⁴ [x² + y² + (m² + M²) q²/2] / q⁴, averaged over the four initial states. For a pair
  from a pair every term is positive; in scattering the last one is negative, and takes digits only where a fast light
  lepton is turned back by a heavy one.
- Leptons of one kind have a second diagram, and the interference 8e⁴ · 2x(x − 2m²)/(q² k²), where q and k are the
  photons and x is the product of two legs that no photon joins to one line.
- An even number of fermions changes sides between these processes, so nothing changes its sign.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Event
from barnwright_qed.coupling import Coupling
from barnwright_qed.crossing import Leg, Legs, invariant, inward

Array = NDArray[np.float64]


def squared(event: Event, parameters: Coupling, line: Legs, other: Legs) -> Array:
    """|M|² of two different leptons, dimensionless; ``line`` and ``other`` are the two legs of each."""
    return _scale(parameters) * _diagram(event, line, other)


def squared_of_one_kind(event: Event, parameters: Coupling, first: Leg, apart: Leg, ends: Legs) -> Array:
    """|M|² of leptons of one kind, dimensionless.

    ``first`` may share its line with each of ``ends``, but never with ``apart``.
    """
    one, two = ends
    x, mass_squared = inward(event, first, apart), event.mass(first) ** 2
    photons = invariant(event, first, one) * invariant(event, first, two)
    interference = 2 * x * (x - 2 * mass_squared) / photons
    return _scale(parameters) * (
        _diagram(event, (first, one), (apart, two)) + _diagram(event, (first, two), (apart, one)) + interference
    )


def _diagram(event: Event, line: Legs, other: Legs) -> Array:
    """[x² + y² + (m² + M²) q²/2] / q⁴."""
    first, _ = line
    square = invariant(event, *line)
    masses = (event.mass(first) ** 2 + event.mass(other[0]) ** 2) / 2
    products = np.square(event.dot(first, other[0])) + np.square(event.dot(first, other[1]))
    return np.asarray((products + masses * square) / np.square(square))


def _scale(parameters: Coupling) -> float:
    return 8 * (4 * np.pi * parameters.alpha) ** 2
