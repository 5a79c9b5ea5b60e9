"""The lattice: exact bits, whole lattices as prefixes, fast convergence, errors that follow Student's t; its vector."""

from __future__ import annotations

import importlib.util
import sys
from fractions import Fraction
from itertools import pairwise, product
from pathlib import Path
from types import ModuleType

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy import stats

from barnwright.integrate.block import CHUNK, seed_words
from barnwright.integrate.generating_vector import FIRST_LEVEL, GENERATING_VECTOR, LAST_LEVEL, MERIT, MERIT_AXES
from barnwright.integrate.lattice import MOST_AXES, MOST_POINTS, generating_vector, points, random_shift

Array = NDArray[np.float64]

TOOL = Path(__file__).resolve().parents[3] / "tools" / "lattice.py"


def smooth(x: Array) -> Array:
    """A smooth function that is not periodic and varies on all axes, less and less; of mean 1."""
    rates = 1.0 / np.arange(1, len(x) + 1) ** 2
    return np.asarray(np.exp(rates @ x) / np.prod(np.expm1(rates) / rates))


def shift_of(seed: int, replicate: int, axes: int) -> NDArray[np.uint64]:
    """The shift that a measuring round would use."""
    return random_shift(seed_words(seed, 0, replicate), axes)


def means(seed: int, level: int, axes: int, baker: bool = True) -> Array:
    """The mean of `smooth` over 2^level points, for each of 16 replicates."""
    vector = generating_vector(axes)
    return np.array(
        [smooth(points(0, 2**level, vector, shift_of(seed, r, axes), baker)).mean() for r in range(16)],
    )


@pytest.fixture(scope="module")
def tool() -> ModuleType:
    """tools/lattice.py as a module."""
    spec = importlib.util.spec_from_file_location("lattice_tool", TOOL)
    assert spec is not None
    assert spec.loader is not None
    module = importlib.util.module_from_spec(spec)
    sys.modules[spec.name] = module  # dataclasses look their module up
    spec.loader.exec_module(module)
    return module


def test_points_are_those_of_the_definition() -> None:
    """Point k is the middle of the 2^-52 cell of z·φ(k) + shift modulo 1, folded by the baker; in fractions."""
    vector, shift = generating_vector(5), shift_of(3, 0, 5)
    for number in (0, 1, 2, 1234567, MOST_POINTS - 1):
        digits = f"{number:0{LAST_LEVEL}b}"[::-1]
        inverse = Fraction(int(digits, 2), 2**LAST_LEVEL)
        for axis, (z, offset) in enumerate(zip(vector.tolist(), shift.tolist(), strict=True)):
            plain = (z * inverse + Fraction(offset, 2**64)) % 1
            folded = min(2 * plain, 2 - 2 * plain - Fraction(1, 2**63))
            for baker, exact in ((False, plain), (True, folded)):
                middle = (int(exact * 2**52) + Fraction(1, 2)) / 2**52
                assert Fraction(float(points(number, 1, vector, shift, baker)[axis, 0])) == middle


@pytest.mark.parametrize("level", [0, 1, 5, 11])
def test_every_prefix_is_a_whole_lattice(level: int) -> None:
    """Without a shift the first 2^m points are {k z / 2^m}, each once."""
    vector, none = generating_vector(4), np.zeros(4, dtype=np.uint64)
    whole = np.arange(2**level)[:, np.newaxis] * np.array(GENERATING_VECTOR[:4]) % 2**level
    found = points(0, 2**level, vector, none, baker=False).T * 2**level
    assert sorted(map(tuple, found.astype(np.int64).tolist())) == sorted(map(tuple, whole.tolist()))


def test_bits_do_not_depend_on_chunks_or_axes() -> None:
    """Chunks, ragged pieces and single points of a range have its bits, and so have the first of more axes."""
    vector, shift = generating_vector(9), shift_of(1, 2, 9)
    whole = points(0, 4 * CHUNK, vector, shift)
    for cuts in ((0, 2048, 4096, 6144, 8192), (0, 1, 1000, 5001, 8190, 8191, 8192)):
        pieces = [points(a, b - a, vector, shift) for a, b in pairwise(cuts)]
        assert np.array_equal(np.concatenate(pieces, axis=1), whole)
    assert np.array_equal(points(0, 4 * CHUNK, generating_vector(3), shift_of(1, 2, 3)), whole[:3])


def test_coordinates_stay_inside_the_cube() -> None:
    """The corners that a shift can reach are neither 0 nor 1."""
    vector = generating_vector(1)
    corners = np.array([0, 1, 2**63 - 1, 2**63, 2**64 - 1], dtype=np.uint64)
    for shift, baker in product(corners, (False, True)):
        assert 0.0 < points(0, 1, vector, np.array([shift]), baker)[0, 0] < 1.0


def test_replicates_have_shifts_of_their_own() -> None:
    """Seeds and replicates give different shifts, and the same ones again."""
    shifts = {tuple(shift_of(seed, replicate, 3).tolist()) for seed in range(5) for replicate in range(16)}
    assert len(shifts) == 80
    assert np.array_equal(shift_of(4, 7, 3), shift_of(4, 7, 3))


