"""The answer of all rows by integrals over panels of the polar axis, in closed form or by quadrature."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.answer import Answer
from barnwright.engine.integrand import Integrand
from barnwright.engine.law import cumulative
from barnwright.engine.partition import Partition, add_panels, partition_of
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Layout, Setting
from barnwright.event import Point
from barnwright.integrate.extrema import EPSILON
from barnwright.integrate.panel_integrals import COUNTED, EVALUATIONS, NEGATIVE, NON_FINITE, PanelIntegrals
from barnwright.integrate.panels import Panels
from barnwright.integrate.polar_axis import Ends, ends_of
from barnwright.integrate.quadrature import ROUNDING, integrate_panels, known_heights
from barnwright.integrate.tally import WorstPoint
from barnwright.kinematics import CM
from barnwright.observables import compile_observable
from barnwright.process import Process

Array = NDArray[np.float64]

SMALL_SHARE = 1e-4
"""Panels below this share of the total are done by quadrature: differences of antiderivatives lose digits there."""


def over_polar_angle(process: Process, setting: Setting, layout: Layout, rows: Rows) -> Answer:
    """Totals, bins and asymmetries of every row."""
    integrand = Integrand(process, setting, rows, process.parameters_of(setting.parameters))
    partition = partition_of(setting, layout, rows).tiled(integrand.tiled)
    if setting.rule == "closed_form":
        integrals = _closed_form(integrand, partition.inside_cuts())
    else:
        integrals = _quadrature(integrand, partition.inside_cuts())
    if setting.beams.given == "kinetic":
        rounding = np.asarray(integrand.tiled(threshold_rounding(rows)))
        integrals = replace(integrals, error=integrals.error + rounding * np.abs(integrals.value))
    integrals.counts[integrand.signed, NEGATIVE] = 0
    return _collected(integrals, partition, integrand, layout)


def threshold_rounding(rows: Rows) -> Array:
    """What a few ε of s − (m_a + m_b)² mean for σ ∝ √(√s − M) above a threshold M, as a share of σ; shape (row, 1)."""
    collision, masses = rows.collision, rows.masses
    before, after = masses[0] + masses[1], masses[2] + masses[3]
    excess = collision.above(before) * (collision.sqrt_s + before)
    return 2 * EPSILON * excess / (collision.sqrt_s * collision.above(after))


def _quadrature(integrand: Integrand, panels: Panels) -> PanelIntegrals:
    """The integrals over panels by quadrature; those that may be negative settle as well as what they are made of."""
    beside = integrand.made_of if integrand.interferes else None
    return integrate_panels(integrand.density(), panels, integrand.scales(), integrand.count, beside)


def _closed_form(integrand: Integrand, panels: Panels) -> PanelIntegrals:
    """Differences of the antiderivative, with quadrature for the panels that are too small for them."""
    x, heights = _heights(integrand, panels)
    direction = np.where(x[:, -1:] >= x[:, :1], 1.0, -1.0)
    value = direction * np.diff(heights, axis=1)
    error = ROUNDING * (np.abs(heights[:, 1:]) + np.abs(heights[:, :-1])) * (panels.width > 0)
    with np.errstate(divide="ignore", invalid="ignore"):  # the antiderivative gets its edges as floats, rounded to ε
        error += np.where(panels.width > 0, EPSILON * np.abs(value) / panels.width, 0.0)
    total = np.max(heights, axis=1, keepdims=True) - np.min(heights, axis=1, keepdims=True)
    counts = np.zeros((integrand.count, len(COUNTED)))
    counts[:, EVALUATIONS] = 1 + np.count_nonzero(panels.width, axis=1)
    counts[:, NON_FINITE] = np.count_nonzero(~np.isfinite(heights), axis=1)
    result = PanelIntegrals(np.where(panels.width > 0, value, 0.0), error, counts)
    small = integrand.alike((panels.width > 0) & (np.abs(value) < SMALL_SHARE * total))
    if integrand.setting.law is None or not small.any():
        return result
    return _with_quadrature(integrand, panels, result, small)


def _heights(integrand: Integrand, panels: Panels) -> tuple[Array, Array]:
    """The boundaries of the panels in the closed form's observable, and its antiderivative there, part after part."""
    setting, rows, process = integrand.setting, integrand.rows, integrand.process
    assert setting.closed_form is not None
    side, x = panels.shared_ends()
    ends = ends_of(np.broadcast_to(side, x.shape), x)
    if ends.one_plus.shape[0] == integrand.count:
        ends = Ends(ends.one_minus[: rows.count], ends.one_plus[: rows.count])
    point = Point.of(rows.reaction, rows.collision, rows.masses)
    x = natural_values(process.closed_forms[setting.closed_form].observable, rows, ends)
    found = [cumulative(process, setting, x, point, integrand.parameters, parts) for parts in integrand.parts]
    return np.asarray(integrand.tiled(x)), found[0] if len(found) == 1 else np.concatenate(found)


