"""The inline driver: time, Ctrl-C, one round of exact sums."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from typing import Literal

import numpy as np
import pytest

from barnwright.engine.protocol import Target
from barnwright.errors import CalculationError
from barnwright.integrate.block import Block, Round, Strand
from barnwright.integrate.ledger import Frozen, Ledger
from barnwright.integrate.tally import Sums, Tally
from barnwright.run.drive import Pace, drive

from .schedules import bits, run
from .toy import Toy, evaluate

PLAN = Toy(target=Target(relative=1e-2))


class Clock:
    """A clock that moves when it is told to."""

    def __init__(self) -> None:
        self.now = 0.0

    def __call__(self) -> float:
        """Seconds."""
        return self.now


@dataclass(frozen=True)
class Points:
    """A plan without chunks: seven points in blocks of at most three, value 10·point + component, error bound 1e-9."""

    digest = "points"
    name = "toy/points"
    rule: Literal["embedded"] = "embedded"
    training = None
    ladder = None

    def round(self, _frozen: Frozen, number: int) -> Round:
        """Its one round."""
        return Round(self.digest, number, (Strand((0, 3)), Strand((3, 6)), Strand((6, 7))))


def points(block: Block, _frozen: Frozen) -> Tally:
    """The sums of some points."""
    value = 10.0 * np.arange(*block.points)[:, None, None] + np.arange(2.0)
    return Tally(block, {(0, 0): Sums(np.stack([value, np.full_like(value, 1e-9)]), np.zeros_like(value))})


def test_one_round_of_points() -> None:
    """Blocks of points in any order are joined along the point axis, with value and bound as they came."""
    verdict = drive(Points(), Ledger("points"), points, Pace(Clock(), None))
    assert (verdict.status, verdict.stop_reason, verdict.rounds) == ("converged", "one round answers", 1)
    assert verdict.estimate.value[:, 0, 1].tolist() == [1.0, 11.0, 21.0, 31.0, 41.0, 51.0, 61.0]
    assert verdict.estimate.value.shape == verdict.estimate.error.shape == (7, 1, 2)
    assert np.all(verdict.estimate.error == 1e-9)
    assert verdict.estimate.degrees_of_freedom is None


def test_same_bits_as_any_other_driver() -> None:
    """The inline driver has the bits of the tests' own."""
    verdict = drive(PLAN, Ledger(PLAN.digest), lambda b, f: evaluate(PLAN, b, f), Pace(Clock(), None))
    assert bits(verdict) == bits(run(PLAN)[0])


def test_time_limit_decides_before_a_round() -> None:
    """With a second a chunk, the last round that fits is the last one; asking for as many repeats it."""
    plan, clock, ledger = replace(PLAN, target=Target(relative=1e-9)), Clock(), Ledger(PLAN.digest)

    def ticking(block: Block, frozen: Frozen) -> Tally:
        clock.now += block.chunks[1] - block.chunks[0]
        return evaluate(plan, block, frozen)

    spent = [3 * 12 + 32 * 2**rung for rung in range(6)]
    verdict = drive(plan, ledger, ticking, Pace(clock, max_seconds=spent[3] + 1))
    assert (verdict.status, verdict.rounds, clock.now) == ("time_limit", 4, spent[3])
    assert verdict.stop_reason == "the next round would not have ended within max_seconds"
    again, _ = run(replace(plan, target=Target(rounds=4)))
    assert again.estimate.value.tobytes() == verdict.estimate.value.tobytes()


def test_time_limit_before_the_first_round() -> None:
    """Too little time for one round is an error, noticed within a round."""
    clock = Clock()

    def ticking(block: Block, frozen: Frozen) -> Tally:
        clock.now += 1.0
        return evaluate(PLAN, block, frozen)

    message = "toy/square: the next round would not have ended within max_seconds, and no round was complete"
    with pytest.raises(CalculationError, match=message):
        drive(PLAN, Ledger(PLAN.digest), ticking, Pace(clock, max_seconds=2.5))
    assert clock.now == 3.0


@pytest.mark.parametrize("blocks", [0, 40, 120])
def test_interrupt(blocks: int) -> None:
    """Ctrl-C ends with the last closed round, or with an error that names the process before the first."""
    calls: Iterator[int] = iter(range(1000))
    plan = replace(PLAN, target=Target(relative=1e-9))

    def interrupted(block: Block, frozen: Frozen) -> Tally:
        if next(calls) == blocks:
            raise KeyboardInterrupt
        return evaluate(plan, block, frozen)

    ledger = Ledger(plan.digest)
    if blocks < 3 * 3 + 32:
        with pytest.raises(
            CalculationError, match="toy/square: the calculation was cancelled, and no round was complete"
        ):
            drive(plan, ledger, interrupted, Pace(Clock(), None))
    else:
        verdict = drive(plan, ledger, interrupted, Pace(Clock(), None))
        assert (verdict.status, verdict.stop_reason) == ("cancelled", "the calculation was cancelled")
        assert verdict.rounds == 3
    assert bits(run(PLAN, ledger=Ledger.from_state(ledger.state()))[0]) == bits(run(PLAN)[0])
