"""What every call goes through: admission, and errors as statuses."""

from __future__ import annotations

from collections.abc import AsyncIterator, Awaitable, Callable
from typing import Any

import grpc

from barnwright.service.admission import Admission
from barnwright.service.status import ROOM, ROOM_KEY, outcome_of

_OURS = "/barnwright."
_MOST_ROOM = 1 << 20


class Gate(grpc.aio.ServerInterceptor):
    """Lets calls of our service in, and maps what they raise. Health and reflection pass by."""

    def __init__(self, admission: Admission) -> None:
        self._admission = admission

    async def intercept_service(self, continuation: Callable[[Any], Awaitable[Any]], handler_call_details: Any) -> Any:
        """Wrap the handler of a call."""
        handler = await continuation(handler_call_details)
        if handler is None or not handler_call_details.method.startswith(_OURS):
            return handler
        if handler.response_streaming:
            return grpc.unary_stream_rpc_method_handler(self._streaming(handler.unary_stream))
        return grpc.unary_unary_rpc_method_handler(self._unary(handler.unary_unary))

    def _unary(self, answer: Callable[[bytes, Any], Awaitable[bytes]]) -> Any:
        async def guarded(message: bytes, context: Any) -> bytes:
            try:
                with self._admission.admit():
                    return await answer(message, context)
            except grpc.aio.AbortError:
                raise
            except Exception as error:
                return await _abort(error, context)

        return guarded

    def _streaming(self, answers: Callable[[bytes, Any], AsyncIterator[bytes]]) -> Any:
        async def guarded(message: bytes, context: Any) -> AsyncIterator[bytes]:
            try:
                with self._admission.admit():
                    async for answer in answers(message, context):
                        yield answer
            except grpc.aio.AbortError:
                raise
            except Exception as error:
                await _abort(error, context)

        return guarded


async def _abort(error: Exception, context: Any) -> bytes:
    """End the call with the status that the error maps to."""
    outcome = outcome_of(error, _room(context))
    await context.abort(outcome.code, outcome.message, outcome.trailers())
    raise AssertionError("abort raises")


def _room(context: Any) -> int:
    """How many bytes of details the client says that it takes."""
    told = dict(context.invocation_metadata() or ()).get(ROOM_KEY, "")
    return min(int(told), _MOST_ROOM) if isinstance(told, str) and told.isdigit() and len(told) < 9 else ROOM
