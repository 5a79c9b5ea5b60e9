"""One server for all tests that leave it as it was."""

from __future__ import annotations

from collections.abc import Iterator

import pytest
from service.running import Running, serving

from barnwright.client import Client


@pytest.fixture(scope="session")
def server() -> Iterator[Running]:
    """A server with the bundled plugins, a healthy one and some that misbehave."""
    with serving("healthy", "raises_on_import", "wrong_shape", "not_a_number") as running:
        yield running


@pytest.fixture(scope="session")
def bundled() -> Iterator[Running]:
    """A server with the plugins that this process has too."""
    with serving() as running:
        yield running


@pytest.fixture(scope="session")
def client(server: Running) -> Iterator[Client]:
    """A client of that server."""
    with server.client() as connected:
        yield connected
