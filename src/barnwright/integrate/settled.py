"""A closed round: its sums are final."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from barnwright.integrate.block import StrandKey
from barnwright.integrate.tally import NON_FINITE, Array, Sums, WorstPoint


@dataclass(frozen=True, slots=True)
class Settled:
    """A closed round of measuring with all that the rounds before it added, or a closed iteration of the training.

    Attributes
    ----------
    number : int
        Rung or iteration.
    sums : mapping of (points, stratum, replicate) to Sums
    chunks : mapping of (points, stratum, replicate) to int
        How many chunks each of the sums holds.
    counters : mapping of str to int
        Of everything up to this round, training included.
    worst : tuple of WorstPoint
    """

    number: int
    sums: Mapping[StrandKey, Sums]
    chunks: Mapping[StrandKey, int]
    counters: Mapping[str, int]
    worst: tuple[WorstPoint, ...]

    @property
    def strata(self) -> tuple[int, ...]:
        """The strata, in order."""
        return tuple(sorted({key[1] for key in self.sums}))

    @property
    def replicates(self) -> tuple[int, ...]:
        """The replicates, in order."""
        return tuple(sorted({key[2] for key in self.sums}))

    @property
    def finite(self) -> bool:
        """Whether every sum is finite and no point was met that is not."""
        return not self.counters.get(NON_FINITE, 0) and all(sums.finite for sums in self.sums.values())

    def of(self, stratum: int, replicate: int) -> Sums:
        """The sums of one stratum and replicate, all points joined along the point axis; see `added_of` for less.

        Raises
        ------
        KeyError
            When the round has no such stratum or replicate.
        """
        parts = [self.sums[key] for key in self._keys(stratum, replicate)]
        if len(parts) == 1:
            return parts[0]
        return Sums(self.added_of(stratum, replicate), np.concatenate([part.largest for part in parts], axis=0))

    def added_of(self, stratum: int, replicate: int) -> Array:
        """What `of` would call ``added``: (moment, point, variation, component).

        Raises
        ------
        KeyError
            When the round has no such stratum or replicate.
        """
        parts = [self.sums[key].added for key in self._keys(stratum, replicate)]
        return parts[0] if len(parts) == 1 else np.concatenate(parts, axis=1)

    def chunks_of(self, stratum: int, replicate: int) -> int:
        """How many chunks each point of a stratum and replicate has.

        Raises
        ------
        KeyError
            When the round has no such stratum or replicate.
        """
        return self.chunks[self._keys(stratum, replicate)[0]]

    def _keys(self, stratum: int, replicate: int) -> list[StrandKey]:
        keys = sorted(key for key in self.sums if key[1:] == (stratum, replicate))
        if not keys:
            raise KeyError((stratum, replicate))
        return keys
