"""A setting: everything a point of a prediction needs besides its beam energies, resolved and checked; pure data."""

from __future__ import annotations

from dataclasses import dataclass
from math import prod
from typing import Literal

from barnwright.beams import BeamSettings
from barnwright.observables import Cut, Observable, angle_in_degrees
from barnwright.process import Parts

Masses = tuple[float, ...]
"""GeV, of beam a, beam b and the outgoing legs; of the beams alone where the final state is X."""
WHOLE: tuple[tuple[str, Parts | None], ...] = (("", None),)
ParameterValue = float | int | bool | str


@dataclass(frozen=True, slots=True)
class HistogramPlan:
    """A histogram: one or two observables, their edges, and whether it is asked per value, bin or solid angle."""

    name: str
    observables: tuple[Observable, ...]
    edges: tuple[tuple[float, ...], ...]
    per: Literal["value", "bin", "solid_angle"]

    @property
    def shape(self) -> tuple[int, ...]:
        """Bins on each axis."""
        return tuple(len(e) - 1 for e in self.edges)

    @property
    def components(self) -> int:
        """Bins of all axes, and the underflow and the overflow."""
        return prod(self.shape) + 2


def polar_kind(observable: Observable) -> Literal["cosine", "rad", "deg"] | None:
    """How an observable is the polar angle of one particle in some frame; None where it is not."""
    tree = angle_in_degrees(observable.tree) or observable.tree
    function = getattr(tree, "function", None)
    if function == "cos_theta":
        return "cosine"
    if function != "theta":
        return None
    return "deg" if observable.unit == "deg" else "rad"


@dataclass(frozen=True, slots=True)
class AsymmetryPlan:
    """An asymmetry between what lies above and what lies below a value of an observable: two components."""

    name: str
    observable: Observable
    at: float


@dataclass(frozen=True, slots=True)
class BinnedAsymmetry:
    """An asymmetry in every bin of a histogram: two components a bin, below and above."""

    asymmetry: AsymmetryPlan
    histogram: HistogramPlan

    @property
    def components(self) -> int:
        """Two for each bin; what lies outside of the bins has none."""
        return 2 * prod(self.histogram.shape)


@dataclass(frozen=True, slots=True)
class Layout:
    """Which component is what.

    The total; each histogram's bins, underflow and overflow; (below, above) of each asymmetry; and of each binned one
    (below, above) bin after bin.
    """

    histograms: tuple[HistogramPlan, ...]
    asymmetries: tuple[AsymmetryPlan, ...]
    binned: tuple[BinnedAsymmetry, ...] = ()

    @property
    def components(self) -> int:
        """How many components there are."""
        return self.binned_start(len(self.binned))

    def histogram_slice(self, index: int) -> slice:
        """The components of one histogram: bins, then underflow and overflow."""
        start = 1 + sum(h.components for h in self.histograms[:index])
        return slice(start, start + self.histograms[index].components)

    def asymmetry_start(self, index: int) -> int:
        """The component "below" of an asymmetry; "above" is the next."""
        return 1 + sum(h.components for h in self.histograms) + 2 * index

    def binned_start(self, index: int) -> int:
        """The component "below" in the first bin of a binned asymmetry."""
        return self.asymmetry_start(len(self.asymmetries)) + sum(one.components for one in self.binned[:index])


@dataclass(frozen=True, slots=True)
class Setting:
    """The request as it stands, or one of its variations.

    Attributes
    ----------
    name : str
        "" for the request as it stands, else the variation's name.
    beams : BeamSettings
        With one entry a point.
    masses : floats, GeV
        Of beam a, beam b, leg 1, leg 2.
    parameters : pairs of name and value
    cuts : tuple of Cut
    rule : "closed_form" or "quadrature"
    closed_form, law : int or None
        Which of the process's closed forms and laws answer.
    peaks : pairs of "t" or "u" and a mass in GeV
    parts : pairs of a name and the parts of the law
        One entry each on the variation axis: all that were asked for, "", then every contribution that is reported.
    """

    name: str
    beams: BeamSettings
    masses: Masses
    parameters: tuple[tuple[str, ParameterValue], ...]
    cuts: tuple[Cut, ...]
    rule: Literal["closed_form", "quadrature"]
    closed_form: int | None
    law: int | None
    peaks: tuple[tuple[str, float], ...] = ()
    parts: tuple[tuple[str, Parts | None], ...] = WHOLE
