"""Asking a process's functions for numbers, and naming the process where they misbehave."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
from numpy.typing import ArrayLike, NDArray

from barnwright.engine.setting import Setting
from barnwright.errors import PluginError
from barnwright.event import Event, Point
from barnwright.process import (
    AngularCrossSection,
    Expression,
    HelicityAmplitudes,
    Law,
    Parameters,
    Parts,
    Process,
    SquaredAmplitude,
    TotalCrossSection,
)

Array = NDArray[np.float64]


def squared_amplitude(
    process: Process, setting: Setting, event: Event, parameters: Parameters, parts: Parts | None
) -> Array:
    """|M|² of a batch, GeV^(2(4 − N)), averaged over the initial and summed over the final states; broadcasts to the
    event.

    Raises
    ------
    PluginError
        When the law raises, or its answer does not broadcast to ``event.shape``. Overflow and division by zero are no
        fault of its own: they give NaN.
    """
    law = law_of(process, setting)

    def ask() -> ArrayLike:
        if isinstance(law, HelicityAmplitudes):
            return law.squared(event, parameters, parts, setting.beams.polarisation)
        assert isinstance(law, (SquaredAmplitude, Expression))
        return law.squared(event, parameters, parts)

    return _asked(process, ask, event.shape, "the law")


def angular(
    process: Process, setting: Setting, point: Point, cosine: Array, parameters: Parameters, parts: Parts | None
) -> Array:
    """dσ/dΩ in GeV⁻² sr⁻¹ of a batch; raises as `squared_amplitude` does."""
    law = law_of(process, setting)
    assert isinstance(law, AngularCrossSection)
    shape = np.broadcast_shapes(point.s.shape, cosine.shape)
    return _asked(process, lambda: law.density(point, cosine, parameters, parts), shape, "the law")


def total(process: Process, setting: Setting, point: Point, parameters: Parameters, parts: Parts | None) -> Array:
    """σ in GeV⁻², shape (point, 1); raises as `squared_amplitude` does."""
    law = law_of(process, setting)
    assert isinstance(law, TotalCrossSection)
    found = _asked(process, lambda: law.total(point, parameters, parts), point.s.shape, "the law")
    return np.broadcast_to(found, point.s.shape)


def cumulative(
    process: Process, setting: Setting, x: Array, point: Point, parameters: Parameters, parts: Parts | None
) -> Array:
    """The antiderivative of dσ/dx in GeV⁻² at x, shape (point, edge).

    Raises
    ------
    PluginError
        When the closed form raises, or its answer has another shape.
    """
    assert setting.closed_form is not None
    form = process.closed_forms[setting.closed_form]
    shape = np.broadcast_shapes(x.shape, point.s.shape)
    found = _asked(process, lambda: form.heights(x, point, parameters, parts), shape, "the closed form")
    return np.broadcast_to(found, shape)


def law_of(process: Process, setting: Setting) -> Law:
    """The law that answers a setting."""
    assert setting.law is not None
    return process.laws[setting.law]


def _asked(process: Process, ask: Callable[[], ArrayLike], shape: tuple[int, ...], what: str) -> Array:
    try:
        with np.errstate(all="ignore"):
            found = np.asarray(ask())
            if found.dtype.kind == "c":
                raise TypeError("it returned complex numbers, expected real ones: |M|² is abs(...)**2")
            found = found.astype(float, copy=False)
    except ArithmeticError:  # plain floats of extreme parameters: no number, as numpy would have it
        return np.full(shape, np.nan)
    except (Exception, SystemExit) as cause:
        raise _fault(process, f"{what} raised {type(cause).__name__}: {cause}") from cause
    return _shaped(process, found, shape, what)


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
