"""A worker's whole job: from a block to its tally.

The sums of a block have the shape (moment, point, variation, component), with the moments value and error bound in
GeV⁻². The variation axis holds, for the request as it stands and for each of its variations, all parts of the law that
are asked for, and then every contribution that is reported.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from barnwright.beams import collide
from barnwright.engine.answer import COUNTS, Answer
from barnwright.engine.azimuth import needs_azimuth, over_azimuth
from barnwright.engine.inclusive import inclusive_answer
from barnwright.engine.law import law_of
from barnwright.engine.plan import Member, Stage
from barnwright.engine.rows import Rows
from barnwright.engine.setting import Setting
from barnwright.errors import PluginError
from barnwright.integrate.block import Block
from barnwright.integrate.tally import Sums, Tally, WorstPoint
from barnwright.process import Process, TotalCrossSection

Array = NDArray[np.float64]


def evaluate(block: Block, stage: Stage, process: Process) -> Tally:
    """Work out a block.

    Parameters
    ----------
    block : Block
        A range of points of the plan, of one of its members.
    stage : Stage
    process : Process
        The one that the plan names for this member.

    Raises
    ------
    PluginError
        When one of the process's functions raises or returns an array of the wrong shape.
    """
    plan = stage.plan
    group, first, last = plan.group_of(block.points)
    member, share = plan.members[block.stratum], group.shares[block.stratum]
    components = member.layout.components
    added = np.zeros((2, last - first, share.entries, components + len(COUNTS)))
    worst: tuple[WorstPoint, ...] = ()
    entry = 0
    try:
        for setting in share.settings:
            for answer in _by_part(process, member, setting, slice(first, last)):
                added[0, :, entry, :components], added[1, :, entry, :components] = answer.value, answer.error
                added[0, :, entry, components:] = answer.counts
                worst = worst or answer.worst
                entry += 1
    except PluginError as error:
        raise PluginError(member.source.distribution, member.source.name, error.cause) from error
    counts = added[0, ..., components:].sum(axis=(0, 1))
    counters = {name: int(count) for name, count in zip(COUNTS, counts, strict=True)}
    return Tally(block, {(0, 0): Sums(added, np.zeros(added.shape[1:]))}, counters, worst)


def _by_part(process: Process, member: Member, setting: Setting, points: slice) -> Iterator[Answer]:
    """The answers of one setting, part after part; points below threshold stay 0."""
    collision = collide(setting.beams, setting.masses[:2]).take(points)
    open_points = np.nonzero(collision.above(sum(setting.masses[2:]))[:, 0] > 0)[0]
    empty = Answer.empty(collision.sqrt_s.shape[0], member.layout.components)
    if open_points.size == 0:
        yield from (empty for _ in setting.parts)
        return
    found = _all_parts(process, member, setting, Rows.of(member.reaction, collision.take(open_points), setting.masses))
    for number in range(len(setting.parts)):
        yield empty.copy().filled(open_points, found.rows(number * open_points.size, open_points.size))


def _all_parts(process: Process, member: Member, setting: Setting, rows: Rows) -> Answer:
    """All parts above threshold, part after part; one by one where the azimuth is integrated over."""
    layout = member.layout
    if setting.law is not None and isinstance(law_of(process, setting), TotalCrossSection):
        return inclusive_answer(process, setting, layout, member.reaction, rows.collision)
    if len(setting.parts) == 1 or not needs_azimuth(setting, layout, rows):
        return over_azimuth(process, setting, layout, rows)
    alone = (replace(setting, parts=(part,)) for part in setting.parts)
    return Answer.joined([over_azimuth(process, one, layout, rows) for one in alone])
