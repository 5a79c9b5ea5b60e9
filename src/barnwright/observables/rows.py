"""The table of observables: name, arguments, unit, range, meaning. README and `describe` are made from it.

Rules of this file
------------------
- GeV and rad. A row with ``frame`` takes the keyword frame = lab, cm or rest(…); the default is the lab unless it
  says cm.
- `Shape` says what the arguments are: one particle, two, several, a beam and a particle, a particle within a system,
  none.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Literal

Shape = Literal["one", "pair", "several", "transfer", "within", "none"]
_PI = math.pi
_INF = math.inf


@dataclass(frozen=True, slots=True)
class Row:
    """One observable.

    Attributes
    ----------
    name, meaning : str
    shape : what its arguments are
    unit : "GeV", "GeV^2", "rad" or ""
    range : pair of float
        What values can occur at all.
    frame : "lab", "cm" or None
        The default frame; None where the value does not depend on one.
    azimuthal : bool
        Whether it changes when everything is turned about the beam.
    """

    name: str
    shape: Shape
    unit: str
    range: tuple[float, float]
    meaning: str
    frame: Literal["lab", "cm"] | None = None
    azimuthal: bool = False

    @property
    def arguments(self) -> str:
        """The arguments as a person writes them."""
        frame = "" if self.frame is None else f", frame={self.frame}"
        return {
            "one": f"(x{frame})",
            "pair": f"(x, y{frame})",
            "several": "(x, …)",
            "transfer": "(beam_a, x)",
            "within": "(x, of=(x, y))",
            "none": "",
        }[self.shape]


_ROWS = (
    Row("energy", "one", "GeV", (0, _INF), "energy", "lab"),
    Row("kinetic_energy", "one", "GeV", (0, _INF), "energy above the rest mass", "lab"),
    Row("momentum", "one", "GeV", (0, _INF), "size of the momentum", "lab"),
    Row("pt", "one", "GeV", (0, _INF), "momentum across the z axis", "lab"),
    Row("theta", "one", "rad", (0, _PI), "polar angle", "lab"),
    Row("cos_theta", "one", "", (-1, 1), "cosine of the polar angle", "lab"),
    Row("phi", "one", "rad", (-_PI, _PI), "azimuth", "lab", azimuthal=True),
    Row("rapidity", "one", "", (-_INF, _INF), "½ ln((E + pz)/(E − pz))", "lab"),
    Row("pseudorapidity", "one", "", (-_INF, _INF), "−ln tan(θ/2)", "lab"),
    Row("energy_fraction", "one", "", (0, _INF), "2E/√s", "cm"),
    Row("mass", "several", "GeV", (0, _INF), "invariant mass of the particles together"),
    Row("recoil_mass", "several", "GeV", (-_INF, _INF), "mass of everything else; −√|m²| where m² is negative"),
    Row("transfer", "transfer", "GeV^2", (-_INF, _INF), "squared difference of two momenta"),
    Row("q2", "transfer", "GeV^2", (-_INF, _INF), "−transfer"),
    Row("angle", "pair", "rad", (0, _PI), "angle between two momenta", "lab"),
    Row("acollinearity", "pair", "rad", (0, _PI), "π − angle", "lab"),
    Row("delta_phi", "pair", "rad", (-_PI, _PI), "difference of the azimuths, in (−π, π]", "lab"),
    Row("acoplanarity", "pair", "rad", (0, _PI), "π − |delta_phi|", "lab"),
    Row("delta_eta", "pair", "", (-_INF, _INF), "difference of the pseudorapidities", "lab"),
    Row("delta_rapidity", "pair", "", (-_INF, _INF), "difference of the rapidities", "lab"),
    Row("delta_r", "pair", "", (0, _INF), "√(delta_eta² + delta_phi²)", "lab"),
    Row("helicity_angle", "within", "rad", (0, _PI), "angle of x in the rest frame of a system to the system's flight"),
    Row("sqrt_s", "none", "GeV", (0, _INF), "energy of the collision in the cm"),
    Row("thrust", "none", "", (0.5, 1), "max over axes of Σ|p·n|/Σ|p|, all outgoing particles, in the cm"),
)

ROWS = {row.name: row for row in _ROWS}


def table() -> tuple[Row, ...]:
    """All rows in the order of the documentation."""
    return _ROWS
