"""Ranges of chunks, their decomposition and the tree in which they are added."""

from __future__ import annotations

import random
from itertools import pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from barnwright.integrate.folding import canonical_nodes, folded, insert_node, node_range
from barnwright.integrate.ranges import aligned_pieces, count_pieces, gaps, overlaps, with_range

RANGES = st.tuples(st.integers(0, 300), st.integers(1, 300)).map(lambda pair: (pair[0], pair[0] + pair[1]))


@pytest.mark.parametrize(
    ("chunks", "nodes"),
    [
        ((0, 1), [(0, 0)]),
        ((0, 8), [(3, 0)]),
        ((0, 7), [(2, 0), (1, 2), (0, 6)]),
        ((3, 8), [(0, 3), (2, 1)]),
        ((5, 11), [(0, 5), (1, 3), (1, 4), (0, 10)]),
        ((4, 4), []),
    ],
)
def test_canonical_nodes(chunks: tuple[int, int], nodes: list[tuple[int, int]]) -> None:
    """The largest aligned runs of 2^n chunks inside a range, from left to right."""
    assert list(canonical_nodes(chunks)) == nodes


@settings(derandomize=True)
@given(RANGES)
def test_canonical_nodes_tile_and_are_largest(chunks: tuple[int, int]) -> None:
    """They tile the range, and the parent of none of them lies inside it."""
    nodes = canonical_nodes(chunks)
    tiles = [node_range(node) for node in nodes]
    assert [chunk for start, stop in tiles for chunk in range(start, stop)] == list(range(*chunks))
    for level, index in nodes:
        start, stop = node_range((level + 1, index // 2))
        assert start < chunks[0] or stop > chunks[1]


def tree(chunks: tuple[int, int]) -> str:
    """The sum of a range as a formula with all its brackets, written without the tree's own code."""

    def node(start: int, size: int) -> str:
        if size == 1:
            return str(start)
        return f"({node(start, size // 2)}+{node(start + size // 2, size // 2)})"

    parts, (start, stop) = [], chunks
    while start < stop:
        size = max(s for s in (2**k for k in range(12)) if start % s == 0 and start + s <= stop)
        parts.append(node(start, size))
        start += size
    whole = parts[0]
    for part in parts[1:]:
        whole = f"({whole}+{part})"
    return whole


def bracketed(left: str, right: str) -> str:
    """A sum that shows its order."""
    return f"({left}+{right})"


@settings(derandomize=True)
@given(st.integers(1, 150), st.randoms(use_true_random=False))
def test_one_bracketing_whatever_the_pieces(stop: int, chance: random.Random) -> None:
    """Pieces cut anywhere and put in in any order are bracketed alike."""
    cuts = sorted(chance.sample(range(1, stop), min(stop - 1, chance.randint(0, 20))))
    pieces = list(zip([0, *cuts], [*cuts, stop], strict=True))
    chance.shuffle(pieces)
    nodes: dict[tuple[int, int], str] = {}
    for piece in pieces:
        inner: dict[tuple[int, int], str] = {}
        for chunk in range(*piece):
            insert_node(inner, (0, chunk), str(chunk), bracketed)
        assert sorted(inner) == sorted(canonical_nodes(piece))
        for node, value in inner.items():
            insert_node(nodes, node, value, bracketed)
    assert folded(nodes, (0, stop), bracketed) == tree((0, stop))


def test_folding_needs_every_node() -> None:
    """A range that is not all there has no sum."""
    with pytest.raises(KeyError, match=r"\(1, 0\)"):
        folded({(0, 2): "2"}, (0, 3), bracketed)


@settings(derandomize=True)
@given(st.lists(RANGES, max_size=12), RANGES)
def test_ranges_behave_like_sets(ranges: list[tuple[int, int]], other: tuple[int, int]) -> None:
    """Adding, overlapping and gaps agree with sets of whole numbers."""
    covered: tuple[tuple[int, int], ...] = ()
    taken: set[int] = set()
    for new in ranges:
        assert overlaps(covered, new) is bool(taken & set(range(*new)))
        if not overlaps(covered, new):
            covered, taken = with_range(covered, new), taken | set(range(*new))
    assert {n for r in covered for n in range(*r)} == taken
    assert all(left[1] < right[0] for left, right in pairwise(covered))
    assert overlaps(covered, other) is bool(taken & set(range(*other)))
    holes = gaps(covered, (0, 700))
    assert {n for r in holes for n in range(*r)} == set(range(700)) - taken
    assert all(start < stop for start, stop in holes)


@settings(derandomize=True)
@given(RANGES, st.integers(1, 64))
def test_aligned_pieces(whole: tuple[int, int], length: int) -> None:
    """Pieces tile the range, begin at multiples of their length, and are counted without making them."""
    pieces = list(aligned_pieces(whole, length))
    assert [n for piece in pieces for n in range(*piece)] == list(range(*whole))
    assert all(start % length == 0 for start, _ in pieces[1:])
    assert all(stop - start <= length for start, stop in pieces)
    assert count_pieces(whole, length) == len(pieces)


def test_nothing_has_no_pieces() -> None:
    """An empty range is cut into nothing."""
    assert list(aligned_pieces((3, 3), 4)) == []
    assert count_pieces((3, 3), 4) == 0
