"""How lines look: told apart in colour, by colour-blind readers, and in a black-and-white print."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

#: Okabe and Ito's palette for colour-blind readers ("Color Universal Design", 2008), darkest first so that it prints.
COLOURS = ("#0072B2", "#D55E00", "#009E73", "#000000", "#CC79A7", "#E69F00", "#56B4E9")
#: One line style a colour, so that a black-and-white print still tells them apart.
DASHES = ("-", (0, (5, 2)), (0, (1, 1.2)), "-.", (0, (8, 2)), (0, (3, 1, 1, 1, 1, 1)), (0, (6, 1, 1, 1)))
#: Hatches of bands that may lie over each other.
HATCHES = ("////", r"\\\\", "....", "xxxx")
#: Cividis: even in lightness, and the same for the usual kinds of colour blindness.
COLOUR_MAP = "cividis"
#: From orange to purple through white at 0, for values of both signs; safe for the usual kinds of colour blindness.
SIGNED_MAP = "PuOr_r"


@dataclass(frozen=True, slots=True)
class Look:
    """Colour, dashes and width of a line; for a band the hatch."""

    colour: str
    dash: Any = "-"
    width: float = 1.3
    hatch: str | None = None

    @property
    def line(self) -> dict[str, Any]:
        """matplotlib's words for a line."""
        return {"color": self.colour, "linestyle": self.dash, "linewidth": self.width}


NOMINAL = Look(COLOURS[0], width=1.8)
#: More lines than colours: the rest is thin and grey, and the legend says how many there are.
REST = Look("#888888", width=0.6)


@dataclass(slots=True)
class Looks:
    """Hands out looks, one after the other, to what shares a panel with the nominal line."""

    lines: int = 0
    bands: int = 0

    def line(self) -> Look:
        """The next line's look; `REST` when the colours are used up."""
        self.lines += 1
        return Look(COLOURS[self.lines], DASHES[self.lines]) if self.lines < len(COLOURS) else REST

    def band(self) -> Look:
        """The next band's look."""
        self.bands += 1
        return Look("#666666", hatch=HATCHES[(self.bands - 1) % len(HATCHES)])
