"""A filled histogram."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any, Self

import numpy as np
from pydantic import PrivateAttr, model_validator

from barnwright.documents.arrays import Array, ArrayDocument, Edges, FloatArray, axes_of
from barnwright.documents.base import Name, Number
from barnwright.documents.checks import Finding, Shown, refuse
from barnwright.documents.estimate import ErrorKind, NotNegative, Unit
from barnwright.documents.histograms import Per
from barnwright.errors import BarnwrightError, CalculationError


@dataclass(frozen=True, slots=True)
class Covariance:
    """A covariance matrix with its rank: estimated from R replicates, it has rank R - 1 at most.

    A matrix whose rank is below its size has no inverse: a chi-square needs fewer bins, or more replicates.
    ``matrix`` has shape (bin, bin), bins in row-major order, in the squared unit of the values.
    """

    matrix: Array
    rank: int

    def __array__(self, dtype: Any = None, copy: bool | None = None) -> Any:
        """The matrix, for numpy's functions."""
        return np.array(self.matrix, dtype=dtype, copy=copy)


class Histogram(ArrayDocument):
    """Values and errors in bins, shape (bin,) or (bin, bin).

    ``values`` are densities (per "value" or "solid_angle") or contents (per "bin"), in ``unit``; ``errors`` are NaN
    (null in JSON) where too few points are known. ``underflow`` and ``overflow`` are contents: in two dimensions
    what lies too low on any axis, and what lies too high on any and too low on none. ``edges`` is the array of the
    one axis, or a tuple of two; ``axis_units`` are their units. ``solid_angles`` (sr) has the bins' solid angles
    where the values are per solid angle.
    """

    name: Name
    observables: tuple[str, ...]
    axis_units: tuple[Unit, ...] = ()
    per: Per = "value"
    edges: Edges
    values: FloatArray
    errors: FloatArray
    unit: Unit
    error_kind: ErrorKind
    degrees_of_freedom: NotNegative | None = None
    underflow: Number | None
    overflow: Number | None
    underflow_error: NotNegative | None = None
    overflow_error: NotNegative | None = None
    solid_angles: FloatArray | None = None

    _replicates: Array | None = PrivateAttr(default=None)

    @model_validator(mode="after")
    def _agree(self) -> Self:
        shape = tuple(axis.size - 1 for axis in axes_of(self.edges))
        found = [
            Finding((name,), Shown(f"shape {values.shape}"), f"as many as bins, shape {shape}")
            for name, values in (("values", self.values), ("errors", self.errors), ("solid_angles", self.solid_angles))
            if values is not None and values.shape != shape
        ]
        if len(self.observables) != len(shape):
            found.append(Finding(("observables",), list(self.observables), f"as many as axes, {len(shape)}"))
        refuse(found)
        return self

    @property
    def volumes(self) -> Array:
        """What a value is multiplied with to give the content of its bin; shape of the values."""
        if self.per == "bin":
            return np.ones(self.values.shape)
        if self.per == "solid_angle":
            if self.solid_angles is None:
                raise CalculationError(f"histogram {self.name!r} does not say the solid angles of its bins")
            return self.solid_angles
        widths = [np.diff(axis) for axis in axes_of(self.edges)]
        return widths[0] if len(widths) == 1 else np.multiply.outer(widths[0], widths[1])

    @property
    def contents(self) -> Array:
        """The content of every bin, in the unit of the total; shape of the values."""
        return self.values * self.volumes

    @property
    def content_errors(self) -> Array:
        """The errors of the contents, in the unit of the total; NaN where unknown."""
        return self.errors * self.volumes

    def attach(self, replicates: Array) -> None:
        """Hand over the contents of the bins in each replicate, shape (replicate, bin), unit of the total."""
        self._replicates = replicates

    def covariance(self) -> Covariance:
        """The covariance of the values, from the replicates, with its rank.

        Raises:
            CalculationError: where there are no replicates; numerical bounds are no statistical errors.
        """
        if self.error_kind == "numerical_bound" or self._replicates is None:
            why = "its errors are numerical bounds" if self.error_kind == "numerical_bound" else "it has no replicates"
            advice = 'a covariance comes with replicates, which accuracy.method = "monte_carlo" makes'
            raise CalculationError(f"histogram {self.name!r} has no covariance: {why}; {advice}")
        values = self._replicates / self.volumes.ravel()
        count = len(values)
        away = values - values.mean(axis=0)
        matrix = away.T @ away / (count * (count - 1))
        return Covariance(matrix, min(count - 1, int(np.count_nonzero(matrix.diagonal()))))

    def to_hist(self) -> Any:
        """The contents as a ``hist.Hist`` with weighted storage; variances are the squared errors.

        In two dimensions underflow and overflow stand in the first and the last corner, so that sums are right.

        Raises:
            BarnwrightError: when the package hist is not installed.
        """
        try:
            import hist
        except ImportError:
            raise BarnwrightError("to_hist needs the package hist: pip install hist") from None
        axes = [
            hist.axis.Variable(edges, label=text)
            for edges, text in zip(axes_of(self.edges), self.observables, strict=True)
        ]
        made = hist.Hist(*axes, storage=hist.storage.Weight(), name=self.name)
        view = made.view(flow=True)
        inner = (slice(1, -1),) * self.values.ndim
        view.value[inner], view.variance[inner] = self.contents, self.content_errors**2
        for place, value, error in (
            (0, self.underflow, self.underflow_error),
            (-1, self.overflow, self.overflow_error),
        ):
            corner = (place,) * self.values.ndim
            view.value[corner] = np.nan if value is None else value
            view.variance[corner] = np.nan if error is None else error**2
        return made

    def __repr__(self) -> str:
        """Name, shape and unit."""
        return f"<Histogram {self.name!r}: {' x '.join(map(str, self.values.shape))} bins, {self.unit}>"

    __str__ = __repr__
