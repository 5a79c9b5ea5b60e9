"""Quadrature over panels: exact answers, honest bounds, divergences noticed."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial

import mpmath
import numpy as np
import pytest

from barnwright.integrate.gauss import FIRST_ORDER, embedded_weights, gauss_legendre
from barnwright.integrate.panel_integrals import NEGATIVE, NON_FINITE, UNRESOLVED, PanelIntegrals
from barnwright.integrate.panels import panels_between
from barnwright.integrate.polar_axis import Ends, Integers
from barnwright.integrate.quadrature import integrate_panels
from barnwright.integrate.roots import Crossings, crossings

Array = np.ndarray
FLAT = np.full((1, 2), np.inf)


def integral(density: Callable[[Ends], Array], levels: list[float], scales: Array = FLAT) -> PanelIntegrals:
    """Over panels cut at these values of c."""
    found = (
        crossings(
            lambda row, ends: np.broadcast_to(ends.c, np.broadcast_shapes(row.shape, ends.c.shape)), 1, np.array(levels)
        )
        if levels
        else Crossings.none()
    )
    return integrate_panels(lambda _, ends: density(ends), panels_between(found, 1), scales, 1)


@pytest.mark.parametrize("order", [5, 10, 20, 40])
def test_rules_are_exact_for_their_polynomials(order: int) -> None:
    """Gauss–Legendre of n nodes integrates x^(2n − 1) over [0, 1]; the embedded partner integrates cubics."""
    nodes, weights = gauss_legendre(order)
    assert np.sum(weights * nodes ** (2 * order - 1)) == pytest.approx(1 / (2 * order), rel=1e-13)
    five, _ = gauss_legendre(FIRST_ORDER)
    for power in range(4):
        assert np.sum(embedded_weights() * five**power) == pytest.approx(1 / (power + 1), rel=1e-14)
    assert abs(np.sum(embedded_weights() * five**4) - 0.2) > 1e-4


DENSITIES = [
    pytest.param(lambda e: 1 + e.c**2, mpmath.mpf(8) / 3, id="polynomial"),
    pytest.param(lambda e: np.exp(3 * e.c), (mpmath.exp(3) - mpmath.exp(-3)) / 3, id="exponential"),
    pytest.param(lambda e: 1 / (1e-3 + e.one_minus), mpmath.log(1 + 2 / mpmath.mpf(1e-3)), id="peak of 1e-3"),
    pytest.param(lambda e: 1 / (1e-12 + e.one_minus), mpmath.log(1 + 2 / mpmath.mpf(1e-12)), id="peak of 1e-12"),
    pytest.param(lambda e: 1 / (1e-9 + e.one_plus) ** 2, 1 / mpmath.mpf(1e-9) - 1 / (2 + mpmath.mpf(1e-9)), id="pole"),
    pytest.param(lambda e: np.sqrt(e.one_minus), mpmath.sqrt(32) / 3, id="root at the end"),
]


@pytest.mark.parametrize(("density", "exact"), DENSITIES)
@pytest.mark.parametrize("levels", [[], [-0.9, 0.0, 0.3], [-1 + 1e-10, 1 - 1e-11]])
@pytest.mark.parametrize("scales", [FLAT, np.array([[1e-9, 1e-12]])], ids=["flat", "mapped"])
def test_integrals(density: Callable[[Ends], Array], exact: mpmath.mpf, levels: list[float], scales: Array) -> None:
    """The sum of all panels is the integral to 1e-12, within the bound, whether or not the peak was declared."""
    found = integral(density, levels, scales)
    total, bound = float(found.value.sum()), float(found.error.sum())
    assert total == pytest.approx(float(exact), rel=1e-12)
    assert abs(total - float(exact)) <= bound + 1e-15 * float(exact)
    assert not found.counts[0, UNRESOLVED]


def test_a_divergence_does_not_settle() -> None:
    """1/(1 − c) has no integral: the panel at the pole stays unresolved, and its error says so."""
    found = integral(lambda e: 1 / e.one_minus, [])
    assert found.counts[0, UNRESOLVED] > 0
    assert found.error.max() > 1e-3 * found.value.max()


def test_what_is_not_finite_or_negative_is_counted_and_placed() -> None:
    """NaN and negative nodes are counted, and the first is named by its place."""
    broken = integral(lambda e: np.where(e.c > 0.5, np.nan, 1.0), [])
    assert broken.counts[0, NON_FINITE] > 0
    assert broken.worst is not None
    assert 1 - broken.worst[1] > 0.5
    negative = integral(lambda e: e.c, [0.0])
    assert negative.counts[0, NON_FINITE] == 0
    assert negative.counts[0, NEGATIVE] > 0


def test_rows_keep_their_bits_in_company() -> None:
    """A row integrated among others has the bits it has alone."""
    widths = np.array([[1e-2], [1e-6], [0.3]])

    def peaks(chosen: Array, row: Integers | None, ends: Ends) -> Array:
        width = chosen if row is None else chosen[row]
        return 1 / (width + ends.one_minus)

    panels = panels_between(Crossings.none(), 1)
    together = integrate_panels(partial(peaks, widths), panels, FLAT, 3).value
    for k in range(3):
        alone = integrate_panels(partial(peaks, widths[k : k + 1]), panels, FLAT, 1).value
        assert np.array_equal(together[k], alone[0])
