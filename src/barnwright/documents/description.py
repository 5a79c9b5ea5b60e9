"""What a process is: the short line of a list, and the whole description."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field

from barnwright.documents.base import Document, Expects, Number, ParameterValue
from barnwright.documents.by_name import ByName


class ProcessSummary(Document):
    """One process of a list. For a broken one ``broken`` is the cause, and what only its code knows is None.

    ``kinds`` are the words by which a list can be filtered: kinds of its reaction and of its laws.
    """

    name: str
    plugin: str
    distribution: str
    version: str
    reaction: str | None = None
    summary: str | None = None
    order: str | None = None
    broken: str | None = None
    kinds: tuple[str, ...] = ()

    def __str__(self) -> str:
        """Name, reaction and summary in one line."""
        if self.broken is not None:
            return f"{self.name}: broken: {self.broken}"
        return "  ".join(text for text in (self.name, self.reaction, self.summary) if text)


class Condition(Document):
    """Values of a parameter with which another one is used."""

    name: str
    values: tuple[ParameterValue, ...]

    def __str__(self) -> str:
        """``scheme = alpha or fermi``."""
        return f"{self.name} = {' or '.join(map(str, self.values))}"


class Alternative(Document):
    """A named set of parameter values that makes sense together."""

    name: str
    values: Annotated[dict[str, ParameterValue], Expects("a table of parameters and values")]

    def __str__(self) -> str:
        """``lep: z_mass = 91.1876, z_width = 2.4952``."""
        return f"{self.name}: {', '.join(f'{name} = {value}' for name, value in self.values.items())}"


class ParameterDescription(Document):
    """One parameter: its type, unit, default, meaning and source; a ``word`` is one of ``choices``.

    It is used where all of ``used_with`` hold; a request that sets it elsewhere is refused.
    """

    name: str
    type: Literal["float", "int", "bool", "word"]
    choices: tuple[str, ...] = ()
    unit: str = ""
    default: ParameterValue | None = None
    meaning: str = ""
    source: str = ""
    required: bool = False
    used_with: tuple[Condition, ...] = ()


class ProcessDescription(ProcessSummary):
    """All that a user needs to know of a process.

    ``laws`` are the kinds of its laws, the cheapest first; ``masses`` (GeV) and the range of sqrt_s (GeV, None: no
    limit) are numbers, ``observables`` the names that its requests may use, ``request`` a ready TOML text.
    ``signed_contributions`` may be negative; ``polarised_beams`` are those that a request may polarise;
    ``closing_cuts`` say for each singular region what keeps away from it; ``claims`` are symmetries and limits.
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
    signed_contributions: tuple[str, ...] = ()
    polarised_beams: tuple[str, ...] = ()
    closing_cuts: tuple[str, ...] = ()
    claims: tuple[str, ...] = ()
    alternatives: ByName[Alternative] = Field(default_factory=ByName[Alternative])
