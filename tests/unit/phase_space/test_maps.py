"""Every map by itself: its ends, its density as the inverse of its slope, and its integral against the flat map's."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
import pytest
from numpy.typing import NDArray
from unit.phase_space.volumes import mean_and_error

from barnwright.phase_space.maps import (
    azimuth,
    collinear,
    cosine,
    flat,
    logarithm,
    paired,
    power,
    resonance,
    soft,
    transfer,
    two_sided,
    volume,
)

Array = NDArray[np.float64]


def number(value: float) -> Array:
    """A number as the maps take it."""
    return np.asarray(value)


@dataclass(frozen=True)
class Map:
    """A map of u to x between two ends, and its density."""

    value: Callable[[Array], Array]
    density: Callable[[Array], Array]
    ends: tuple[float, float]


Z_MASS, Z_WIDTH = 91.1876, 2.4952
LOW, HIGH = number(4.0), number(15625.0)


def breit_wigner(low: float, high: float, width: float, running: bool = False) -> Map:
    """The Z's line, of any width, between two m²."""
    line = resonance.line(Z_MASS, width, running)
    ends = number(low), number(high)
    return Map(lambda u: resonance.value(u, *ends, *line), lambda x: resonance.density(x, *ends, *line), (low, high))


def two_lines() -> Map:
    """The first of two Z's of a Higgs boson of 125 GeV."""
    line = paired.Line(*resonance.line(Z_MASS, Z_WIDTH, False))
    bend = paired.bend_of((LOW, HIGH), (line, line), number(125.0), 4.0)
    return Map(
        lambda u: resonance.value(paired.value(u, bend), LOW, HIGH, *line),
        lambda x: resonance.density(x, LOW, HIGH, *line) * paired.density(x, bend),
        (4.0, 15625.0),
    )


def falling(exponent: float, start: float, width: float) -> Map:
    """A power of the distance from a pole."""
    first, size = number(start), number(width)
    return Map(
        lambda u: power.value(u, first, size, exponent),
        lambda x: power.density(x + start, first, size, exponent),
        (0.0, width),
    )


def bodies(k: int, masses: float) -> Map:
    """The invariant of k + 1 bodies in 10 GeV."""
    room = volume.Room(masses, number(10.0 - masses), k)
    return Map(
        lambda u: np.square(volume.value(u, room)), lambda x: volume.density(np.sqrt(x), room), (masses**2, 100.0)
    )


def along(exponent: float, delta: float, low: float, high: float) -> Map:
    """1 − cos to a beam."""
    ends, shift = (number(low), number(high)), number(delta)
    return Map(
        lambda u: transfer.value(u, ends, shift, exponent),
        lambda x: transfer.density(x + delta, ends, shift, exponent),
        (low, high),
    )


def both_beams(first: float, second: float, low: float, high: float) -> Map:
    """1 − cos with a peak at either end."""
    ends, deltas = (number(low), number(high)), (number(first), number(second))
    return Map(
        lambda u: two_sided.value(u, ends, deltas)[0],
        lambda x: two_sided.density((x + first, 2.0 - x + second), ends, deltas),
        (low, high),
    )


def spread(u: Array, density: Array) -> Array:
    """A density that is the same everywhere, in the shape of u."""
    return np.broadcast_to(density, u.shape)


MAPS = {
    "flat": Map(lambda u: flat.value(u, LOW, HIGH), lambda x: spread(x, flat.density(LOW, HIGH)), (4.0, 15625.0)),
    "power 2": falling(2.0, 0.01, 50.0),
    "power 0.5": falling(0.5, 1e-6, 50.0),
    "power 1.5 from afar": falling(1.5, 1e9, 1.0),
    "logarithm": Map(
        lambda u: logarithm.value(u, number(1e-4), number(2.0)),
        lambda x: logarithm.density(x + 1e-4, number(1e-4), number(2.0)),
        (0.0, 2.0),
    ),
    "fixed width": breit_wigner(4.0, 15625.0, Z_WIDTH),
    "running width": breit_wigner(4.0, 15625.0, Z_WIDTH, running=True),
    "wide": breit_wigner(0.0, 40_000.0, 60.0),
    "below the line": breit_wigner(4.0, 900.0, Z_WIDTH),
    "above the line": breit_wigner(10_000.0, 20_000.0, Z_WIDTH),
    "two lines": two_lines(),
    "soft": Map(
        lambda u: soft.value(u, number(0.5), number(100.0)),
        lambda x: soft.density(x, number(0.5), number(100.0)),
        (0.5, 100.0),
    ),
    "soft without a cut": Map(
        lambda u: soft.value(u, number(0.0), number(100.0)),
        lambda x: soft.density(x, number(0.0), number(100.0)),
        (0.0, 100.0),
    ),
    "collinear": Map(
        lambda u: collinear.value(u, number(0.01), number(81.0), number(0.3)),
        lambda x: collinear.density(x, number(0.01), number(81.0), number(0.3)),
        (0.01, 81.0),
    ),
    "transfer": along(1.0, 1e-5, 0.0, 2.0),
    "transfer squared": along(2.0, 1e-3, 0.0, 2.0),
    "transfer of something heavy": along(2.0, 1e7, 0.1, 1.9),
    "two-sided": both_beams(1e-4, 1e-5, 0.0, 2.0),
    "two-sided within": both_beams(1e-9, 1e-9, 0.02, 1.7),
    **{f"{k + 1} massless bodies": bodies(k, 0.0) for k in range(1, 7)},
    **{f"{k + 1} massive bodies": bodies(k, 0.4) for k in (1, 2, 4)},
    "cosine": Map(
        lambda u: cosine.value(u, number(0.3), number(1.9))[0],
        lambda x: spread(x, cosine.density(number(0.3), number(1.9))),
        (0.3, 1.9),
    ),
    "cosine everywhere": Map(
        lambda u: cosine.everywhere(u)[0], lambda x: spread(x, cosine.density(number(0.0), number(2.0))), (0.0, 2.0)
    ),
}


