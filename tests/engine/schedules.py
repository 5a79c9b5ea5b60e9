"""Drivers that a calculation must not notice: other orders, other blocks, duplicates, losses, interruptions."""

from __future__ import annotations

import json
import random
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import Any

from barnwright.engine.calculate import calculate
from barnwright.engine.judge import Verdict
from barnwright.integrate.block import Block, Round
from barnwright.integrate.estimate import replicate_values
from barnwright.integrate.ledger import Ledger
from barnwright.integrate.tally import Tally

from .toy import Toy, evaluate

Work = Callable[[Round, Ledger], None]


@dataclass(frozen=True)
class Mess:
    """A schedule drawn from a seed: longest block in chunks, chances that a tally is lost or comes twice."""

    seed: int = 0
    longest: int = 4
    lost: float = 0.0
    twice: float = 0.0


def run(plan: Toy, work: Work | None = None, ledger: Ledger | None = None) -> tuple[Verdict, Ledger]:
    """Calculate with a way to work off a round; in order by default."""
    ledger = Ledger(plan.digest) if ledger is None else ledger
    work = in_order(plan) if work is None else work
    calculation = calculate(plan, ledger)
    while True:
        try:
            wanted = next(calculation)
        except StopIteration as end:
            verdict: Verdict = end.value
            return verdict, ledger
        work(wanted, ledger)


def in_order(plan: Toy) -> Work:
    """One block after another."""

    def work(wanted: Round, ledger: Ledger) -> None:
        for block in ledger.missing(wanted):
            ledger.add(evaluate(plan, block, ledger.frozen))

    return work


def messy(plan: Toy, mess: Mess) -> Work:
    """Blocks cut anywhere, shuffled, some lost and asked for again in other blocks, some delivered twice."""
    chance = random.Random(mess.seed)  # noqa: S311  a schedule keeps no secret

    def work(wanted: Round, ledger: Ledger) -> None:
        old: list[Tally] = []
        while missing := ledger.missing(wanted):
            blocks = list(anyhow(missing, chance, mess.longest))
            chance.shuffle(blocks)
            for block in blocks:
                if chance.random() < mess.lost:
                    continue
                tally = evaluate(plan, block, ledger.frozen)
                assert ledger.add(tally)
                old.append(tally)
                if chance.random() < mess.twice:
                    assert not ledger.add(chance.choice(old))

    return work


def anyhow(wanted: Round, chance: random.Random, longest: int) -> Iterator[Block]:
    """The blocks of a round cut at random."""
    for strand in wanted.strands:
        start, stop = strand.chunks
        while start < stop:
            end = min(stop, start + chance.randint(1, longest))
            yield wanted.block(strand, (start, end))
            start = end


def through_json(ledger: Ledger) -> Ledger:
    """The ledger written down and read again."""
    state: dict[str, Any] = json.loads(json.dumps(ledger.state(), allow_nan=False))
    return Ledger.from_state(state)


def bits(verdict: Verdict) -> tuple[object, ...]:
    """Every bit of an answer, and all that goes with it."""
    found, settled = verdict.estimate, verdict.settled
    sums = [array.tobytes() for key in sorted(settled.sums) for array in settled.sums[key].arrays]
    return (
        verdict.status,
        verdict.stop_reason,
        verdict.rounds,
        found.value.tobytes(),
        found.error.tobytes(),
        replicate_values(settled, 1).tobytes(),
        sums,
        dict(settled.counters),
        settled.worst,
    )
