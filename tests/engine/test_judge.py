"""When a ladder of rounds stops, what it reports, and that its errors are honest all the same."""

from __future__ import annotations

import re
from dataclasses import replace
from math import inf, nan, sqrt

import numpy as np
import pytest

from barnwright.engine.calculate import calculate
from barnwright.engine.judge import LAST_RUNG, Continue, excess, judge, reached
from barnwright.engine.protocol import Target
from barnwright.errors import CalculationError
from barnwright.integrate.estimate import Estimate
from barnwright.integrate.ledger import Ledger

from .schedules import run
from .toy import Toy, exact

PLAN = Toy(target=Target(relative=1e-2), iterations=1, chunk=16)


def estimate_of(value: list[float], error: list[float]) -> Estimate:
    """One point, one variation."""
    return Estimate(np.array([[value]]), np.array([[error]]), "replicates", 15)


@pytest.mark.parametrize(
    ("target", "expected"),
    [
        (Target(relative=0.01), 2.0),
        (Target(relative=None, absolute=4.0), 0.5),
        (Target(relative=0.01, absolute=4.0), 0.5),
        (Target(relative=0.04, absolute=1e-9), 0.5),
        (Target(relative=0.04, per_bin=0.1, bins=(1, 2), bin_floor=0.2), 1.25),
        (Target(relative=0.04, per_bin=0.1, bins=(1, 2, 3), bin_floor=0.0), inf),
        (Target(relative=0.04, per_bin=0.1, bins=(1, 2, 3), bin_floor=1e-3), 10.0),
    ],
)
def test_excess(target: Target, expected: float) -> None:
    """Relative or absolute suffices; every bin above the floor counts, and an unknown error is not good enough."""
    found = estimate_of([100.0, 80.0, 10.0, 1e-4], [2.0, 10.0, 10.0, nan])
    assert excess(found, target) == pytest.approx(expected, rel=1e-12)


def test_excess_of_nothing() -> None:
    """An exact 0 is good enough; a 0 of unknown error is not."""
    assert excess(estimate_of([0.0], [0.0]), Target()) == 0.0
    assert excess(estimate_of([0.0], [nan]), Target()) == inf


@pytest.mark.parametrize(
    ("past", "expected"),
    [
        ([0.1], False),
        ([1.0, 0.9], True),
        ([1.08, 1.01], False),
        ([1.08, 1.01, 0.99], True),
        ([1.10, 0.99], False),
        ([1.10, 0.99, 0.9], True),
        ([9.0, 0.5, 1.2], False),
    ],
)
def test_first_round_that_may_be_reported(past: list[float], expected: bool) -> None:
    """A round needs one before it with 1.3 × error / √2 below the target, and its own error at most the target."""
    assert (reached(Target(), past) is not None) is expected


def first_reported(excesses: list[float]) -> int:
    """The round that the rule reports, of a ladder whose excesses are known."""
    return next(n for n in range(len(excesses)) if reached(Target(), excesses[: n + 1]) is not None)


@pytest.mark.parametrize("target", [0.055, 0.07, 0.085])
def test_stop_rule_keeps_coverage(target: float) -> None:
    """Of 20 000 ladders of 16 normal replicates, Student's intervals cover 0.669 and 0.949 when the rule stops them.

    Source: simulation with 1e5 ladders a target, independent of the package; the first round below the target would
    have 0.658 and 0.943, no stopping 0.683 and 0.9545. The rule may cost at most twice the points.
    """
    generator, count, quantiles = np.random.default_rng(20), 20_000, (1.0319, 2.1812)  # t15 at 0.6827, 0.9545: tables
    replicates = generator.normal(size=(count, 16))
    means, errors = [], []
    for rung in range(10):
        if rung:
            replicates = (replicates + generator.normal(size=replicates.shape) / sqrt(2 ** (rung - 1))) / 2
        means.append(replicates.mean(axis=1))
        errors.append(replicates.std(axis=1, ddof=1) / 4)
    mean, error, ladders = np.array(means), np.array(errors), np.arange(count)
    by_rule = np.array([first_reported(list(column)) for column in (error / target).T])
    naive = np.argmax(error <= target, axis=0)
    covered, naively = (
        np.array([np.mean(np.abs(mean[n, ladders]) < q * error[n, ladders]) for q in quantiles])
        for n in (by_rule, naive)
    )
    assert covered == pytest.approx([0.669, 0.949], abs=0.008)
    assert np.all(covered > naively + 0.002)
    assert np.mean(2.0**by_rule) < 2 * np.mean(2.0**naive)


