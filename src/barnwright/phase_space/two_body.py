"""Two-body phase space: its density in the cosine of the polar angle, and the width of a peak on that axis."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.kinematics import Collision, TwoBody

Array = NDArray[np.float64]

SMALLEST_SCALE = 1e-30


def two_body_density(collision: Collision, masses: tuple[float, ...]) -> Array:
    """dΦ₂/dcos θ = p'/(8π √s), the azimuth integrated over; dimensionless, shape (point, 1).

    Source: PDG Review, Kinematics, two-body phase space (dΦ₂ = p dΩ/(16π² √s), with (2π)⁴δ⁴ included), from memory.
    Parameters: masses in GeV of the two outgoing legs.
    """
    return np.asarray(collision.momentum(*masses) / (8 * np.pi * collision.sqrt_s))


def peak_scale(two_body: TwoBody, channel: str, mass: float) -> Array:
    """δ of a peak 1/(M² − t) or 1/(M² − u) as a function of the distance x from its pole of the axis: x + δ.

    Parameters
    ----------
    two_body : TwoBody
        Evaluated at any angle.
    channel : "t" (peak at cos θ = 1) or "u" (at −1)
    mass : float, GeV
        M, of the exchanged particle.

    Returns
    -------
    array, shape (point, 1)
        ∞ where the peak is wider than the axis.
    """
    transfer = two_body.t if channel == "t" else two_body.u
    distance = two_body.one_minus_cos if channel == "t" else two_body.one_plus_cos
    slope = 2 * two_body.incoming_momentum * two_body.outgoing_momentum
    with np.errstate(divide="ignore", invalid="ignore"):
        scale = (mass * mass - transfer) / slope - distance
    scale = np.where(np.isfinite(scale), np.maximum(scale, SMALLEST_SCALE), np.inf)
    return np.where(scale > 2.0, np.inf, scale)
