"""Errors as google.rpc.Status: one table.

Status and details travel in the trailers of a call, and clients take about 8 kB of these unless told otherwise. A
client that takes more says so in the metadata of its call, ``barnwright-details-bytes``, and gets everything in full;
others get as much as fits, and the number of violations there are.
"""

from __future__ import annotations

import logging
import uuid
from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from typing import Any

import grpc
from google.protobuf.any_pb2 import Any as AnyMessage
from google.protobuf.duration_pb2 import Duration
from google.protobuf.message import Message
from google.rpc.error_details_pb2 import BadRequest, ErrorInfo, RetryInfo  # type: ignore[import-untyped]
from google.rpc.status_pb2 import Status  # type: ignore[import-untyped]

from barnwright.errors import BarnwrightError, PluginError, RequestError, ServerError, UnknownProcessError, Violation
from barnwright.wire.v1.service_pb2 import Violations

DOMAIN = "barnwright"
DETAILS_KEY = "grpc-status-details-bin"
PUSHBACK_KEY = "grpc-retry-pushback-ms"
ROOM_KEY = "barnwright-details-bytes"
ROOM = 4500
LONGEST_TEXT = 600

_LOG = logging.getLogger(__name__)
_CODES = {code.name: code for code in grpc.StatusCode}
Trailers = tuple[tuple[str, str | bytes], ...]


@dataclass(frozen=True, slots=True)
class Outcome:
    """How a call fails.

    ``metadata`` are the variables of the ``reason`` (UPPER_SNAKE); ``pushback_ms`` tells clients when to try again, a
    negative number that they should not.
    """

    code: grpc.StatusCode
    reason: str
    text: str
    metadata: Mapping[str, str] = field(default_factory=dict)
    details: Sequence[Message] = ()
    pushback_ms: int | None = None

    @property
    def message(self) -> str:
        """The text, shortened to what fits beside the details."""
        return shortened(self.text, LONGEST_TEXT)

    def trailers(self) -> Trailers:
        """The trailing metadata: the status with all details, and when to try again."""
        info = ErrorInfo(reason=self.reason, domain=DOMAIN, metadata=self.metadata)
        status = Status(code=self.code.value[0], message=self.message)
        for detail in (info, *self.details):
            packed = AnyMessage()
            packed.Pack(detail)
            status.details.append(packed)
        pushback = () if self.pushback_ms is None else ((PUSHBACK_KEY, str(self.pushback_ms)),)
        return ((DETAILS_KEY, status.SerializeToString()), *pushback)


def outcome_of(error: Exception, room: int = ROOM) -> Outcome:
    """How a call fails that ended with this error; its details take about ``room`` bytes at most.

    What nobody foresaw is logged, and its text stays here.
    """
    for kind, make in _TABLE.items():
        if isinstance(error, kind):
            return make(error, room)
    incident = uuid.uuid4().hex[:12]
    _LOG.error("incident %s", incident, exc_info=error)
    text = f"a fault in the server; its log has the details under incident {incident}"
    return Outcome(grpc.StatusCode.INTERNAL, "INTERNAL", text, {"incident": incident})


def shortened(text: str, longest: int) -> str:
    """The text, cut where it is longer than so many characters."""
    return text if len(text) <= longest else f"{text[: longest - 1]}…"


def _unknown_process(error: UnknownProcessError, room: int) -> Outcome:
    first = error.violations[0]
    metadata = {"process": first.value, **({"nearest": first.nearest} if first.nearest else {})}
    details = _violations(error.violations, room - 1000)
    return Outcome(grpc.StatusCode.NOT_FOUND, "PROCESS_UNKNOWN", str(error), metadata, details)


def _request(error: RequestError, room: int) -> Outcome:
    metadata = {"violations": str(len(error.violations))}
    details = _violations(error.violations, room - 1000)
    return Outcome(grpc.StatusCode.INVALID_ARGUMENT, "REQUEST_INVALID", str(error), metadata, details)


def _plugin(error: PluginError, room: int) -> Outcome:
    cause = shortened(error.cause, max(room - 2000, 500))
    metadata = {"plugin": error.plugin, "process": error.process, "cause": cause}
    return Outcome(grpc.StatusCode.FAILED_PRECONDITION, "PLUGIN_BROKEN", str(error), metadata)


def _server(error: ServerError, _room: int) -> Outcome:
    code = _CODES.get(error.code or "", grpc.StatusCode.UNAVAILABLE)
    if error.retry_after is None:
        return Outcome(code, "WORKER_LOST", str(error), pushback_ms=-1)
    reason = "QUEUE_FULL" if code is grpc.StatusCode.RESOURCE_EXHAUSTED else "SERVER_RESTARTING"
    milliseconds = round(1000 * error.retry_after)
    retry = RetryInfo(retry_delay=Duration(nanos=milliseconds % 1000 * 1_000_000, seconds=milliseconds // 1000))
    metadata = {"retry_after": f"{error.retry_after:g} s"}
    return Outcome(code, reason, str(error), metadata, (retry,), milliseconds)


def _calculation(error: BarnwrightError, room: int) -> Outcome:
    metadata = {"cause": shortened(str(error), max(room - 2000, 500))}
    return Outcome(grpc.StatusCode.FAILED_PRECONDITION, "CALCULATION_FAILED", str(error), metadata)


_TABLE: Mapping[type[Exception], Callable[[Any, int], Outcome]] = {
    UnknownProcessError: _unknown_process,
    RequestError: _request,
    PluginError: _plugin,
    ServerError: _server,
    BarnwrightError: _calculation,
}


def _violations(violations: Iterable[Violation], room: int) -> list[Message]:
    """A BadRequest with as many as fit; for a client that takes more than all do, also our own message with parts."""
    bad, parts, with_parts = BadRequest(), Violations(), room > ROOM
    for violation in violations:
        text = shortened(str(violation), max(room, 600) // 2)
        described = BadRequest.FieldViolation(field=shortened(violation.field, 200), description=text)
        room -= described.ByteSize() + 4
        if with_parts:
            room -= parts.violations.add(**_parts(violation)).ByteSize() + 4
        if room < 0 and bad.field_violations:
            break
        bad.field_violations.append(described)
    return [bad, parts] if with_parts else [bad]


def _parts(violation: Violation) -> dict[str, Any]:
    return {name: getattr(violation, name) for name in ("field", "value", "expected", "nearest", "position")}
