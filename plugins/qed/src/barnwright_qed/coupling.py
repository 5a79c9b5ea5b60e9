"""The one parameter of quantum electrodynamics, and the words that several processes of this plugin share."""

from __future__ import annotations

import scipy
from scipy import constants

from barnwright.plugin import Parameters, parameter

RADIATION_CAUTION = (
    "Cross sections feed shielding, dose and beam-safety estimates: this one holds at lowest order within its range of "
    "validity; work that can hurt someone follows local rules and a qualified radiation-protection expert."
)
BELOW_THE_Z = "lowest order in alpha with the photon alone; above about 30 GeV the Z boson is felt"
PESKIN = "M. Peskin, D. Schroeder, An Introduction to Quantum Field Theory (1995)"
HELICITY_CAUTION = "Polarisation is by helicity in the cm; that of a massive particle depends on the frame."
ALTERNATIVES = {"alpha-at-the-z": {"alpha": 1 / 128}}
"""A coupling as at M_Z (common practice): every result here scales with a power of alpha."""


class Coupling(Parameters):
    """The electromagnetic coupling."""

    alpha: float = parameter(
        constants.fine_structure,
        meaning="electromagnetic coupling, e²/4π, at zero momentum transfer",
        source=f"CODATA through scipy.constants (scipy {scipy.__version__})",
    )
