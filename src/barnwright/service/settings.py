"""What a server is told when it starts."""

from __future__ import annotations

import os
from dataclasses import dataclass, field

from barnwright.errors import RequestError, Violation, show

MIB = 1 << 20


def processors() -> int:
    """How many processors this process may use."""
    return len(os.sched_getaffinity(0)) if hasattr(os, "sched_getaffinity") else os.cpu_count() or 1


@dataclass(frozen=True, slots=True)
class Limits:
    """Times in seconds, sizes in bytes.

    Attributes
    ----------
    block_seconds
        A block that takes longer costs its worker, and the request fails.
    light_seconds
        The same for resolving a request, load checks of its plugin included, and for descriptions.
    suspect_seconds
        Work that takes longer gets a substitute beside its worker, so that others don't wait for it.
    cancel_seconds
        How long the work of a cancelled call may go on before its worker is ended.
    deaths
        So many workers may be lost by one request before it fails.
    calls
        So many calls may be there at once; more are refused.
    grace_seconds
        How long calls may go on after the first SIGTERM.
    start_seconds
        How long scheduler and workers may take to start.
    """

    block_seconds: float = 60.0
    light_seconds: float = 10.0
    suspect_seconds: float = 1.0
    cancel_seconds: float = 0.05
    deaths: int = 2
    calls: int = 128
    grace_seconds: float = 30.0
    start_seconds: float = 60.0
    request_bytes: int = 4 * MIB
    answer_bytes: int = 256 * MIB


@dataclass(frozen=True, slots=True)
class Settings:
    """Where to listen, with how many workers for blocks and for light work, and within which limits.

    ``insecure`` allows an address that other machines can reach.
    """

    address: str
    insecure: bool = False
    workers: int = field(default_factory=processors)
    light_workers: int = 2
    limits: Limits = Limits()

    @classmethod
    def of(cls, address: str, *, insecure: bool, workers: int | None) -> Settings:
        """The settings of a command line. Raises ``RequestError`` for a number of workers below 1."""
        if workers is None:
            return cls(address, insecure)
        if workers < 1:
            raise RequestError([Violation("workers", show(workers), "a whole number of at least 1")])
        return cls(address, insecure, workers)
