"""The unit of an observable: powers of GeV and rad; a number written in the text fits any unit in a sum."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from barnwright.observables.rows import ROWS
from barnwright.observables.tree import Constant, Leaf, Operation, Tree


@dataclass(frozen=True, slots=True)
class Dimension:
    """GeV^gev rad^rad; ``free`` for plain numbers."""

    gev: Fraction = Fraction(0)
    rad: Fraction = Fraction(0)
    free: bool = False

    def power(self, exponent: Fraction) -> Dimension:
        """This dimension to a power."""
        return Dimension(self.gev * exponent, self.rad * exponent, self.free)

    def times(self, other: Dimension, sign: int = 1) -> Dimension:
        """The product, or the quotient for sign −1."""
        free = self.free and other.free
        return Dimension(self.gev + sign * other.gev, self.rad + sign * other.rad, free)

    def __str__(self) -> str:
        return " ".join(_factor(name, power) for name, power in (("GeV", self.gev), ("rad", self.rad)) if power)


class UnitMismatchError(ValueError):
    """Two quantities of different units in one sum; `first` and `second` are the units."""

    def __init__(self, first: Dimension, second: Dimension) -> None:
        self.first, self.second = first, second
        super().__init__(f"{str(first) or 'a pure number'} and {str(second) or 'a pure number'}")


_OF_ROW = {
    "GeV": Dimension(gev=Fraction(1)),
    "GeV^2": Dimension(gev=Fraction(2)),
    "rad": Dimension(rad=Fraction(1)),
    "": Dimension(),
}


def dimension_of(tree: Tree) -> Dimension:
    """The dimension of a tree.

    Raises
    ------
    UnitMismatchError
        When different units are added or compared.
    """
    if isinstance(tree, Constant):
        return Dimension(free=True)
    if isinstance(tree, Leaf):
        return _OF_ROW[ROWS[tree.function].unit] if tree.function in ROWS else Dimension(rad=Fraction(1))
    return _of_operation(tree)


def _of_operation(tree: Operation) -> Dimension:
    parts = [dimension_of(operand) for operand in tree.operands]
    match tree.function:
        case "*":
            return parts[0].times(parts[1])
        case "/":
            return parts[0].times(parts[1], -1)
        case "sqrt":
            return parts[0].power(Fraction(1, 2))
        case "**":
            exponent = tree.operands[1]
            value = exponent.value if isinstance(exponent, Constant) else 0.0
            return parts[0].power(Fraction(value).limit_denominator(100))
        case _:
            return _common(parts)


def _common(parts: list[Dimension]) -> Dimension:
    known = [part for part in parts if not part.free]
    for part in known[1:]:
        if part != known[0]:
            raise UnitMismatchError(known[0], part)
    return known[0] if known else parts[0]


def _factor(name: str, power: Fraction) -> str:
    return name if power == 1 else f"{name}^{float(power):g}"
