"""The one parameter of quantum electrodynamics, and the caution that every process of this plugin carries."""

from __future__ import annotations

import scipy
from scipy import constants

from barnwright.plugin import Parameters, parameter

RADIATION_CAUTION = (
    "Cross sections feed shielding, dose and beam-safety estimates: this one holds at lowest order within its range of "
    "validity; work that can hurt someone follows local rules and a qualified radiation-protection expert."
)


class Coupling(Parameters):
    """The electromagnetic coupling."""

    alpha: float = parameter(
        constants.fine_structure,
        meaning="electromagnetic coupling, e²/4π, at zero momentum transfer",
        source=f"CODATA through scipy.constants (scipy {scipy.__version__})",
    )
