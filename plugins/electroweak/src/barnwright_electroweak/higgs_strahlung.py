"""electroweak/higgs-strahlung: e- e+ -> Z0 H0, the electron massless, the Z stable.

Source: B. L. Ioffe, V. A. Khoze, Sov. J. Part. Nucl. 9 (1978) 50; B. W. Lee, C. Quigg, H. B. Thacker, Phys. Rev. D 16
(1977) 1519; A. Djouadi, Phys. Rept. 457 (2008) 1, section 4.1.

Rules of this file
------------------
- M = g_Z² M_Z g_τ v̄γ^μ P_τ u ε*_μ/D(s): the vertex ZZH is g_Z M_Z, g_L = −½ + sin²θ_W and g_R = sin²θ_W are the
  electron's couplings, D is the Z's propagator.
- In the cm, with q and E the Z's momentum and energy and c = cos θ between e- and Z: the current of e-_L e+_R or
  e-_R e+_L gives √s E sin θ/M_Z to the Z of helicity 0, √(s/2)(1 ± c) to those of ±1; summed, s(2 + q² sin²θ/M_Z²).
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.amplitudes import propagator
from barnwright.plugin import (
    Claims,
    ClosedForm,
    Event,
    HelicityAmplitudes,
    Point,
    Process,
    SquaredAmplitude,
    Validity,
    mass_of,
    parameter,
    table_source,
)
from barnwright_electroweak import inputs
from barnwright_electroweak.cautions import RADIATION

Array = NDArray[np.float64]
Complex = NDArray[np.complex128]

MASSLESS = ("e-",)
ROWS = tuple((electron, -electron, z, 0) for electron in (-1, 1) for z in (-1, 0, 1))
"""Helicities that do not vanish: electron, positron, Z, H."""
ELECTRON = -1.0, -0.5
"""Charge and isospin."""
TINY = np.finfo(float).tiny
"""What the momentum of a Z at rest is divided by: its sin θ is 0."""


class HiggsStrahlungInputs(inputs.ElectroweakInputs):
    """Fermi's constant, the mixing angle and the masses; α is read by the scheme `alpha` alone."""

    scheme: inputs.Scheme = inputs.scheme("fermi", photons=False)
    alpha: inputs.Positive = inputs.alpha({"scheme": ("alpha",)})
    higgs_mass: inputs.Positive = parameter(
        mass_of("H0"), unit="GeV", meaning="mass of the Higgs boson", source=table_source()
    )


def squared(event: Event, parameters: HiggsStrahlungInputs) -> Array:
    """|M|², dimensionless: g_Z⁴ (g_L² + g_R²) s (2 M_Z² + q² sin²θ)/4|D|²."""
    coupled = inputs.couplings(parameters)
    strength = coupled.left(*ELECTRON) ** 2 + coupled.right(ELECTRON[0]) ** 2
    spins = 2 * event.mass(1) ** 2 + np.square(event.cm_vector(1).pt)
    line = np.square(np.abs(_propagator(event.s, parameters)))
    return np.asarray(coupled.neutral**2 * strength / 4 * event.s * line * spins)


def amplitudes(event: Event, parameters: HiggsStrahlungInputs) -> Complex:
    """The rows of `ROWS`, dimensionless: each electron helicity with the Z's −1, 0 and 1."""
    coupled = inputs.couplings(parameters)
    z, mass = event.cm_vector(1), event.mass(1)
    cosine = z.cos_theta * event.cm_vector("beam_a").cos_theta
    along, against = mass * (1 + cosine), mass * (1 - cosine)
    across = np.sqrt(2) * z.energy * z.pt / np.maximum(z.momentum, TINY)
    left, right = coupled.left(*ELECTRON), coupled.right(ELECTRON[0])
    rows = (left * along, left * across, left * against, right * against, -right * across, right * along)
    scale = coupled.neutral * np.sqrt(event.s / 2) * _propagator(event.s, parameters)
    return np.asarray(np.stack(np.broadcast_arrays(*rows))[:, None] * scale)


def cumulative(x: Array, point: Point, parameters: HiggsStrahlungInputs) -> Array:
    """∫ dσ/dcos θ from 0 to x in GeV⁻²; an odd function of x."""
    coupled = inputs.couplings(parameters)
    strength = coupled.left(*ELECTRON) ** 2 + coupled.right(ELECTRON[0]) ** 2
    q = point.final_momentum
    spins = 2 * point.mass(1) ** 2 + np.square(q) * (1 - np.square(x) / 3)
    line = np.square(np.abs(_propagator(point.s, parameters)))
    scale = coupled.neutral**2 * strength / (128 * np.pi) * q / point.momentum * line
    return np.asarray(scale * x * spins)


def _propagator(s: Array, parameters: HiggsStrahlungInputs) -> Complex:
    """1/D(s) in GeV⁻²; mass and width are those of the form that `width_scheme` names."""
    return propagator(s, parameters.z_mass, parameters.z_width, parameters.width_scheme)


process = Process(
    name="higgs-strahlung",
    reaction="e- e+ -> Z0 H0",
    summary="a Higgs boson and a Z from e- e+ through a Z, the electron massless, the final Z stable",
    references=(
        "B. L. Ioffe, V. A. Khoze, Sov. J. Part. Nucl. 9 (1978) 50",
        "B. W. Lee, C. Quigg, H. B. Thacker, Phys. Rev. D 16 (1977) 1519",
        "A. Djouadi, Phys. Rept. 457 (2008) 1, section 4.1",
    ),
    laws=(
        SquaredAmplitude(squared, massless=MASSLESS),
        HelicityAmplitudes(amplitudes, helicities=ROWS, massless=MASSLESS),
    ),
    closed_forms=(ClosedForm(cumulative, observable="cos_theta(1, frame=cm)", massless=MASSLESS),),
    parameters=HiggsStrahlungInputs,
    masses={"e-": 0.0, "Z0": "z_mass", "H0": "higgs_mass"},
    claims=Claims(
        exchange=(("beam_a", "beam_b"),),
        limits=(
            "dσ/dcos θ ∝ λ sin²θ + 8 M_Z²/s, λ = 4q²/s: sin²θ at high energy (Djouadi, eq. 4.7)",
            "σ ∝ q, the Z's momentum, at threshold: an S wave",
        ),
    ),
    valid=Validity(
        sqrt_s=(0.0, 3000.0),
        text="lowest order with a stable Z, from M_Z + M_H on; above about 1 TeV electroweak corrections exceed 10 %",
    ),
    cautions=(
        "Radiation from the beams is left out; it lowers σ by 10 to 20 % near 240 GeV.",
        "Electroweak corrections, a few per cent of σ, are left out, and so are the widths of the final Z and H.",
        "With Z -> nu nu~ or e- e+, vector-boson fusion gives the same final state and grows with energy.",
        RADIATION,
    ),
    alternatives={
        "alpha": {"scheme": "alpha"},
        "on shell": {"scheme": "on_shell"},
        "no width": {"z_width": 0.0},
        "fixed width": {"width_scheme": "fixed"},
        "heavier": {"higgs_mass": 140.0},
    },
)
