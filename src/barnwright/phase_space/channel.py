"""A channel: one tree of two-body splittings, from numbers of the unit cube to momenta, with its exact density.

Rules of this file
------------------
- Everything in the centre of mass, beam a along +z; for a decay the parent rests. Momenta have the shape (leg, 4,
  event), legs in written order, components (E, px, py, pz) in GeV.
- dΦ_n = (2π)⁴ δ⁴(P − Σp) Π d³p/((2π)³ 2E) of a tree is a product: dm²/2π for every inner system, and
  p* dcos dφ/(16π² M) for every splitting. Source: PDG Review, Kinematics, from memory.
- The density g is that of events with respect to dΦ_n: ∫ f dΦ_n = ∫ du f/g. It is made of the momenta alone, so that
  every channel can tell it for the events of any other; for those outside its limits it is 0.
- Axes: first the invariants from the root down, then the cosines, then the azimuths; 3n − 4 in all.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.phase_space.incoming import Surroundings
from barnwright.phase_space.maps import azimuth
from barnwright.phase_space.mother import Mother
from barnwright.phase_space.parts import Splitting
from barnwright.phase_space.steps import Made, make
from barnwright.phase_space.systems import Systems
from barnwright.phase_space.tell import tell

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Channel:
    """One way to make momenta; pure data.

    Attributes
    ----------
    name : str
        The tree as a person reads it: ``(gamma (mu- mu+))``.
    incoming : tuple of floats, GeV
        Masses of the one or two incoming particles.
    masses : tuple of floats, GeV
        Of the outgoing legs.
    splittings : tuple of Splitting
        From the whole downwards: a mother stands before her parts.
    """

    name: str
    incoming: tuple[float, ...]
    masses: tuple[float, ...]
    splittings: tuple[Splitting, ...]

    @property
    def axes(self) -> int:
        """How many numbers make an event: 3n − 4."""
        return 3 * len(self.masses) - 4

    def momenta(self, u: Array, energy: Array | float) -> tuple[Array, Array]:
        """Events and their density.

        Parameters
        ----------
        u : array (axes, event)
            In (0, 1).
        energy : number or array (event,), GeV
            √s, above the sum of the masses.

        Returns
        -------
        momenta : array (leg, 4, event), GeV
        density : array (event,)
            Per unit of dΦ_n, GeV^(4 − 2n); infinite where the limits leave nothing.
        """
        n, events = len(self.masses), u.shape[1]
        around = Surroundings.of(self.incoming, np.asarray(energy, dtype=float))
        mothers = {self.splittings[0].mother: Mother.whole(around.energy)}
        momenta, density = np.empty((n, 4, events)), np.full(events, self._constant)
        invariants, cosines, turns = iter(u[: n - 2]), u[n - 2 : 2 * n - 3], azimuth.value(u[2 * n - 3 :])
        with np.errstate(all="ignore"):  # an empty window divides by its width
            for splitting, cosine, *turn in zip(self.splittings, cosines, *turns, strict=True):
                made = make(splitting, mothers.pop(splitting.mother), (invariants, cosine, (turn[0], turn[1])), around)
                density *= made.density
                _keep(splitting, made, mothers, momenta)
        return momenta, np.where(density > 0, density, np.inf) if self.limited else density

    def density(self, momenta: Array, energy: Array | float) -> Array:
        """The density of any events, per unit of dΦ_n (GeV^(4 − 2n)); shapes as in `momenta`, 0 outside the limits."""
        return self.density_in(Systems(momenta, self.masses, np.asarray(energy, dtype=float)))

    def density_in(self, systems: Systems) -> Array:
        """The density of the events behind some systems, which the channels of a batch share."""
        around = Surroundings.of(self.incoming, systems.energy)
        density: Array = np.asarray(self._constant)
        with np.errstate(all="ignore"):
            for splitting in self.splittings:
                density = density * tell(splitting, systems, around)
        return np.where(density > 0, density, 0.0) if self.limited else density

    @property
    def limited(self) -> bool:
        """Whether cuts bound any of its numbers."""
        return any(part.limited for splitting in self.splittings for part in (splitting.first, splitting.second))

    @property
    def _constant(self) -> float:
        """(2π)^(n−2) for the invariants times (16π²/2π)^(n−1) for the splittings."""
        n = len(self.masses)
        return float((2.0 * np.pi) ** (n - 2) * (8.0 * np.pi) ** (n - 1))


def densities(channels: Sequence[Channel], momenta: Array, energy: Array | float) -> Array:
    """The densities that several channels of one reaction give the same events, shape (channel, event)."""
    systems = Systems(momenta, channels[0].masses, np.asarray(energy, dtype=float))
    return np.stack([channel.density_in(systems) for channel in channels])


def _keep(splitting: Splitting, made: Made, mothers: dict[tuple[int, ...], Mother], momenta: Array) -> None:
    """Legs go to the event, systems wait for their own splitting."""
    for part, drawn, vector in zip((splitting.first, splitting.second), made.parts, made.vectors, strict=True):
        if part.single:
            for component, array in enumerate(vector):
                momenta[part.legs[0] - 1, component] = array
        else:
            mothers[part.legs] = Mother.moving(vector, drawn.mass, drawn.square, drawn.rise)
