"""The processes of the QED plugin beside their diagrams, masses and points, for the tests of its laws."""

from __future__ import annotations

from typing import Any, NamedTuple

import mpmath
import numpy as np
from barnwright_qed import bhabha, breit_wheeler, compton, electron_muon, moller, muon_pair, photon_pair, tau_pair
from barnwright_qed.coupling import Coupling
from scipy import constants

from barnwright.event import Event, Point
from barnwright.kinematics import Collision, TwoBody
from barnwright.process import Claims, Process

from . import qed_diagrams, traces

ELECTRON, MUON, TAU = 0.51099895069e-3, 0.1056583755, 1.77693
ALPHA = constants.fine_structure
CHARGE_SQUARED = 4 * np.pi * ALPHA
COUPLING = Coupling(alpha=ALPHA)
TO_BARN = 1e28 * (constants.hbar * constants.c / (1e9 * constants.e)) ** 2
"""GeV⁻² in barn, from CODATA."""

ROUNDED = (ELECTRON + MUON) - MUON
"""The electron's mass, rounded so that its sum with the muon's is exact: a collision counts from that sum."""

Masses = tuple[float, float, float, float]


class Entry(NamedTuple):
    """A process, its diagrams with e = 1, and masses in GeV of beam a, beam b, leg 1, leg 2."""

    process: Process
    diagrams: Any
    masses: Masses

    @property
    def laws(self) -> Any:
        """The squared amplitude and the helicity amplitudes."""
        return self.process.laws

    @property
    def claims(self) -> Claims:
        """What the process claims."""
        assert self.process.claims is not None
        return self.process.claims

    @property
    def threshold(self) -> Any:
        """The lowest √s in GeV at which there is a reaction."""
        return max(sum(map(mpmath.mpf, self.masses[:2])), sum(map(mpmath.mpf, self.masses[2:])))

    def event(self, found: Collision, cosines: Any) -> Event:
        """Events in the cm at cosines of the polar angle, (angle,)."""
        c = np.array([cosines], dtype=float)
        return Event(self.process.legs, TwoBody(found, self.masses, 1 - c, 1 + c))

    def point(self, found: Collision) -> Point:
        """What the closed form sees."""
        return Point.of(self.process.legs, found, self.masses)

    def momenta(self, found: Collision, cosine: float) -> tuple[Any, ...]:
        """The four momenta in many digits, for the very numbers that the collision holds."""
        return traces.two_to_two(held(found), self.masses, 1 - mpmath.mpf(cosine), 1 + mpmath.mpf(cosine))


def collision(sqrt_s: Any) -> Collision:
    """A collision at an energy known to many digits, kept in two floats."""
    head = float(sqrt_s)
    return Collision(np.array([[head]]), np.array([[float(sqrt_s - mpmath.mpf(head))]]), np.ones((1, 1)))


def held(found: Collision) -> Any:
    """The energy that the two floats hold."""
    return mpmath.mpf(float(found.sqrt_s[0, 0])) + mpmath.mpf(float(found.correction[0, 0]))


ENTRIES = {
    entry.process.name: entry
    for entry in (
        Entry(bhabha.process, qed_diagrams.bhabha, (ELECTRON,) * 4),
        Entry(moller.process, qed_diagrams.moller, (ELECTRON,) * 4),
        Entry(electron_muon.process, qed_diagrams.electron_muon, (ROUNDED, MUON, ROUNDED, MUON)),
        Entry(muon_pair.process, qed_diagrams.pair, (ELECTRON, ELECTRON, MUON, MUON)),
        Entry(tau_pair.process, qed_diagrams.pair, (ELECTRON, ELECTRON, TAU, TAU)),
        Entry(compton.process, qed_diagrams.compton, (0.0, ELECTRON, 0.0, ELECTRON)),
        Entry(photon_pair.process, qed_diagrams.photon_pair, (ELECTRON, ELECTRON, 0.0, 0.0)),
        Entry(breit_wheeler.electron, qed_diagrams.breit_wheeler, (0.0, 0.0, ELECTRON, ELECTRON)),
        Entry(breit_wheeler.muon, qed_diagrams.breit_wheeler, (0.0, 0.0, MUON, MUON)),
        Entry(breit_wheeler.tau, qed_diagrams.breit_wheeler, (0.0, 0.0, TAU, TAU)),
    )
}
