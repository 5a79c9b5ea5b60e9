"""Changes of variable, one a file: a number u of the unit interval to a value, and the density du/dvalue of a value.

Rules of this room
------------------
- Every body is a function of numbers in ``np.`` calls, without branches on them: arrays of any shapes that broadcast.
- A density is exact and known from the value alone, whichever map made it.
- The ends of a range are arguments: what a cut or the kinematics forbids is never reached by any u in (0, 1).
- Maps of an invariant m² are in GeV². Maps of a polar angle give 1 − cos and 1 + cos apart, because near a pole the
  small one of them carries the digits.
"""

from barnwright.phase_space.maps import (
    azimuth,
    collinear,
    cosine,
    flat,
    logarithm,
    paired,
    power,
    resonance,
    soft,
    transfer,
    two_sided,
    volume,
)

__all__ = [
    "azimuth",
    "collinear",
    "cosine",
    "flat",
    "logarithm",
    "paired",
    "power",
    "resonance",
    "soft",
    "transfer",
    "two_sided",
    "volume",
]
