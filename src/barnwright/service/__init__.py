"""The server: a process that speaks gRPC, one that schedules, and workers that calculate.

Rules of this room:

- The server process owns nothing heavy. It passes the bytes of a request to the scheduler and the bytes of the answer
  back; it never runs a plugin's code, and a cancel or a deadline is a message.
- The scheduler owns the ``calculate`` generators, the ledgers, assembly and translation. It hands out one piece of work
  at a time to each worker, takes the next from the running calls in turn, and ends a worker whose work takes too long.
- Workers run plugins' code. Nobody depends on one of them: what dies is replaced, its work given to another.
- Each ends when the one that started it is gone, however that ended.
"""

from __future__ import annotations

import os
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from barnwright.service.settings import Limits, Settings

__all__ = ["Limits", "Settings", "serve"]


def serve(address: str, *, insecure: bool = False, workers: int | None = None) -> int:
    """Serve at "host:port" until SIGTERM or SIGINT; port 0 takes a free one. Gives the exit code.

    ``insecure`` allows an address that other machines can reach; ``workers`` is the number of processes that
    calculate, one for each processor unless given. Says on standard output when it is ready.

    Raises:
        RequestError: when the address is none, or one that other machines can reach and ``insecure`` is not set.
        ServerError: when the address is taken, or the workers do not start.
    """
    os.environ.setdefault("GRPC_VERBOSITY", "NONE")  # an address in use is said in our own words, once
    from barnwright.service.server import run
    from barnwright.service.settings import Settings

    return run(Settings.of(address, insecure=insecure, workers=workers))
