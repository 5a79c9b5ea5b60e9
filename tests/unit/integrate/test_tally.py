"""Blocks, seeds, and what a block adds up."""

from __future__ import annotations

import pickle

import numpy as np
import pytest

from barnwright.integrate.block import Block, Round, Strand, chunk_generator, seed_words
from barnwright.integrate.tally import Sums, Tally, TallyBuilder, WorstPoint, worst_of

BLOCK = Block("stage", 0, (0, 1), 0, 0, (2, 5), (1, 2))


def sums(value: float, largest: float = 1.0, training: float | None = None) -> Sums:
    """Sums of one number each."""
    extra = None if training is None else (np.full(2, training),)
    return Sums(np.full((3, 1, 1, 1), value), np.full((1, 1, 1), largest), extra)


def test_seed_words_are_numpys() -> None:
    """Words follow SeedSequence(seed, spawn_key=(stage, stratum, replicate)), with the iteration added in training."""
    measuring = np.random.SeedSequence(7, spawn_key=(1, 2, 3)).generate_state(4)
    training = np.random.SeedSequence(7, spawn_key=(0, 2, 3, 5)).generate_state(4)
    assert seed_words(7, 2, 3) == tuple(measuring.tolist())
    assert seed_words(7, 2, 3, iteration=5) == tuple(training.tolist())
    assert seed_words(7, 2, 3, iteration=0) != seed_words(7, 2, 3)
    assert all(isinstance(word, int) for word in seed_words(7, 2, 3))


def test_chunks_draw_for_themselves() -> None:
    """What a chunk draws depends on its strand's words and its number."""
    words = seed_words(1, 0, 0)
    first = chunk_generator(words, 3).random(4)
    assert np.array_equal(first, chunk_generator(words, 3).random(4))
    assert not np.any(first == chunk_generator(words, 4).random(4))
    assert not np.any(first == chunk_generator(seed_words(1, 0, 1), 3).random(4))


def test_round_is_lazy_and_counted() -> None:
    """A round with more blocks than memory holds is made at once, counted, and begins to give blocks."""
    strands = tuple(Strand((0, 1), 0, replicate, (2**22, 2**23), (replicate,)) for replicate in range(16))
    wanted = Round("stage", 23, strands, length=3)
    assert len(wanted) == 16 * 1_398_102
    first = next(iter(wanted))
    assert first.chunks == (4194304, 4194306)
    assert first.name == "round 23, points 0:1, stratum 0, replicate 0, chunks 4194304:4194306"
    assert wanted.chunks == 16 * 2**22


def test_block_travels_light() -> None:
    """A block is under 1 kB when pickled."""
    block = Block("a" * 64, 23, (0, 2**31), 99, 1023, (2**40, 2**41), seed_words(2**63, 99, 1023))
    assert len(pickle.dumps(block)) < 1000
    assert pickle.loads(pickle.dumps(block)) == block  # noqa: S301  our own bytes


def test_builder_folds() -> None:
    """Chunks 2, 3 and 4 become the nodes of 2:4 and of 4; counters add up and the worst points stay."""
    builder = TallyBuilder(BLOCK)
    for value, worst in ((1.0, 5.0), (2.0, 9.0), (4.0, 7.0)):
        builder.add(sums(value, worst, value), {"evaluations": 10}, [WorstPoint(worst, ((value,),))])
    tally = builder.tally()
    assert set(tally.nodes) == {(1, 1), (0, 4)}
    pair = tally.nodes[1, 1]
    assert pair.training is not None
    assert (pair.added.flat[0], pair.largest.flat[0], pair.training[0][0]) == (3.0, 9.0, 3.0)
    assert tally.counters == {"evaluations": 30}
    assert [point.value for point in tally.worst] == [9.0, 7.0, 5.0]


def test_builder_counts_its_chunks() -> None:
    """A chunk too many and a chunk too few are mistakes of the rule that made them."""
    builder = TallyBuilder(BLOCK)
    builder.add(sums(1.0))
    with pytest.raises(IndexError, match="chunks 2:5 still lacks chunk 3"):
        builder.tally()
    builder.add(sums(1.0))
    builder.add(sums(1.0))
    with pytest.raises(IndexError, match="chunks 2:5 has no chunk 5"):
        builder.add(sums(1.0))


def test_fingerprint_sees_every_bit() -> None:
    """NaN equals itself; a zero's sign, a counter, a worst point and a training sum all show."""
    tally = Tally(BLOCK, {(0, 0): sums(np.nan)})
    assert tally.fingerprint() == Tally(BLOCK, {(0, 0): sums(np.nan)}).fingerprint()
    others = [
        Tally(BLOCK, {(0, 0): sums(0.0)}),
        Tally(BLOCK, {(0, 0): sums(-0.0)}),
        Tally(BLOCK, {(0, 1): sums(0.0)}),
        Tally(BLOCK, {(0, 0): sums(0.0, training=0.0)}),
        Tally(BLOCK, {(0, 0): sums(0.0)}, {"negative": 1}),
        Tally(BLOCK, {(0, 0): sums(0.0)}, {}, (WorstPoint(1.0, ()),)),
    ]
    assert len({each.fingerprint() for each in [tally, *others]}) == 7


def test_worst_points_are_few_and_ordered() -> None:
    """What is not finite comes first, then the largest; how they came does not matter."""
    points = [WorstPoint(value, ((value,),)) for value in (1.0, -8.0, 2.0, float("inf"), 4.0, 3.0)]
    expected = [float("inf"), -8.0, 4.0, 3.0]
    assert [point.value for point in worst_of(points)] == expected
    assert worst_of([*worst_of(points[3:]), *worst_of(points[:3])]) == worst_of(points)
