"""Closed forms: an antiderivative, whose differences are totals, cuts and bins."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from numpy.typing import ArrayLike, NDArray

from barnwright.event import Point
from barnwright.observables import Observable, compile_observable
from barnwright.process.contributions import Parts, called
from barnwright.reaction import Reaction

Cumulative = Callable[..., ArrayLike]


@dataclass(frozen=True, slots=True)
class ClosedForm:
    """∫ up to x of dσ/dx in GeV⁻² (a width: GeV), identical particles counted once.

    Attributes
    ----------
    cumulative : function ``(x, point, parameters)``, also with ``parts`` where the process has contributions
        x has the shape (point, edge) and broadcasts against the arrays of the point, (point, 1); so does the answer.
        Where the integral starts is free. +z is the direction of beam a.
    observable : str
        What x is, as text of the observable language.
    massless : particles or legs
        The closed form is skipped when one of these masses is not 0.
    """

    cumulative: Cumulative
    observable: str
    massless: tuple[str, ...] = ()

    def heights(self, x: NDArray[Any], point: Point, parameters: Any, parts: Parts | None = None) -> ArrayLike:
        """The antiderivative at x."""
        found: ArrayLike = called(self.cumulative, parts, x, point, parameters)
        return found

    def axis(self, reaction: Reaction) -> Observable:
        """The observable that x is; leg numbers name one of identical particles too.

        Raises
        ------
        ObservableError
            With every finding about the text.
        """
        return compile_observable(self.observable, reaction, numbered=True)
