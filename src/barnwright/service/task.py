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


Code = tuple[str, str]
"""A kind of task, and the process whose code it runs."""


def code_of(step: Light | Blocks) -> Code:
    """The code that the tasks of a step run."""
    return (step.task, step.process) if isinstance(step, Light) else ("tally", step.stage.plan.name)


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
    def code(self) -> Code:
        """What it runs."""
        return code_of(self.step)

    @property
    def process(self) -> str:
        """The process whose code it runs; "" for what the core does by itself."""
        return self.code[1]

    @property
    def plugin(self) -> str:
        """The distribution that offers the process; before it is known, the plugin's name."""
        if isinstance(self.step, Blocks):
            return self.step.stage.plan.distribution
        return self.resolved.plugin if self.resolved else self.process.partition("/")[0]

    @property
    def is_calculating(self) -> bool:
        """Whether a law is at work, and not a plugin being loaded and checked, or a request being resolved."""
        return self.block is not None or self.resolved is not None


@dataclass(slots=True)
class LightQueue:
    """The one task of a light step."""

    waiting: list[Task]

    def pull(self, *, light: bool) -> Task | None:  # noqa: ARG002  (as the other queue's)
        """The task, for any worker."""
        return self.waiting.pop() if self.waiting else None

    def take(self, _task: Task, _result: Any) -> bool:
        """Its result ends the step."""
        return True


@dataclass(slots=True)
class RoundQueue:
    """The blocks of a round."""

    job: Job
    step: Blocks
    waiting: list[Task] = field(default_factory=list)
    blocks: Iterator[Block] = field(default_factory=lambda: iter(()))

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
        if light and len(self.step.round) > QUICK:
            return None
        return self.waiting.pop() if self.waiting else self._fresh()

    def take(self, task: Task, result: Any) -> bool:
        """Add a tally; True when the round is complete, or its time is up."""
        self.step.ledger.add(result)
        if task.block is not None:
            self.step.pace.done(task.block)
        missing = len(self.step.ledger.missing(self.step.round))
        if missing and self.step.pace.over:
            self.step.ledger.stop("time_limit")
            return True
        return not missing

    def _fresh(self) -> Task | None:
        block = next(self.blocks, None)
        return None if block is None else Task(self.job, self.step, block)
