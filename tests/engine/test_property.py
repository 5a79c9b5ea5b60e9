"""Any schedule at all."""

from __future__ import annotations

from functools import cache

from hypothesis import given, settings
from hypothesis import strategies as st

from barnwright.engine.protocol import Target
from barnwright.integrate.block import Round
from barnwright.integrate.ledger import Ledger

from .schedules import anyhow, bits, run, through_json
from .toy import STRATA, Toy, ToyLadder, evaluate

PLAN = Toy(target=Target(rounds=5), chunk=8, replicates=2)


@cache
def reference() -> tuple[object, ...]:
    """The bits of the plan worked off in order."""
    return bits(run(PLAN)[0])


@settings(derandomize=True, deadline=None, max_examples=150)
@given(st.data())
def test_any_schedule_gives_the_same_bits(data: st.DataObject) -> None:
    """Cut, order, duplicates, losses and resumptions are all drawn, and none of them shows."""
    chance = data.draw(st.randoms(use_true_random=False))
    longest = data.draw(st.integers(1, 64))
    ledgers = [Ledger(PLAN.digest)]

    class RebornError(Exception):
        """The run goes on with a ledger read from plain data."""

    def work(wanted: Round, ledger: Ledger) -> None:
        while missing := ledger.missing(wanted):
            blocks = list(anyhow(missing, chance, longest))
            for block in data.draw(st.permutations(blocks)):
                fate = data.draw(st.sampled_from(["once", "twice", "lost", "reborn"]))
                if fate == "lost":
                    continue
                tally = evaluate(PLAN, block, ledger.frozen)
                assert ledger.add(tally)
                assert fate != "twice" or not ledger.add(tally)
                if fate == "reborn" and len(ledgers) < 6:
                    ledgers.append(through_json(ledger))
                    raise RebornError

    while True:
        try:
            verdict, _ = run(PLAN, work, ledgers[-1])
        except RebornError:
            continue
        assert bits(verdict) == reference()
        return


@settings(derandomize=True, deadline=None)
@given(st.integers(1, 12), st.integers(1, 40))
def test_evaluations_are_what_the_rounds_hold(rounds: int, replicates: int) -> None:
    """The cost that a ladder foretells is the number of chunks its rounds have, times the points in a chunk."""
    plan = Toy(replicates=replicates, iterations=0)
    ladder: ToyLadder = plan.ladder
    chunks = sum(plan.round((), number).chunks for number in range(rounds))
    assert ladder.evaluations(rounds) == chunks * plan.chunk
    assert chunks % STRATA == 0
