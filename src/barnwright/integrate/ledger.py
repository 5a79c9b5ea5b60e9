"""The ledger: tallies in, final sums out. The only type of the calculation that changes.

Rules of this file
------------------
- Tallies of the open round come in any order; one thread at a time adds them.
- An equal duplicate is dropped. A different one ends the calculation, naming the block. A tally whose chunks are partly
  there already is dropped, and `missing` asks for the rest. One of another stage, or that nobody asked for, is refused.
- Measuring rounds extend each other: round k's sums hold the chunks of all rounds up to k.
- What is not finite is added like anything else, so that it shows.
- Where a round stands is plain data (`checkpoint`), so that a run resumes at any block.
"""

from __future__ import annotations

from collections.abc import Iterable
from typing import Literal

from barnwright.errors import CalculationError
from barnwright.integrate.block import Round, Strand, StrandKey
from barnwright.integrate.folding import Node, canonical_nodes, folded, insert_node
from barnwright.integrate.ranges import Range, gaps, overlaps, with_range
from barnwright.integrate.settled import Settled
from barnwright.integrate.tally import Array, Sums, Tally, WorstPoint, added_counters, worst_of

StopReason = Literal["time_limit", "cancelled"]
Frozen = tuple[Array, ...]
Place = tuple[StrandKey, Range]
"""A strand and a range of its chunks."""


