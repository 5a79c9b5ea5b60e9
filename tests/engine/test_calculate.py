"""A calculation has the same bits whoever works off its blocks, in whatever order and however often interrupted."""

from __future__ import annotations

from concurrent.futures import ThreadPoolExecutor
from dataclasses import replace

import numpy as np
import pytest

from barnwright.engine.protocol import Target
from barnwright.integrate.block import Round
from barnwright.integrate.ledger import Ledger

from .schedules import Mess, Work, bits, in_order, messy, run, through_json
from .toy import Toy, chunk_sums, evaluate, exact

PLAN = Toy()
SMALL = Toy(target=Target(rounds=3), length=2)


@pytest.fixture(scope="module")
def reference() -> tuple[object, ...]:
    """The bits of the plan worked off in order."""
    return bits(run(PLAN)[0])


def test_value_agrees_with_the_integral() -> None:
    """All components of both variations lie within 5 standard errors of their arctangents, and the errors are small."""
    verdict, ledger = run(PLAN)
    found = verdict.estimate
    assert verdict.status == "converged"
    assert ledger.trained == PLAN.iterations
    assert found.degrees_of_freedom == 15
    pulls = (found.value[0] - exact()) / found.error[0]
    assert np.all(np.abs(pulls) < 5), pulls
    assert np.all(found.error[0, :, 0] <= 5e-3 * found.value[0, :, 0])


def test_training_pays() -> None:
    """The frozen map reduces the error of the narrow peak by more than a factor of 3 at equal points."""
    rounds = Target(rounds=5)
    trained = run(replace(PLAN, target=rounds))[0].estimate.error[0, 0, 0]
    flat = run(replace(PLAN, target=rounds, iterations=0))[0].estimate.error[0, 0, 0]
    assert flat > 3 * trained


@pytest.mark.parametrize("length", [1, 2, 3, 5, 8, 13, 32, 64])
def test_block_lengths(length: int, reference: tuple[object, ...]) -> None:
    """Blocks of 1 to 64 chunks give the same bits."""
    assert bits(run(replace(PLAN, length=length))[0]) == reference


def test_every_block_length() -> None:
    """Each length from 1 to 64 gives the same bits on a ladder whose last rung adds 64 chunks a replicate."""
    plan = Toy(target=Target(rounds=8), chunk=4, replicates=2)
    results = {repr(bits(run(replace(plan, length=length))[0])) for length in range(1, 65)}
    assert len(results) == 1


@pytest.mark.parametrize(
    "mess",
    [
        Mess(longest=7),
        Mess(longest=1),
        Mess(longest=64, twice=0.5),
        Mess(lost=0.4),
        Mess(longest=9, lost=0.5, twice=0.5),
    ],
    ids=["shuffled", "single", "duplicated", "lost", "all"],
)
def test_messy_schedules(mess: Mess, reference: tuple[object, ...]) -> None:
    """Shuffled, duplicated and lost tallies of blocks cut at random leave no trace."""
    assert bits(run(PLAN, messy(PLAN, mess))[0]) == reference


def test_threads(reference: tuple[object, ...]) -> None:
    """Four threads that finish in any order give the same bits."""
    chunk_sums.cache_clear()

    def work(wanted: Round, ledger: Ledger) -> None:
        frozen = ledger.frozen
        with ThreadPoolExecutor(4) as pool:
            for tally in pool.map(lambda block: evaluate(PLAN, block, frozen), list(ledger.missing(wanted))[::-1]):
                ledger.add(tally)

    assert bits(run(PLAN, work)[0]) == reference


class InterruptedRunError(Exception):
    """The calculation was killed."""


def test_resumed_at_every_block() -> None:
    """Killed after any number of tallies, and resumed from plain data in other blocks, it ends with the same bits."""
    whole, blocks = bits(run(SMALL)[0]), 0
    while True:
        ledger, left = Ledger(SMALL.digest), [blocks]

        def work(wanted: Round, ledger: Ledger, left: list[int] = left) -> None:
            for block in ledger.missing(wanted):
                if not left[0]:
                    raise InterruptedRunError
                left[0] -= 1
                ledger.add(evaluate(SMALL, block, ledger.frozen))

        try:
            run(SMALL, work, ledger)
        except InterruptedRunError:
            resumed = replace(SMALL, length=1 + blocks % 5)
            assert bits(run(resumed, ledger=through_json(ledger))[0]) == whole
            blocks += 1
        else:
            break
    assert blocks > 100


def test_resumed_again_and_again(reference: tuple[object, ...]) -> None:
    """A run that is written down and read again after every fortieth tally, in a messy order, has the same bits."""
    ledger, deaths = Ledger(PLAN.digest), 0
    while True:
        work = messy(PLAN, Mess(seed=deaths, longest=8))
        taken = [0]

        def mortal(wanted: Round, ledger: Ledger, taken: list[int] = taken, work: Work = work) -> None:
            for block in list(ledger.missing(wanted))[::-1]:
                if taken[0] == 40:
                    raise InterruptedRunError
                taken[0] += 1
                ledger.add(evaluate(PLAN, block, ledger.frozen))
            work(wanted, ledger)

        try:
            verdict, _ = run(PLAN, mortal, ledger)
        except InterruptedRunError:
            ledger, deaths = through_json(ledger), deaths + 1
        else:
            break
    assert deaths > 3
    assert bits(verdict) == reference


def test_refined() -> None:
    """A finished ledger asked for a better answer gives the bits of asking at once, and so does one asked for less."""
    coarse, fine = (replace(PLAN, target=Target(relative=r)) for r in (1e-2, 3e-3))
    first, ledger = run(coarse)
    refined, ledger = run(fine, ledger=through_json(ledger))
    at_once, _ = run(fine)
    assert refined.rounds > first.rounds
    assert bits(refined) == bits(at_once)
    assert bits(run(coarse, ledger=ledger)[0]) == bits(first)


def test_rounds_repeat_an_answer() -> None:
    """Asking for as many rounds as were taken repeats the numbers, whatever the target."""
    first, _ = run(PLAN)
    again, _ = run(replace(PLAN, target=Target(relative=1e-9, max_evaluations=1, rounds=first.rounds)))
    assert bits(again)[2:] == bits(first)[2:]


def test_in_order_is_what_missing_says() -> None:
    """A round is counted before its blocks are made, and each block adds some of it."""
    ledger = Ledger(SMALL.digest)
    ledger.open(SMALL.training.round((), 0))
    wanted = ledger.round
    assert wanted is not None
    assert len(ledger.missing(wanted)) == len(list(wanted)) == 6
    in_order(SMALL)(wanted, ledger)
    assert len(ledger.missing(wanted)) == 0
