"""The unit of an observable: powers of GeV and rad.

Rules of this file
------------------
- A number written in the text fits any unit in a sum; ``deg`` is an angle, ``keV`` an energy.
- An angle is a pure number as well: in a sum with one it is one, as in ``delta_eta**2 + delta_phi**2``.
- A quantity with a unit is raised to numbers only, and nothing is raised to a quantity with GeV.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import cast

from barnwright.grammar import Binary, Call, Finding, Name, Negation, Node, Number, constant_of
from barnwright.observables.rows import ROWS
from barnwright.observables.scales import SCALES


@dataclass(frozen=True, slots=True)
class Dimension:
    """GeV^gev rad^rad; ``free`` for numbers of the text, which fit any unit."""

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


_OF_ROW = {
    "GeV": Dimension(gev=Fraction(1)),
    "GeV^2": Dimension(gev=Fraction(2)),
    "rad": Dimension(rad=Fraction(1)),
    "": Dimension(),
}
_OF_NAME = {**{name: _OF_ROW[unit] for name, (unit, _) in SCALES.items()}, "pi": Dimension(free=True)}


def dimension_of(node: Node, findings: list[Finding]) -> Dimension:
    """The dimension of a node; what does not fit together is added to the findings."""
    if isinstance(node, Number):
        return Dimension(free=True)
    if isinstance(node, Name):
        return _OF_NAME.get(node.name) or _OF_ROW[ROWS[node.name].unit]
    if isinstance(node, Negation):
        return dimension_of(node.operand, findings)
    return _of_call(node, findings) if isinstance(node, Call) else _of_binary(node, findings)


def _of_binary(node: Binary, findings: list[Finding]) -> Dimension:
    left, right = dimension_of(node.left, findings), dimension_of(node.right, findings)
    match node.operator:
        case "*":
            return left.times(right)
        case "/":
            return left.times(right, -1)
        case "**":
            return _of_power(node, left, right, findings)
    return _common([left, right], node.position, findings)


def _of_call(node: Call, findings: list[Finding]) -> Dimension:
    if node.function in ROWS:
        return _OF_ROW[ROWS[node.function].unit]
    parts = [dimension_of(operand, findings) for operand in cast("tuple[Node, ...]", node.arguments)]
    return parts[0].power(Fraction(1, 2)) if node.function == "sqrt" else _common(parts, node.position, findings)


def _of_power(node: Binary, base: Dimension, exponent: Dimension, findings: list[Finding]) -> Dimension:
    value = constant_of(node.right)
    if value is not None:
        return base.power(Fraction(value).limit_denominator(100))
    if exponent.gev:
        findings.append(Finding(node.position + 2, f"an exponent without a unit, not one in {exponent}"))
    elif base.gev:
        findings.append(Finding(node.position + 2, f"a number, since the base has the unit {base}"))
    return Dimension()


def _common(parts: list[Dimension], position: int, findings: list[Finding]) -> Dimension:
    """The dimension of what is added or compared."""
    known = [part for part in parts if not part.free]
    if not known:
        return parts[0]
    other = next((part for part in known if part.gev != known[0].gev), None)
    if other is not None:
        first, second = (str(part) or "a pure number" for part in (known[0], other))
        findings.append(Finding(position, f"quantities of one unit in a sum or comparison, not {first} and {second}"))
    return known[0] if all(part == known[0] for part in known) else Dimension(gev=known[0].gev)


def _factor(name: str, power: Fraction) -> str:
    return name if power == 1 else f"{name}^{float(power):g}"