def test_pulls_have_width_one() -> None:
    """Over 200 seeds stopped by the rule: pulls like Student's t, coverage, and errors near the target."""
    target, pulls, errors = 0.03, [], []
    for seed in range(200):
        verdict, _ = run(Toy(seed=seed, target=Target(relative=target), iterations=2, chunk=32))
        assert verdict.status == "converged"
        found = verdict.estimate
        pulls.append((found.value[0] - exact()) / found.error[0])
        errors.append(found.error[0, :, 0] / found.value[0, :, 0])
    pull = np.array(pulls)
    width = sqrt(15 / 13)
    assert np.all(np.abs(pull) < 6)
    assert np.all(np.abs(pull.mean(axis=0)) < 4 * width / sqrt(200)), pull.mean(axis=0)
    assert pull.std(axis=0, ddof=1) == pytest.approx(np.full((2, 3), width), abs=0.22)
    for sigmas, share in ((1, 0.667), (2, 0.936)):
        inside = np.mean(np.abs(pull) < sigmas, axis=0)
        assert inside == pytest.approx(np.full((2, 3), share), abs=3.5 * sqrt(share * (1 - share) / 200)), sigmas
    assert np.max(errors) <= target
    assert np.min(np.max(errors, axis=1)) > target / 5


def test_evaluation_limit() -> None:
    """The ladder ends with the last round that fits, says how far it got, and keeps within the limit."""
    limit = PLAN.ladder.evaluations(3)
    verdict, ledger = run(replace(PLAN, target=Target(relative=1e-6, max_evaluations=limit)))
    assert verdict.status == "evaluation_limit"
    assert verdict.rounds == ledger.closed == 3
    assert verdict.settled.counters["evaluations"] == limit
    needed = PLAN.ladder.evaluations(4)
    pattern = (
        rf"the error is \d\S* times the target; another round would make it {needed} evaluations, "
        rf"more than max_evaluations = {limit}"
    )
    assert re.fullmatch(pattern, verdict.stop_reason)


def test_lower_limit_on_a_finished_ledger() -> None:
    """A ledger that went further than a limit allows answers as if it had stopped there."""
    _, ledger = run(replace(PLAN, target=Target(rounds=5)))
    lower = replace(PLAN, target=Target(relative=1e-6, max_evaluations=PLAN.ladder.evaluations(2)))
    verdict, _ = run(lower, ledger=ledger)
    assert (verdict.status, verdict.rounds) == ("evaluation_limit", 2)


def test_limit_below_the_first_round() -> None:
    """A limit that does not allow one round is refused before any work, with the least number that would do."""
    plan = replace(PLAN, target=Target(max_evaluations=99))
    least = PLAN.ladder.evaluations(1)
    message = f"toy/square: max_evaluations = 99 does not allow the first round: expected at least {least}"
    with pytest.raises(CalculationError, match=message):
        next(calculate(plan, Ledger(plan.digest)))


@pytest.mark.parametrize("rounds", [1, 2, 5])
def test_rounds_are_exact(rounds: int) -> None:
    """So many rounds are taken as are asked for, whatever the errors and limits."""
    verdict, ledger = run(replace(PLAN, target=Target(relative=0.9, max_evaluations=1, rounds=rounds)))
    assert (verdict.status, verdict.rounds, ledger.closed) == ("converged", rounds, rounds)
    assert verdict.stop_reason == f"{rounds} rounds were asked for"


def test_last_rung() -> None:
    """No ladder has more than 24 rounds."""
    plan = replace(PLAN, target=Target(relative=1e-12, max_evaluations=2**53))
    ledger = run(replace(PLAN, target=Target(rounds=2)))[1]
    last = ledger.settled[-1]
    ledger.settled = [replace(last, number=number) for number in range(LAST_RUNG + 1)]
    verdict = judge(plan, ledger)
    assert not isinstance(verdict, Continue)
    assert (verdict.status, verdict.rounds) == ("evaluation_limit", 24)
    assert verdict.stop_reason.endswith("times the target after 24 rounds, the most that are taken")


def test_stopped() -> None:
    """A stop ends with the last closed round; before the first one it is an error that names the process."""
    calculation = calculate(PLAN, ledger := Ledger(PLAN.digest))
    next(calculation)
    ledger.stop("cancelled")
    with pytest.raises(CalculationError, match="toy/square: the calculation was cancelled, and no round was complete"):
        next(calculation)
    _, ledger = run(replace(PLAN, target=Target(rounds=2)))
    calculation = calculate(PLAN, ledger)
    assert next(calculation).number == 2
    ledger.stop("time_limit")
    with pytest.raises(StopIteration) as end:
        next(calculation)
    assert (end.value.value.status, end.value.value.rounds) == ("time_limit", 2)
