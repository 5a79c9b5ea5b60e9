"""The process: what goes in and out, its laws, and what a user must know to trust them. Composition, no inheritance."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from typing import Any

from barnwright.peaks import Peak
from barnwright.reaction import Reaction

from .claims import Claims
from .closed_form import ClosedForm
from .declaration import checked_reaction
from .laws import Law
from .parameters import Parameters, ParameterValue
from .species import codes_of
from .validity import Validity


@dataclass(frozen=True, slots=True, kw_only=True, eq=False)
class Process:
    """A reaction with its laws; frozen, and checked when it is made.

    Attributes
    ----------
    name : str
        Lower case with hyphens; users ask for ``plugin/name``.
    reaction : str
        ``"e- e+ -> mu- mu+"``.
    laws : tuple of laws
        The first whose ``massless`` legs are massless is used; the others are second roads.
    summary, order, references, cautions : text
    parameters : subclass of Parameters
    masses : mass in GeV, or name of the parameter that is the mass, by particle or leg
        A mass belongs to the species: that of mu- is that of mu+ too. Others come from the particle table.
    peaks : tuple of Peak
        Where |M|² is large.
    closed_forms : tuple of ClosedForm
    derived : tables as in a request
        Derived quantities that a request for this process may want.
    contributions : keyword that a law receives by name
    signed : bool
        Whether |M|² may be negative.
    valid : Validity or None
    claims : Claims or None
    singular : tuple of str
        Divergences that cuts must keep out: ``"t"``, ``"u"``, ``"soft(gamma)"``, ``"collinear(gamma, mu-)"``.
    alternatives : named sets of parameter values that a checker may try
    example : parameter values for the load checks, where parameters have no default
    needs : names of meanings that the core must know
    legs : Reaction
        The reaction read.

    Raises
    ------
    DeclarationError
        A PluginError with every finding about the declaration, each naming its field.
    """

    name: str
    reaction: str
    laws: tuple[Law, ...] = ()
    summary: str = ""
    order: str = "tree"
    references: tuple[str, ...] = ()
    parameters: type[Parameters] = Parameters
    masses: Mapping[str, float | str] = field(default_factory=dict)
    peaks: tuple[Peak, ...] = ()
    closed_forms: tuple[ClosedForm, ...] = ()
    derived: tuple[Mapping[str, Any], ...] = ()
    contributions: Mapping[str, str] = field(default_factory=dict)
    signed: bool = False
    valid: Validity | None = None
    claims: Claims | None = None
    cautions: tuple[str, ...] = ()
    singular: tuple[str, ...] = ()
    alternatives: Mapping[str, Mapping[str, ParameterValue]] = field(default_factory=dict)
    example: Mapping[str, ParameterValue] = field(default_factory=dict)
    needs: frozenset[str] = frozenset()
    legs: Reaction = field(init=False, repr=False)

    def __post_init__(self) -> None:
        object.__setattr__(self, "legs", checked_reaction(self))

    def codes_of(self, leg: str | int) -> tuple[int, ...]:
        """The codes of a leg (``beam_a`` −1, ``beam_b`` −2, a number) or of all legs of a particle's species.

        Raises
        ------
        LookupError
            When the reaction has no such leg; the message names it.
        """
        return codes_of(self.legs, leg)

    def mass_of(self, code: int) -> float | str | None:
        """The declared mass of a leg in GeV, or the parameter that is its mass; None: that of the particle table."""
        for leg, mass in self.masses.items():
            if code in self.codes_of(leg):
                return mass
        return None

    def parameters_of(self, values: Mapping[str, ParameterValue] | Iterable[tuple[str, ParameterValue]]) -> Parameters:
        """The parameters with these values, defaults for the others.

        Raises
        ------
        pydantic.ValidationError
            For unknown names and values that do not fit.
        """
        return self.parameters.model_validate(dict(values))
