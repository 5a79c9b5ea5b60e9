"""Laws that give a cross section itself: dσ/dΩ of potentials and partial waves, σ(s) of lineshapes."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any, ClassVar

import numpy as np
from numpy.typing import ArrayLike, NDArray

from barnwright.event import Point
from barnwright.process.contributions import Parts, called

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class AngularCrossSection:
    """dσ/dΩ in GeV⁻² sr⁻¹ in the cm, averaged over initial and summed over final states.

    Attributes
    ----------
    cross_section : function ``(point, cos_theta, parameters)``, also with ``parts``
        cos_theta is that of leg 1 to beam a, shape (point or 1, node); the arrays of the point have the shape
        (point, 1). Identical particles are counted by the core.
    massless : particles or legs
        The law is skipped when one of these masses is not 0.
    """

    kind: ClassVar[str] = "angular_cross_section"
    compiled: ClassVar[bool] = False

    cross_section: Callable[..., ArrayLike]
    massless: tuple[str, ...] = ()

    def density(self, point: Point, cos_theta: Array, parameters: Any, parts: Parts | None = None) -> ArrayLike:
        """dσ/dΩ in GeV⁻² sr⁻¹; broadcasts to (point, node)."""
        found: ArrayLike = called(self.cross_section, parts, point, cos_theta, parameters)
        return found


@dataclass(frozen=True, slots=True)
class TotalCrossSection:
    """σ(s) in GeV⁻²: it has no angular distribution, so nothing can be asked about its final state.

    Attributes
    ----------
    cross_section : function ``(point, parameters)``, also with ``parts``
        The arrays of the point and of the answer have the shape (point, 1). Identical particles are counted in it.
    massless : particles or legs
        The law is skipped when one of these masses is not 0.
    """

    kind: ClassVar[str] = "total_cross_section"
    compiled: ClassVar[bool] = False

    cross_section: Callable[..., ArrayLike]
    massless: tuple[str, ...] = ()

    def total(self, point: Point, parameters: Any, parts: Parts | None = None) -> ArrayLike:
        """σ in GeV⁻²; broadcasts to (point, 1)."""
        found: ArrayLike = called(self.cross_section, parts, point, parameters)
        return found