class Ledger:
    """Tallies of one calculation, merged so that their order and their blocks leave no trace.

    Parameters
    ----------
    plan : str
        Digest of the plan.

    Attributes
    ----------
    settled : list of Settled
        The closed rounds of measuring.
    trained : int
        How many iterations of the training are done.
    frozen : tuple of arrays
        What they made of the maps; empty before the first.
    stopped : "time_limit", "cancelled" or None
    """

    def __init__(self, plan: str) -> None:
        self.plan = plan
        self.settled: list[Settled] = []
        self.trained = 0
        self.frozen: Frozen = ()
        self.stopped: StopReason | None = None
        self.round: Round | None = None
        self._nodes: dict[StrandKey, dict[Node, Sums]] = {}
        self._covered: dict[StrandKey, tuple[Range, ...]] = {}
        self.counters: dict[str, int] = {}
        self.worst: tuple[WorstPoint, ...] = ()
        self._seen: dict[Place, Tally | str] = {}
        self._strands: dict[StrandKey, Strand] = {}
        self._past: dict[tuple[bool, int, str], dict[Place, Tally | str]] = {}

    @property
    def closed(self) -> int:
        """How many rounds of measuring are closed."""
        return len(self.settled)

    def open(self, wanted: Round) -> None:
        """Expect the tallies of a round; opening the open round again changes nothing but the length of its blocks.

        Raises
        ------
        CalculationError
            When another round is open, or it is not the next one.
        """
        if self.round is not None:
            if self.round.with_length(wanted.length) != wanted:
                raise CalculationError(f"{self.round.name} is open; it cannot become {wanted.name} of other blocks")
            self.round = wanted
            return
        expected = self.trained if wanted.training else self.closed
        if wanted.number != expected:
            raise CalculationError(f"{wanted.name} cannot be opened: the ledger is ready for number {expected}")
        self._strands = {strand.key: strand for strand in wanted.strands}
        self._covered = dict.fromkeys(self._strands, ())
        self.round = wanted

    def add(self, tally: Tally) -> bool:
        """Take a tally; False says that it was dropped because its chunks are there already.

        Raises
        ------
        CalculationError
            When a different tally of the same block was taken, the tally is of another stage, or nobody asked for it.
        """
        block, opened = tally.block, self.round
        if self._is_past(tally):
            return False
        if opened is None or block.stage != opened.stage:
            wanted = "no round is open" if opened is None else f"expected {opened.stage}"
            raise CalculationError(f"a tally of stage {block.stage} was refused ({wanted}): {block.name}")
        self._check_asked_for(tally, opened)
        place = (block.key, block.chunks)
        if place in self._seen:
            _check_equal(tally, self._seen[place])
            return False
        covered = self._covered[block.key]
        if overlaps(covered, block.chunks):
            return False
        self._covered[block.key] = with_range(covered, block.chunks)
        whole = block.chunks == self._strands[block.key].chunks
        self._seen[place] = tally if whole else tally.fingerprint()
        self._merge(tally)
        return True

    def missing(self, wanted: Round) -> Round:
        """The part of the open round that has not come yet: a counted sequence of blocks, empty when all is there.

        Raises
        ------
        CalculationError
            When this round is not the open one.
        """
        self._check_open(wanted)
        strands = tuple(
            Strand(s.points, s.stratum, s.replicate, hole, s.seed)
            for s in wanted.strands
            for hole in gaps(self._covered[s.key], s.chunks)
        )
        return Round(wanted.stage, wanted.number, strands, wanted.length, wanted.training)

    def close(self, wanted: Round) -> Settled:
        """Make the sums of the open round final.

        Raises
        ------
        CalculationError
            When blocks are missing, or this round is not the open one.
        """
        missing = self.missing(wanted)
        if missing:
            raise CalculationError(f"{len(missing)} blocks are missing, the first is {next(iter(missing)).name}")
        whole = {s.key: (0, s.chunks[1]) for s in wanted.strands}
        sums = {key: folded(self._nodes[key], chunks, Sums.plus) for key, chunks in whole.items()}
        chunks = {key: stop for key, (_, stop) in whole.items()}
        closed = Settled(wanted.number, sums, chunks, dict(self.counters), self.worst)
        self._past[wanted.identity] = self._seen
        self.round, self._seen, self._covered = None, {}, {}
        if wanted.training:
            self._nodes = {}
        else:
            self.settled.append(closed)
        return closed

    def freeze(self, frozen: Iterable[Array]) -> None:
        """Keep what a closed iteration of the training made of the maps."""
        self.frozen = tuple(frozen)
        self.trained += 1

    def stop(self, reason: StopReason) -> None:
        """Let the calculation end with the last closed round."""
        self.stopped = reason

    def _merge(self, tally: Tally) -> None:
        nodes = self._nodes.setdefault(tally.block.key, {})
        for node, sums in tally.nodes.items():
            insert_node(nodes, node, sums, Sums.plus)
        self.counters = added_counters(self.counters, tally.counters)
        self.worst = worst_of((*self.worst, *tally.worst))

    def _is_past(self, tally: Tally) -> bool:
        """Whether a tally belongs to a round that was closed here; it is compared with what was taken then."""
        block = tally.block
        taken = self._past.get((block.training, block.round, block.stage))
        if taken is None:
            return False
        if (block.key, block.chunks) in taken:
            _check_equal(tally, taken[block.key, block.chunks])
        return True

    def _check_asked_for(self, tally: Tally, opened: Round) -> None:
        block = tally.block
        strand = self._strands.get(block.key)
        if strand is None or not strand.chunks[0] <= block.chunks[0] < block.chunks[1] <= strand.chunks[1]:
            raise CalculationError(f"a tally that nobody asked for was refused: {block.name}")
        if block != opened.block(strand, block.chunks):
            raise CalculationError(f"a tally with another seed or round was refused: {block.name}")
        if tuple(sorted(tally.nodes)) != tuple(sorted(canonical_nodes(block.chunks))):
            raise CalculationError(f"a tally with other chunks than its block was refused: {block.name}")

    def _check_open(self, wanted: Round) -> None:
        if self.round is None or self.round.with_length(wanted.length) != wanted:
            raise CalculationError(f"{wanted.name} is not open")


def _check_equal(tally: Tally, taken: Tally | str) -> None:
    before = taken if isinstance(taken, str) else taken.fingerprint()
    if tally.fingerprint() != before:
        raise CalculationError(
            f"two different tallies of one block: {tally.block.name}; its worker does not repeat its own numbers, "
            "or two workers have different versions or processors"
        )
