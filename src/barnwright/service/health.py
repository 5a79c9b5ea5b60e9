"""grpc.health.v1: SERVING only while workers are ready.

Not the servicer that comes with the package: its watches hold up a server that ends for all of its grace, and one that
is not read holds a lock which every change of the status needs.
"""

from __future__ import annotations

import asyncio
from collections.abc import AsyncIterator
from typing import Any

import grpc
from grpc_health.v1 import health_pb2, health_pb2_grpc

from barnwright.service.handlers import SERVICE

NAMES = ("", SERVICE)
_KNOWN = health_pb2.HealthCheckResponse


class Health(health_pb2_grpc.HealthServicer):  # type: ignore[misc,unused-ignore]
    """One status for the server and the service; watches end when the server does."""

    def __init__(self) -> None:
        self._status: int = _KNOWN.NOT_SERVING
        self._is_over = False
        self._changed = asyncio.Event()

    def say(self, *, serving: bool) -> None:
        """Set the status; nothing after `end`."""
        if not self._is_over:
            self._status = _KNOWN.SERVING if serving else _KNOWN.NOT_SERVING
            self._wake()

    def end(self) -> None:
        """Not serving any more, for good; watches are told, then ended."""
        self.say(serving=False)
        self._is_over = True
        self._wake()

    async def Check(self, request: Any, context: Any) -> Any:  # noqa: N802  (the name of the standard)
        """The status now."""
        if request.service not in NAMES:
            await context.abort(grpc.StatusCode.NOT_FOUND, f"expected one of {', '.join(map(repr, NAMES))}")
        return _KNOWN(status=self._status)

    async def Watch(self, request: Any, _context: Any) -> AsyncIterator[Any]:  # noqa: N802
        """The status now, and after every change; for services that are not here the standard has a status too."""
        told = None
        while True:
            changed, is_over = self._changed, self._is_over
            status = self._status if request.service in NAMES else _KNOWN.SERVICE_UNKNOWN
            if status != told:
                told = status
                yield _KNOWN(status=status)
            if is_over:
                return
            await changed.wait()

    def _wake(self) -> None:
        self._changed.set()
        self._changed = asyncio.Event()
