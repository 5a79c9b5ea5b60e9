"""One running call, as the scheduler sees it: what it wants done next, and what came of it."""

from __future__ import annotations

import traceback
from collections.abc import Callable
from typing import Any

from barnwright.errors import BarnwrightError, PluginError, ServerError
from barnwright.service.frames import Failed, Fault, Reply
from barnwright.service.steps import Blocks, Credit, Light, Step, Steps
from barnwright.service.task import Code, LightQueue, RoundQueue, Task, code_of

WINDOW = 2
"""Messages of a stream that may be under way before the caller has taken the first of them."""

Send = Callable[[Reply | Failed | Fault], None]


class Job:
    """A call and how far it has come.

    Attributes
    ----------
    step
        What it waits for; None once it has ended.
    """

    def __init__(self, number: int, steps: Steps, send: Send) -> None:
        self.number = number
        self.step: Step | None = None
        self._steps = steps
        self._send = send
        self._queue: LightQueue | RoundQueue | None = None
        self._deaths = 0
        self._credits = WINDOW

    def advance(self, value: Any = None) -> None:
        """Resume the call with what it waited for, up to its next step that takes time, or its end."""
        self._resume(lambda: self._steps.send(value))

    def refuse(self, error: BarnwrightError) -> None:
        """What it waited for ended with an error that the caller may see; the call may know better."""
        self._resume(lambda: self._steps.throw(error))

    def _resume(self, further: Callable[[], Step]) -> None:
        try:
            self.step = further()
            while not self._begin(self.step):
                self.step = self._steps.send(None)
        except StopIteration:
            self.step = self._queue = None
        except BarnwrightError as error:
            self._end(Failed(self.number, error))
        except Exception:  # told to the server's log, with all that is known
            self._end(Fault(self.number, traceback.format_exc()))

    @property
    def is_light(self) -> bool:
        """Whether it waits for a light task."""
        return isinstance(self.step, Light)

    @property
    def code(self) -> Code | None:
        """What its next task runs; None when it waits for no task."""
        return None if self.step is None or isinstance(self.step, Credit) else code_of(self.step)

    def pull(self, *, light: bool) -> Task | None:
        """The next task for a light or another worker, or None."""
        return None if self._queue is None else self._queue.pull(light=light)

    def accept(self, task: Task, result: Any) -> None:
        """Take the result of a task that is wanted."""
        try:
            is_complete = self._queue is not None and self._queue.take(task, result)
        except BarnwrightError as error:
            self.refuse(error)
            return
        if is_complete:
            self.advance(result if isinstance(task.step, Light) else None)

    def fault(self, trace: str) -> None:
        """A task ended with an error that nobody foresaw."""
        self._end(Fault(self.number, trace))

    def hung(self, task: Task, seconds: float) -> None:
        """A task was ended because it took too long."""
        block = task.block.name if task.block else "all points"
        what = f"working out {block}" if task.is_calculating else "loading and checking"
        why = "one of its functions hangs, or the request is too large"
        cause = f"{what} took longer than {seconds:g} s, so the worker was ended: {why}"
        self.refuse(PluginError(task.plugin, task.process, cause))

    def lost(self, task: Task, limit: int) -> None:
        """The worker of a task was lost; another one tries, unless that happened too often."""
        self._deaths += 1
        if self._deaths >= limit or self._queue is None:
            message = f"{self._deaths} workers were lost while they worked on this request; it may be what ends them"
            self.refuse(ServerError(message, "UNAVAILABLE"))
        else:
            self._queue.waiting.append(task)

    def credit(self) -> None:
        """The caller has taken a message of the stream."""
        self._credits += 1
        if self.step is not None and self._queue is None:
            self._credits -= 1
            self.advance()

    def cancel(self) -> None:
        """Nobody waits for the call any more."""
        self._steps.close()
        self.step = self._queue = None

    def _end(self, frame: Failed | Fault) -> None:
        self.cancel()
        self._send(frame)

    def _begin(self, step: Step) -> bool:
        """Set up a step; False when there is nothing to wait for."""
        self._queue = None
        if isinstance(step, Light):
            self._queue = LightQueue([Task(self, step)])
            return True
        if isinstance(step, Blocks):
            self._queue = RoundQueue(self, step)
            return self._queue.begin()
        if self._credits:
            self._credits -= 1
            return False
        return True
