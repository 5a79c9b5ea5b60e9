"""Laws for momenta: functions that give |M|² of a batch of events.

Rules of this file
------------------
- |M|² in GeV^(2(4 − N)), N the number of all legs; averaged over the physical initial states, summed over the final
  ones.
- Factors for identical particles belong to the core, not to a law.
- A law takes masses from ``event.mass``, never from a table, and returns something that broadcasts to ``event.shape``.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import lru_cache
from math import prod
from typing import Any, ClassVar, Literal

import numpy as np
from numpy.typing import ArrayLike, NDArray

from barnwright.errors import RequestError, Violation, show
from barnwright.event import Event
from barnwright.formula import Formula, compile_formula
from barnwright.particles import find
from barnwright.process.contributions import Parts, called
from barnwright.process.cross_sections import AngularCrossSection, TotalCrossSection
from barnwright.process.helicity_amplitudes import HelicityAmplitudes
from barnwright.process.parameters import Parameters
from barnwright.reaction import Reaction

Array = NDArray[np.float64]
LawFunction = Callable[..., ArrayLike]


@dataclass(frozen=True, slots=True)
class SquaredAmplitude:
    """|M|² as a plain function.

    Attributes
    ----------
    function : function ``(event, parameters)``, also with ``parts`` where the process has contributions
    massless : particles or legs
        The law is skipped when one of these masses is not 0.
    compiled : bool
        Whether the function is a compiled kernel that releases the interpreter's lock.
    """

    kind: ClassVar[str] = "squared_amplitude"

    function: LawFunction
    massless: tuple[str, ...] = ()
    compiled: bool = False

    def squared(self, event: Event, parameters: Parameters, parts: Parts | None = None) -> ArrayLike:
        """|M|² in GeV^(2(4 − N)), averaged; broadcasts to ``event.shape``; raises what the function raises."""
        found: ArrayLike = called(self.function, parts, event, parameters)
        return found


@dataclass(frozen=True, slots=True)
class Expression:
    """|M|² as text of the formula language, or as a sympy expression.

    Attributes
    ----------
    squared_amplitude : str or sympy expression
    spin_colour : "averaged" or "summed"
        Whether the initial states are averaged over already.
    massless : particles or legs
        The law is skipped when one of these masses is not 0.
    """

    kind: ClassVar[str] = "expression"
    compiled: ClassVar[bool] = False

    squared_amplitude: Any
    spin_colour: Literal["averaged", "summed"] = "averaged"
    massless: tuple[str, ...] = ()

    def compile(self, reaction: Reaction, parameter_names: tuple[str, ...]) -> Formula:
        """The batch function of the expression.

        Raises
        ------
        FormulaError
            With positions, for unknown names and anything else that is no formula.
        RequestError
            When it is summed, and the table does not know the spin of an incoming particle.
        """
        if self.spin_colour == "summed":
            initial_states(reaction)
        return _compiled(self.squared_amplitude, reaction, parameter_names)

    def squared(self, event: Event, parameters: Parameters, parts: Parts | None = None) -> ArrayLike:
        """|M|² of the batch in GeV^(2(4 − N)), averaged; broadcasts to ``event.shape``."""
        assert parts is None, "a process with contributions has no expressions"
        values = parameters.model_dump()
        found = self.compile(event.reaction, tuple(values)).evaluate(event, values)
        return found if self.spin_colour == "averaged" else found / initial_states(event.reaction)


@lru_cache(maxsize=256)
def _compiled(expression: Any, reaction: Reaction, parameter_names: tuple[str, ...]) -> Formula:
    """Once for each expression: a batch must not pay for turning sympy into text."""
    return compile_formula(expression, reaction, parameter_names)


MomentaLaw = SquaredAmplitude | HelicityAmplitudes | Expression
"""Laws that see the momenta of an event."""

Law = MomentaLaw | AngularCrossSection | TotalCrossSection


def initial_states(reaction: Reaction) -> int:
    """How many spin and colour states the incoming particles have together: neutrinos one helicity, photons two.

    Raises
    ------
    RequestError
        For a particle whose spin the table does not know (a nucleus).
    """
    return prod(_states(name) for name in reaction.incoming)


def _states(name: str) -> int:
    particle = find(name)
    if particle.spin_states is None:
        expected = f"'averaged', since the particle table does not know the spin of {name}"
        raise RequestError([Violation("formula.spin_colour", show("summed"), expected, "averaged")])
    return particle.spin_states * particle.colour
