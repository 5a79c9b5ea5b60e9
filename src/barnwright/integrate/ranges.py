"""Half-open ranges of whole numbers, kept sorted, disjoint and merged."""

from __future__ import annotations

from bisect import bisect_left, bisect_right
from collections.abc import Iterator
from itertools import pairwise

Range = tuple[int, int]


def with_range(covered: tuple[Range, ...], new: Range) -> tuple[Range, ...]:
    """Ranges with one more, which overlaps none of them; neighbours are merged."""
    place = bisect_left(covered, new)
    before, after = covered[:place], covered[place:]
    if before and before[-1][1] == new[0]:
        before, new = before[:-1], (before[-1][0], new[1])
    if after and after[0][0] == new[1]:
        after, new = after[1:], (new[0], after[0][1])
    return (*before, new, *after)


def overlaps(covered: tuple[Range, ...], other: Range) -> bool:
    """Whether a range shares a number with any of the ranges."""
    place = bisect_right(covered, (other[0], other[0]))
    left = place > 0 and covered[place - 1][1] > other[0]
    return left or (place < len(covered) and covered[place][0] < other[1])


def gaps(covered: tuple[Range, ...], whole: Range) -> tuple[Range, ...]:
    """What is left of a range once the ranges, all inside it, are taken away."""
    if not covered:
        return (whole,) if whole[0] < whole[1] else ()
    ends = [whole[0], *(end for r in covered for end in r), whole[1]]
    holes = list(pairwise(ends))[::2]
    return tuple(hole for hole in holes if hole[0] < hole[1])


def aligned_pieces(whole: Range, length: int) -> Iterator[Range]:
    """A range cut at every multiple of a length, so that pieces meet the folding tree at few nodes."""
    start = whole[0]
    while start < whole[1]:
        stop = min((start // length + 1) * length, whole[1])
        yield start, stop
        start = stop


def count_pieces(whole: Range, length: int) -> int:
    """How many pieces `aligned_pieces` makes."""
    return 0 if whole[0] >= whole[1] else (whole[1] - 1) // length - whole[0] // length + 1
