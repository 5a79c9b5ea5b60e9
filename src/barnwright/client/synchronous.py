"""The client for programs that wait."""

from __future__ import annotations

import threading
from collections.abc import Mapping, Sequence
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


class Client:
    """A client of one server; use it in a ``with`` block, or call ``close``. Threads may share it.

    Every call raises ``RequestError`` with the violations that the server found, ``UnknownProcessError`` and
    ``PluginError`` as the Python functions do, and ``ServerError`` when the machinery fails. Ctrl-C cancels the call
    on the server too. ``timeout`` is how many seconds the call may take; the server learns it.
    """

    def __init__(self, address: str, *, patience: float = 5.0, timeout: float | None = None) -> None:
        self.address = checked_address(address)
        self._patience = patience
        self._timeout = timeout
        self._was_there = threading.Event()
        self._channel = grpc.insecure_channel(self.address, options=OPTIONS)
        self._stub: Any = CrossSectionServiceStub(self._channel)  # type: ignore[no-untyped-call]

    def predict(
        self, request: answers.RequestLike | None = None, /, *, timeout: float | None = None, **fields: Any
    ) -> Prediction:
        """One prediction; the arguments are those of ``barnwright.predict``."""
        message = answers.predict_message(self._checked(request, fields))
        return answers.prediction_of(self._ask(self._stub.Predict, message, timeout))

    def scan(
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
        message = answers.scan_message(self._checked(request, fields), axes)
        self._wait_for_server()
        call = self._stub.Scan(message, timeout=timeout or self._timeout, metadata=METADATA)
        predictions: list[Prediction] = []
        try:
            for part in call:
                predictions += answers.predictions_of(part)
        except grpc.RpcError as failure:
            raise error_of(failure) from None
        finally:
            call.cancel()
        return RemoteSweep(axes, tuple(predictions))

    def validate(
        self, request: answers.RequestLike | None = None, /, *, timeout: float | None = None, **fields: Any
    ) -> answers.Validation:
        """What a request means and costs, or what is wrong with it, which raises nothing; nothing is computed."""
        try:
            message = answers.validate_message(self._checked(request, fields))
        except RequestError as error:
            return answers.Validation(None, None, error.violations)
        return answers.validation_of(self._ask(self._stub.ValidateRequest, message, timeout))

    def processes(
        self, *, particle: str | Sequence[str] | None = None, plugin: str | None = None, kind: str | None = None
    ) -> list[ProcessSummary]:
        """The processes of the server, sorted by name; the arguments are those of ``barnwright.processes``."""
        return answers.summaries_of(self._ask(self._stub.ListProcesses, answers.list_message(particle, plugin, kind)))

    def describe(self, name: str) -> ProcessDescription:
        """What a process of the server is."""
        return answers.description_of(self._ask(self._stub.GetProcess, wire.GetProcessRequest(name=name)))

    def close(self) -> None:
        """Close the connection; calls that run are cancelled."""
        self._channel.close()

    def __enter__(self) -> Self:
        return self

    def __exit__(
        self, kind: type[BaseException] | None, error: BaseException | None, trace: TracebackType | None
    ) -> None:
        self.close()

    def _checked(self, request: answers.RequestLike | None, fields: Mapping[str, Any]) -> Request:
        """The request document. Where it is refused, what the server finds wrong with the rest of it is told too."""
        try:
            return answers.request_of(request, fields)
        except RequestError as error:
            left = remainder_of(error)
            raise error if left is None else completed(error, self._findings(left)) from None

    def _findings(self, left: Request) -> tuple[Violation, ...]:
        """What the server finds; nothing where it is away or a plugin is broken: what is known is told all the same."""
        message = answers.validate_message(left)
        try:
            return answers.validation_of(self._ask(self._stub.ValidateRequest, message)).violations
        except BarnwrightError:
            return ()

    def _ask(self, method: Any, message: Any, timeout: float | None = None) -> Any:
        """The answer to a call. As a future, so that Ctrl-C gets through and cancels it on the server."""
        self._wait_for_server()
        call = method.future(message, timeout=timeout or self._timeout, metadata=METADATA)
        try:
            return call.result()
        except grpc.RpcError as failure:
            raise error_of(failure) from None
        finally:
            call.cancel()

    def _wait_for_server(self) -> None:
        """Before the first call: until the connection stands. Raises ``ServerError`` when it takes too long."""
        if self._was_there.is_set():
            return
        standing = grpc.channel_ready_future(self._channel)
        try:
            standing.result(self._patience)
        except grpc.FutureTimeoutError:
            raise ServerError(absent(self.address, self._patience), "UNAVAILABLE") from None
        finally:
            standing.cancel()
        self._was_there.set()