@pytest.mark.parametrize("name", MAPS)
def test_a_map_stays_between_its_ends_and_rises(name: str) -> None:
    """u near 0 and 1 come close to the ends, no u leaves them by more than rounding, and x rises with u."""
    mapped, (low, high) = MAPS[name], MAPS[name].ends
    u = np.concatenate([np.logspace(-15, -3, 60), np.linspace(0.001, 0.999, 2001), 1 - np.logspace(-3, -15, 60)])
    x = mapped.value(u)
    slack = 1e-12 * (high - low)
    assert np.all(np.diff(x) >= -slack)
    assert x.min() >= low - slack
    assert x.max() <= high + slack
    assert x[0] < low + 0.01 * (high - low)
    assert x[-1] > high - 0.01 * (high - low)


@pytest.mark.parametrize("name", MAPS)
def test_the_density_is_the_inverse_of_the_slope(name: str) -> None:
    """dx/du by differences of x times the density is 1, to 1e-6."""
    mapped = MAPS[name]
    u = np.array([0.011, 0.1, 0.234, 0.45, 0.55, 0.71, 0.9, 0.987])
    step = 1e-5
    slope = (
        8 * (mapped.value(u + step) - mapped.value(u - step)) - mapped.value(u + 2 * step) + mapped.value(u - 2 * step)
    ) / (12 * step)
    np.testing.assert_allclose(slope * mapped.density(mapped.value(u)), 1.0, rtol=1e-6)


@pytest.mark.parametrize("name", MAPS)
def test_a_map_integrates_what_the_flat_map_does(name: str) -> None:
    """∫ f dx of an f with the map's own peak and something else, by the map and by flat points in ln-spaced strips."""
    mapped, (low, high) = MAPS[name], MAPS[name].ends

    def f(x: Array) -> Array:
        return mapped.density(x) * (1.0 + np.square((x - low) / (high - low)))

    rng = np.random.default_rng(len(name))
    x = mapped.value(rng.random(40_000))
    mean, error = mean_and_error(f(x) / mapped.density(x))
    exact = strips(f, low, high, MAPS[name].value(np.linspace(0.0005, 0.9995, 1000)))
    assert abs(mean - exact) < 4 * error + 1e-6
    assert error < 0.01 * exact


def strips(f: Callable[[Array], Array], low: float, high: float, edges: Array) -> float:
    """∫ f by Gauss and Legendre, eight even nodes between neighbouring edges."""
    nodes, weights = np.polynomial.legendre.leggauss(8)
    ends = np.concatenate([[low], edges, [high]])
    half = 0.5 * np.diff(ends)[:, None]
    x = ends[:-1, None] + half * (1.0 + nodes)
    return float(np.sum(weights * half * f(x.ravel()).reshape(x.shape)))


@pytest.mark.parametrize("k", range(1, 8))
def test_shares_of_phase_space_solve_their_equation(k: int) -> None:
    """(k + 1) v^k − k v^(k+1) is u again, to 1e-14, from 1e-30 to 1 − 1e-15."""
    room = volume.Room(0.0, number(1.0), k)
    u = np.concatenate([np.logspace(-30, -1, 500), np.linspace(0.1, 0.9, 500), 1 - np.logspace(-1, -15, 500)])
    np.testing.assert_allclose(volume.fraction(volume.value(u, room), room), u, rtol=1e-14)


def test_a_running_width_is_the_same_line_in_another_form() -> None:
    """1/((x − M²)² + x²Γ²/M²) is proportional to the density that `line` gives for a running width."""
    mapped = MAPS["running width"]
    x = np.linspace(5.0, 15_000.0, 400)
    ratio = mapped.density(x) * ((x - Z_MASS**2) ** 2 + (x * Z_WIDTH / Z_MASS) ** 2)
    np.testing.assert_allclose(ratio, ratio[0], rtol=1e-12)


def test_an_azimuth_is_even_and_on_the_circle() -> None:
    """cos² + sin² = 1, the angle is 2π(u − ½), and the density is 1/2π."""
    u = np.random.default_rng(3).random(1000)
    cosine_of, sine_of = azimuth.value(u)
    np.testing.assert_allclose(cosine_of**2 + sine_of**2, 1.0, rtol=1e-14)
    np.testing.assert_allclose(np.arctan2(sine_of, cosine_of), 2 * np.pi * (u - 0.5), atol=1e-14)
    assert pytest.approx(1 / (2 * np.pi)) == azimuth.DENSITY


@pytest.mark.parametrize("name", ["cosine", "two-sided"])
def test_both_distances_from_the_poles_keep_their_digits(name: str) -> None:
    """1 − cos and 1 + cos add up to 2, and the small one is positive however close the pole."""
    u = np.concatenate([np.logspace(-14, -1, 100), 1 - np.logspace(-1, -14, 100)])
    if name == "cosine":
        ahead, behind = cosine.everywhere(u)
    else:
        ahead, behind = two_sided.value(u, (number(0.0), number(2.0)), (number(1e-9), number(1e-9)))
    np.testing.assert_allclose(ahead + behind, 2.0, rtol=1e-14)
    assert np.all((ahead > 0) & (behind > 0))