def _with_quadrature(
    integrand: Integrand, panels: Panels, result: PanelIntegrals, small: NDArray[np.bool_]
) -> PanelIntegrals:
    """The same integrals with the small ones done by quadrature."""
    fine = _quadrature(integrand, panels.only(small))
    result.value[small], result.error[small] = fine.value[small], fine.error[small]
    return PanelIntegrals(result.value, result.error, result.counts + fine.counts, fine.worst)


def natural_values(text: str, rows: Rows, ends: Ends) -> Array:
    """A closed form's observable at locations, with +z along beam a whatever the request says."""
    observable = compile_observable(text, rows.reaction, numbered=True)
    if (
        observable.axis is not None
        and observable.axis.kind == "cosine"
        and observable.axis.leg == 1
        and not observable.axis.folded
    ):
        return ends.c
    own = Rows(rows.reaction, rows.collision.facing_a(), rows.masses, rows.azimuth)
    return own.values(observable, None, ends)


def _collected(integrals: PanelIntegrals, partition: Partition, integrand: Integrand, layout: Layout) -> Answer:
    """Add the panels up into components; an edge of a histogram that is grazed says nothing about the uncut total."""
    panels, answer = partition.panels, Answer.empty(integrand.count, layout.components)
    heights = _boundary_heights(integrals, panels, integrand)
    for number, component in enumerate(partition.components):
        add_panels(answer.value, component, integrals.value)
        add_panels(answer.error, component, integrals.error)
        if heights is not None:
            whole = panels.without_spares(component)
            grazed = panels.graze if number > 0 or integrand.setting.cuts else 0.0
            slack = np.where(whole[:, 1:] != whole[:, :-1], panels.wobble, grazed) * heights
            add_panels(answer.error, whole[:, 1:], slack)
            add_panels(answer.error, whole[:, :-1], slack)
    undefined = np.broadcast_to(partition.undefined, (integrand.count,))
    counts = np.column_stack([integrals.counts, undefined])
    return Answer(answer.value, answer.error, counts, worst_points(integrals, integrand))


def _boundary_heights(integrals: PanelIntegrals, panels: Panels, integrand: Integrand) -> Array | None:
    """The integrand at each inner boundary, (row, panel − 1); None where no boundary is uncertain.

    The mean of the panels beside it is enough where an edge is known to the last digit; where it was searched for, the
    law is asked as well, since it may be much steeper than a panel.
    """
    if not (panels.wobble.any() or panels.graze.any()):
        return None
    with np.errstate(divide="ignore", invalid="ignore"):
        mean = np.where(panels.width > 0, np.abs(integrals.value) / panels.width, 0.0)
    mean = panels.without_spares(mean)
    heights, known = np.maximum(mean[:, 1:], mean[:, :-1]), integrals.heights
    searched = np.maximum(panels.wobble, panels.graze).max(axis=1, keepdims=True) > EPSILON
    if known is None and integrand.setting.law is not None and searched.any():
        ends = panels.boundaries()
        inner = Ends(ends.one_minus[:, 1:-1], ends.one_plus[:, 1:-1])
        known = np.where(searched, known_heights(np.broadcast_to(integrand.density()(None, inner), heights.shape)), 0.0)
    return heights if known is None else np.maximum(heights, known)


def worst_points(integrals: PanelIntegrals, integrand: Integrand) -> tuple[WorstPoint, ...]:
    """The first point at which the law was not finite, or negative where it must not be."""
    if integrals.worst is None or not integrals.counts[:, [NON_FINITE, NEGATIVE]].any():
        return ()
    rows = integrand.rows
    row, one_minus, one_plus, value = integrals.worst
    ends = Ends(np.array([[one_minus]]), np.array([[one_plus]]))
    event = rows.event(np.array([row % rows.count]), ends)
    legs = (-1, -2, *range(1, len(rows.reaction.outgoing) + 1))
    momenta = tuple(tuple(float(c) for c in event.vector(code, CM).components().reshape(4)) for code in legs)
    return (WorstPoint(value=value, momenta=momenta),)
