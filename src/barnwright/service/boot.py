"""The start of the scheduler process: the fork server loads what workers need while the scheduler loads its own."""

from __future__ import annotations

import multiprocessing
import signal
import sys
from multiprocessing import forkserver
from multiprocessing.connection import Connection

PRELOADED = ["barnwright.service.tasks", "barnwright.service.worker"]


def main(descriptor: int) -> None:
    """Run the scheduler until the server, at the other end of this descriptor, says stop or is gone."""
    for number in (signal.SIGINT, signal.SIGTERM):
        signal.signal(number, signal.SIG_IGN)
    context = multiprocessing.get_context("forkserver")
    context.set_forkserver_preload(PRELOADED)
    forkserver.ensure_running()
    from barnwright.service.scheduler import Scheduler, ServerIsGoneError

    server = Connection(descriptor)
    try:
        Scheduler(server, server.recv(), context).run()
    except ServerIsGoneError:
        sys.exit(0)
