"""Where a process may be trusted."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Validity:
    """The range of √s in GeV within which the laws hold, ends included (None: everywhere), and a sentence about it."""

    sqrt_s: tuple[float, float] | None = None
    text: str = ""
