"""What server and scheduler say to each other, and scheduler and worker; pickled, between our own processes only."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from barnwright.errors import BarnwrightError

# ---- server to scheduler ---------------------------------------------------------------------------------------------


@dataclass(frozen=True, slots=True)
class Call:
    """A call of the service: the name of its method, and its message in bytes."""

    number: int
    method: str
    message: bytes


@dataclass(frozen=True, slots=True)
class Cancel:
    """Nobody waits for this call any more."""

    number: int


@dataclass(frozen=True, slots=True)
class More:
    """The caller has taken one message of this call's stream."""

    number: int


@dataclass(frozen=True, slots=True)
class Stop:
    """End all workers, and yourself."""


# ---- scheduler to server ---------------------------------------------------------------------------------------------


@dataclass(frozen=True, slots=True)
class Ready:
    """Workers are there for every kind of work."""


@dataclass(frozen=True, slots=True)
class Reply:
    """A message of the answer to a call, in bytes; the last one ends it."""

    number: int
    message: bytes
    last: bool = True


@dataclass(frozen=True, slots=True)
class Failed:
    """A call ended with an error that its caller may see."""

    number: int
    error: BarnwrightError


@dataclass(frozen=True, slots=True)
class Fault:
    """A call ended with an error that nobody foresaw: its traceback, for the log only."""

    number: int
    traceback: str


# ---- scheduler to worker and back ------------------------------------------------------------------------------------


@dataclass(frozen=True, slots=True)
class Work:
    """A task of the table in `tasks`, and its arguments."""

    task: str
    arguments: tuple[Any, ...]


@dataclass(frozen=True, slots=True)
class Resolved:
    """On the way: the request was resolved, and now the functions of this process calculate."""

    process: str
    plugin: str


@dataclass(frozen=True, slots=True)
class Done:
    """What the task returned."""

    result: Any


@dataclass(frozen=True, slots=True)
class Refused:
    """The task raised an error that the caller may see."""

    error: BarnwrightError


@dataclass(frozen=True, slots=True)
class Broken:
    """The task raised an error that nobody foresaw: its traceback."""

    traceback: str
