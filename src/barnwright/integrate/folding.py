"""Sums over chunks in a fixed binary tree, so that their bits depend on the chunks alone.

Rules of this file
------------------
- Node (level, index) stands for the chunks [index·2^level, (index + 1)·2^level). A parent is left child + right child.
- A range of chunks has one canonical decomposition: the largest nodes that lie inside it, from left to right.
- The sum of a range folds its canonical nodes from left to right. Whoever held which chunks, and in what order they
  came, is forgotten on the way.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, MutableMapping
from typing import TypeVar

from barnwright.integrate.ranges import Range

Node = tuple[int, int]
T = TypeVar("T")
Combine = Callable[[T, T], T]


def node_range(node: Node) -> Range:
    """The chunks of a node."""
    level, index = node
    return index << level, (index + 1) << level


def canonical_nodes(chunks: Range) -> tuple[Node, ...]:
    """The canonical decomposition of a range of chunks, from left to right."""
    nodes = []
    start, stop = chunks
    while start < stop:
        level = (stop - start).bit_length() - 1
        if start:
            level = min(level, (start & -start).bit_length() - 1)
        nodes.append((level, start >> level))
        start += 1 << level
    return tuple(nodes)


def insert_node(nodes: MutableMapping[Node, T], node: Node, value: T, combine: Combine[T]) -> None:
    """Put a node among others that do not overlap it, folding siblings into their parent as far up as they go."""
    level, index = node
    while (level, index ^ 1) in nodes:
        sibling = nodes.pop((level, index ^ 1))
        value = combine(sibling, value) if index & 1 else combine(value, sibling)
        level, index = level + 1, index >> 1
    nodes[level, index] = value


def folded(nodes: Mapping[Node, T], chunks: Range, combine: Combine[T]) -> T:
    """The sum of a range of chunks whose canonical nodes are all there.

    Raises
    ------
    KeyError
        When one of them is not.
    """
    first, *others = canonical_nodes(chunks)
    value = nodes[first]
    for node in others:
        value = combine(value, nodes[node])
    return value
