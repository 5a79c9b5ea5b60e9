"""The ledger as far as a calculation does not show it, and what closed rounds say."""

from __future__ import annotations

import json
from dataclasses import replace

import numpy as np
import pytest

from barnwright.errors import CalculationError
from barnwright.integrate.block import Round, Strand
from barnwright.integrate.estimate import estimate, hits, replicate_values
from barnwright.integrate.ledger import Ledger
from barnwright.integrate.settled import Settled
from barnwright.integrate.tally import Sums, Tally, WorstPoint

ROUND = Round("stage", 0, (Strand(chunks=(0, 4)),), length=2)


def tally(wanted: Round, chunks: tuple[int, int], value: float = 1.0) -> Tally:
    """A tally of chunks that make one node."""
    size = chunks[1] - chunks[0]
    node = (size.bit_length() - 1, chunks[0] // size)
    return Tally(wanted.block(wanted.strands[0], chunks), {node: one(value * size)}, {"evaluations": size})


def one(value: float) -> Sums:
    """Sums of one number each."""
    return Sums(np.full((3, 1, 1, 1), value), np.full((1, 1, 1), value))


def opened() -> Ledger:
    """A ledger that waits for four chunks."""
    ledger = Ledger("plan")
    ledger.open(ROUND)
    return ledger


def test_partly_known_tally_is_dropped_and_the_rest_asked_for() -> None:
    """A tally that overlaps is not half added; what it would have brought stays missing, in blocks of any length."""
    ledger = opened()
    assert ledger.add(tally(ROUND, (1, 2)))
    assert not ledger.add(tally(ROUND, (0, 2)))
    assert not ledger.add(tally(ROUND, (0, 4)))
    assert ledger.lacking == Ledger.from_state(ledger.state()).lacking == 3
    assert [block.chunks for block in ledger.missing(ROUND)] == [(0, 1), (2, 4)]
    assert [block.chunks for block in ledger.missing(ROUND.with_length(1))] == [(0, 1), (2, 3), (3, 4)]


def test_rounds_extend_each_other() -> None:
    """The second round's sums hold the first one's chunks; the first one's stay as they were."""
    ledger = opened()
    ledger.add(tally(ROUND, (0, 4)))
    assert ledger.lacking == 0
    first = ledger.close(ROUND)
    wanted = Round("stage", 1, (Strand(chunks=(4, 8)),))
    ledger.open(wanted)
    ledger.add(tally(wanted, (4, 8), 2.0))
    second = ledger.close(wanted)
    assert (first.of(0, 0).added.flat[0], first.chunks_of(0, 0), first.counters) == (4.0, 4, {"evaluations": 4})
    assert (second.of(0, 0).added.flat[0], second.chunks_of(0, 0), second.counters) == (12.0, 8, {"evaluations": 8})
    assert ledger.settled == [first, second]


def test_opening() -> None:
    """The open round may be opened again in other blocks; another one, one too early or one with a hole may not."""
    ledger = opened()
    ledger.open(ROUND.with_length(1))
    with pytest.raises(CalculationError, match="round 0 of stage other is not open: round 0 of stage stage is"):
        ledger.open(replace(ROUND, stage="other"))
    with pytest.raises(CalculationError, match="round 3 cannot be opened: the ledger is ready for number 0"):
        Ledger("plan").open(replace(ROUND, number=3))
    with pytest.raises(CalculationError, match="round 0 begins at chunk 4: earlier ones are missing"):
        Ledger("plan").open(replace(ROUND, strands=(Strand(chunks=(4, 8)),)))


def test_nothing_is_open() -> None:
    """Without an open round nothing is missing, nothing closes, and no tally is taken."""
    ledger = Ledger("plan")
    with pytest.raises(CalculationError, match="round 0 of stage stage is not open: no round is"):
        ledger.missing(ROUND)
    with pytest.raises(CalculationError, match="round 0 of stage stage is not open: no round is"):
        ledger.close(ROUND)
    with pytest.raises(
        CalculationError, match="a tally of stage stage was refused, no round is open: round 0, points 0:1"
    ):
        ledger.add(tally(ROUND, (0, 1)))


def test_state_of_what_json_cannot_say() -> None:
    """NaN, infinities and the sign of zero survive strict JSON; so do the frozen maps."""
    ledger = opened()
    ledger.freeze([np.array([0.0, -0.0, np.nan, 5e-324])])
    strange = Tally(
        ROUND.block(ROUND.strands[0], (0, 2)), {(1, 0): one(-np.inf)}, {}, (WorstPoint(np.nan, ((np.inf, -0.0),)),)
    )
    ledger.add(strange)
    state = json.loads(json.dumps(ledger.state(), allow_nan=False))
    again = Ledger.from_state(state)
    assert again.state() == ledger.state()
    assert again.frozen[0].tobytes() == ledger.frozen[0].tobytes()
    assert not again.add(strange)


def test_state_of_another_form() -> None:
    """A state that says another schema is refused."""
    with pytest.raises(CalculationError, match=r"a ledger's state says 'other', expected 'barnwright\.ledger/1'"):
        Ledger.from_state({"schema": "other"})


def monte_carlo(values: list[list[float]], passed: float) -> Settled:
    """A closed round of one number a replicate (inner) and stratum (outer), of two chunks each."""
    sums = {
        ((0, 1), stratum, replicate): Sums(np.array([v, v * v, passed]).reshape(3, 1, 1, 1), np.ones((1, 1, 1)))
        for stratum, row in enumerate(values)
        for replicate, v in enumerate(row)
    }
    return Settled(4, sums, dict.fromkeys(sums, 2), {}, ())


def test_estimate_from_replicates() -> None:
    """Mean and standard error of the replicates' values, each the sum of its strata over chunks × points."""
    settled = monte_carlo([[20.0, 40.0, 60.0], [20.0, 20.0, 80.0]], passed=5.0)
    assert replicate_values(settled, 5).ravel().tolist() == [4.0, 6.0, 14.0]
    found = estimate(settled, "replicates", 5)
    assert found.value.item() == 8.0
    assert found.error.item() == pytest.approx(np.std([4.0, 6.0, 14.0], ddof=1) / np.sqrt(3), rel=1e-15)
    assert found.degrees_of_freedom == 2
    assert hits(settled).item() == 30.0
    assert np.isnan(estimate(monte_carlo([[1.0, 2.0, 3.0]], passed=9.0), "replicates", 5).error.item())


def test_bits_of_a_component_do_not_depend_on_the_others() -> None:
    """A total has the same bits with 1 and with 100 components beside it."""
    generator = np.random.default_rng(3)
    added = generator.random((3, 1, 1, 100)) + 20 + generator.random((16, 3, 1, 1, 100))
    many, few = (
        Settled(
            0,
            {((0, 1), 0, r): Sums(added[r, ..., :n].copy(), added[r, 0, ..., :n].copy()) for r in range(16)},
            {((0, 1), 0, r): 1 for r in range(16)},
            {},
            (),
        )
        for n in (100, 1)
    )
    for name in ("value", "error"):
        whole, part = (getattr(estimate(settled, "replicates", 64), name) for settled in (many, few))
        assert whole[..., :1].tobytes() == part.tobytes()


def test_bounds_add_up_over_strata() -> None:
    """Values and error bounds of an exact rule add up over strata, with no degrees of freedom."""
    sums = {
        ((0, 1), s, 0): Sums(np.array([value, bound]).reshape(2, 1, 1, 1), np.zeros((1, 1, 1)))
        for s, (value, bound) in enumerate([(1.0, 0.25), (2.0, 0.5)])
    }
    found = estimate(Settled(0, sums, dict.fromkeys(sums, 1), {}, ()), "exact", 1)
    assert (found.value.item(), found.error.item(), found.degrees_of_freedom) == (3.0, 0.75, None)


def test_unknown_sum() -> None:
    """A stratum or replicate that a round does not have is a KeyError."""
    settled = monte_carlo([[1.0]], passed=1.0)
    assert (settled.strata, settled.replicates) == ((0,), (0,))
    with pytest.raises(KeyError, match=r"\(1, 0\)"):
        settled.of(1, 0)
    with pytest.raises(KeyError, match=r"\(0, 7\)"):
        settled.chunks_of(0, 7)
