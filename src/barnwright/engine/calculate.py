"""The law of a calculation, without any input or output: rounds of blocks go out, a verdict comes back.

Whoever drives it adds the tally of every block to the ledger and advances the generator when ``ledger.missing(round)``
is empty. To end early, it calls ``ledger.stop(reason)`` and advances. A ledger that has come some way is handed in.
"""

from __future__ import annotations

from collections.abc import Generator

from barnwright.engine.judge import Continue, Verdict, judge
from barnwright.engine.protocol import PlanProtocol
from barnwright.errors import CalculationError
from barnwright.integrate.block import Round
from barnwright.integrate.ledger import Frozen, Ledger

__all__ = ["Continue", "PlanProtocol", "Round", "Verdict", "calculate", "judge", "train"]


def calculate(plan: PlanProtocol, ledger: Ledger) -> Generator[Round, None, Verdict]:
    """Train, then measure round after round until a verdict falls.

    Raises
    ------
    CalculationError
        When the ledger is another plan's, the generator is advanced while blocks are missing, the limit of evaluations
        does not allow the first round, or the calculation was stopped before its end.
    """
    _check(plan, ledger)
    frozen = yield from train(plan, ledger)
    while isinstance(verdict := judge(plan, ledger), Continue):
        wanted = plan.round(frozen, verdict.next_round)
        ledger.open(wanted)
        yield wanted
        if ledger.stopped is None:
            ledger.close(wanted)
    return verdict


def train(plan: PlanProtocol, ledger: Ledger) -> Generator[Round, None, Frozen]:
    """Adapt the maps, an iteration after another, and freeze them; sums that are not finite adapt nothing."""
    training = plan.training
    while training is not None and ledger.trained < training.iterations and ledger.stopped is None:
        wanted = training.round(ledger.frozen, ledger.trained)
        ledger.open(wanted)
        yield wanted
        if ledger.stopped is None:
            settled = ledger.close(wanted)
            ledger.freeze(training.adapted(ledger.frozen, settled) if settled.finite else ledger.frozen)
    return ledger.frozen


def _check(plan: PlanProtocol, ledger: Ledger) -> None:
    if ledger.plan != plan.digest:
        raise CalculationError(f"the ledger belongs to plan {ledger.plan}, not to {plan.digest}")
    ladder = plan.ladder
    if ladder is None or ladder.target.rounds is not None:
        return
    if ladder.evaluations(1) > ladder.target.max_evaluations:
        raise CalculationError(
            f"{plan.name}: max_evaluations = {ladder.target.max_evaluations} does not allow the first round: "
            f"expected at least {ladder.evaluations(1)}"
        )
