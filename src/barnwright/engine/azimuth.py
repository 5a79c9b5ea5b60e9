"""The azimuth, integrated only where a cut or a histogram asks for it.

Without transverse polarisation nothing depends on the azimuth but the observables themselves. Panels in the azimuth
end where an observable of the azimuth alone crosses an edge; where azimuth and polar angle mix, panels are halved
until the answer settles. Where beams cross at an angle all of the lab depends on the azimuth of the cm, and then the
polar angle is the outer axis (`over_circles`).
"""

from __future__ import annotations

from collections.abc import Mapping
from functools import partial

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.answer import Answer
from barnwright.engine.edges import levels_by_observable
from barnwright.engine.integrand import Integrand
from barnwright.engine.over_circles import over_circles
from barnwright.engine.polar import over_polar_angle
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Layout, Setting
from barnwright.engine.turning import Split, split
from barnwright.integrate.gauss import FIRST_ORDER, embedded_weights, gauss_legendre
from barnwright.integrate.panels import panels_between
from barnwright.integrate.polar_axis import Ends, Integers
from barnwright.integrate.roots import Crossings, crossings
from barnwright.observables import Observable
from barnwright.process import Process

Array = NDArray[np.float64]

TOLERANCE = 1e-11
DEEPEST = 10


def over_azimuth(process: Process, setting: Setting, layout: Layout, rows: Rows) -> Answer:
    """Totals, bins and asymmetries of every row, averaged over the azimuth where something depends on it."""
    crossed = rows.collision.crossed is not None
    questions = split(setting, layout, crossed)
    if questions is None:
        return over_polar_angle(process, setting, layout, rows)
    if crossed:
        return _crossed(process, setting, questions, rows)
    wanted = levels_by_observable(setting.cuts, layout)
    answer = Answer.empty(rows.count, layout.components)
    for point in range(rows.count):
        found = _one_point(process, setting, layout, rows.take(point), wanted)
        answer = answer.filled(np.array([point]), found)
    return answer


def needs_azimuth(setting: Setting, layout: Layout, rows: Rows) -> bool:
    """Whether a cut or a question depends on the azimuth in a way for which parts of the law are done one by one."""
    if rows.collision.crossed is not None:
        return False
    return any(observable.azimuthal for observable in levels_by_observable(setting.cuts, layout))


def _crossed(process: Process, setting: Setting, questions: Split, rows: Rows) -> Answer:
    """Beams that cross at an angle, point by point; what does not turn is done for all points at once."""
    whole = Answer.empty(rows.count * len(setting.parts), questions.components)
    parameters = process.parameters_of(setting.parameters)
    for point in range(rows.count):
        integrand = Integrand(process, setting, rows.take(point), parameters)
        found = over_circles(integrand, questions.turning)
        whole = whole.placed(slice(point, None, rows.count), questions.turning_places, found)
    if questions.still is None:
        return whole
    found = over_polar_angle(process, setting, questions.still, rows)
    return whole.placed(slice(None), questions.still_places, found)


def _one_point(
    process: Process, setting: Setting, layout: Layout, rows: Rows, wanted: Mapping[Observable, Array]
) -> Answer:
    low, high = _azimuth_panels(rows, wanted)
    answer = Answer.empty(1, layout.components)
    nodes, weights = gauss_legendre(FIRST_ORDER)
    for depth in range(DEEPEST + 1):
        azimuth = np.pi * (low[:, None] + (high - low)[:, None] * nodes).reshape(-1, 1)
        many = rows.collision.take(np.zeros(azimuth.size, dtype=np.intp))
        found = over_polar_angle(process, setting, layout, Rows(rows.reaction, many, rows.masses, azimuth))
        share = 0.5 * (high - low)[:, None]
        fine, coarse = (_summed(found.value, w) * share for w in (weights, embedded_weights()))
        bound = np.abs(fine - coarse) + _summed(found.error, weights) * share
        scale = max(float(np.max(np.abs(answer.value + fine.sum(axis=0)))), 1e-300)
        done = (np.max(np.abs(fine - coarse), axis=1) <= TOLERANCE * scale) | (depth == DEEPEST)
        answer.value[0] += fine[done].sum(axis=0)
        answer.error[0] += bound[done].sum(axis=0)
        answer.counts[0] += found.counts.sum(axis=0)
        answer = Answer(answer.value, answer.error, answer.counts, answer.worst or found.worst)
        if done.all():
            break
        low, high, middle = low[~done], high[~done], 0.5 * (low[~done] + high[~done])
        low, high = np.concatenate([low, middle]), np.concatenate([middle, high])
    return answer


def _summed(values: Array, weights: Array) -> Array:
    """(panel × node, component) summed over the nodes of each panel."""
    shaped = values.reshape(-1, weights.size, values.shape[-1])
    return np.asarray(np.add.reduce(shaped * weights[:, None], axis=1))


def _azimuth_panels(rows: Rows, wanted: Mapping[Observable, Array]) -> tuple[Array, Array]:
    """Ends of the azimuth panels as shares of π, between −1 and 1."""
    parts = [
        crossings(partial(_turned, rows, observable, entry), 1, levels)
        for observable, levels in wanted.items()
        if observable.azimuthal and _azimuth_alone(rows, observable)
        for entry in range(observable.entries)
    ]
    quarter = Crossings(
        np.zeros(2, np.intp), np.array([0, 1]), np.array([0.5, 0.5]), np.zeros(2), np.zeros(2, dtype=bool)
    )
    panels = panels_between(Crossings.join([quarter, *parts]), 1)
    ends = panels.boundaries().c[0]
    wide = np.diff(ends) > 0
    return ends[:-1][wide], ends[1:][wide]


def _azimuth_alone(rows: Rows, observable: Observable) -> bool:
    """Whether the observable is the same at every polar angle."""
    some = np.array([[-0.9, -0.2, 0.3, 0.8]])
    ends = Ends(1 - some, 1 + some)
    return all(
        np.array_equal(_at(rows, observable, e, ends, -0.6), _at(rows, observable, e, ends, 0.8))
        for e in range(observable.entries)
    )


def _turned(rows: Rows, observable: Observable, entry: int, row: Integers, ends: Ends) -> Array:
    """The observable as a function of the azimuth's location, at one polar angle."""
    del row
    return _at(rows, observable, entry, ends, 0.3)


def _at(rows: Rows, observable: Observable, entry: int, ends: Ends, cosine: float) -> Array:
    """The observable at azimuths π·c, one polar angle."""
    shape = ends.one_plus.shape
    polar = Ends(np.full(shape, 1 - cosine), np.full(shape, 1 + cosine))
    turned = Rows(rows.reaction, rows.collision, rows.masses, np.pi * ends.c)
    found = np.asarray(observable.values(turned.event(None, polar)))
    chosen = found[entry] if observable.quantifier is not None else found
    return np.broadcast_to(chosen, np.broadcast_shapes(chosen.shape, shape)).reshape(shape)
