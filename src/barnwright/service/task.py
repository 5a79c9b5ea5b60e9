"""Pieces of work on their way to a worker, and the two queues that they come from."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field
from typing import TYPE_CHECKING, Any

from barnwright.integrate.block import Block
from barnwright.service.frames import Resolved
from barnwright.service.steps import Blocks, Light

if TYPE_CHECKING:
    from barnwright.service.job import Job

QUICK = 4
"""A round of at most so many blocks may use the light workers, where its process has just been resolved."""


@dataclass(slots=True, eq=False)
class Task:
    """A light task, or one block of a round, of a job; ``resolved`` once a light one has come so far."""

    job: Job
    step: Light | Blocks
    block: Block | None = None
    resolved: Resolved | None = None

    @property
    def is_wanted(self) -> bool:
        """Whether its job still waits for it."""
        return self.job.step is self.step

    @property
    def process(self) -> str:
        """The process whose code it runs."""
        return self.step.process if isinstance(self.step, Light) else self.step.stage.plan.source.name

    @property
    def plugin(self) -> str:
        """The distribution that offers the process; before it is known, the plugin's name."""
        if isinstance(self.step, Blocks):
            return self.step.stage.plan.source.distribution
        return self.resolved.plugin if self.resolved else self.process.partition("/")[0]

    @property
    def is_calculating(self) -> bool:
        """Whether a law is at work, and not a plugin being loaded and checked, or a request being resolved."""
        return self.block is not None or self.resolved is not None


@dataclass(slots=True)
class LightQueue:
    """The one task of a light step."""

    waiting: list[Task]

    def pull(self, *, light: bool) -> Task | None:
        """The task, for light workers only."""
        return self.waiting.pop() if light and self.waiting else None

    def take(self, _task: Task, _result: Any) -> bool:
        """Its result ends the step."""
        return True


@dataclass(slots=True)
class RoundQueue:
    """The blocks of a round.

    Before one of them has been worked out, only one is given away, so that a law that hangs holds one worker.
    """

    job: Job
    step: Blocks
    waiting: list[Task] = field(default_factory=list)
    blocks: Iterator[Block] = field(default_factory=lambda: iter(()))
    given: int = 0
    proven: bool = False

    def begin(self) -> bool:
        """Look up what is missing; False when there is nothing to wait for, or no time left for it."""
        ledger = self.step.ledger
        missing = ledger.missing(self.step.round)
        if len(missing) and not self.step.pace.fits(missing):
            ledger.stop("time_limit")
            return False
        self.blocks = iter(missing)
        return len(missing) > 0

    def pull(self, *, light: bool) -> Task | None:
        """The next block; long rounds have none for light workers."""
        if (light and len(self.step.round) > QUICK) or (self.given and not self.proven):
            return None
        task = self.waiting.pop() if self.waiting else self._fresh()
        self.given += task is not None
        return task

    def take(self, task: Task, result: Any) -> bool:
        """Add a tally; True when the round is complete, or its time is up."""
        self.given -= 1
        self.proven = True
        self.step.ledger.add(result)
        if task.block is not None:
            self.step.pace.done(task.block)
        missing = len(self.step.ledger.missing(self.step.round))
        if missing and self.step.pace.over:
            self.step.ledger.stop("time_limit")
            return True
        return not missing

    def give_back(self, task: Task) -> None:
        """Its worker was lost: somebody else gets it."""
        self.given -= 1
        self.waiting.append(task)

    def _fresh(self) -> Task | None:
        block = next(self.blocks, None)
        return None if block is None else Task(self.job, self.step, block)
