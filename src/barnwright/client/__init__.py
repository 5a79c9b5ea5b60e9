"""The client of a server, with the face of the Python functions: predict, scan, processes, describe, validate.

It imports no part of the server, and needs no plugin: requests are checked for syntax here, for all else there.
"""

from __future__ import annotations

from barnwright.client.answers import Cost, Validation
from barnwright.client.asynchronous import AsyncClient
from barnwright.client.sweep import RemoteSweep
from barnwright.client.synchronous import Client

__all__ = ["AsyncClient", "Client", "Cost", "RemoteSweep", "Validation", "connect", "connect_async"]


def connect(address: str, *, patience: float = 5.0, timeout: float | None = None) -> Client:
    """A client of the server at "host:port"; nothing is sent before the first question.

    ``patience`` is how many seconds the first question waits for a server that is not there yet; ``timeout`` how many
    seconds a call may take, None for as long as it needs.

    Raises:
        RequestError: when the address is none.
    """
    return Client(address, patience=patience, timeout=timeout)


def connect_async(address: str, *, patience: float = 5.0, timeout: float | None = None) -> AsyncClient:
    """The same for asyncio; also ``await connect_async(...)``, which waits for the server."""
    return AsyncClient(address, patience=patience, timeout=timeout)
