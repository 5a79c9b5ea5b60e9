"""Two photons and one lepton line: one function for scattering, annihilation and creation, by exchanged momenta.

Sources: O. Klein, Y. Nishina, Z. Phys. 52 (1929) 853; P. A. M. Dirac, Proc. Camb. Phil. Soc. 26 (1930) 361; G. Breit,
J. A. Wheeler, Phys. Rev. 46 (1934) 1087; in the invariant form of M. Peskin, D. Schroeder, An Introduction to Quantum
Field Theory (1995), eqs. 5.87 and 5.105. Masses exact.

Rules of this file
------------------
- All momenta are counted as incoming (see crossing.py): p of a lepton, k and l of the photons. With a = p·k and
  b = p·l, a + b = −k·l holds exactly, so 1/a + 1/b is taken as −k·l/ab and never as a difference.
- |M|² = 2e⁴ [1 + (1 − x)² − (k·l)²/ab], x = m² k·l/ab, averaged over four initial states; with both photons on one side
  a lepton has changed sides, and the sign with it. Then 1 + (1 − x)² is at most half of (k·l)²/ab ≥ 4: no digits are
  lost.
- In the cm of a pair, with c = cos θ, β the lepton's velocity, w = 1 − β² = 4m²/s and D = 1 − β²c² = w + β²(1 − c²):
  |M|² = 2e⁴ [−2 + 4(1 + w)/D − 4w²/D²], whose antiderivative in c is
  x [−2 − 2w²/D + (4 + 4w − 2w²) artanh(βx)/(βx)].
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Event, Point
from barnwright_qed.coupling import Coupling
from barnwright_qed.crossing import Leg, Legs, inward, on_one_side
from barnwright_qed.logarithm import artanh_rest

Array = NDArray[np.float64]


def squared(event: Event, parameters: Coupling, lepton: Leg, photons: Legs) -> Array:
    """|M|², dimensionless; ``lepton`` is one of the two lepton legs."""
    between = inward(event, *photons)
    product = inward(event, lepton, photons[0]) * inward(event, lepton, photons[1])
    share = between / product
    bracket = 1 + np.square(1 - event.mass(lepton) ** 2 * share) - between * share
    sign = -1 if on_one_side(*photons) else 1
    return np.asarray(sign * 2 * (4 * np.pi * parameters.alpha) ** 2 * bracket)


def angular_integral(x: Array, point: Point, momentum: Array, mass: float) -> Array:
    """∫ |M|²/2e⁴ dc from c = 0 to x for a pair with ``momentum`` (cm) and ``mass`` in GeV; an odd function of x."""
    energy = point.sqrt_s / 2
    beta, w = momentum / energy, np.square(mass / energy)
    r = beta * np.abs(x)
    denominator = w + np.square(beta) * (1 - x) * (1 + x)
    mean = 1 + np.square(r) * artanh_rest(r, denominator / np.square(1 + r))
    return np.asarray(x * ((4 + 4 * w - 2 * w * w) * mean - 2 - 2 * w * w / denominator))
