"""Elastic scattering of neutrinos on electrons in the contact limit, the electron's mass exact.

Source: G. 't Hooft, Phys. Lett. B 37 (1971) 195; PDG Review 2024, "Electroweak model and constraints on new physics",
eqs. 10.14–10.16 (from memory).

Rules of this file
------------------
- L = −2√2 G_F [ν̄γ^μ P_L ν][ēγ_μ(g_L P_L + g_R P_R)e] with g_L = −½ + sin²θ_W, g_R = sin²θ_W; for ν_e the charged
  current, by Fierz's identity, adds 1 to g_L. An antineutrino exchanges g_L and g_R.
- Averaged over the electron alone, since a neutrino has one helicity. With a = p_ν·p_e, b = p_ν'·p_e, n = p_ν·p_ν':
  |M|² = 64 G_F² [g_L² a² + g_R² b² − g_L g_R m² n].
- In the cm, with k the momentum, w = 1 + cos θ: a = k√s, b = k(m²/√s + k w), n = k²(2 − w); the antiderivative starts
  at cos θ = −1, where every term of b is positive.
- Helicity amplitudes: with E + k = √s and E − k = m²/√s the electron's chiral components are √s and m²/√s; of a
  neutrino's electron they are those of F. Halzen, A. Martin, Quarks and Leptons (1984), section 5.3 (from memory).
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import (
    Claims,
    ClosedForm,
    Event,
    HelicityAmplitudes,
    Parameters,
    Point,
    Process,
    SquaredAmplitude,
    Validity,
)
from barnwright_electroweak import inputs
from barnwright_electroweak.cautions import BOUND_ELECTRONS, RADIATION

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]


class ContactInputs(Parameters):
    """Fermi's constant and the mixing angle: all that the contact limit knows."""

    fermi_constant: inputs.Positive = inputs.fermi_constant()
    sin2_theta_w: inputs.Fraction = inputs.sin2_theta_w()


@dataclass(frozen=True, slots=True)
class Contact:
    """One neutrino on an electron; ``helicity`` −1 for a neutrino, +1 for an antineutrino, ``charged`` for ν_e."""

    helicity: int
    charged: bool

    def couplings(self, parameters: ContactInputs) -> tuple[float, float]:
        """Couplings to electrons of the neutrino's helicity and of the other one."""
        left = parameters.sin2_theta_w + (0.5 if self.charged else -0.5)
        right = parameters.sin2_theta_w
        return (left, right) if self.helicity < 0 else (right, left)

    def squared(self, event: Event, parameters: ContactInputs) -> Array:
        """|M|², dimensionless."""
        same, other = self.couplings(parameters)
        mass = event.mass("beam_b")
        bracket = (
            np.square(same * event.dot("beam_a", "beam_b"))
            + np.square(other * event.dot(1, "beam_b"))
            - same * other * mass**2 * event.dot("beam_a", 1)
        )
        return np.asarray(64 * parameters.fermi_constant**2 * bracket)

    def amplitudes(self, event: Event, parameters: ContactInputs) -> Complex:
        """The four rows of `rows`, dimensionless and real up to phases."""
        same, other = self.couplings(parameters)
        forth, back = _half_angles(event)
        momentum, small = event.cm_vector("beam_a").energy, event.mass("beam_b") ** 2 / event.sqrt_s
        flip = other * event.mass("beam_b") * np.sqrt(forth * back)
        rows = (same * event.sqrt_s - other * small * back, flip, -flip, other * event.sqrt_s * forth)
        scale = 8 * np.sqrt(2) * parameters.fermi_constant * momentum
        return np.asarray(scale * np.stack(np.broadcast_arrays(*rows))[:, None], dtype=complex)

    def rows(self) -> tuple[tuple[int, ...], ...]:
        """Helicities of ν, e, ν', e': electrons of the neutrino's helicity first, those of the other one last."""
        h = self.helicity
        return ((h, h, h, h), (h, h, h, -h), (h, -h, h, h), (h, -h, h, -h))

    def cumulative(self, x: Array, point: Point, parameters: ContactInputs) -> Array:
        """∫ dσ/dcos θ from −1 to x in GeV⁻²."""
        same, other = self.couplings(parameters)
        s, k, w = point.s, point.momentum, 1 + x
        square = point.mass("beam_b") ** 2
        floor, rise = square / point.sqrt_s, k * w
        mean = (
            same**2 * s
            + other**2 * (floor * floor + floor * rise + np.square(rise) / 3)
            - same * other * square * (2 - w / 2)
        )
        return np.asarray(2 * np.square(parameters.fermi_constant * k) / (np.pi * s) * w * mean)


def _half_angles(event: Event) -> tuple[Array, Array]:
    """cos²(θ/2) and sin²(θ/2) of the outgoing neutrino; every term is positive, whichever way beam a moves."""
    before, after = event.cm_vector("beam_a"), event.cm_vector(1)
    forth = before.plus * after.plus + before.minus * after.minus
    back = before.plus * after.minus + before.minus * after.plus
    scale = 4 * before.energy * after.energy
    return forth / scale, back / scale


def _process(contact: Contact, neutrino: str, word: str, crossed: str) -> Process:
    """The process of one neutrino; ``word`` is its name in a sentence, ``crossed`` that of its antiparticle."""
    massless = (neutrino,)
    limit = "g_L² + g_R²/3" if contact.helicity < 0 else "g_L²/3 + g_R²"
    left = "1/2 + sin2_theta_w" if contact.charged else "-1/2 + sin2_theta_w"
    return Process(
        name=_name(word),
        reaction=f"{neutrino} e- -> {neutrino} e-",
        summary=f"elastic scattering of {word}s on electrons in the contact limit, the electron's mass exact",
        references=(
            "G. 't Hooft, Phys. Lett. B 37 (1971) 195",
            "PDG Review 2024, Electroweak model and constraints on new physics, section 10.3",
        ),
        laws=(
            SquaredAmplitude(contact.squared, massless=massless),
            HelicityAmplitudes(contact.amplitudes, helicities=contact.rows(), massless=massless),
        ),
        closed_forms=(ClosedForm(contact.cumulative, observable="cos_theta(1, frame=cm)", massless=massless),),
        parameters=ContactInputs,
        claims=Claims(
            crossing=(f"electroweak/{_name(crossed)}",),
            limits=(f"σ → (G_F² s/π)({limit}) for s far above m², g_L = {left}, g_R = sin2_theta_w ('t Hooft 1971)",),
        ),
        valid=Validity(
            sqrt_s=(0.0, 5.0),
            text="contact limit, s far below M_W²: at √s = 5 GeV (24 TeV on an electron at rest) the propagators of W "
            "and Z change σ by about 1 %",
        ),
        cautions=(
            "Radiative corrections, a few per cent of σ, are left out; sin2_theta_w is meant at low momentum transfer.",
            BOUND_ELECTRONS,
            RADIATION,
        ),
        alternatives={"no vector coupling of mu and tau neutrinos": {"sin2_theta_w": 0.25}},
    )


def _name(word: str) -> str:
    return f"{word.replace(' ', '-')}-electron"


muon_neutrino = _process(Contact(-1, charged=False), "nu(mu)", "muon neutrino", "muon antineutrino")
muon_antineutrino = _process(Contact(1, charged=False), "nu(mu)~", "muon antineutrino", "muon neutrino")
electron_neutrino = _process(Contact(-1, charged=True), "nu(e)", "electron neutrino", "electron antineutrino")
electron_antineutrino = _process(Contact(1, charged=True), "nu(e)~", "electron antineutrino", "electron neutrino")
