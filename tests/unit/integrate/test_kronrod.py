"""The Gauss–Kronrod rule in the variable that smooths square roots."""

from __future__ import annotations

import numpy as np
import pytest

from barnwright.integrate.kronrod import kronrod

PUBLISHED = (0.991455371120813, 0.949107912342759, 0.864864423359769, 0.741531185599394)
"""The outer nodes of the 15-point rule on [−1, 1]; R. Piessens and others, QUADPACK (1983), from memory."""


def test_the_nodes_are_the_published_ones() -> None:
    """Nodes in u, found again from v = u²(3 − 2u), are those of the tables."""
    u = 0.5 * (1 - np.array(PUBLISHED))
    assert kronrod().place[:4] == pytest.approx(u * u * (3 - 2 * u), rel=1e-12)
    assert kronrod().place[::-1] == pytest.approx(1 - kronrod().place, abs=1e-15)


def test_exact_to_the_degree_of_the_rule() -> None:
    """Powers of v up to 6 are polynomials in u of degree 20, with the measure: the finer rule is exact; sums are 1."""
    rule = kronrod()
    for power in range(7):
        assert rule.fine @ rule.place**power == pytest.approx(1 / (power + 1), rel=2e-15)
    assert rule.coarse.sum() == pytest.approx(1.0, abs=1e-15)
    assert np.count_nonzero(rule.coarse) == 7


@pytest.mark.parametrize(
    ("function", "integral"),
    [
        (np.sqrt, 2 / 3),
        (lambda v: np.sqrt(1 - v), 2 / 3),
        (lambda v: np.sqrt(v * (1 - v)), np.pi / 8),
        (lambda v: np.arccos(2 * v - 1) / np.pi, 0.5),
    ],
)
def test_square_roots_at_the_ends(function, integral: float) -> None:  # type: ignore[no-untyped-def]
    """Functions that begin or end like a square root are as good as smooth."""
    rule = kronrod()
    fine, coarse = (float(weights @ function(rule.place)) for weights in (rule.fine, rule.coarse))
    assert fine == pytest.approx(integral, abs=1e-15)
    assert abs(fine - coarse) < 1e-7


def test_slopes() -> None:
    """The integral of a slope from values of the antiderivative is their difference, within the bound of rounding."""
    rule = kronrod()
    places = np.concatenate([[0.0], rule.place, [1.0]])
    heights = np.sin(3 * places) + 100.0
    noise = rule.rounding * np.finfo(float).eps * 101
    assert rule.fine @ (rule.slopes @ heights) == pytest.approx(np.sin(3.0), abs=noise)
    weighed = rule.fine @ (np.sqrt(rule.place) * (rule.slopes @ places**2))
    assert weighed == pytest.approx(2 / 2.5, rel=1e-13)
