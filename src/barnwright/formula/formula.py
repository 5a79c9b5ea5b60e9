"""A compiled formula: a short program of array operations, each common subexpression once.

Rules of this file
------------------
- A program is a tuple of steps; a step names an operation and the earlier steps it works on. Pure data.
- Numbers are floats: ``9**99`` is a large float, never a large integer.
- A power with a small whole exponent is made by multiplications, as a person would.
"""

from __future__ import annotations

import operator
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.event import Event
from barnwright.formula.language import ELEMENTARY

Array = NDArray[np.float64]
Step = tuple[str, tuple[Any, ...]]

LARGEST_MULTIPLIED = 8


@dataclass(frozen=True, slots=True)
class Formula:
    """A formula for one reaction.

    Attributes
    ----------
    text : str
    program : tuple of steps
        ``("number", (2.0,))``, ``("parameter", ("alpha",))``, ``("s", ())``, ``("dot", (x, y))`` with legs, and
        ``("+", (3, 5))``, ``("log", (4,))`` with the numbers of earlier steps. The last step is the value.
    spent : tuple of tuples of int
        For every step the earlier ones whose values nobody asks for afterwards: a long formula holds few arrays.
    """

    text: str
    program: tuple[Step, ...]
    spent: tuple[tuple[int, ...], ...]

    def evaluate(self, event: Event, parameters: Mapping[str, Any]) -> Array:
        """The value of the formula for a batch; broadcasts to ``event.shape``.

        Parameters
        ----------
        event : Event
        parameters : mapping of name to number
        """
        values: list[Any] = []
        with np.errstate(all="ignore"):
            for (operation, arguments), spent in zip(self.program, self.spent, strict=True):
                values.append(_step(operation, arguments, values, (event, parameters)))
                for earlier in spent:
                    values[earlier] = None
        return np.asarray(values[-1], dtype=float)


def last_uses(program: tuple[Step, ...]) -> tuple[tuple[int, ...], ...]:
    """For every step of a program the earlier ones that it is the last to use."""
    last: dict[int, int] = {}
    for number, (operation, arguments) in enumerate(program):
        if operation in _ARITHMETIC or operation in ELEMENTARY:
            last.update(dict.fromkeys(arguments, number))
    spent: list[list[int]] = [[] for _ in program]
    for earlier, number in last.items():
        spent[number].append(earlier)
    return tuple(map(tuple, spent))


def _step(operation: str, arguments: tuple[Any, ...], values: list[Any], given: tuple[Event, Mapping[str, Any]]) -> Any:
    event, parameters = given
    if operation == "number":
        return np.float64(arguments[0])
    if operation == "parameter":
        return np.float64(parameters[arguments[0]])
    if operation in ("s", "t", "u"):
        return getattr(event, operation)
    if operation in _OF_LEGS:
        return _OF_LEGS[operation](event, arguments)
    return _operated(operation, [values[k] for k in arguments])


def _operated(operation: str, operands: list[Any]) -> Any:
    return (_ARITHMETIC.get(operation) or ELEMENTARY[operation])(*operands)


def power(base: Any, exponent: Any) -> Any:
    """base**exponent; by multiplications where the exponent is one small whole number."""
    if np.ndim(exponent) or exponent != int(exponent if np.isfinite(exponent) else 0.5):
        return np.power(base, exponent)
    count = abs(int(exponent))
    if count > LARGEST_MULTIPLIED:
        return np.power(base, exponent)
    result = np.ones_like(base)
    for _ in range(count):
        result = result * base
    return result if exponent >= 0 else 1.0 / result


_ARITHMETIC: dict[str, Callable[..., Any]] = {
    "+": operator.add,
    "-": operator.sub,
    "*": operator.mul,
    "/": operator.truediv,
    "negative": operator.neg,
    "**": power,
}


def _invariant_mass(event: Event, legs: tuple[Any, ...]) -> Array:
    square: Any = sum(event.mass(leg) ** 2 for leg in legs)
    for k, first in enumerate(legs):
        for second in legs[k + 1 :]:
            square = square + 2 * event.dot(first, second)
    return np.asarray(np.sqrt(np.maximum(square, 0.0)))


_OF_LEGS = {
    "dot": lambda event, legs: event.dot(*legs),
    "rest_mass": lambda event, legs: np.float64(event.mass(legs[0])),
    "invariant_mass": _invariant_mass,
}
