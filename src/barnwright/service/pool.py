"""The workers: started, given work, watched, ended and replaced."""

from __future__ import annotations

import selectors
from collections.abc import Iterator
from multiprocessing.context import ForkServerContext

from barnwright.service.crew import Worker
from barnwright.service.settings import Settings
from barnwright.service.task import Code, Task


class Pool:
    """All workers, light ones and others; their connections are in the selector, with the worker as data."""

    def __init__(self, context: ForkServerContext, settings: Settings, selector: selectors.BaseSelector) -> None:
        self._context = context
        self._limits = settings.limits
        self._wanted = {True: settings.light_workers, False: settings.workers}
        self._selector = selector
        self._workers: list[Worker] = []
        self.fill()

    def __iter__(self) -> Iterator[Worker]:
        return iter(tuple(self._workers))

    @property
    def is_ready(self) -> bool:
        """Whether there is a worker for every kind of work."""
        return all(any(w.is_ready and w.light == light for w in self._workers) for light in self._wanted)

    def idle(self) -> list[Worker]:
        """Who can be given work, light ones first."""
        return sorted((w for w in self._workers if w.is_idle), key=lambda worker: not worker.light)

    def running(self) -> set[Code]:
        """What the workers are at."""
        return {worker.task.code for worker in self._workers if worker.task is not None}

    def has_spare_light(self, worker: Worker) -> bool:
        """Whether another light worker is there for light tasks, so that this one may take a block."""
        return any(w.light and w.is_idle and w is not worker for w in self._workers)

    def fill(self) -> None:
        """Start workers until there are enough; whoever is suspect does not count, up to twice as many in all."""
        for light, wanted in self._wanted.items():
            alike = sum(worker.light == light for worker in self._workers)
            for _ in range(min(wanted - self._sound(light), 2 * wanted - alike)):
                worker = Worker(self._context, light=light)
                self._workers.append(worker)
                self._selector.register(worker.connection, selectors.EVENT_READ, worker)

    def is_surplus(self, worker: Worker) -> bool:
        """Whether there are more like this one than wanted: substitutes that are not needed any more."""
        return self._sound(worker.light) > self._wanted[worker.light]

    def _sound(self, light: bool) -> int:
        """How many workers are not suspect."""
        seconds = self._limits.suspect_seconds
        return sum(worker.light == light and worker.busy_seconds < seconds for worker in self._workers)

    def end(self, worker: Worker) -> Task | None:
        """End a worker; gives the task that it had."""
        self._selector.unregister(worker.connection)
        self._workers.remove(worker)
        worker.end()
        return worker.task

    def limit(self, worker: Worker) -> float:
        """How many seconds the worker may be at its task."""
        task = worker.task
        if task is None:
            return float("inf")
        if not task.is_wanted:
            return self._limits.cancel_seconds
        return self._limits.block_seconds if task.is_calculating else self._limits.light_seconds

    def overdue(self) -> list[Worker]:
        """Who has been at a task for too long."""
        return [w for w in self._workers if self._worked(w) > self.limit(w)]

    def patience(self) -> float | None:
        """Seconds until the next worker becomes suspect or overdue; None when all are idle."""
        times = []
        for worker in self._workers:
            if worker.task is not None:
                spent, suspect = self._worked(worker), self._limits.suspect_seconds
                limit = self.limit(worker)
                times.append((min(limit, suspect) if spent < suspect else limit) - spent)
        return max(0.0, min(times)) + 0.001 if times else None

    def _worked(self, worker: Worker) -> float:
        return worker.worked_seconds(self._limits.suspect_seconds)
