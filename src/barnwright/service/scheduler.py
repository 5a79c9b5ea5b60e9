"""The scheduler process: who works on what.

One thread and one loop. It waits for the server and the workers, takes what they say, hands out the next pieces of work
from the running calls in turn, and looks after workers that take too long.
"""

from __future__ import annotations

import selectors
from collections import deque
from multiprocessing.connection import Connection
from multiprocessing.context import ForkServerContext
from typing import Any

from barnwright.service.calls import CALLS
from barnwright.service.crew import Worker
from barnwright.service.frames import (
    Broken,
    Call,
    Cancel,
    Done,
    Failed,
    Fault,
    More,
    Ready,
    Refused,
    Reply,
    Resolved,
    Stop,
)
from barnwright.service.job import Job
from barnwright.service.pool import Pool
from barnwright.service.settings import Settings
from barnwright.service.task import Code, Task

STILLBORN = 5
"""After so many workers that did not even start, none will."""


class ServerIsGoneError(Exception):
    """Nobody is at the other end any more."""


class Scheduler:
    """The running calls in turn, and the pool."""

    def __init__(self, server: Connection, settings: Settings, context: ForkServerContext) -> None:
        self._server = server
        self._limits = settings.limits
        self._selector = selectors.DefaultSelector()
        self._selector.register(server, selectors.EVENT_READ, None)
        self._jobs: dict[int, Job] = {}
        self._turn: deque[Job] = deque()
        self._pool = Pool(context, settings, self._selector)
        self._proven: set[Code] = set()
        self._said_ready = False
        self._stillborn = 0

    def run(self) -> None:
        """Loop until the server says stop. Raises ``ServerIsGoneError`` when it is gone."""
        try:
            while True:
                for key, _ in self._selector.select(self._pool.patience()):
                    if key.data is None:
                        frame = self._receive()
                        if isinstance(frame, Stop):
                            return
                        self._hear_server(frame)
                    else:
                        self._hear_worker(key.data)
                self._look_after()
                self._hand_out()
        finally:
            for worker in self._pool:
                self._pool.end(worker)

    def _hear_server(self, frame: Call | Cancel | More) -> None:
        if isinstance(frame, Call):
            self._begin(frame)
        elif (job := self._jobs.get(frame.number)) is None:
            return
        elif isinstance(frame, Cancel):
            job.cancel()
        else:
            job.credit()

    def _begin(self, call: Call) -> None:
        def reply(message: bytes, last: bool) -> None:
            self._send(Reply(call.number, message, last))

        job = Job(call.number, CALLS[call.method](call.message, reply), self._send)
        self._jobs[call.number] = job
        self._turn.append(job)
        job.advance()

    def _receive(self) -> Any:
        try:
            return self._server.recv()
        except (EOFError, OSError) as error:
            raise ServerIsGoneError from error

    def _send(self, frame: Ready | Reply | Failed | Fault) -> None:
        try:
            self._server.send(frame)
        except OSError as error:
            raise ServerIsGoneError from error

    def _hear_worker(self, worker: Worker) -> None:
        try:
            answer = worker.connection.recv()
        except (EOFError, OSError):
            self._lose(worker)
            return
        if isinstance(answer, Resolved):
            worker.resolved(answer)
            return
        task, worker.task, worker.is_ready = worker.task, None, True
        if task is not None and task.is_wanted:
            self._take(task, answer)
        if self._pool.is_surplus(worker):
            self._pool.end(worker)
        if not self._said_ready and self._pool.is_ready:
            self._said_ready = True
            self._send(Ready())

    def _take(self, task: Task, answer: Any) -> None:
        if isinstance(answer, Done):
            self._proven.add(task.code)
            task.job.accept(task, answer.result)
        elif isinstance(answer, Refused):
            task.job.refuse(answer.error)
        elif isinstance(answer, Broken):
            task.job.fault(answer.traceback)

    def _lose(self, worker: Worker) -> None:
        """Its end of the connection is closed: replace it, and let another one try its task."""
        task = self._pool.end(worker)
        if task is not None and task.is_wanted:
            task.job.lost(task, self._limits.deaths)
        self._stillborn = 0 if worker.is_ready else self._stillborn + 1
        if self._stillborn == STILLBORN:
            raise RuntimeError(f"{STILLBORN} workers in succession ended while they started")

    def _look_after(self) -> None:
        """End what takes too long, start substitutes, forget calls that have ended."""
        for worker in self._pool.overdue():
            limit = self._pool.limit(worker)
            task = self._pool.end(worker)
            if task is not None and task.is_wanted:
                task.job.hung(task, limit)
        self._pool.fill()
        if ended := [job for job in self._turn if job.step is None]:
            for job in ended:
                self._turn.remove(job)
                del self._jobs[job.number]

    def _hand_out(self) -> None:
        """Give every idle worker a task of the calls in turn."""
        for worker in self._pool.idle():
            task = self._next_task(worker)
            if task is not None:
                worker.give(task)

    def _next_task(self, worker: Worker) -> Task | None:
        for _ in range(len(self._turn)):
            job = self._turn[0]
            self._turn.rotate(-1)
            spare = not worker.light or job.is_light or self._pool.has_spare_light(worker)
            task = job.pull(light=worker.light) if spare and self._may_run(job.code) else None
            if task is not None:
                return task
        return None

    def _may_run(self, code: Code | None) -> bool:
        """Whether code may be given to a worker: what has not answered once holds one only, so that it may hang."""
        return code is None or not code[1] or code in self._proven or code not in self._pool.running()
