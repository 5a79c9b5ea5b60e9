"""The client for asyncio."""

from __future__ import annotations

import asyncio
from collections.abc import Generator, Mapping, Sequence
from types import TracebackType
from typing import Any, Self

import grpc

from barnwright.client import answers
from barnwright.client.channel import METADATA, OPTIONS, absent, checked_address
from barnwright.client.failures import error_of
from barnwright.client.sweep import RemoteSweep
from barnwright.documents import (
    Prediction,
    ProcessDescription,
    ProcessSummary,
    Request,
    completed,
    plain_axes,
    remainder_of,
)
from barnwright.errors import BarnwrightError, RequestError, ServerError, Violation
from barnwright.wire.v1 import service_pb2 as wire
from barnwright.wire.v1.service_pb2_grpc import CrossSectionServiceStub


class AsyncClient:
    """As ``Client``, with coroutines; use it in an ``async with`` block, or ``await close()``.

    Cancelling a task that waits for an answer cancels the call on the server.
    """

    def __init__(self, address: str, *, patience: float = 5.0, timeout: float | None = None) -> None:
        self.address = checked_address(address)
        self._patience = patience
        self._timeout = timeout
        self._was_there = False
        self._opened: tuple[grpc.aio.Channel, Any] | None = None

    async def predict(
        self, request: answers.RequestLike | None = None, /, *, timeout: float | None = None, **fields: Any
    ) -> Prediction:
        """One prediction; the arguments are those of ``barnwright.predict``."""
        message = answers.predict_message(await self._checked(request, fields))
        return answers.prediction_of(await self._ask("Predict", message, timeout))

    async def scan(
        self,
        request: answers.RequestLike | None = None,
        /,
        *,
        over: Mapping[str, Sequence[Any]],
        timeout: float | None = None,
        **fields: Any,
    ) -> RemoteSweep:
        """A prediction at every value of keys of the request; the arguments are those of ``barnwright.scan``."""
        axes = plain_axes(over)
        message = answers.scan_message(await self._checked(request, fields), axes)
        stub = await self._ready()
        call = stub.Scan(message, timeout=timeout or self._timeout, metadata=METADATA)
        predictions: list[Prediction] = []
        try:
            async for part in call:
                predictions += answers.predictions_of(part)
        except grpc.RpcError as failure:
            raise error_of(failure) from None
        finally:
            call.cancel()
        return RemoteSweep(axes, tuple(predictions))

    async def validate(
        self, request: answers.RequestLike | None = None, /, *, timeout: float | None = None, **fields: Any
    ) -> answers.Validation:
        """What a request means and costs, or what is wrong with it, which raises nothing; nothing is computed."""
        try:
            message = answers.validate_message(await self._checked(request, fields))
        except RequestError as error:
            return answers.Validation(None, None, error.violations)
        return answers.validation_of(await self._ask("ValidateRequest", message, timeout))

    async def processes(
        self, *, particle: str | Sequence[str] | None = None, plugin: str | None = None, kind: str | None = None
    ) -> list[ProcessSummary]:
        """The processes of the server, sorted by name; the arguments are those of ``barnwright.processes``."""
        return answers.summaries_of(await self._ask("ListProcesses", answers.list_message(particle, plugin, kind)))

    async def describe(self, name: str) -> ProcessDescription:
        """What a process of the server is."""
        return answers.description_of(await self._ask("GetProcess", wire.GetProcessRequest(name=name)))

    async def close(self) -> None:
        """Close the connection; calls that run are cancelled."""
        if self._opened is not None:
            await self._opened[0].close(None)

    def __await__(self) -> Generator[Any, None, Self]:
        """Wait for the server. Raises ``ServerError`` when it is not there."""
        return self._waited().__await__()

    async def __aenter__(self) -> Self:
        return self

    async def __aexit__(
        self, kind: type[BaseException] | None, error: BaseException | None, trace: TracebackType | None
    ) -> None:
        await self.close()

    async def _waited(self) -> Self:
        await self._ready()
        return self

    async def _checked(self, request: answers.RequestLike | None, fields: Mapping[str, Any]) -> Request:
        """The request document. Where it is refused, what the server finds wrong with the rest of it is told too."""
        try:
            return answers.request_of(request, fields)
        except RequestError as error:
            left = remainder_of(error)
            raise error if left is None else completed(error, await self._findings(left)) from None

    async def _findings(self, left: Request) -> tuple[Violation, ...]:
        """What the server finds; nothing where it is away or a plugin is broken: what is known is told all the same."""
        message = answers.validate_message(left)
        try:
            return answers.validation_of(await self._ask("ValidateRequest", message)).violations
        except BarnwrightError:
            return ()

    async def _ask(self, method: str, message: Any, timeout: float | None = None) -> Any:
        stub = await self._ready()
        try:
            return await getattr(stub, method)(message, timeout=timeout or self._timeout, metadata=METADATA)
        except grpc.RpcError as failure:
            raise error_of(failure) from None

    async def _ready(self) -> Any:
        """The stub. The channel belongs to the loop that runs at the first call."""
        if self._opened is None:
            channel = grpc.aio.insecure_channel(self.address, options=OPTIONS)
            self._opened = channel, CrossSectionServiceStub(channel)  # type: ignore[no-untyped-call]
        channel, stub = self._opened
        if not self._was_there:
            try:
                await asyncio.wait_for(channel.channel_ready(), self._patience)
            except TimeoutError:
                raise ServerError(absent(self.address, self._patience), "UNAVAILABLE") from None
            self._was_there = True
        return stub
