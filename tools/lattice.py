"""Construct the generating vector of integrate/generating_vector.py: python tools/lattice.py [--check].

The vector z makes the rank-1 lattices {k z / 2^m}, k = 0 … 2^m - 1, good for every m from FIRST_LEVEL to LAST_LEVEL at
once. It is made component by component in a weighted Korobov space of smoothness 2 with product weights γ_j, where the
squared worst-case error of a lattice of N points is

    e² = -1 + (1/N) Σ_k Π_j (1 + γ_j ω(k z_j / N mod 1)),    ω(x) = 2π² (x² - x + 1/6).

It is also the variance, over random shifts, of the mean over the lattice of a function with Fourier coefficients
|f(h)|² = Π γ_j / h_j²: of a function with jumps, as cuts and piecewise linear maps make them.

Of all odd z_j the one is taken whose largest e(m)/e*(m) over the levels m is smallest, where e*(m) belongs to the
lattice constructed for 2^m points alone: R. Cools, F. Y. Kuo, D. Nuyens, "Constructing embedded lattice rules for
multivariate integration", SIAM J. Sci. Comput. 28 (2006) 2162.

All candidates are judged at once by fast Fourier transforms (D. Nuyens, R. Cools, J. Complexity 22 (2006) 4). Up to a
sign, which ω does not see, the odd numbers modulo 2^n are the powers of 5, a cyclic group of 2^(n-2) elements. Sorted
by that power, Σ over odd k of p(k/2^n) ω(k z/2^n) is a circular correlation, and a step from level to level a tiling.

All levels up to 26 take about 10 minutes and 2.2 GB. --check compares with the committed file and writes nothing.
"""

from __future__ import annotations

import sys
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, field
from math import pi
from pathlib import Path

import numpy as np
from numpy.typing import NDArray
from scipy import fft

Array = NDArray[np.float64]

TARGET = Path(__file__).resolve().parent.parent / "src" / "barnwright" / "integrate" / "generating_vector.py"

AXES, FIRST_LEVEL, LAST_LEVEL = 32, 10, 26
WEIGHTS = tuple(0.1 * 0.9**axis for axis in range(1, AXES + 1))
"""Tried beside eight other choices, even and falling, 0.0005 to 0.1, on seven functions (smooth, ridges, bins, cuts)
in 5 to 20 axes with 2^11 to 2^16 points: the smallest errors on average, though those that start at 0.02 or more stay
within 2 % of it.
"""
TOLD_AXES = (2, 4, 8, 16, 32)

ALIKE = 1e-4
"""Candidates within this fraction of the best are equally good and the first is taken, whatever the rounding."""


def order(level: int) -> int:
    """How many fractions k/2^level with odd k there are, up to a sign; one for k = 0, which is level 0."""
    return 1 << max(level - 2, 0)


def kernel(level: int) -> Array:
    """ω at 5^i / 2^level, i = 0 … order - 1; at 0 for level 0."""
    numerators: NDArray[np.int64] = np.array([min(level, 1)], dtype=np.int64)
    while numerators.size < order(level):
        numerators = np.concatenate([numerators, numerators * pow(5, numerators.size, 2**level) % 2**level])
    x: Array = numerators / 2**level
    return 2 * pi**2 * (x * (x - 1) + 1 / 6)


def kernel_sum(level: int) -> float:
    """The sum of ω over all k/2^level with odd k, exactly: over all k it is 2π²/(6·2^level)."""
    return pi**2 / 3 * (2.0**-level - (2.0 ** (1 - level) if level else 0.0))


@dataclass
class Level:
    """What the construction knows at the fractions with denominator 2^level.

    ``product`` is Π_j (1 + γ_j ω) - 1 over the axes that stand. Means are taken off before each transform, and that of
    ω is put back exactly: a merit of 1e-15 then keeps its digits.
    """

    level: int
    omega: Array = field(init=False)
    transform: NDArray[np.complex128] = field(init=False)
    product: Array = field(init=False)

    def __post_init__(self) -> None:
        self.omega = kernel(self.level)
        self.transform = fft.rfft(self.omega - self.omega.mean())
        self.product = np.zeros_like(self.omega)

    def sums(self) -> Array:
        """Σ over odd k of (1 + product) ω(k z/2^level) for each candidate z = 5^g, by g."""
        mean = self.product.mean()
        sides = 1 if self.level < 2 else 2
        size = self.omega.size
        spread = fft.irfft(fft.rfft(self.product - mean).conj() * self.transform, size) if size > 1 else 0.0
        return np.asarray(kernel_sum(self.level) * (1 + mean) + sides * spread + np.zeros(size))

    def extend(self, weight: float, power: int) -> None:
        """Take the axis with z = 5^power into the products."""
        self.product += (1 + self.product) * (weight * np.roll(self.omega, -(power % self.omega.size)))


