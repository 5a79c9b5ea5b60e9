"""The methods of the service, as bytes in and bytes out: the scheduler reads and writes them."""

from __future__ import annotations

from collections.abc import AsyncIterator
from contextlib import aclosing
from typing import Any

import grpc

from barnwright.service.link import Link
from barnwright.wire.v1 import service_pb2

SERVICE = "barnwright.wire.v1.CrossSectionService"


def handlers(link: Link) -> Any:
    """A handler for every method of the service's description."""
    methods = service_pb2.DESCRIPTOR.services_by_name["CrossSectionService"].methods
    table = {m.name: _streaming(link, m.name) if m.server_streaming else _unary(link, m.name) for m in methods}
    return grpc.method_handlers_generic_handler(SERVICE, table)


def _unary(link: Link, method: str) -> Any:
    async def answer(message: bytes, _context: Any) -> bytes:
        async with aclosing(link.answers(method, message)) as answers:
            return await anext(answers)

    return grpc.unary_unary_rpc_method_handler(answer)


def _streaming(link: Link, method: str) -> Any:
    async def stream(message: bytes, _context: Any) -> AsyncIterator[bytes]:
        async with aclosing(link.answers(method, message)) as answers:
            async for answer in answers:
                yield answer

    return grpc.unary_stream_rpc_method_handler(stream)
