"""Where a command's question goes: to this process, or to a server that answers in the same way."""

from __future__ import annotations

import sys
from collections.abc import Iterator, Mapping, Sequence
from contextlib import contextmanager
from typing import TYPE_CHECKING, Any, Protocol, TypeVar

if TYPE_CHECKING:
    from barnwright.documents import Prediction
    from barnwright.documents.description import ProcessDescription, ProcessSummary

T = TypeVar("T")


class Answers(Protocol):
    """The face that the Python functions and the client share."""

    def predict(self, request: Mapping[str, Any], /) -> Prediction:
        """One prediction."""

    def scan(self, request: Mapping[str, Any], /, *, over: Mapping[str, Sequence[Any]]) -> Any:
        """A sweep: one prediction for every point."""

    def processes(
        self, *, particle: Sequence[str] | None = None, plugin: str | None = None, kind: str | None = None
    ) -> list[ProcessSummary]:
        """Every process, or those of a choice."""

    def describe(self, name: str) -> ProcessDescription:
        """One process in full."""


@contextmanager
def face(server: str | None) -> Iterator[Answers]:
    """The functions of this process, or a client of the server at "host:port", closed at the end."""
    from barnwright import api

    if server is None:
        yield api
        return
    with api.connect(server) as client:
        yield client


@contextmanager
def waiting(text: str) -> Iterator[None]:
    """Show a person that work is going on; nothing where nobody watches standard error."""
    if not sys.stderr.isatty():
        yield
        return
    from rich.console import Console

    with Console(stderr=True).status(text):
        yield


def watched(items: Sequence[T], text: str) -> Iterator[T]:
    """The same items one by one, with a progress bar on standard error while a person watches it."""
    if not sys.stderr.isatty():
        yield from items
        return
    from rich.console import Console
    from rich.progress import track

    yield from track(items, text, console=Console(stderr=True), transient=True)
