"""What a calculation needs to know about a plan; whatever has these names can be calculated."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

from barnwright.integrate.block import Round
from barnwright.integrate.estimate import Rule
from barnwright.integrate.ledger import Frozen
from barnwright.integrate.settled import Settled


@dataclass(frozen=True, slots=True)
class Target:
    """When a ladder of rounds may stop; the names are those of the request's accuracy.

    Attributes
    ----------
    relative : float or None
        Share of the total, component 0.
    absolute : float or None
        In the unit of the sums; reaching this one or the relative one suffices.
    per_bin : float or None
        Share of every one of ``bins`` that is above ``bin_floor`` of the total; must hold as well.
    bins : tuple of int
        Components.
    max_evaluations : int
        Training included.
    rounds : int or None
        Exactly so many rounds, whatever their errors.
    """

    relative: float | None = 1e-3
    absolute: float | None = None
    per_bin: float | None = None
    bin_floor: float = 1e-6
    bins: tuple[int, ...] = ()
    max_evaluations: int = 20_000_000
    rounds: int | None = None


class Ladder(Protocol):
    """Rounds that each double the points of the one before, with replicates for the errors."""

    @property
    def target(self) -> Target:
        """When it may stop."""

    @property
    def chunk(self) -> int:
        """Points in a chunk."""

    def evaluations(self, rounds: int) -> int:
        """How many points so many rounds take together, training included; never depends on the target."""


class Training(Protocol):
    """Iterations that adapt maps before anything is measured."""

    @property
    def iterations(self) -> int:
        """How many; fixed work, never a clock."""

    def round(self, frozen: Frozen, iteration: int) -> Round:
        """The blocks of an iteration, on the maps of the one before; ``frozen`` is empty for the first."""

    def adapted(self, frozen: Frozen, settled: Settled) -> Frozen:
        """The maps after an iteration."""


class PlanProtocol(Protocol):
    """A plan as a calculation sees it."""

    @property
    def digest(self) -> str:
        """Names everything that shapes the numbers, and nothing that only says when to stop."""

    @property
    def name(self) -> str:
        """What messages call it, as ``qed/compton``."""

    @property
    def rule(self) -> Rule:
        """How its sums become values and errors."""

    @property
    def training(self) -> Training | None:
        """None where there is nothing to train."""

    @property
    def ladder(self) -> Ladder | None:
        """None where one round answers."""

    def round(self, frozen: Frozen, number: int) -> Round:
        """The blocks that a round of measuring adds to those before it."""
