"""A worker's whole job: from a block to its tally.

The sums of a block have the shape (moment, point, variation, component), with the moments value and error bound in
GeV⁻².
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import collide
from barnwright.engine.answer import COUNTS, Answer
from barnwright.engine.azimuth import over_azimuth
from barnwright.engine.plan import Stage
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Setting
from barnwright.errors import PluginError
from barnwright.integrate.block import Block
from barnwright.integrate.tally import Sums, Tally, WorstPoint
from barnwright.process import Process

Array = NDArray[np.float64]


def evaluate(block: Block, stage: Stage, process: Process) -> Tally:
    """Work out a block.

    Parameters
    ----------
    block : Block
        A range of points of the plan.
    stage : Stage
    process : Process
        The one that the plan names.

    Raises
    ------
    PluginError
        When one of the process's functions raises or returns an array of the wrong shape.
    """
    plan = stage.plan
    group, first, last = plan.group_of(block.points)
    components = plan.layout.components
    added = np.zeros((2, last - first, len(group.settings), components + len(COUNTS)))
    worst: tuple[WorstPoint, ...] = ()
    for number, setting in enumerate(group.settings):
        try:
            answer = _setting_answer(process, stage, setting, slice(first, last))
        except PluginError as error:
            raise PluginError(plan.source.distribution, plan.source.name, error.cause) from error
        added[0, :, number, :components], added[1, :, number, :components] = answer.value, answer.error
        added[0, :, number, components:] = answer.counts
        worst = worst or answer.worst
    counts = added[0, ..., components:].sum(axis=(0, 1))
    counters = {name: int(count) for name, count in zip(COUNTS, counts, strict=True)}
    return Tally(block, {(0, 0): Sums(added, np.zeros(added.shape[1:]))}, counters, worst)


def _setting_answer(process: Process, stage: Stage, setting: Setting, points: slice) -> Answer:
    """One variation: the points below its threshold stay 0, the others are integrated."""
    plan = stage.plan
    collision = collide(setting.beams, setting.masses[:2]).take(points)
    open_points = np.nonzero(collision.above(sum(setting.masses[2:]))[:, 0] > 0)[0]
    answer = Answer.empty(collision.sqrt_s.shape[0], plan.layout.components)
    if open_points.size == 0:
        return answer
    rows = Rows(plan.reaction, collision.take(open_points), setting.masses, np.zeros((1, 1)))
    found = over_azimuth(process, setting, plan.layout, rows)
    return answer.filled(open_points, found)
