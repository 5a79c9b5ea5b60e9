"""One worker process, as the scheduler sees it: started, given work, ended."""

from __future__ import annotations

import os
import signal
from contextlib import suppress
from multiprocessing.connection import Connection
from multiprocessing.context import ForkServerContext
from multiprocessing.process import BaseProcess
from pathlib import Path
from time import monotonic, sleep

from barnwright.engine import Stage
from barnwright.service.frames import Resolved, Work
from barnwright.service.shelf import Shelf
from barnwright.service.steps import Light
from barnwright.service.task import Task
from barnwright.service.worker import work


class Worker:
    """One worker process and what it is doing."""

    def __init__(self, context: ForkServerContext, *, light: bool) -> None:
        self.light = light
        self.is_ready = False
        self.task: Task | None = None
        self.since = monotonic()
        self._stood: float | None = None
        self._stages: Shelf[Stage] = Shelf()
        self.connection, theirs = context.Pipe()
        self._process = _started(context, theirs)
        theirs.close()

    @property
    def is_idle(self) -> bool:
        """Whether it can be given work."""
        return self.is_ready and self.task is None

    @property
    def busy_seconds(self) -> float:
        """How long it has been at its task."""
        return monotonic() - self.since if self.task is not None else 0.0

    def worked_seconds(self, suspect_seconds: float) -> float:
        """The same, without the time for which it stood in line for a processor once it had become suspect.

        Workers have the lowest priority: where a machine is busy with something else, time alone would end sound ones.
        """
        busy = self.busy_seconds
        if busy < suspect_seconds:
            return busy
        if self._stood is None:
            self._stood = seconds_in_line(self._process.pid)
        return busy - (seconds_in_line(self._process.pid) - self._stood)

    def give(self, task: Task) -> None:
        """Hand over a task; a stage goes along only if the worker does not have it yet."""
        self.task, self.since, self._stood = task, monotonic(), None
        step = task.step
        if isinstance(step, Light):
            message = Work(step.task, step.arguments)
        else:
            name = step.stage.digest
            sent = None if name in self._stages else step.stage
            self._stages.take(name, step.stage)
            message = Work("tally", (task.block, name, sent))
        with suppress(OSError):  # a worker that is gone shows at once as the end of its connection
            self.connection.send(message)

    def resolved(self, message: Resolved) -> None:
        """Its task has come so far that a law is at work: from now on it may take longer."""
        if self.task is not None:
            self.task.resolved, self.since, self._stood = message, monotonic(), None

    def end(self) -> None:
        """End it now, whatever it does."""
        self.connection.close()
        with suppress(ProcessLookupError):
            if self._process.pid is not None:
                os.kill(self._process.pid, signal.SIGKILL)
        self._process.join()


def _started(context: ForkServerContext, connection: Connection) -> BaseProcess:
    """A new worker process at the end of a connection.

    The fork server is started anew where it is gone; while it is just going, that shows as a broken line.
    """
    attempts = 5
    while True:
        process = context.Process(target=work, args=(connection,), daemon=True)
        try:
            process.start()
        except (EOFError, OSError):
            attempts -= 1
            if not attempts:
                raise
            sleep(0.05)
        else:
            return process


def seconds_in_line(pid: int | None) -> float:
    """How long a process has been ready to run without a processor; 0 where the system does not tell."""
    try:
        return int(Path(f"/proc/{pid}/schedstat").read_text().split()[1]) / 1e9
    except (OSError, IndexError, ValueError):
        return 0.0
