"""From the mass of a neutral atom, which the table holds for nuclei, to the mass of the bare nucleus."""

from __future__ import annotations

import math


def bare_mass(atomic_mass: float, protons: int, electron_mass: float) -> float:
    """Mass of the nucleus in the unit of the masses given, MeV: M = M_atom − Z m_e + B(Z).

    Parameters
    ----------
    atomic_mass
        Mass of the neutral atom in its ground state, MeV.
    protons
        Z, the number of electrons that are taken away.
    electron_mass
        MeV.

    Notes
    -----
    B, the binding energy of all electrons, is 14.4381 Z^2.39 + 1.55468e-6 Z^5.35 eV: D. Lunney, J. M. Pearson and
    C. Thibault, Rev. Mod. Phys. 75 (2003) 1021, eq. (A4).
    """
    binding = 14.4381 * math.pow(protons, 2.39) + 1.55468e-6 * math.pow(protons, 5.35)
    return atomic_mass - protons * electron_mass + binding * 1e-6
