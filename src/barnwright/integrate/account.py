"""What has come of one strand so far; a new tally makes a new account, so an interruption never leaves half of one."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from barnwright.integrate.folding import Node, folded, insert_node
from barnwright.integrate.ranges import Range, gaps, overlaps, with_range
from barnwright.integrate.tally import Sums, Tally, WorstPoint, added_counters, worst_of


@dataclass(frozen=True, slots=True)
class Account:
    """Chunks that have come, and their sums folded as far as they go.

    Attributes
    ----------
    covered : tuple of ranges of chunks
        Sorted, disjoint, neighbours merged.
    nodes : mapping of (level, index) to Sums
    counters : mapping of str to int
    worst : tuple of WorstPoint
    """

    covered: tuple[Range, ...] = ()
    nodes: Mapping[Node, Sums] = field(default_factory=dict)
    counters: Mapping[str, int] = field(default_factory=dict)
    worst: tuple[WorstPoint, ...] = ()

    def has_any(self, chunks: Range) -> bool:
        """Whether some of the chunks have come."""
        return overlaps(self.covered, chunks)

    def holes(self, stop: int) -> tuple[Range, ...]:
        """Which of the chunks [0, stop) have not come."""
        return gaps(self.covered, (0, stop))

    def plus(self, tally: Tally) -> Account:
        """The account with a tally none of whose chunks it has."""
        nodes = dict(self.nodes)
        for node, sums in tally.nodes.items():
            insert_node(nodes, node, sums, Sums.plus)
        return Account(
            with_range(self.covered, tally.block.chunks),
            nodes,
            added_counters(self.counters, tally.counters),
            worst_of((*self.worst, *tally.worst)),
        )

    def sums(self, stop: int) -> Sums:
        """The sums of the chunks [0, stop), which have all come."""
        return folded(self.nodes, (0, stop), Sums.plus)
