"""Tallies that contradict, come from elsewhere or are not finite."""

from __future__ import annotations

import re
from collections.abc import Callable
from dataclasses import replace

import numpy as np
import pytest

from barnwright.engine.calculate import calculate
from barnwright.engine.protocol import Target
from barnwright.errors import CalculationError
from barnwright.integrate.block import Round
from barnwright.integrate.ledger import Ledger
from barnwright.integrate.tally import Sums, Tally

from .schedules import Mess, bits, messy, run, through_json
from .toy import CELLS, Toy, evaluate

PLAN = Toy(target=Target(relative=1e-2), iterations=1)


def changed(tally: Tally, last_bit: Callable[[Sums], Sums]) -> Tally:
    """The tally with its first node changed."""
    node, sums = next(iter(tally.nodes.items()))
    return replace(tally, nodes={**tally.nodes, node: last_bit(sums)})


def nudged(sums: Sums) -> Sums:
    """One number moved by one unit in the last place."""
    added = sums.added.copy()
    added[0, 0, 0, 0] = np.nextafter(added[0, 0, 0, 0], np.inf)
    return replace(sums, added=added)


def opened(number: int = 0) -> tuple[Ledger, Round]:
    """A ledger that waits for a round of measuring."""
    ledger = Ledger(PLAN.digest)
    calculation = calculate(PLAN, ledger)
    wanted = next(calculation)
    while wanted.training or wanted.number < number:
        for block in wanted:
            ledger.add(evaluate(PLAN, block, ledger.frozen))
        wanted = next(calculation)
    return ledger, wanted


@pytest.mark.parametrize("resumed", [False, True])
def test_different_duplicate(resumed: bool) -> None:
    """A tally that differs in one last bit from the one taken ends the calculation and names the block."""
    ledger, wanted = opened(number=2)
    tally = evaluate(PLAN, next(iter(wanted)), ledger.frozen)
    assert ledger.add(tally)
    ledger = through_json(ledger) if resumed else ledger
    assert not ledger.add(tally)
    name = re.escape("round 2, points 0:1, stratum 0, replicate 0, chunks 2:4")
    with pytest.raises(CalculationError, match=rf"two different tallies of one block \({name}\)"):
        ledger.add(changed(tally, nudged))


def test_different_counter() -> None:
    """Counters are part of what must repeat."""
    ledger, wanted = opened()
    tally = evaluate(PLAN, next(iter(wanted)), ledger.frozen)
    ledger.add(tally)
    with pytest.raises(CalculationError, match="two different tallies of one block"):
        ledger.add(replace(tally, counters={**tally.counters, "negative": 1}))


def test_late_duplicate_of_a_closed_round() -> None:
    """A duplicate that comes after its round was closed is still compared; after a resumption it is dropped."""
    ledger, wanted = opened()
    tallies = [evaluate(PLAN, block, ledger.frozen) for block in wanted]
    for tally in tallies:
        ledger.add(tally)
    ledger.close(wanted)
    assert not ledger.add(tallies[3])
    assert not through_json(ledger).add(tallies[3])
    with pytest.raises(CalculationError, match=r"two different tallies of one block \(round 0,"):
        ledger.add(changed(tallies[3], nudged))


def test_other_stage_is_refused() -> None:
    """A tally made on another plan or other maps is refused, naming both stages."""
    ledger, wanted = opened()
    other = Toy(seed=2, iterations=1)
    foreign = next(iter(other.round(ledger.frozen, 0)))
    message = f"a tally of stage {foreign.stage} was refused, expected stage {wanted.stage}: round 0, points 0:1"
    with pytest.raises(CalculationError, match=message):
        ledger.add(evaluate(other, foreign, ledger.frozen))


def test_not_asked_for() -> None:
    """Replicates, chunks, rounds and seeds that the round does not have are refused."""
    ledger, wanted = opened(number=1)
    tally = evaluate(PLAN, next(iter(wanted)), ledger.frozen)
    block = tally.block
    for stranger in (
        replace(block, replicate=16),
        replace(block, stratum=2),
        replace(block, points=(0, 2)),
        replace(block, chunks=(0, 1)),
        replace(block, chunks=(1, 3)),
    ):
        with pytest.raises(CalculationError, match="a tally that nobody asked for was refused: round 1"):
            ledger.add(replace(tally, block=stranger))
    for stranger in (replace(block, round=2), replace(block, seed=(1, 2, 3, 4)), replace(block, training=True)):
        with pytest.raises(CalculationError, match=r"a tally of another round or seed was refused: (round|training)"):
            ledger.add(replace(tally, block=stranger))
    with pytest.raises(CalculationError, match="a tally whose sums are not those of its chunks was refused"):
        ledger.add(replace(tally, nodes={}))


@pytest.mark.parametrize("kind", ["training", "measuring"])
def test_not_finite_is_suspect(kind: str) -> None:
    """One NaN, wherever it comes, makes the verdict suspect, with the point, and with the same bits on any schedule."""
    plan = Toy(target=Target(rounds=6), poisoned=("training" if kind == "training" else "measuring", 5))
    verdict, ledger = run(plan)
    assert verdict.status == "suspect"
    assert re.fullmatch(r"the integrand was not finite at \d+ points", verdict.stop_reason)
    assert np.isnan(verdict.settled.worst[0].value)
    assert len(verdict.settled.worst[0].momenta[0]) == 2
    assert ledger.closed == (1 if kind == "training" else 4)
    assert bits(run(plan, messy(plan, Mess(longest=6, lost=0.3, twice=0.3)))[0]) == bits(verdict)


def test_not_finite_adapts_nothing() -> None:
    """Training sums that are not finite leave the maps as they were."""
    plan = Toy(target=Target(rounds=1), iterations=2, poisoned=("training", 3))
    _, ledger = run(plan)
    assert ledger.trained == 2
    assert all(np.array_equal(edges, np.linspace(0, 1, CELLS + 1)) for edges in ledger.frozen)


def test_blocks_are_missing() -> None:
    """Advancing the calculation too early says how many blocks are missing and which is the first."""
    ledger = Ledger(PLAN.digest)
    calculation = calculate(PLAN, ledger)
    wanted = next(calculation)
    ledger.add(evaluate(PLAN, list(wanted)[1], ledger.frozen))
    message = "2 blocks are missing, the first is training iteration 0, points 0:1, stratum 0, replicate 0, chunks 0:4"
    with pytest.raises(CalculationError, match=message):
        next(calculation)


def test_ledger_of_another_plan() -> None:
    """A ledger is handed in to the plan it was made for, and no other."""
    with pytest.raises(CalculationError, match=f"the ledger belongs to plan other, not to {PLAN.digest}"):
        next(calculate(PLAN, Ledger("other")))
