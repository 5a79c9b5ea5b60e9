"""What a process is: the short line of a list, and the whole description."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field

from barnwright.documents.base import Document, Expects, Number, ParameterValue
from barnwright.documents.by_name import ByName


class ProcessSummary(Document):
    """One process of a list. For a broken one ``broken`` is the cause, and what only its code knows is None."""

    name: str
    plugin: str
    distribution: str
    version: str
    reaction: str | None = None
    summary: str | None = None
    order: str | None = None
    broken: str | None = None

    def __str__(self) -> str:
        """Name, reaction and summary in one line."""
        if self.broken is not None:
            return f"{self.name}: broken: {self.broken}"
        return "  ".join(text for text in (self.name, self.reaction, self.summary) if text)


class ParameterDescription(Document):
    """One parameter: its type, unit, default, meaning and source; a ``word`` is one of ``choices``."""

    name: str
    type: Literal["float", "int", "bool", "word"]
    choices: tuple[str, ...] = ()
    unit: str = ""
    default: ParameterValue | None = None
    meaning: str = ""
    source: str = ""
    required: bool = False


class ProcessDescription(ProcessSummary):
    """All that a user needs to know of a process.

    ``laws`` are the kinds of its laws, the cheapest first; ``masses`` (GeV) and the range of sqrt_s (GeV, None: no
    limit) are numbers, ``observables`` the names that its requests may use, ``request`` a ready TOML text.
    """

    laws: tuple[str, ...] = ()
    parameters: ByName[ParameterDescription] = Field(default_factory=ByName[ParameterDescription])
    masses: Annotated[dict[str, float], Expects("a table of legs and masses (GeV)")] = Field(default_factory=dict)
    contributions: tuple[str, ...] = ()
    derived: tuple[str, ...] = ()
    singular: tuple[str, ...] = ()
    validity: str = ""
    sqrt_s_min: Number | None = None
    sqrt_s_max: Number | None = None
    cautions: tuple[str, ...] = ()
    references: tuple[str, ...] = ()
    observables: tuple[str, ...] = ()
    request: str = ""