def gains(levels: Sequence[Level], weight: float) -> Iterator[Array]:
    """By how much each candidate raises e², level by level."""
    total = np.zeros(1)
    for level in levels:
        sums = level.sums()
        total = np.tile(total, sums.size // total.size) + sums
        yield weight / 2**level.level * total


def construct(
    weights: Sequence[float], first: int, last: int, reference: Array | None = None
) -> tuple[list[int], Array]:
    """Component by component: the vector, and e² of its first 1, 2, … axes at levels first … last, (axis, level).

    ``reference`` holds the e² to compare with, in the same shape; 1 where there is one level only.
    """
    levels = [Level(level) for level in range(last + 1)]
    scale = np.ones((len(weights), last + 1 - first)) if reference is None else reference
    merit, squares, powers = np.zeros_like(scale), np.zeros(last + 1 - first), []
    for axis, weight in enumerate(weights):
        kept, worst = [], np.zeros(1)
        for level, gain in enumerate(gains(levels, weight)):
            if level >= first:
                kept.append(gain)
                ratio = (squares[level - first] + gain) / scale[axis, level - first]
                worst = np.maximum(np.tile(worst, ratio.size // worst.size), ratio)
        power = int(np.flatnonzero(worst <= worst.min() * (1 + ALIKE))[0]) if axis else 0
        squares = squares + [gain[power % gain.size] for gain in kept]
        merit[axis] = squares
        powers.append(power)
        for one in levels:
            one.extend(weight, power)
    numbers = [pow(5, power, 2**last) for power in powers]
    return [min(number, 2**last - number) for number in numbers], merit


def embedded(weights: Sequence[float], first: int, last: int) -> tuple[list[int], Array, Array]:
    """The vector that is good at all levels first … last; its e² and the e*² it is judged by, (axis, level)."""
    columns = [construct(weights, level, level)[1][:, 0] for level in range(first, last + 1)]
    reference = np.stack(columns, axis=1)
    vector, merit = construct(weights, first, last, reference)
    return vector, merit, reference


def module(vector: Sequence[int], merit: Array, reference: Array) -> str:
    """The text of generating_vector.py."""
    errors, ratios = np.sqrt(merit), np.sqrt(merit / reference)
    rows = [axes - 1 for axes in TOLD_AXES]
    lines = [
        '"""The generating vector of the lattices: written by tools/lattice.py, which says how it is made."""',
        "",
        "from __future__ import annotations",
        "",
        f"FIRST_LEVEL, LAST_LEVEL = {FIRST_LEVEL}, {LAST_LEVEL}",
        '"""The lattices of 2^FIRST_LEVEL … 2^LAST_LEVEL points are good."""',
        "",
        "GENERATING_VECTOR = (",
        *(f"    {number}," for number in vector),
        ")",
        '"""One odd number an axis; what varies most goes first."""',
        "",
        f"MERIT_AXES = {TOLD_AXES}",
        "MERIT = {",
        *(
            f"    {FIRST_LEVEL + column}: ({', '.join(f'{value:.4e}' for value in errors[rows, column])}),"
            for column in range(errors.shape[1])
        ),
        "}",
        '"""By level m, the worst-case error e(m) of the lattice of 2^m points in so many axes.',
        "",
        "Largest e(m)/e*(m), where e*(m) belongs to the lattice constructed for 2^m points alone:",
        *(f"{ratios[axes - 1].max():.3f} in {axes} axes," for axes in TOLD_AXES),
        f"{ratios.max():.3f} in the worst number of axes.",
        '"""',
    ]
    return "\n".join(lines) + "\n"


def main() -> None:
    """Write the committed file, or compare with it."""
    text = module(*embedded(WEIGHTS, FIRST_LEVEL, LAST_LEVEL))
    if "--check" not in sys.argv[1:]:
        TARGET.write_text(text, encoding="utf-8")
    elif text != TARGET.read_text(encoding="utf-8"):
        sys.exit(f"{TARGET} is not what tools/lattice.py makes")


if __name__ == "__main__":
    main()
