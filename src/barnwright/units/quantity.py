"""A number with its error and unit, and how it is written: ``84.32(7) pb``.

Rules of this file:

- The error is rounded as in the Review of Particle Physics (PDG 2024, Introduction, section 5.3 "Rounding"): by its
  three leading digits, 100 to 354 keeps two digits, 355 to 949 keeps one, 950 to 999 becomes 1000 and keeps two.
- The digits in parentheses count in the last place of the value: 84.3(12) is 84.3 ± 1.2. Where the error reaches
  beyond the units, both are whole: 8430(70) is 8430 ± 70.
- Below 1e-4 and from 1e6 on, a power of ten follows: 1.234(5)e-07.
- An error that is None, 0, not finite, or below the 15th digit of the value is not written.
"""

from __future__ import annotations

from dataclasses import dataclass
from decimal import ROUND_HALF_UP, Context, Decimal
from math import isfinite

_DIGITS = 15
_VALUE_ALONE = 12
_SMALLEST, _LARGEST = -4, 6
_EXACT = Context(prec=400)


@dataclass(frozen=True, slots=True)
class Quantity:
    """A measured or predicted number.

    Parameters
    ----------
    value, error
        In `unit`; the error is one standard deviation or a bound, or None where there is none.
    unit
        As in ``"pb"``; ``""`` for a pure number.
    """

    value: float
    error: float | None
    unit: str

    def __str__(self) -> str:
        written = _written(float(self.value), None if self.error is None else float(self.error))
        return f"{written} {self.unit}" if self.unit else written


def _written(value: float, error: float | None) -> str:
    if error is None or not (isfinite(value) and isfinite(error)) or error <= 0:
        return f"{value:.{_VALUE_ALONE}g}"
    spread = _spread(error)
    last = int(spread.as_tuple().exponent)
    highest = max(_first_digit(value), spread.adjusted())
    if highest - last >= _DIGITS:
        return f"{value:.{_DIGITS}g}"
    power = 0 if _SMALLEST <= highest < _LARGEST else highest
    shown = Decimal(repr(value)).quantize(Decimal(1).scaleb(last), context=_EXACT).scaleb(-power, _EXACT)
    digits = spread.scaleb(-min(last, power), _EXACT)
    exponent = f"e{power:+03d}" if power else ""
    return f"{shown:f}({digits:f}){exponent}"


def _first_digit(number: float) -> int:
    """The power of ten of the first digit; of 0, far below all others."""
    return Decimal(repr(number)).adjusted() if number else -(10**4)


def _spread(error: float) -> Decimal:
    """The error to the digits that the rule of the PDG keeps."""
    exact = Decimal(repr(error))
    leading = exact.quantize(Decimal(1).scaleb(exact.adjusted() - 2), ROUND_HALF_UP, _EXACT)
    first = leading.adjusted()
    place = first - 1 if leading.scaleb(2 - first, _EXACT) < 355 else first
    return leading.quantize(Decimal(1).scaleb(place), ROUND_HALF_UP, _EXACT)