@pytest.mark.parametrize(("axes", "power"), [(1, 1.9), (2, 1.8), (4, 1.7), (8, 1.6)])
def test_smooth_functions_converge_fast(axes: int, power: float) -> None:
    """Between 2^9 and 2^16 points the error of a smooth function falls faster than N^-1.5."""
    levels = np.arange(9, 17)
    errors = [np.sqrt(np.mean((means(2, level, axes) - 1.0) ** 2)) for level in levels]
    assert np.polyfit(levels, np.log2(errors), 1)[0] < -power


def test_the_baker_pays() -> None:
    """In 5 axes, 2^13 points: at least 30 times less error than without, 300 times less than random points."""
    folded, plain = means(0, 13, 5).std(ddof=1), means(0, 13, 5, baker=False).std(ddof=1)
    random = smooth(np.random.default_rng(1).random((5, 2**13))).std() / 2**6.5
    assert folded < plain / 30
    assert folded < random / 300


def test_pulls_follow_student() -> None:
    """200 seeds, 16 shifts, a smooth function in 4 axes: the pulls of the mean have Student's law with 15 degrees."""
    pulls = []
    for seed in range(200):
        values = means(seed, 9, 4)
        pulls.append((values.mean() - 1.0) / (values.std(ddof=1) / 4.0))
    law = stats.t(15)
    assert stats.kstest(pulls, law.cdf).pvalue > 0.05
    for sigma, share in ((1, 0.6827), (2, 0.9545)):
        inside = np.mean(np.abs(pulls) < law.ppf((1 + share) / 2))
        assert abs(inside - share) < 3 * np.sqrt(share * (1 - share) / 200), sigma


def test_too_much_is_refused() -> None:
    """More axes than the vector has, and points beyond its last lattice."""
    vector, shift = generating_vector(2), shift_of(0, 0, 2)
    with pytest.raises(ValueError, match=f"axes: got {MOST_AXES + 1}, expected 1 to {MOST_AXES}"):
        generating_vector(MOST_AXES + 1)
    with pytest.raises(ValueError, match=f"points: got {MOST_POINTS} to {MOST_POINTS + 1}"):
        points(MOST_POINTS, 1, vector, shift)


def direct_merit(vector: tuple[int, ...], weights: tuple[float, ...], level: int) -> float:
    """The squared worst-case error by its definition, point by point."""
    k = np.arange(2**level)
    product = np.ones(2**level)
    for z, weight in zip(vector, weights, strict=True):
        x = k * z % 2**level / 2**level
        product *= 1.0 + weight * 2.0 * np.pi**2 * (x * x - x + 1.0 / 6.0)
    return float(np.mean(product - 1.0))


def test_committed_merit_is_that_of_the_vector(tool: ModuleType) -> None:
    """The table beside the vector, up to 2^14 points, against the definition of the figure."""
    for level, told in MERIT.items():
        for axes, merit in zip(MERIT_AXES, told, strict=True):
            if level <= 14:
                direct = direct_merit(GENERATING_VECTOR[:axes], tool.WEIGHTS[:axes], level)
                assert np.sqrt(direct) == pytest.approx(merit, rel=1e-4)
    assert (min(MERIT), max(MERIT)) == (FIRST_LEVEL, LAST_LEVEL)


def test_construction_finds_the_best_by_trying_all(tool: ModuleType) -> None:
    """A small vector, each component of which is compared with all odd numbers by the definition of the figure."""
    weights, levels = (0.5, 0.3, 0.2, 0.1), range(4, 9)
    vector, merit, reference = tool.embedded(weights, levels[0], levels[-1])

    def worst(candidate: list[int]) -> float:
        axes = len(candidate)
        found = (direct_merit(tuple(candidate), weights[:axes], level) for level in levels)
        return max(square / best for square, best in zip(found, reference[axes - 1], strict=True))

    for axes in range(1, 5):
        told = (merit[axes - 1] / reference[axes - 1]).max()
        assert worst(vector[:axes]) == pytest.approx(told, rel=1e-9)
        assert told <= min(worst([*vector[: axes - 1], z]) for z in range(1, 2 ** levels[-1], 2)) * (1 + tool.ALIKE)


def test_reference_is_the_best_of_each_level(tool: ModuleType) -> None:
    """Constructed for one level, the first two axes are the best pair {1, z} by trying all."""
    weights = (0.5, 0.3)
    _, merit = tool.construct(weights, 6, 6)
    assert merit[1, 0] == pytest.approx(min(direct_merit((1, z), weights, 6) for z in range(1, 64, 2)), rel=1e-4)


def test_a_small_vector_is_made_anew(tool: ModuleType) -> None:
    """The construction gives what it gave when this test was written."""
    vector, _, _ = tool.embedded(tool.WEIGHTS[:8], 10, 16)
    assert vector == [1, 13893, 20957, 13269, 11681, 15797, 11173, 12923]
