"""Fermion pairs at the Z for the tests: the processes, their events, and two second opinions on them.

Inputs are pinned: those of the tables may move. The second opinions are written apart from the plugin: diagrams from
explicit spinors, and the published cross section in vector and axial couplings with plain numbers of mpmath.
"""

from __future__ import annotations

from typing import Any, NamedTuple

import mpmath
import numpy as np
from barnwright_electroweak import lepton_pairs, quark_pairs
from barnwright_electroweak.inputs import ElectroweakInputs

from barnwright.amplitudes import (
    complex_pole,
    current,
    dot,
    electric_charge,
    external_states,
    helicity_rows,
    propagator,
    vector_exchange,
    weak_isospin,
    z_coupling,
)
from barnwright.event import Event, Point
from barnwright.kinematics import Collision, TwoBody
from barnwright.process import Process

PINNED: dict[str, Any] = {
    "alpha": 1 / 128,
    "sin2_theta_w": 0.2312,
    "fermi_constant": 1.1663788e-5,
    "z_mass": 91.1876,
    "z_width": 2.4952,
    "w_mass": 80.379,
}
POLARISED = [(0.0, 0.0), (-0.8, 0.3), (0.8, -0.3), (1.0, -1.0), (-1.0, 1.0)]
"""P of e- and e+."""
ENERGIES = np.array([[10.0], [35.0], [88.0], [91.1876], [91.3], [94.0], [161.0], [250.0]])
COSINES = np.array([[-1.0, -1 + 1e-9, -0.71, 0.0, 0.3, 0.98, 1 - 1e-9, 1.0]])
EVERYTHING = frozenset({"photon", "z", "photon*z"})


class Flavour(NamedTuple):
    """A process, the name of its fermion, that one's mass in GeV and number of colours."""

    process: Process
    name: str
    mass: float
    colours: int

    def event(
        self, electron: float = 0.0, energies: Any = ENERGIES, cosines: Any = COSINES, orientation: int = 1
    ) -> Event:
        """Events at energies (point, 1) and cosines (1, node), the electron's mass in GeV."""
        masses = (electron, electron, self.mass, self.mass)
        turned = TwoBody(collision(energies, orientation), masses, 1 - cosines, 1 + cosines, 0.7)
        return Event(self.process.legs, turned)

    def heights(self, parameters: Any, electron: float = 0.0, parts: Any = EVERYTHING, cosines: Any = COSINES) -> Any:
        """The closed form at ENERGIES and cosines, GeV⁻²."""
        point = Point.of(self.process.legs, collision(ENERGIES), (electron, electron, self.mass, self.mass))
        return self.process.closed_forms[0].heights(cosines, point, parameters, parts if self.charged else None)

    @property
    def charged(self) -> bool:
        """Whether the photon takes part."""
        return electric_charge(self.name) != 0

    def parameters(self, **changes: Any) -> ElectroweakInputs:
        """The pinned inputs with changes; laws take the mass of a quark from the event."""
        found = self.process.parameters_of({**PINNED, **changes})
        assert isinstance(found, ElectroweakInputs)
        return found


def collision(energies: Any, orientation: int = 1) -> Collision:
    """At energies (point, 1) in GeV, beam a along ``orientation`` times +z."""
    return Collision(energies, np.zeros_like(energies), np.ones_like(energies), orientation)


FLAVOURS = {
    "muon": Flavour(lepton_pairs.muon_pair, "mu-", 0.1056583755, 1),
    "tau": Flavour(lepton_pairs.tau_pair, "tau-", 1.77693, 1),
    "neutrino": Flavour(lepton_pairs.neutrino_pair, "nu(mu)", 0.0, 1),
    "up": Flavour(quark_pairs.up_pair, "u", 0.0, 3),
    "down": Flavour(quark_pairs.down_pair, "d", 0.0, 3),
    "strange": Flavour(quark_pairs.strange_pair, "s", 0.0, 3),
    "charm": Flavour(quark_pairs.charm_pair, "c", 1.27, 3),
    "bottom": Flavour(quark_pairs.bottom_pair, "b", 4.18, 3),
}


def mixing(parameters: ElectroweakInputs) -> float:
    """sin²θ_W of the scheme."""
    on_shell = parameters.scheme == "on_shell"
    return 1 - (parameters.w_mass / parameters.z_mass) ** 2 if on_shell else parameters.sin2_theta_w


def charge_squared(parameters: ElectroweakInputs) -> float:
    """e² of the scheme."""
    if parameters.scheme == "on_shell":
        return 4 * np.pi * np.sqrt(2) * parameters.fermi_constant * parameters.w_mass**2 * mixing(parameters) / np.pi
    return 4 * np.pi * parameters.alpha


