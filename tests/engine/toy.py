"""A Monte Carlo plan without physics: an integrand of the unit square, a trained map, strata, replicates and a ladder.

The integrand is f(x, y) = L(x) + a·y·L(x) with L(x) = w/((x − c)² + w²), one term a stratum, for two variations of
w and a, and three components: the total, x < c and y < 1/2. Their integrals are arctangents.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import lru_cache
from hashlib import sha256
from math import atan
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.protocol import Target
from barnwright.integrate.block import Block, Round, Strand, chunk_generator, seed_words
from barnwright.integrate.ledger import Frozen
from barnwright.integrate.settled import Settled
from barnwright.integrate.tally import Sums, Tally, TallyBuilder, WorstPoint

Array = NDArray[np.float64]

CENTRE = 0.3
VARIATIONS = ((0.01, 1.0), (0.1, 3.0))
"""w and a."""

CELLS = 24
STRATA = 2
TRAINING_CHUNKS = 12
GOOD = Target(relative=5e-3)


@dataclass(frozen=True)
class ToyLadder:
    """Doublings from one chunk of a replicate on."""

    target: Target
    chunk: int
    replicates: int
    trained: int

    def evaluations(self, rounds: int) -> int:
        """Points of all strata and replicates, and of the training."""
        return self.trained + STRATA * self.replicates * self.chunk * (1 << (rounds - 1))


@dataclass(frozen=True)
class ToyTraining:
    """Adapts one grid in x by its first stratum."""

    plan: Toy
    iterations: int

    def round(self, frozen: Frozen, iteration: int) -> Round:
        """One strand of twelve chunks."""
        seed = seed_words(self.plan.seed, 0, 0, iteration)
        strand = Strand((0, 1), 0, 0, (0, TRAINING_CHUNKS), seed)
        return Round(self.plan.stage(frozen), iteration, (strand,), self.plan.length, training=True)

    def adapted(self, frozen: Frozen, settled: Settled) -> Frozen:
        """Cells of equal shares of √⟨f²⟩, damped."""
        training = settled.of(0, 0).training
        assert training is not None
        sum_f, n_f = training
        edges = _edges(frozen)
        shares = np.sqrt(np.sqrt(sum_f / np.maximum(n_f, 1)))
        heights = np.concatenate([[0.0], np.cumsum(shares + 0.01 * shares.mean())])
        return (np.interp(np.linspace(0.0, heights[-1], CELLS + 1), heights, edges),)


@dataclass(frozen=True)
class Toy:
    """The plan; ``poisoned``: a kind of round, and a chunk of replicate 0 whose first point is not finite there."""

    seed: int = 1
    target: Target = GOOD
    length: int = 4
    iterations: int = 3
    chunk: int = 64
    replicates: int = 16
    poisoned: tuple[Literal["training", "measuring"], int] | None = None

    name = "toy/square"
    rule: Literal["replicates"] = "replicates"

    @property
    def digest(self) -> str:
        """Everything but the target and the length of the blocks."""
        return _digest(repr(replace(self, target=Target(), length=1)).encode())

    @property
    def training(self) -> ToyTraining:
        """Its iterations."""
        return ToyTraining(self, self.iterations)

    @property
    def ladder(self) -> ToyLadder:
        """Its rungs."""
        return ToyLadder(self.target, self.chunk, self.replicates, self.iterations * TRAINING_CHUNKS * self.chunk)

    def stage(self, frozen: Frozen) -> str:
        """The digest of the plan with its grid."""
        return _digest(self.digest.encode(), *(array.tobytes() for array in frozen))

    def round(self, frozen: Frozen, number: int) -> Round:
        """The chunks by which a rung doubles the one before it."""
        chunks = (2**number // 2, 2**number)
        strands = tuple(
            Strand((0, 1), stratum, replicate, chunks, seed_words(self.seed, stratum, replicate))
            for stratum in range(STRATA)
            for replicate in range(self.replicates)
        )
        return Round(self.stage(frozen), number, strands, self.length)


def evaluate(plan: Toy, block: Block, frozen: Frozen) -> Tally:
    """A worker's whole job."""
    assert block.stage == plan.stage(frozen)
    grid = _edges(frozen).tobytes()
    builder = TallyBuilder(block)
    for chunk in range(*block.chunks):
        bad = plan.poisoned == ("training" if block.training else "measuring", chunk) and block.replicate == 0
        sums, worst = chunk_sums(grid, block.seed, chunk, plan.chunk, block.stratum, bad)
        counters = {"evaluations": plan.chunk, "non_finite": int(bad), "negative": 0}
        builder.add(sums if block.training else replace(sums, training=None), counters, worst)
    return builder.tally()


@lru_cache(maxsize=100_000)
def chunk_sums(
    grid: bytes, seed: tuple[int, ...], chunk: int, points: int, stratum: int, bad: bool
) -> tuple[Sums, tuple[WorstPoint, ...]]:
    """The sums of one chunk; remembered, since the tests ask for the same ones over and over."""
    u, y = chunk_generator(seed, chunk).random((2, points))
    edges = np.frombuffer(grid)
    cell = np.minimum((u * CELLS).astype(np.intp), CELLS - 1)
    width = edges[cell + 1] - edges[cell]
    x = edges[cell] + (u * CELLS - cell) * width
    weight = np.stack([_term(x, y, w, a, stratum) for w, a in VARIATIONS]) * (width * CELLS)
    if bad:
        weight[:, 0] = np.nan
    keep = np.stack([np.ones(points, dtype=bool), x < CENTRE, y < 0.5])
    terms = np.where(keep, weight[:, None, :], 0.0)
    moments = (terms, terms * terms, np.broadcast_to(keep, terms.shape).astype(np.float64))
    added = np.stack([np.add.reduce(m, axis=-1) for m in moments])[:, None]
    sum_f, n_f = (np.bincount(cell, w, CELLS).astype(np.float64) for w in (weight[0] ** 2, np.ones(points)))
    place = int(np.argmax(np.where(np.isnan(weight[0]), np.inf, weight[0])))
    worst = WorstPoint(float(weight[0, place]), ((float(x[place]), float(y[place])),))
    return Sums(added, np.max(np.abs(terms), axis=-1)[None], (sum_f, n_f)), (worst,)


def exact() -> Array:
    """The integrals, shape (variation, component)."""
    rows = []
    for w, a in VARIATIONS:
        below, whole = atan(CENTRE / w), atan((1 - CENTRE) / w) + atan(CENTRE / w)
        rows.append([whole * (1 + a / 2), below * (1 + a / 2), whole * (1 / 2 + a / 8)])
    return np.array(rows)


def _term(x: Array, y: Array, w: float, a: float, stratum: int) -> Array:
    peak = w / ((x - CENTRE) ** 2 + w * w)
    return peak * (a * y) if stratum else peak


def _edges(frozen: Frozen) -> Array:
    return frozen[0] if frozen else np.linspace(0.0, 1.0, CELLS + 1)


def _digest(*parts: bytes) -> str:
    digest = sha256()
    for part in parts:
        digest.update(part)
    return digest.hexdigest()
