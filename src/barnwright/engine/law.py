"""Asking a process's functions for numbers, and naming the process where they misbehave."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from barnwright.errors import PluginError
from barnwright.event import Event, Point
from barnwright.process import Parameters, Process

Array = NDArray[np.float64]


def squared_amplitude(process: Process, law: int, event: Event, parameters: Parameters) -> Array:
    """|M|² of a batch, GeV^(2(4 − N)), averaged over the initial and summed over the final states; broadcasts to the
    event.

    Raises
    ------
    PluginError
        When the law raises, or its answer does not broadcast to ``event.shape``. Overflow and division by zero are no
        fault of its own: they give NaN.
    """
    try:
        with np.errstate(all="ignore"):
            found = np.asarray(process.laws[law].squared(event, parameters), dtype=float)
    except ArithmeticError:  # plain floats of extreme parameters: no number, as numpy would have it
        return np.full(event.shape, np.nan)
    except (Exception, SystemExit) as cause:
        raise _fault(process, f"the law raised {type(cause).__name__}: {cause}") from cause
    return _shaped(process, found, event.shape, "the law")


def cumulative(process: Process, closed_form: int, x: Array, point: Point, parameters: Parameters) -> Array:
    """The antiderivative of dσ/dx in GeV⁻² at x, shape (point, edge).

    Raises
    ------
    PluginError
        When the closed form raises, or its answer has another shape.
    """
    shape = np.broadcast_shapes(x.shape, point.s.shape)
    try:
        with np.errstate(all="ignore"):
            found = np.asarray(process.closed_forms[closed_form].cumulative(x, point, parameters), dtype=float)
    except ArithmeticError:
        return np.full(shape, np.nan)
    except (Exception, SystemExit) as cause:
        raise _fault(process, f"the closed form raised {type(cause).__name__}: {cause}") from cause
    return np.broadcast_to(_shaped(process, found, shape, "the closed form"), shape)


def _shaped(process: Process, found: Array, shape: tuple[int, ...], what: str) -> Array:
    try:
        fits = np.broadcast_shapes(found.shape, shape) == shape
    except ValueError:
        fits = False
    if not fits:
        raise _fault(process, f"{what} returned an array of shape {found.shape}, which does not broadcast to {shape}")
    return found


def _fault(process: Process, cause: str) -> PluginError:
    return PluginError(plugin="", process=process.name, cause=cause)
