"""The driver for one process and one thread."""

from __future__ import annotations

from collections.abc import Callable
from math import inf

from barnwright.engine.calculate import calculate
from barnwright.engine.judge import Verdict
from barnwright.engine.protocol import PlanProtocol
from barnwright.integrate.block import Block, Round
from barnwright.integrate.ledger import Frozen, Ledger
from barnwright.integrate.tally import Tally

Evaluate = Callable[[Block, Frozen], Tally]
"""From a block, and the frozen maps of its round, to its tally."""


class Pace:
    """Foretells from the chunks that were done whether a round ends in time.

    Parameters
    ----------
    clock : callable
        Gives seconds.
    max_seconds : float or None
        From now on.
    """

    def __init__(self, clock: Callable[[], float], max_seconds: float | None) -> None:
        self._clock = clock
        self._start = clock()
        self._limit = inf if max_seconds is None else max_seconds
        self._chunks = 0

    def fits(self, wanted: Round) -> bool:
        """Whether all of a round's chunks fit what is left; before the first one is done, whether anything is left."""
        spent = self._clock() - self._start
        return spent * (1 + (wanted.chunks / self._chunks if self._chunks else 0)) <= self._limit

    def done(self, block: Block) -> None:
        """Count a block's chunks."""
        self._chunks += block.chunks[1] - block.chunks[0]

    @property
    def over(self) -> bool:
        """Whether the time is up."""
        return self._clock() - self._start > self._limit


def drive(plan: PlanProtocol, ledger: Ledger, evaluate: Evaluate, pace: Pace) -> Verdict:
    """Calculate a plan here and now; Ctrl-C ends it with the last closed round.

    Raises
    ------
    CalculationError
        When it was stopped, or its time was up, before the first round was complete.
    """
    calculation = calculate(plan, ledger)
    while True:
        try:
            wanted = next(calculation)
        except StopIteration as end:
            verdict: Verdict = end.value
            return verdict
        try:
            _work_off(wanted, ledger, evaluate, pace)
        except KeyboardInterrupt:
            ledger.stop("cancelled")


def _work_off(wanted: Round, ledger: Ledger, evaluate: Evaluate, pace: Pace) -> None:
    missing = ledger.missing(wanted)
    if not pace.fits(missing):
        ledger.stop("time_limit")
        return
    for block in missing:
        if pace.over:
            ledger.stop("time_limit")
            return
        ledger.add(evaluate(block, ledger.frozen))
        pace.done(block)
