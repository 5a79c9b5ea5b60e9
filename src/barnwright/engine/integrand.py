"""The differential cross section on the polar axis: law, flux and phase space together.

Rules of this file
------------------
- The rows of an integral are those of the block, once for every part of the law that is asked for: part after part.
- The parts share their events. A row number of an integral is part × rows + row.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import flux
from barnwright.engine.law import angular, law_of, squared_amplitude
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Setting
from barnwright.integrate.polar_axis import Ends, Integers, ends_of
from barnwright.phase_space import peak_scale, two_body_density
from barnwright.process import AngularCrossSection, Parameters, Parts, Process, is_interference
from barnwright.process.contributions import plain

Array = NDArray[np.float64]
PartDensity = Callable[[Parts | None], Array]
"""dσ/dcos θ in GeV⁻² of one part of the law, at locations that are fixed."""

FLAT = np.full((1, 2), np.inf)


@dataclass(frozen=True)
class Integrand:
    """dσ/dcos θ in GeV⁻² of the rows of a block (its share at one azimuth is the same for all)."""

    process: Process
    setting: Setting
    rows: Rows
    parameters: Parameters

    @property
    def count(self) -> int:
        """Rows of the integral: those of the block for every part."""
        return self.rows.count * len(self.setting.parts)

    @property
    def parts(self) -> tuple[Parts | None, ...]:
        """What is asked of the law, one after another."""
        return tuple(parts for _, parts in self.setting.parts)

    @cached_property
    def signed(self) -> NDArray[np.bool_]:
        """Which rows of the integral may be negative: those with an interference, and all where the process says so."""
        found = [self.process.signed or (p is not None and any(map(is_interference, p))) for p in self.parts]
        return np.repeat(np.array(found), self.rows.count)

    def alike(self, chosen: NDArray[np.bool_]) -> NDArray[np.bool_]:
        """What is chosen for any part, for all of them: they share their events, and so their panels."""
        parts = len(self.parts)
        if parts == 1:
            return chosen
        return np.tile(chosen.reshape(parts, -1, chosen.shape[1]).any(axis=0), (parts, 1))

    @property
    def interferes(self) -> bool:
        """Whether a part is, or contains, the interference of others."""
        return any(parts is not None and any(map(is_interference, parts)) for parts in self.parts)

    def made_of(self, found: Array, ends: Ends) -> Array:
        """The sizes of a density, (row, node); of an interference the sum of the two parts that interfere."""
        count = self.rows.count
        sizes = np.abs(found).reshape(len(self.parts), count, -1)
        known = {parts: sizes[number].copy() for number, parts in enumerate(self.parts)}
        own = ends if ends.one_plus.shape[0] == 1 else Ends(ends.one_minus[:count], ends.one_plus[:count])
        at = self._at(None, own)
        for size, parts in zip(sizes, self.parts, strict=True):
            if parts is None or not any(map(is_interference, parts)):
                continue
            for keyword in plain(parts):
                alone = frozenset((keyword,))
                np.add(size, known[alone] if alone in known else np.abs(at(alone)), out=size)
        return sizes.reshape(found.shape)

    def tiled(self, array: NDArray[np.generic]) -> NDArray[np.generic]:
        """An array of rows of the block, or of one row for all, as one of rows of the integral."""
        parts = len(self.setting.parts)
        return array if parts == 1 or array.shape[0] == 1 else np.concatenate([array] * parts)

    def density(self) -> Callable[[Integers | None, Ends], Array]:
        """The function that quadrature asks: (row, node) → GeV⁻²."""
        return self._of_one_part if len(self.parts) == 1 else self._of_all_parts

    def _of_one_part(self, row: Integers | None, ends: Ends) -> Array:
        return self._at(row, ends)(self.parts[0])

    def _of_all_parts(self, row: Integers | None, ends: Ends) -> Array:
        if row is None:
            count = self.rows.count
            if ends.one_plus.shape[0] == self.count:
                ends = Ends(ends.one_minus[:count], ends.one_plus[:count])
            at, found = self._at(None, ends), np.empty((len(self.parts), count, ends.one_plus.shape[1]))
            for answer, parts in zip(found, self.parts, strict=True):
                answer[:] = at(parts)
            return found.reshape(self.count, -1)
        number, own = np.divmod(row, self.rows.count)
        at = self._at(own, ends)
        chosen = number if row.ndim == ends.one_plus.ndim else number[:, None]
        found = np.zeros(ends.one_plus.shape)
        for each in np.unique(number):
            found = np.where(chosen == each, at(self.parts[each]), found)
        return found

    def _at(self, row: Integers | None, ends: Ends) -> PartDensity:
        """The densities of every part at locations on the polar axis."""
        process, setting, rows = self.process, self.setting, self.rows
        if isinstance(law_of(process, setting), AngularCrossSection):
            point, cosine = rows.point(row, ends), ends.c
            around = 2 * np.pi * rows.reaction.symmetry_factor
            return lambda parts: around * angular(process, setting, point, cosine, self.parameters, parts)
        event = rows.event(row, ends)
        factor = self._factor if row is None else self._factor[row]
        return lambda parts: squared_amplitude(process, setting, event, self.parameters, parts) * factor

    @cached_property
    def _factor(self) -> Array:
        """What turns |M|² into dσ/dcos θ, shape (row, 1)."""
        collision, masses = self.rows.collision, self.rows.masses
        per_angle = two_body_density(collision, masses[2:]) / flux(collision, masses[:2])
        return per_angle * self.rows.reaction.symmetry_factor

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
        return np.asarray(self.tiled(result))
