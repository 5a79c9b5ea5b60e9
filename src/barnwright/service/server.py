"""The server process: from its start to the end of the last call."""

from __future__ import annotations

import asyncio
import logging
import signal
import sys
from collections.abc import Callable

import grpc
from grpc_health.v1 import health_pb2_grpc
from grpc_reflection.v1alpha import reflection

from barnwright.errors import ServerError
from barnwright.service.address import Address, read_address
from barnwright.service.admission import Admission
from barnwright.service.handlers import SERVICE, handlers
from barnwright.service.health import Health
from barnwright.service.interceptor import Gate
from barnwright.service.link import Link
from barnwright.service.settings import Settings

_LOG = logging.getLogger(__name__)


def run(settings: Settings) -> int:
    """Serve until a signal; gives the exit code. Raises ``RequestError`` and ``ServerError`` as ``serve`` does."""
    logging.basicConfig(stream=sys.stderr, format="%(asctime)s %(levelname)s %(message)s")
    address = read_address(settings.address, insecure=settings.insecure)
    asyncio.run(Server(settings, address).serve())
    return 0


class Server:
    """gRPC in front, the link to the scheduler behind."""

    def __init__(self, settings: Settings, address: Address) -> None:
        self._settings = settings
        self._address = address
        self._is_ready = asyncio.Event()
        self._is_lost = asyncio.Event()
        self._signals: asyncio.Queue[int] = asyncio.Queue()

    async def serve(self) -> None:
        """Listen, say so when workers are ready, and drain at the first signal."""
        loop = asyncio.get_running_loop()
        for number in (signal.SIGTERM, signal.SIGINT):
            loop.add_signal_handler(number, self._signals.put_nowait, number)
        health = Health()
        link = Link(self._settings, self._ready(health), self._lost(health))
        server = self._make(link, health)
        port = self._listen(server)
        try:
            await self._run(server, link, health, Address(self._address.host, port))
        finally:
            health.end()
            await server.stop(0)
            await link.close()

    async def _run(self, server: grpc.aio.Server, link: Link, health: Health, at: Address) -> None:
        ended = asyncio.create_task(self._signals.get())
        started = asyncio.create_task(self._start(link))
        await asyncio.wait({ended, started}, return_when=asyncio.FIRST_COMPLETED)
        if not started.done():
            started.cancel()
            return
        await started
        await server.start()
        print(f"barnwright is listening on {at}", flush=True)  # noqa: T201
        keeper = asyncio.create_task(self._keep(link))
        await asyncio.wait({ended, keeper}, return_when=asyncio.FIRST_COMPLETED)
        keeper.cancel()
        if not ended.done():
            await keeper
        health.end()
        await self._drain(server)

    async def _drain(self, server: grpc.aio.Server) -> None:
        """Let calls end within the grace; a second signal ends them at once."""
        stopping = asyncio.create_task(server.stop(self._settings.limits.grace_seconds))
        again = asyncio.create_task(self._signals.get())
        await asyncio.wait({stopping, again}, return_when=asyncio.FIRST_COMPLETED)
        again.cancel()
        await server.stop(0)

    async def _start(self, link: Link) -> None:
        """Start the scheduler, and wait for its workers."""
        self._is_ready.clear()
        self._is_lost.clear()
        await link.start()
        waits = {asyncio.create_task(event.wait()) for event in (self._is_ready, self._is_lost)}
        await asyncio.wait(waits, timeout=self._settings.limits.start_seconds, return_when=asyncio.FIRST_COMPLETED)
        for wait in waits:
            wait.cancel()
        if not self._is_ready.is_set() or self._is_lost.is_set():
            raise ServerError("the workers did not start; what they said stands above", "UNAVAILABLE")

    async def _keep(self, link: Link) -> None:
        """Whenever the scheduler is lost, start another one. Raises ``ServerError`` when that fails."""
        while True:
            await self._is_lost.wait()
            _LOG.error("the scheduler was lost; starting another one")
            await self._start(link)

    def _make(self, link: Link, health: Health) -> grpc.aio.Server:
        limits = self._settings.limits
        options = (
            ("grpc.so_reuseport", 0),
            ("grpc.max_receive_message_length", limits.request_bytes),
            ("grpc.max_send_message_length", limits.answer_bytes),
        )
        server = grpc.aio.server(interceptors=[Gate(Admission(limits.calls))], options=options)
        server.add_generic_rpc_handlers((handlers(link),))
        health_pb2_grpc.add_HealthServicer_to_server(health, server)
        if self._address.is_loopback:
            names = (SERVICE, "grpc.health.v1.Health", reflection.SERVICE_NAME)
            reflection.enable_server_reflection(names, server)
        return server

    def _listen(self, server: grpc.aio.Server) -> int:
        """Take the port. Raises ``ServerError`` when somebody else has it."""
        try:
            port = server.add_insecure_port(str(self._address))
        except RuntimeError:
            port = 0
        if port == 0:
            message = f"cannot listen on {self._address}: it is taken, or this machine has no such address"
            raise ServerError(message, "UNAVAILABLE")
        return int(port)

    def _ready(self, health: Health) -> Callable[[], None]:
        def ready() -> None:
            self._is_ready.set()
            health.say(serving=True)

        return ready

    def _lost(self, health: Health) -> Callable[[], None]:
        def lost() -> None:
            self._is_lost.set()
            health.say(serving=False)

        return lost
