"""The answers of a scan, as they came from a server."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import Any, overload

import numpy as np
from numpy.typing import NDArray

from barnwright.documents import Prediction, Scanned

Array = NDArray[np.float64]


@dataclass(frozen=True, repr=False)
class RemoteSweep(Scanned):
    """The answers of a scan; ``over`` are the values by key, the first key varies slowest."""

    over: Mapping[str, tuple[Any, ...]]
    predictions: tuple[Prediction, ...]

    @property
    def unit(self) -> str:
        """The unit of the totals."""
        return self.predictions[0].total.unit

    @property
    def values(self) -> Array:
        """The totals in `unit`, shaped like the grid; NaN where one is not known."""
        return _numbers([prediction.total.value for prediction in self.predictions]).reshape(self.shape)

    @property
    def errors(self) -> Array:
        """The errors of the totals in `unit`, shaped like the grid; NaN where one is not known."""
        return _numbers([prediction.total.error for prediction in self.predictions]).reshape(self.shape)

    @property
    def status(self) -> str:
        """The status that all points share."""
        return self.predictions[0].status

    @overload
    def __getitem__(self, index: int) -> Prediction: ...
    @overload
    def __getitem__(self, index: slice) -> list[Prediction]: ...
    def __getitem__(self, index: int | slice) -> Prediction | list[Prediction]:
        """The prediction at a point, or those of some points."""
        return list(self.predictions[index]) if isinstance(index, slice) else self.predictions[index]

    def __iter__(self) -> Iterator[Prediction]:
        return iter(self.predictions)


def _numbers(entries: list[float | None]) -> Array:
    return np.array([np.nan if entry is None else entry for entry in entries], dtype=np.float64)
