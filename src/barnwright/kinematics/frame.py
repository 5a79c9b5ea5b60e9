"""The frames in which an observable may be asked for."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal


@dataclass(frozen=True, slots=True)
class Frame:
    """`lab`, `cm`, or the rest frame of some outgoing legs (a pure boost from the cm, axes kept).

    Attributes
    ----------
    kind : "lab", "cm" or "rest"
    legs : tuple of int
        The leg numbers (1-based) whose sum is at rest; empty unless ``kind`` is "rest".
    """

    kind: Literal["lab", "cm", "rest"]
    legs: tuple[int, ...] = ()


LAB = Frame("lab")
CM = Frame("cm")
