"""Where a squared amplitude is large: pure data, which a phase-space map turns into a change of variables."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, get_args

from barnwright.errors import nearest

Shape = Literal["resonance", "power", "logarithm", "soft", "collinear"]
SHAPES: tuple[str, ...] = get_args(Shape)


@dataclass(frozen=True, slots=True)
class Peak:
    """One place where a squared amplitude is large.

    Parameters
    ----------
    of
        The invariant: ``"t"``, ``"u"``, or the legs whose invariant mass it is (``"mu- mu+"``); for ``soft`` and
        ``collinear`` the legs that become soft or collinear.
    shape
        ``"resonance"`` (a Breit-Wigner in the invariant mass), ``"power"`` (1/(m² − x)^power), ``"logarithm"`` (1/x
        over a wide range), ``"soft"`` or ``"collinear"``.
    at
        Mass of what is exchanged or resonates: GeV, or the name of a parameter, or of a leg whose mass it is; None: 0.
    width
        Of a resonance: GeV, or the name of a parameter.
    power
        The exponent of a ``power``.

    Raises
    ------
    ValueError
        For a shape that does not exist; the nearest is named.
    """

    of: str
    shape: Shape
    at: str | float | None = None
    width: str | float | None = None
    power: float = 1.0

    def __post_init__(self) -> None:
        if self.shape not in SHAPES:
            near = nearest(str(self.shape), SHAPES)
            ending = f"; nearest: {near}" if near else ""
            raise ValueError(f"the shape of a peak is one of {', '.join(SHAPES)}, not {self.shape!r}{ending}")
