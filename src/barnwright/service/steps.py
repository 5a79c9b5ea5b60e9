"""What a call waits for. A call is a generator: it yields one of these and is resumed when it came."""

from __future__ import annotations

from collections.abc import Generator
from dataclasses import dataclass
from typing import Any

from barnwright.engine import Stage
from barnwright.integrate.block import Round
from barnwright.integrate.ledger import Ledger
from barnwright.run.drive import Pace


@dataclass(frozen=True, slots=True)
class Light:
    """A short task for a light worker; resumed with its result. ``process`` is whose code it runs, "" for none."""

    task: str
    arguments: tuple[Any, ...]
    process: str = ""


@dataclass(frozen=True, slots=True)
class Blocks:
    """A round whose tallies go into the ledger; resumed when none is missing, or when the ledger was stopped."""

    round: Round
    stage: Stage
    ledger: Ledger
    pace: Pace


@dataclass(frozen=True, slots=True)
class Credit:
    """Leave to send one more message of a stream; resumed when the caller has taken enough of the earlier ones."""


Step = Light | Blocks | Credit
Steps = Generator[Step, Any, None]