def z_squared(parameters: ElectroweakInputs) -> float:
    """g_Z² of the scheme."""
    if parameters.scheme == "alpha":
        return charge_squared(parameters) / (mixing(parameters) * (1 - mixing(parameters)))
    return 4 * np.sqrt(2) * parameters.fermi_constant * parameters.z_mass**2


def diagrams(flavour: Flavour, event: Event, parameters: ElectroweakInputs, keyword: str) -> Any:
    """M of the photon's or the Z's diagram by explicit spinors, rows by rising helicities, (helicity, …event)."""
    electron, positron, one, two = external_states(event)
    if keyword == "photon":
        charges = electric_charge("e-") * electric_charge(flavour.name)
        found = -dot(current(positron, electron), current(one, two)) * charge_squared(parameters) * charges / event.s
        return helicity_rows(event, found)[:, 0]
    before = current(positron, electron, *z_coupling("e-", mixing(parameters)))
    after = current(one, two, *z_coupling(flavour.name, mixing(parameters)))
    line = parameters.z_mass, parameters.z_width, parameters.width_scheme
    momentum = np.stack([event.sqrt_s, *(np.zeros_like(event.sqrt_s) for _ in range(3))])
    found = vector_exchange(before, after, momentum, complex_pole(*line)) * propagator(event.s, *line)
    return helicity_rows(event, found * z_squared(parameters))[:, 0]


class Published:
    """dσ/dcos θ of e- e+ -> f f~ for massless electrons, in GeV⁻², plain numbers of mpmath.

    With χ = (g_Z²/4e²) s P(s), v = T₃ − 2Q sin²θ_W and a = T₃, λ the electron's helicity and c_λ = v_e − λ a_e:

        dσ_λ/dc = (πα²N/s) β [(1 + c²) G₁ + (1 − β²) (1 − c²) G₁ + β² (1 + c²) G₃ − 4 λ β c G₂]

    where G₁ = |QQ' + c_λ v'χ|², G₃ = |c_λ a'χ|², G₂ = Re (QQ' + c_λ v'χ)(c_λ a'χ)*. Sources: ALEPH, DELPHI, L3, OPAL,
    SLD, Phys. Rept. 427 (2006) 257, eq. 1.34, for massless fermions; the masses as in the Z physics at LEP 1 report,
    CERN 89-08 (1989), vol. 1 (both from memory).
    """

    def __init__(
        self, flavour: Flavour, sqrt_s: float, parameters: ElectroweakInputs, with_photon: bool = True
    ) -> None:
        self.colours, self.s = flavour.colours, mpmath.mpf(sqrt_s) ** 2
        self.charge = -electric_charge(flavour.name) if with_photon else 0.0
        self.beta = mpmath.sqrt(1 - 4 * mpmath.mpf(flavour.mass) ** 2 / self.s)
        self.alpha = mpmath.mpf(charge_squared(parameters)) / (4 * mpmath.pi)
        mass, width = mpmath.mpf(parameters.z_mass), mpmath.mpf(parameters.z_width)
        imaginary = self.s * width / mass if parameters.width_scheme == "running" else mass * width
        unit = mpmath.mpf(z_squared(parameters)) / (16 * mpmath.pi * self.alpha)  # g_Z²/4e²
        self.chi = unit * self.s / (self.s - mass**2 + 1j * imaginary)
        sin2 = mpmath.mpf(mixing(parameters))
        self.electron = self._couplings("e-", sin2)
        self.other = self._couplings(flavour.name, sin2)

    @staticmethod
    def _couplings(name: str, sin2: Any) -> tuple[Any, Any]:
        isospin = mpmath.mpf(weak_isospin(name))
        return isospin - 2 * mpmath.mpf(electric_charge(name)) * sin2, isospin

    def integral(self, low: float, high: float, polarised: tuple[float, float] = (0.0, 0.0)) -> Any:
        """∫ dσ/dc between two cosines."""
        electron, positron = polarised
        left, right = (1 - electron) * (1 + positron) / 4, (1 + electron) * (1 - positron) / 4
        return left * self._of_helicity(-1, low, high) + right * self._of_helicity(1, low, high)

    def _of_helicity(self, helicity: int, low: float, high: float) -> Any:
        vector, axial = self.other
        strength = self.electron[0] - helicity * self.electron[1]
        even, odd = self.charge + strength * vector * self.chi, strength * axial * self.chi
        flat, curved = abs(even) ** 2, abs(odd) ** 2
        mixed = mpmath.re(even * mpmath.conj(odd))
        share = 1 - self.beta**2

        def primitive(c: Any) -> Any:
            c = mpmath.mpf(c)
            square = c + c**3 / 3
            angular = flat * (square + share * (c - c**3 / 3)) + curved * self.beta**2 * square
            return angular - 2 * helicity * mixed * self.beta * c**2

        scale = mpmath.pi * self.alpha**2 * self.colours / self.s * self.beta
        return scale * (primitive(high) - primitive(low))
