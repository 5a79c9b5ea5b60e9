"""A formula in place of a process."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field

from barnwright.documents.base import MAX_ITEMS, Document, Expects, Name, Number, Text


class FormulaPeak(Document):
    """Where the squared amplitude is large: of which invariant, in which shape, at what mass and width (GeV)."""

    of: Name
    shape: Literal["resonance", "power", "logarithm", "soft", "collinear"]
    at: Annotated[Number | Name, Expects("a finite number (GeV), or the name of a parameter or leg")] | None = None
    width: Annotated[Number | Name, Expects("a finite number (GeV), or the name of a parameter")] | None = None
    power: Number = 1.0


class Formula(Document):
    """A squared amplitude in GeV^(2(4 - N)), N the number of all legs, written as text.

    ``spin_colour`` says whether it is averaged over the initial states already, or summed only.
    ``parameters`` gives the names that the text may use, each with its default.
    """

    reaction: Text
    squared_amplitude: Text
    spin_colour: Literal["averaged", "summed"]
    parameters: Annotated[
        dict[Name, Number], Field(max_length=MAX_ITEMS), Expects("a table of names and their default numbers")
    ] = Field(default_factory=dict)
    peaks: Annotated[tuple[FormulaPeak, ...], Field(max_length=MAX_ITEMS), Expects("a list of peaks")] = ()
