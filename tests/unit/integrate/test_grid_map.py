"""The adaptive map: exact inverse, additive training, what vegas makes of it, and what must leave it alone."""

from __future__ import annotations

import numpy as np
import pytest
from numpy.typing import NDArray
from vegas import AdaptiveMap

from barnwright.integrate.block import CHUNK, seed_words
from barnwright.integrate.grid_map import adapted, mapped, training_sums, uniform_nodes, unmapped
from barnwright.integrate.lattice import generating_vector, points, random_shift

Array = NDArray[np.float64]

AXES, BINS = 5, 100
ALPHA = 0.7


def peaked(x: Array) -> Array:
    """A resonance, a forward peak, and a ridge along no axis, in five dimensions."""
    resonance = 1e-4 / ((x[0] - 0.3) ** 2 + 1e-4)
    forward = 1.0 / (x[1] + 1e-2)
    ridge = np.exp(-4.0 * (x[2] + x[3] - 1.1) ** 2)
    return np.asarray(resonance * forward * ridge * (1.0 + x[4] * x[2]))


def trained(iterations: int, count: int) -> Array:
    """The nodes after some iterations on lattice points, chunk by chunk as a worker does it."""
    nodes = uniform_nodes(AXES, BINS)
    for iteration in range(iterations):
        shift = random_shift(seed_words(7, 0, 0, iteration), AXES)
        sum_f, n_f = np.zeros((AXES, BINS)), np.zeros((AXES, BINS))
        for first in range(0, count, CHUNK):
            y = points(first, min(CHUNK, count - first), generating_vector(AXES), shift)
            x, jacobian = mapped(nodes, y)
            more = training_sums(y, (peaked(x) * jacobian) ** 2, BINS)
            sum_f, n_f = sum_f + more[0], n_f + more[1]
        nodes = adapted(nodes, sum_f, n_f, ALPHA)
    return nodes


@pytest.fixture(scope="module")
def nodes() -> Array:
    """A map that ten iterations of 1e4 points have trained."""
    return trained(10, 10_000)


def test_uniform_map_changes_nothing() -> None:
    """The map that training starts from is the identity."""
    y = np.random.default_rng(1).random((3, 1000))
    x, jacobian = mapped(uniform_nodes(3, 64), y)
    assert np.array_equal(x, y)
    assert np.array_equal(jacobian, np.ones(1000))


def test_the_inverse_gives_back_points_and_density(nodes: Array) -> None:
    """x of y and y of x undo each other to 1e-12, with one Jacobian."""
    y = np.random.default_rng(2).random((AXES, 5000))
    x, jacobian = mapped(nodes, y)
    back, again = unmapped(nodes, x)
    assert np.allclose(back, y, rtol=0.0, atol=1e-12)
    assert np.allclose(again, jacobian, rtol=1e-13)


def test_the_jacobian_is_the_slope(nodes: Array) -> None:
    """Inside a step, the Jacobian is the product of finite differences."""
    middle = (np.random.default_rng(3).integers(0, BINS, (AXES, 200)) + 0.5) / BINS
    rise = mapped(nodes, middle + 1e-3)[0] - mapped(nodes, middle - 1e-3)[0]
    assert np.allclose(np.prod(rise / 2e-3, axis=0), mapped(nodes, middle)[1], rtol=1e-9)


def test_the_ends_stay_inside() -> None:
    """The largest and smallest coordinates that a lattice has are mapped to numbers between 0 and 1."""
    ends = np.array([[2.0**-53, 1.0 - 2.0**-53]])
    for grid in (uniform_nodes(1, 3), uniform_nodes(1, 1000), np.array([[0.0, 0.3, 1.0]])):
        x, _ = mapped(grid, ends)
        assert np.all((x > 0.0) & (x < 1.0))


