"""What a skilled physicist writes by hand for e- e+ -> mu- mu+ through a photon, both masses exact.

|M|^2 averaged over spins is 8 e^4/s^2 [(p1.k1)^2 + (p1.k2)^2 + m_mu^2 p1.p2 + m_e^2 k1.k2 + 2 m_e^2 m_mu^2]
(Peskin and Schroeder, section 5.1, with the electron mass kept), which in the cm is even in cos theta.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from itertools import pairwise

import numpy as np
import numpy.typing as npt
from scipy.constants import physical_constants

Array = npt.NDArray[np.float64]

ALPHA = physical_constants["fine-structure constant"][0]
ELECTRON = physical_constants["electron mass energy equivalent in MeV"][0] * 1e-3
MUON = physical_constants["muon mass energy equivalent in MeV"][0] * 1e-3
HBAR_C = physical_constants["reduced Planck constant times c in MeV fm"][0] * 1e-3
PICOBARN = HBAR_C**2 * 1e10
"""GeV^-2 in pb: (hbar c)^2 in GeV^2 fm^2, and 1 fm^2 = 1e10 pb."""
NODES, WEIGHTS = np.polynomial.legendre.leggauss(4)


def by_hand(cosine: float, s: float) -> float:
    """dsigma/dcos(theta) in pb at one cosine, s in GeV^2, with plain Python numbers."""
    velocity_e = math.sqrt(1.0 - 4.0 * ELECTRON**2 / s)
    velocity_mu = math.sqrt(1.0 - 4.0 * MUON**2 / s)
    forward = 0.25 * s * (1.0 - velocity_e * velocity_mu * cosine)
    backward = 0.25 * s * (1.0 + velocity_e * velocity_mu * cosine)
    p1_p2 = 0.5 * s - ELECTRON**2
    k1_k2 = 0.5 * s - MUON**2
    mixed = MUON**2 * p1_p2 + ELECTRON**2 * k1_k2 + 2.0 * ELECTRON**2 * MUON**2
    squared = 8.0 * (4.0 * math.pi * ALPHA) ** 2 / s**2 * (forward**2 + backward**2 + mixed)
    return squared * velocity_mu / velocity_e / (32.0 * math.pi * s) * PICOBARN


@dataclass(frozen=True, slots=True)
class GaussLegendre:
    """The bare loop: 4 nodes a bin, all energies and bins in one batch, what depends on s alone worked out once."""

    edges: Array

    def __call__(self, energies: Array) -> Array:
        """Bins in pb, shape (energy, bin); energies are sqrt(s) in GeV."""
        half = 0.5 * np.diff(self.edges)
        middle = 0.5 * (self.edges[:-1] + self.edges[1:])
        cosines = (middle[:, None] + half[:, None] * NODES).ravel()
        constant, quadratic = coefficients(energies**2)
        values = constant[:, None] + quadratic[:, None] * cosines**2
        return np.asarray((values.reshape(len(energies), len(half), 4) @ WEIGHTS) * half)


def coefficients(s: Array) -> tuple[Array, Array]:
    """dsigma/dcos(theta) = a + b cos^2(theta): a and b in pb, s in GeV^2."""
    velocity_e = np.sqrt(1.0 - 4.0 * ELECTRON**2 / s)
    velocity_mu = np.sqrt(1.0 - 4.0 * MUON**2 / s)
    mixed = MUON**2 * (0.5 * s - ELECTRON**2) + ELECTRON**2 * (0.5 * s - MUON**2) + 2.0 * ELECTRON**2 * MUON**2
    outside = 8.0 * (4.0 * np.pi * ALPHA) ** 2 / s**2 * velocity_mu / velocity_e / (32.0 * np.pi * s) * PICOBARN
    return outside * (s**2 / 8.0 + mixed), outside * (velocity_e * velocity_mu) ** 2 * s**2 / 8.0


def quad_bins(edges: Array, s: float) -> Array:
    """The total and every bin in pb by scipy.integrate.quad, one after the other."""
    from scipy.integrate import quad

    pairs = [(edges[0], edges[-1]), *pairwise(edges)]
    return np.array([quad(by_hand, low, high, args=(s,))[0] for low, high in pairs])
