"""The life of a worker process."""

from __future__ import annotations

import os
import signal
import threading
import traceback
from multiprocessing import parent_process
from multiprocessing.connection import Connection, wait

from barnwright.errors import BarnwrightError
from barnwright.service.frames import Broken, Done, Refused, Work

NICENESS = 19


def work(connection: Connection) -> None:
    """Do one piece of work after another, until the scheduler closes the connection or is gone.

    The first message says that the worker is ready. Work runs at the lowest priority: the server, which answers
    within milliseconds, always comes first.
    """
    for number in (signal.SIGINT, signal.SIGTERM):
        signal.signal(number, signal.SIG_IGN)
    threading.Thread(target=_end_with_parent, daemon=True).start()
    os.nice(NICENESS)
    from barnwright.service.tasks import TASKS

    answer: Done | Refused | Broken = Done(None)
    while True:
        try:
            connection.send(answer)
            task: Work = connection.recv()
        except (EOFError, OSError):
            return
        try:
            answer = Done(TASKS[task.task](connection.send, *task.arguments))
        except BarnwrightError as error:
            answer = Refused(error)
        except BaseException:  # a plugin may raise anything, SystemExit too: the worker lives on
            answer = Broken(traceback.format_exc())


def _end_with_parent() -> None:
    """A worker that is deep in its work notices nothing else: end it when the scheduler is gone."""
    parent = parent_process()
    if parent is not None:
        wait([parent.sentinel])
        os._exit(1)