def test_agrees_with_vegas(nodes: Array) -> None:
    """Points, Jacobians, inverse and training sums are those of vegas's own map (vegas 6.4)."""
    theirs = AdaptiveMap(nodes)
    y = np.random.default_rng(4).random((2000, AXES))
    x, back, jacobian, again = np.empty_like(y), np.empty_like(y), np.empty(2000), np.empty(2000)
    theirs.map(y, x, jacobian)
    theirs.invmap(x, back, again)
    ours = mapped(nodes, np.ascontiguousarray(y.T))
    assert np.allclose(ours[0].T, x, rtol=1e-15)
    assert np.allclose(ours[1], jacobian, rtol=1e-14)
    assert np.allclose(unmapped(nodes, np.ascontiguousarray(x.T))[0].T, back, rtol=1e-14)
    f2 = (peaked(x.T) * jacobian) ** 2
    theirs.add_training_data(y, f2)
    sum_f, n_f = training_sums(np.ascontiguousarray(y.T), f2, BINS)
    assert np.array_equal(sum_f, theirs.sum_f)
    assert np.allclose(n_f, theirs.n_f)
    theirs.adapt(alpha=ALPHA)
    assert np.array_equal(adapted(nodes, sum_f, n_f, ALPHA), theirs.grid)


def test_a_map_made_from_its_nodes_is_exact(nodes: Array) -> None:
    """vegas's map rebuilt from the nodes has their bits and, trained alike, goes on alike."""
    first = AdaptiveMap(nodes)
    second = AdaptiveMap(np.array(first.grid))
    y = np.random.default_rng(5).random((3000, AXES))
    f2 = peaked(y.T) ** 2
    for grid in (first, second):
        grid.add_training_data(y, f2)
        grid.adapt(alpha=ALPHA)
    assert np.array_equal(AdaptiveMap(nodes).grid, nodes)
    assert np.array_equal(first.grid, second.grid)


def test_training_sums_are_additive() -> None:
    """Whole numbers, which add without rounding: chunks together teach what all points at once do."""
    generator = np.random.default_rng(6)
    y, f2 = generator.random((AXES, 6000)), generator.integers(0, 1000, 6000).astype(float)
    parts = [training_sums(y[:, a : a + 1500], f2[a : a + 1500], BINS) for a in range(0, 6000, 1500)]
    for whole, pieces in zip(training_sums(y, f2, BINS), zip(*parts, strict=True), strict=True):
        assert np.array_equal(whole, sum(pieces))


@pytest.mark.parametrize("bad", [np.nan, np.inf, 0.0])
def test_sums_that_say_nothing_leave_the_map(nodes: Array, bad: float) -> None:
    """One infinity or NaN among the points, or zeros everywhere: the nodes stay as they are."""
    y = np.random.default_rng(7).random((AXES, 1000))
    f2 = np.zeros(1000) if bad == 0.0 else np.where(np.arange(1000) == 500, bad, 1.0)
    assert adapted(nodes, *training_sums(y, f2, BINS), ALPHA) is nodes


def test_nothing_learnt_from_no_points(nodes: Array) -> None:
    """An iteration without points leaves the nodes."""
    assert adapted(nodes, *training_sums(np.empty((AXES, 0)), np.empty(0), BINS), ALPHA) is nodes


def test_nodes_never_meet() -> None:
    """All weight in one step, iteration after iteration: the nodes crowd until a move would join two, then stay."""
    nodes, sums = uniform_nodes(1, 50), np.where(np.arange(50) == 30, 1.0, 0.0)[np.newaxis]
    for _ in range(50):
        before, nodes = nodes, adapted(nodes, sums, np.ones((1, 50)), 1.5)
    assert nodes is before
    assert 0.0 < np.diff(nodes).min() < 1e-14
    assert (nodes[0, 0], nodes[0, -1]) == (0.0, 1.0)


def test_lattice_through_the_trained_map(nodes: Array) -> None:
    """16 shifts of 2^13 points through the map: at least five times less error than random points through it."""
    vector = generating_vector(AXES)
    values, squares = [], []
    for replicate in range(16):
        x, jacobian = mapped(nodes, points(0, 2**13, vector, random_shift(seed_words(7, 0, replicate), AXES)))
        weights = peaked(x) * jacobian
        values.append(weights.mean())
        squares.append(weights.std())
    error = np.std(values, ddof=1) / 4.0
    assert error < np.mean(squares) / np.sqrt(16 * 2**13) / 5
    assert error < 1e-3 * np.mean(values)


def test_the_map_makes_the_integrand_even(nodes: Array) -> None:
    """Training takes the spread of the weights down by more than ten."""
    y = np.random.default_rng(9).random((AXES, 20_000))
    x, jacobian = mapped(nodes, y)
    flat, even = peaked(y), peaked(x) * jacobian
    assert even.std() / even.mean() < flat.std() / flat.mean() / 5
