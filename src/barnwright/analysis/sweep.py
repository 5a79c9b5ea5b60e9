"""A scan: one plan with many points, arrays of its totals, and predictions made when asked for."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import Any, overload

import numpy as np
from numpy.typing import NDArray

from barnwright.documents import Prediction, Request, Scanned, plain_axes
from barnwright.engine import Answers
from barnwright.process import Process
from barnwright.run.local import answers

Array = NDArray[np.float64]


@dataclass(frozen=True, repr=False)
class Sweep(Scanned):
    """The answers of a scan.

    Attributes
    ----------
    over : values by key of the request
        The first key varies slowest.
    """

    over: Mapping[str, tuple[Any, ...]]
    answers: Answers

    @property
    def unit(self) -> str:
        """The unit of the totals."""
        return self.answers.plan.request.unit

    @property
    def values(self) -> Array:
        """The totals in `unit`, shaped like the grid."""
        return self.answers.value[:, 0, 0].reshape(self.shape)

    @property
    def errors(self) -> Array:
        """The errors of the totals in `unit`, shaped like the grid."""
        return self.answers.error[:, 0, 0].reshape(self.shape)

    @property
    def status(self) -> str:
        """The status that all points share."""
        return self.answers.status

    @overload
    def __getitem__(self, index: int) -> Prediction: ...
    @overload
    def __getitem__(self, index: slice) -> list[Prediction]: ...
    def __getitem__(self, index: int | slice) -> Prediction | list[Prediction]:
        """The prediction at a point, made now."""
        if isinstance(index, slice):
            return [self.answers.prediction(i) for i in range(len(self))[index]]
        return self.answers.prediction(range(len(self))[index])

    def __iter__(self) -> Iterator[Prediction]:
        return (self.answers.prediction(i) for i in range(len(self)))


def scan(request: Request, over: Mapping[str, Sequence[Any]], process: Process | None = None) -> Sweep:
    """A prediction at every point of a grid, as one plan.

    Parameters
    ----------
    request : Request
    over : values by dotted key
        ``{"beams.sqrt_s": [...]}``; several keys make a grid, the first varies slowest.
    process : Process, optional
        An object made in a notebook.

    Raises
    ------
    RequestError, UnknownProcessError, PluginError, CalculationError
    """
    axes = plain_axes(over)
    return Sweep(axes, answers(request, axes, process))
