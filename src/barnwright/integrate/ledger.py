"""The ledger: tallies in, final sums out. The only type of the calculation that changes.

Rules of this file
------------------
- Tallies of the open round come in any order; one thread at a time adds them.
- An equal duplicate is dropped. A different one ends the calculation, naming the block. A tally whose chunks are partly
  there already is dropped, and `missing` asks for the rest. One of another stage, or that nobody asked for, is refused.
- Measuring rounds extend each other: round k's sums hold the chunks of all rounds up to k.
- What is not finite is added like anything else, so that it shows.
- `state` is plain data, so that a run resumes at any block.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from functools import reduce
from typing import Any, Literal, Self

from barnwright.errors import CalculationError
from barnwright.integrate.account import Account
from barnwright.integrate.block import Round, Strand, StrandKey
from barnwright.integrate.checkpoint import (
    dump_account,
    dump_array,
    dump_key,
    dump_round,
    dump_settled,
    dump_worst,
    load_account,
    load_array,
    load_key,
    load_round,
    load_settled,
    load_worst,
)
from barnwright.integrate.folding import canonical_nodes
from barnwright.integrate.ranges import Range
from barnwright.integrate.settled import Settled
from barnwright.integrate.tally import Array, Tally, WorstPoint, added_counters, worst_of

StopReason = Literal["time_limit", "cancelled"]
Frozen = tuple[Array, ...]
Place = tuple[StrandKey, Range]
"""A strand and a range of its chunks."""

STATE_SCHEMA = "barnwright.ledger/1"


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
    round : Round or None
        The open one.
    stopped : "time_limit", "cancelled" or None
    lacking : int
        How many chunks of the open round have not come yet; `missing` says which.
    """

    def __init__(self, plan: str) -> None:
        self.plan = plan
        self.settled: list[Settled] = []
        self.trained = 0
        self.frozen: Frozen = ()
        self.round: Round | None = None
        self.stopped: StopReason | None = None
        self.lacking = 0
        self._training_counters: Mapping[str, int] = {}
        self._training_worst: tuple[WorstPoint, ...] = ()
        self._accounts: dict[StrandKey, Account] = {}
        self._strands: dict[StrandKey, Strand] = {}
        self._seen: dict[Place, Tally | str] = {}
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
            When another round is open, or this one does not begin where the ledger stands.
        """
        if self.round is not None:
            self._check_open(wanted)
            self.round = wanted
            return
        expected = self.trained if wanted.training else self.closed
        if wanted.number != expected:
            raise CalculationError(f"{wanted.name} cannot be opened: the ledger is ready for number {expected}")
        for strand in wanted.strands:
            if self._account(strand.key).holes(strand.chunks[0]):
                raise CalculationError(f"{wanted.name} begins at chunk {strand.chunks[0]}: earlier ones are missing")
        self._expect(wanted)

    def add(self, tally: Tally) -> bool:
        """Take a tally; False says that it was dropped because its chunks are there already.

        Raises
        ------
        CalculationError
            When a different tally of the same block was taken, the tally is of another stage, or nobody asked for it.
        """
        block, key, chunks = tally.block, tally.block.key, tally.block.chunks
        taken = self._past.get((block.training, block.round, block.stage))
        if taken is None:
            self._check_asked_for(tally)
        known = (self._seen if taken is None else taken).get((key, chunks))
        if known is not None:
            _check_equal(tally, known)
        if taken is not None or known is not None or self._account(key).has_any(chunks):
            return False
        self._accounts[key] = self._account(key).plus(tally)
        whole = chunks == self._strands[key].chunks
        self._seen[key, chunks] = tally if whole else tally.fingerprint()
        self.lacking -= chunks[1] - chunks[0]
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
            for s in (wanted.strands if self.lacking else ())
            for hole in self._account(s.key).holes(s.chunks[1])
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
        sums = {s.key: self._accounts[s.key].sums(s.chunks[1]) for s in wanted.strands}
        chunks = {s.key: s.chunks[1] for s in wanted.strands}
        accounts = self._accounts.values()
        counters = reduce(added_counters, (a.counters for a in accounts), self._training_counters)
        worst = worst_of((*self._training_worst, *(point for a in accounts for point in a.worst)))
        settled = Settled(wanted.number, sums, chunks, counters, worst)
        self._past[wanted.identity] = self._seen
        self.round, self._seen = None, {}
        if wanted.training:
            self._accounts, self._training_counters, self._training_worst = {}, counters, worst
        else:
            self.settled.append(settled)
        return settled

    def freeze(self, frozen: Iterable[Array]) -> None:
        """Keep what a closed iteration of the training made of the maps."""
        self.frozen = tuple(frozen)
        self.trained += 1

    def stop(self, reason: StopReason) -> None:
        """Let the calculation end with the last closed round."""
        self.stopped = reason

    def state(self) -> dict[str, Any]:
        """Where the calculation stands, as plain data that JSON can carry: closed rounds, and what the open one has.

        A stop is not part of it: who resumes wants to go on.
        """
        seen = [(key, chunks, t if isinstance(t, str) else t.fingerprint()) for (key, chunks), t in self._seen.items()]
        return {
            "schema": STATE_SCHEMA,
            "plan": self.plan,
            "settled": [dump_settled(settled) for settled in self.settled],
            "trained": self.trained,
            "frozen": [dump_array(array) for array in self.frozen],
            "round": None if self.round is None else dump_round(self.round),
            "training_counters": dict(self._training_counters),
            "training_worst": dump_worst(self._training_worst),
            "accounts": [[dump_key(key), dump_account(account)] for key, account in self._accounts.items()],
            "seen": [[dump_key(key), list(chunks), fingerprint] for key, chunks, fingerprint in seen],
            "past": [list(identity) for identity in self._past],
        }

    @classmethod
    def from_state(cls, state: Mapping[str, Any]) -> Self:
        """The ledger that `state` described.

        Raises
        ------
        CalculationError
            When it was written in another form.
        """
        if state.get("schema") != STATE_SCHEMA:
            raise CalculationError(f"a ledger's state says {state.get('schema')!r}, expected {STATE_SCHEMA!r}")
        ledger = cls(state["plan"])
        ledger.settled = [load_settled(settled) for settled in state["settled"]]
        ledger.trained = state["trained"]
        ledger.frozen = tuple(load_array(array) for array in state["frozen"])
        ledger._training_counters = dict(state["training_counters"])
        ledger._training_worst = load_worst(state["training_worst"])
        ledger._accounts = {load_key(key): load_account(account) for key, account in state["accounts"]}
        ledger._seen = {(load_key(key), (start, stop)): mark for key, (start, stop), mark in state["seen"]}
        ledger._past = {(training, number, stage): {} for training, number, stage in state["past"]}
        if state["round"] is not None:
            ledger._expect(load_round(state["round"]))
        return ledger

    def _account(self, key: StrandKey) -> Account:
        return self._accounts.get(key, _EMPTY)

    def _expect(self, wanted: Round) -> None:
        self._strands = {strand.key: strand for strand in wanted.strands}
        self.round = wanted
        holes = (hole for s in wanted.strands for hole in self._account(s.key).holes(s.chunks[1]))
        self.lacking = sum(stop - start for start, stop in holes)

    def _check_open(self, wanted: Round) -> None:
        if self.round is None or self.round.with_length(wanted.length) != wanted:
            instead = "no round is" if self.round is None else f"{self.round.name} of stage {self.round.stage} is"
            raise CalculationError(f"{wanted.name} of stage {wanted.stage} is not open: {instead}")

    def _check_asked_for(self, tally: Tally) -> None:
        block, opened = tally.block, self.round
        if opened is None or block.stage != opened.stage:
            instead = "no round is open" if opened is None else f"expected stage {opened.stage}"
            raise CalculationError(f"a tally of stage {block.stage} was refused, {instead}: {block.name}")
        strand = self._strands.get(block.key)
        if strand is None or not strand.chunks[0] <= block.chunks[0] < block.chunks[1] <= strand.chunks[1]:
            raise CalculationError(f"a tally that nobody asked for was refused: {block.name}")
        if block != opened.block(strand, block.chunks):
            raise CalculationError(f"a tally of another round or seed was refused: {block.name}")
        if set(tally.nodes) != set(canonical_nodes(block.chunks)):
            raise CalculationError(f"a tally whose sums are not those of its chunks was refused: {block.name}")


_EMPTY = Account()


def _check_equal(tally: Tally, taken: Tally | str) -> None:
    before = taken if isinstance(taken, str) else taken.fingerprint()
    if tally.fingerprint() != before:
        raise CalculationError(
            f"two different tallies of one block ({tally.block.name}): its worker does not repeat its own numbers, "
            "or two workers have other versions or processors"
        )
