"""How many calls may be there at once."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager

from barnwright.errors import ServerError

RETRY_SECONDS = 0.5


class Admission:
    """Counts the calls that are there; calls about the server's health are not among them."""

    def __init__(self, limit: int) -> None:
        self._limit = limit
        self._there = 0

    @contextmanager
    def admit(self) -> Iterator[None]:
        """Let a call in for as long as the block lasts.

        Raises:
            ServerError: RESOURCE_EXHAUSTED, when too many are there already.
        """
        if self._there >= self._limit:
            message = f"{self._there} calls are there already, as many as the server takes; try again later"
            raise ServerError(message, "RESOURCE_EXHAUSTED", RETRY_SECONDS)
        self._there += 1
        try:
            yield
        finally:
            self._there -= 1
