"""Whether a calculation goes on, and what it reports.

Rules of this file
------------------
- A verdict is read off the closed rounds from the first one on, as if they came one by one. So a finished calculation
  can be refined, and a ledger that has gone further than a target needs answers as if that target had been asked alone.
- Reporting the first round whose estimated error is small enough would select the small estimates. The first round that
  may be reported is therefore the one after a round with ``SAFETY × error / √2`` below the target; it is reported if
  its own error is below the target too, else the next one for which this holds.
- One sum or point that is not finite makes the answer suspect.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from math import inf, sqrt
from typing import Literal

import numpy as np

from barnwright.engine.protocol import Ladder, PlanProtocol, Target
from barnwright.errors import CalculationError
from barnwright.integrate.estimate import Estimate, estimate
from barnwright.integrate.ledger import Ledger
from barnwright.integrate.settled import Settled
from barnwright.integrate.tally import NON_FINITE, Array

Status = Literal["converged", "evaluation_limit", "time_limit", "cancelled", "suspect"]

LAST_RUNG = 23
SAFETY = 1.3

_STOPPED = {
    "time_limit": "the next round would not have ended within max_seconds",
    "cancelled": "the calculation was cancelled",
}


@dataclass(frozen=True, slots=True)
class Continue:
    """The calculation goes on."""

    next_round: int


@dataclass(frozen=True, slots=True)
class Verdict:
    """How a calculation ended.

    Attributes
    ----------
    status : "converged", "evaluation_limit", "time_limit", "cancelled" or "suspect"
    stop_reason : str
        Why, in a sentence without a full stop.
    settled : Settled
        The round that is reported.
    estimate : Estimate
        Its values and errors.
    """

    status: Status
    stop_reason: str
    settled: Settled
    estimate: Estimate

    @property
    def rounds(self) -> int:
        """How many rounds were taken; asking for as many repeats the numbers to the bit."""
        return self.settled.number + 1


def judge(plan: PlanProtocol, ledger: Ledger) -> Continue | Verdict:
    """Go on, or end with one of the closed rounds.

    Raises
    ------
    CalculationError
        When the calculation was stopped before the first round was complete.
    """
    past: list[float] = []
    last: tuple[Settled, Estimate] | None = None
    for settled in ledger.settled:
        if last is not None and plan.ladder is not None and not _fits(plan.ladder, settled.number):
            return Verdict("evaluation_limit", _limit_reason(plan.ladder, settled.number, past[-1]), *last)
        found = estimate(settled, plan.rule, 1 if plan.ladder is None else plan.ladder.chunk)
        last = settled, found
        if not (settled.finite and bool(np.isfinite(found.value).all())):
            return Verdict("suspect", _suspicion(settled), *last)
        if plan.ladder is None:
            return Verdict("converged", "one round answers", *last)
        past.append(excess(found, plan.ladder.target))
        if (reason := reached(plan.ladder.target, past)) is not None:
            return Verdict("converged", reason, *last)
    return _after_the_last(plan, ledger, past, last)


def excess(found: Estimate, target: Target) -> float:
    """The largest ratio of an error to what is allowed: up to 1 where the target is reached, ∞ where it is unknown."""
    total, error = found.value[..., :1], found.error[..., :1]
    allowed = np.maximum((target.relative or 0.0) * np.abs(total), target.absolute or 0.0)
    ratios = [_ratio(error, allowed).max(initial=0.0)]
    if target.per_bin is not None and target.bins:
        bins, errors = np.abs(found.value[..., target.bins]), found.error[..., target.bins]
        counts = bins > target.bin_floor * np.abs(total)
        ratios.append(_ratio(errors, target.per_bin * bins)[counts].max(initial=0.0))
    return float(max(ratios))


def reached(target: Target, past: list[float]) -> str | None:
    """Why the last of some rounds may be reported, given the excess of each; None where it may not."""
    if target.rounds is not None:
        return f"{target.rounds} rounds were asked for" if len(past) == target.rounds else None
    *before, own = past
    return f"the error is {own:.2g} times the target" if own <= 1 and _foreseen(before) else None


def _suspicion(settled: Settled) -> str:
    count = settled.counters.get(NON_FINITE, 0)
    return f"the integrand was not finite at {count} points" if count else "a sum is not finite"


def _ratio(error: Array, allowed: Array) -> Array:
    with np.errstate(divide="ignore", invalid="ignore"):
        ratio = np.where(error == 0, 0.0, error / allowed)
    return np.where(np.isnan(ratio), inf, ratio)


def _foreseen(past: Iterable[float]) -> bool:
    """Whether a round after these may be reported."""
    return any(SAFETY * each / sqrt(2) < 1 for each in past)


def _fits(ladder: Ladder, number: int) -> bool:
    """Whether a round after the first may be taken."""
    if ladder.target.rounds is not None:
        return True
    return number <= LAST_RUNG and ladder.evaluations(number + 1) <= ladder.target.max_evaluations


def _limit_reason(ladder: Ladder, number: int, own: float) -> str:
    far = f"the error is {own:.3g} times the target"
    if number > LAST_RUNG:
        return f"{far} after {number} rounds, the most that are taken"
    return (
        f"{far}; another round would make it {ladder.evaluations(number + 1)} evaluations, more than "
        f"max_evaluations = {ladder.target.max_evaluations}"
    )


def _after_the_last(
    plan: PlanProtocol, ledger: Ledger, past: list[float], last: tuple[Settled, Estimate] | None
) -> Continue | Verdict:
    """No closed round may be reported as converged: stop with the last one, or go on."""
    number = ledger.closed
    if last is not None and plan.ladder is not None and not _fits(plan.ladder, number):
        return Verdict("evaluation_limit", _limit_reason(plan.ladder, number, past[-1]), *last)
    if ledger.stopped is None:
        return Continue(number)
    if last is None:
        raise CalculationError(f"{plan.name}: {_STOPPED[ledger.stopped]}, and no round was complete")
    return Verdict(ledger.stopped, _STOPPED[ledger.stopped], *last)
