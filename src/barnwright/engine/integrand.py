"""The differential cross section on the polar axis: law, flux and phase space together."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import flux
from barnwright.engine.law import squared_amplitude
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Setting
from barnwright.integrate.polar_axis import Ends, Integers, ends_of
from barnwright.phase_space import peak_scale, two_body_density
from barnwright.process import Parameters, Process

Array = NDArray[np.float64]


FLAT = np.full((1, 2), np.inf)


@dataclass(frozen=True, slots=True)
class Integrand:
    """dσ/dcos θ in GeV⁻² of the rows of a block (its share at one azimuth is the same for all)."""

    process: Process
    setting: Setting
    rows: Rows
    parameters: Parameters

    def density(self) -> Callable[[Integers | None, Ends], Array]:
        """The function that quadrature asks: (row, node) → GeV⁻²."""
        rows, law = self.rows, self.setting.law
        assert law is not None
        masses = self.rows.masses
        per_angle = two_body_density(rows.collision, masses[2:]) / flux(rows.collision, masses[:2])
        factor = per_angle * rows.reaction.symmetry_factor

        def density(row: Integers | None, ends: Ends) -> Array:
            squared = squared_amplitude(self.process, law, rows.event(row, ends), self.parameters)
            return squared * (factor if row is None else factor[row])

        return density

    def scales(self) -> Array:
        """The width δ of the peaks at the backward and forward pole for every row; ∞ where there is none."""
        rows = self.rows
        if not self.setting.peaks:
            return FLAT
        result = np.full((rows.count, 2), np.inf)
        for side, channel in enumerate(("u", "t")):
            pole = ends_of(np.array([[side]]), np.zeros((1, 1)))
            two_body = rows.two_body(pole)
            for _, mass in (p for p in self.setting.peaks if p[0] == channel):
                result[:, side] = np.fmin(result[:, side], peak_scale(two_body, channel, mass)[:, 0])
        return result
