"""Momenta counted as incoming: what makes processes with legs on other sides one function.

Rules of this file
------------------
- An outgoing momentum counts with a minus, so that all four momenta of a reaction add up to zero and a leg that changes
  sides changes nothing else. The factor −1 of every fermion that changes sides belongs to the functions that use this.
- Legs are ``"beam_a"``, ``"beam_b"``, 1 and 2.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.plugin import Event

Array = NDArray[np.float64]
Leg = str | int
Legs = tuple[Leg, Leg]


def on_one_side(first: Leg, second: Leg) -> bool:
    """Whether both legs come in or both go out."""
    return isinstance(first, str) == isinstance(second, str)


def inward(event: Event, first: Leg, second: Leg) -> Array:
    """The four-product in GeV² of two momenta counted as incoming."""
    product = event.dot(first, second)
    return product if on_one_side(first, second) else -product


def invariant(event: Event, first: Leg, second: Leg) -> Array:
    """The square in GeV² of the sum of two momenta counted as incoming: s, t or u."""
    return event.s if on_one_side(first, second) else event.transfer(first, second)
