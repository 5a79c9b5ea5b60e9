"""The answer of a total law: σ(s) at every point, with no axis of its own.

Nothing can be asked about its final state; what can be asked about √s is answered here.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.answer import COUNTS, Answer
from barnwright.engine.law import total
from barnwright.engine.membership import OUTSIDE, memberships, passes
from barnwright.engine.partition import add_panels
from barnwright.engine.setting import Layout, Setting
from barnwright.event import Event, Point
from barnwright.integrate.extrema import EPSILON
from barnwright.integrate.panel_integrals import EVALUATIONS, NEGATIVE, NON_FINITE
from barnwright.kinematics import Collision, TwoBody
from barnwright.observables import Observable
from barnwright.process import Process, is_interference
from barnwright.reaction import Reaction

Array = NDArray[np.float64]

ROUNDING = 2 * EPSILON
"""√s is a float, and so are s and s − M² in a law: the answer says what this relative change of √s means."""


def inclusive_answer(
    process: Process, setting: Setting, layout: Layout, reaction: Reaction, collision: Collision
) -> Answer:
    """Totals, and the bins of √s, of every point; part after part."""
    count, parameters = collision.sqrt_s.shape[0], process.parameters_of(setting.parameters)
    answer = Answer.empty(count * len(setting.parts), layout.components)
    components = _components(setting, layout, reaction, collision)
    shaken = [_shifted(collision, share) for share in (0.0, ROUNDING, -ROUNDING)]
    for number, (_, parts) in enumerate(setting.parts):
        rows = slice(number * count, (number + 1) * count)
        points = (Point.of(reaction, one, setting.masses) for one in shaken)
        value, *others = (total(process, setting, point, parameters, parts) for point in points)
        error = 16 * EPSILON * np.abs(value) + np.max([np.abs(other - value) for other in others], axis=0)
        for component in components:
            add_panels(answer.value[rows], component, value)
            add_panels(answer.error[rows], component, error)
        signed = process.signed or (parts is not None and any(map(is_interference, parts)))
        counts = np.zeros((count, len(COUNTS)))
        counts[:, EVALUATIONS] = 1
        counts[:, NON_FINITE] = ~np.isfinite(value[:, 0])
        counts[:, NEGATIVE] = 0 if signed else value[:, 0] < 0
        answer.counts[rows] = counts
    return answer


def _shifted(collision: Collision, share: float) -> Collision:
    """The same collision at a √s that is larger by a share of itself."""
    moved = collision.sqrt_s * (1 + share)
    return Collision(moved, collision.correction, collision.stretch, collision.orientation, collision.target)


def _components(
    setting: Setting, layout: Layout, reaction: Reaction, collision: Collision
) -> tuple[NDArray[np.intp], ...]:
    """The component of every point, shape (point, 1), for the total and each question about √s."""
    ones = np.ones((1, 1))
    event = Event(reaction, TwoBody(collision, (*setting.masses[:2], 0.0, 0.0), ones, ones))

    def values(observable: Observable) -> Array:
        return observable.values(event)

    found = memberships(layout, values, passes(setting.cuts, values))
    shape = collision.sqrt_s.shape
    return tuple(np.where(np.isfinite(collision.sqrt_s), np.broadcast_to(one, shape), OUTSIDE) for one in found)
