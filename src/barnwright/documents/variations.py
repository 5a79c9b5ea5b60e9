"""Variations: the same prediction with other inputs."""

from __future__ import annotations

from typing import Annotated, Any

from pydantic import BeforeValidator, Field

from barnwright.documents.base import MAX_ITEMS, Document, Expects, Mass, Name, ParameterValue, Polarisation
from barnwright.documents.beams import _of_parent
from barnwright.documents.cuts import CutChange


class BeamsChange(Document):
    """The part of the beams that a variation may change: the polarisation."""

    polarisation: Annotated[
        dict[Name, Polarisation],
        BeforeValidator(_of_parent),
        Field(max_length=2),
        Expects("a table of at most two beams and their polarisations, each from -1 to 1"),
    ] = Field(default_factory=dict)


class Variation(Document):
    """A named change of parameters, masses (GeV), polarisation or cuts, merged key by key into the request."""

    name: Name
    parameters: Annotated[
        dict[Name, ParameterValue], Field(max_length=MAX_ITEMS), Expects("a table of parameters and values")
    ] = Field(default_factory=dict)
    masses: Annotated[dict[Name, Mass], Field(max_length=MAX_ITEMS), Expects("a table of legs and masses (GeV)")] = (
        Field(default_factory=dict)
    )
    beams: Annotated[BeamsChange, Expects("a table with polarisation; nothing else of the beams can vary")] | None = (
        None
    )
    cuts: Annotated[
        tuple[CutChange, ...], Field(max_length=MAX_ITEMS), Expects("a list of cuts, each with a name")
    ] = ()

    def change(self) -> dict[str, Any]:
        """The override that this variation stands for: only what was given, without the name."""
        left_out = {"name", "beams"} if self.beams is None else {"name"}
        return self.model_dump(mode="json", exclude_unset=True, exclude=left_out)
