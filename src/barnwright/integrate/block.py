"""The unit of work: a range of chunks of one replicate, or a range of points where there is nothing to chunk.

Rules of this file
------------------
- Ranges are half-open.
- A strand is everything that one round adds to one sum: points, stratum and replicate fixed, a range of chunk numbers.
  How a strand is cut into blocks is the driver's business and never changes a bit of the result.
- Seed words come from ``SeedSequence(seed, spawn_key=(stage, stratum, replicate))``: stage 1 for measuring, stage 0 for
  training, which adds the iteration. They never contain the point. What a chunk draws for itself adds the chunk's
  number, never the block's, so that it does not depend on the block it came in.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

import numpy as np

from barnwright.integrate.ranges import Range, aligned_pieces, count_pieces

CHUNK = 2048
"""Points in a chunk."""

TRAINING_STAGE, MEASURING_STAGE = 0, 1

Seed = tuple[int, ...]
StrandKey = tuple[Range, int, int]
"""Points, stratum and replicate: what a sum belongs to."""


@dataclass(frozen=True, slots=True)
class Block:
    """What a worker is asked for; pure data of less than 1 kB.

    Attributes
    ----------
    stage : str
        Digest of the stage: the plan and its frozen arrays.
    round : int
        Rung of the ladder, or iteration of the training.
    points : tuple of int
        Range of the plan's points.
    stratum : int
        Process and channel.
    replicate : int
        Which independent randomisation.
    chunks : tuple of int
        Range of chunk numbers; (0, 1) where the rule has no chunks.
    seed : tuple of int
        32-bit words, see `seed_words`; empty where nothing is random.
    training : bool
        Whether the tally has to carry training sums.
    """

    stage: str
    round: int
    points: Range
    stratum: int
    replicate: int
    chunks: Range
    seed: Seed
    training: bool = False

    @property
    def key(self) -> StrandKey:
        """The strand to which the block belongs."""
        return self.points, self.stratum, self.replicate

    @property
    def name(self) -> str:
        """The block in words, for messages."""
        return (
            f"{_round_name(self.training, self.round)}, points {self.points[0]}:{self.points[1]}, "
            f"stratum {self.stratum}, replicate {self.replicate}, chunks {self.chunks[0]}:{self.chunks[1]}"
        )


@dataclass(frozen=True, slots=True)
class Strand:
    """A run of chunks that a round adds to one sum; the fields are those of `Block`."""

    points: Range = (0, 1)
    stratum: int = 0
    replicate: int = 0
    chunks: Range = (0, 1)
    seed: Seed = ()

    @property
    def key(self) -> StrandKey:
        """What the sum belongs to."""
        return self.points, self.stratum, self.replicate


@dataclass(frozen=True, slots=True)
class Round:
    """A lazy, counted sequence of blocks: one rung of the ladder, or one iteration of the training.

    ``length`` is the number of chunks in a block, which starts at one of its multiples; it does not shape the numbers.
    """

    stage: str
    number: int
    strands: tuple[Strand, ...]
    length: int = 1
    training: bool = False

    def __len__(self) -> int:
        return sum(count_pieces(strand.chunks, self.length) for strand in self.strands)

    def __iter__(self) -> Iterator[Block]:
        for strand in self.strands:
            for piece in aligned_pieces(strand.chunks, self.length):
                yield self.block(strand, piece)

    @property
    def name(self) -> str:
        """The round in words, for messages."""
        return _round_name(self.training, self.number)

    @property
    def identity(self) -> tuple[bool, int, str]:
        """Whether it trains, its number and its stage: no two rounds of a calculation share them."""
        return self.training, self.number, self.stage

    @property
    def chunks(self) -> int:
        """How many chunks all strands have together."""
        return sum(strand.chunks[1] - strand.chunks[0] for strand in self.strands)

    def block(self, strand: Strand, chunks: Range) -> Block:
        """The block of any range of chunks of a strand."""
        return Block(
            stage=self.stage,
            round=self.number,
            points=strand.points,
            stratum=strand.stratum,
            replicate=strand.replicate,
            chunks=chunks,
            seed=strand.seed,
            training=self.training,
        )

    def with_length(self, length: int) -> Round:
        """The same round in blocks of another length in chunks."""
        return replace(self, length=length)


def seed_words(seed: int, stratum: int, replicate: int, iteration: int | None = None) -> Seed:
    """The four 32-bit seed words of a strand; with an iteration, of a training strand."""
    key: tuple[int, ...] = (MEASURING_STAGE, stratum, replicate)
    if iteration is not None:
        key = (TRAINING_STAGE, stratum, replicate, iteration)
    words = np.random.SeedSequence(seed, spawn_key=key).generate_state(4)
    return tuple(int(word) for word in words)


def chunk_generator(words: Seed, chunk: int) -> np.random.Generator:
    """The generator of the numbers that a chunk draws for itself."""
    return np.random.Generator(np.random.PCG64(np.random.SeedSequence(words, spawn_key=(chunk,))))


def _round_name(training: bool, number: int) -> str:
    return f"training iteration {number}" if training else f"round {number}"
