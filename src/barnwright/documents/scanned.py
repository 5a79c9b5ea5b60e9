"""What every scan offers, wherever it was calculated."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from functools import cached_property
from itertools import product
from math import prod
from typing import TYPE_CHECKING, Any

from barnwright.documents.by_name import ByName
from barnwright.documents.curves import Curve, Curves
from barnwright.documents.prediction import Prediction
from barnwright.pictures import picture

if TYPE_CHECKING:
    from os import PathLike

    from matplotlib.figure import Figure

MOST_LINES = 30
"""Of a scan that is printed."""


class Scanned(Sequence[Prediction]):
    """The predictions of a grid in the order of its points, and arrays of their numbers.

    Attributes
    ----------
    over : values by key of the request
        The first key varies slowest.
    """

    over: Mapping[str, tuple[Any, ...]]

    @property
    def shape(self) -> tuple[int, ...]:
        """How many values each key has."""
        return tuple(len(values) for values in self.over.values())

    @property
    def points(self) -> tuple[dict[str, Any], ...]:
        """The values of the scanned keys at every point, in the order of the predictions."""
        return tuple(dict(zip(self.over, place, strict=True)) for place in product(*self.over.values()))

    @cached_property
    def curves(self) -> Curves:
        """All totals and derived quantities as arrays shaped like the grid; made when first asked for."""
        return Curves.of(self, self.shape)

    @property
    def derived(self) -> ByName[Curve]:
        """The derived quantities: ``sweep.derived["A_FB"].values`` and ``.errors``."""
        return self.curves.total.derived

    @property
    def contributions(self) -> ByName[Curve]:
        """The totals of the contributions in `unit`; ``sweep.contributions["z"].derived`` is derived from them."""
        return self.curves.contributions

    @property
    def processes(self) -> ByName[Curve]:
        """The totals of the processes of a sum, in `unit`."""
        return self.curves.processes

    @property
    def variations(self) -> ByName[Curve]:
        """The totals of the variations, in `unit`."""
        return self.curves.variations

    def plot(self, path: str | PathLike[str] | None = None) -> Figure:
        """The picture of a scan over one key or two: a matplotlib figure, written to ``path`` (png, pdf, svg) if given.

        Raises:
            RequestError: when a key has no numbers, there are three and more, or the path names no picture.
            BarnwrightError: when matplotlib (extra ``plot``) is missing.
        """
        return picture(self, path)

    def __len__(self) -> int:
        return prod(self.shape)

    def __repr__(self) -> str:
        """The keys with how many values each has."""
        keys = ", ".join(f"{key}: {len(values)} values" for key, values in self.over.items())
        return f"<{type(self).__name__} of {len(self)} predictions over {keys}>"

    def __str__(self) -> str:
        """A line for each of the first points: the keys, the total, derived quantities and the status."""
        lines = [repr(self)]
        for number, (place, prediction) in enumerate(zip(self.points, self, strict=True)):
            if number == MOST_LINES:
                lines.append(f"  … and {len(self) - MOST_LINES} more")
                break
            keys = ", ".join(f"{key} = {value}" for key, value in place.items())
            derived = "".join(f", {quantity}" for quantity in prediction.derived)
            lines.append(f"  {keys}: {prediction.total}{derived}, {prediction.status}")
        return "\n".join(lines)
