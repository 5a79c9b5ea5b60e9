"""Beams that cross at an angle: the way from the centre of mass to the lab, and the beams' own momenta.

Rules of this file
------------------
- Both frames share the x–z plane. Written as the matrix [[E + pz, px − i py], [px + i py, E − pz]], a momentum P
  becomes A P Aᵀ with A real and det A = 1: the rotation in that plane and the boost of the net motion in one. (Spinor
  representation of the Lorentz group: S. Weinberg, The Quantum Theory of Fields I, section 2.7, from memory.)
- A momentum is its light-like part, of energy |p|, and (E − |p|) at rest. The light-like part is a spinor, and its
  E ± pz are squares of spinor components: sums of positive terms, which keep a particle close to the axis precise.
- GeV.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics.four_vector import Exact, FourVector

Array = NDArray[np.float64]
Matrix = tuple[Array, Array, Array, Array]


@dataclass(frozen=True, slots=True)
class CrossedBeams:
    """Arrays have the shape of the collision's, (point, 1).

    Attributes
    ----------
    half_angle : float, rad
        Between +z and the beam that goes there, and between −z and the other one; both lean towards +x.
    kinetic : two arrays, GeV
        E − m of beam a and beam b in the lab.
    matrix : four arrays
        A above, row by row.
    """

    half_angle: float
    kinetic: tuple[Array, Array]
    matrix: Matrix

    def mapped(self, change: Callable[[Array], Array]) -> CrossedBeams:
        """The same with every array put through a function."""
        first, second = map(change, self.kinetic)
        a, b, c, d = map(change, self.matrix)
        return CrossedBeams(self.half_angle, (first, second), (a, b, c, d))

    def turned(self) -> CrossedBeams:
        """Turned by π about the x axis, in both frames."""
        a, b, c, d = self.matrix
        return CrossedBeams(self.half_angle, self.kinetic, (d, c, b, a))

    def beam(self, code: int, mass: float, forward: bool) -> FourVector:
        """The lab momentum of a beam, by its leg code; ``forward``: the one that goes towards +z."""
        kinetic = self.kinetic[-1 - code]
        momentum = np.sqrt(kinetic * (kinetic + 2 * mass))
        energy = kinetic + mass
        large = energy + momentum * np.cos(self.half_angle)
        small = mass * mass / np.maximum(energy + momentum, 1e-300) + 2 * momentum * np.sin(0.5 * self.half_angle) ** 2
        across = momentum * np.sin(self.half_angle)
        exact = Exact(kinetic=kinetic, energy=energy, momentum=momentum, px=across, py=np.zeros_like(across))
        plus, minus = (large, small) if forward else (small, large)
        return FourVector(plus, minus, across, np.zeros_like(across), mass, exact)

    def to_lab(
        self, mass: float, in_cm: tuple[Array, Array], halves: tuple[Array, Array], turn: tuple[Array, Array]
    ) -> FourVector:
        """The lab momentum of a particle of the centre of mass.

        Parameters
        ----------
        mass : float, GeV
        in_cm : |p| and E − |p|, GeV
        halves : 1 + cos and 1 − cos of its polar angle
        turn : cosine and sine of its azimuth
        """
        a, b, c, d = self.matrix
        (momentum, rest), (along, against), (cosine, sine) = in_cm, halves, turn
        up, down = np.sqrt(momentum * along), np.sqrt(momentum * against)
        sideways = np.square(sine)
        plus = np.square(a * up + b * down * cosine) + np.square(b * down) * sideways + rest * (a * a + b * b)
        minus = np.square(c * up + d * down * cosine) + np.square(d * down) * sideways + rest * (c * c + d * d)
        still = rest * (a * c + b * d) + momentum * (a * c * along + b * d * against)
        px, py = still + up * down * (a * d + b * c) * cosine, up * down * sine
        return FourVector(plus, minus, np.sqrt(np.square(px) + np.square(py)), None, mass, Exact(px=px, py=py))
