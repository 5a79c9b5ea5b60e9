"""Errors of calls, made into what they were where they arose."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any, TypeVar

from google.protobuf.message import DecodeError, Message
from google.rpc.error_details_pb2 import BadRequest, ErrorInfo, RetryInfo  # type: ignore[import-untyped]
from google.rpc.status_pb2 import Status  # type: ignore[import-untyped]

from barnwright.errors import (
    BarnwrightError,
    CalculationError,
    PluginError,
    RequestError,
    ServerError,
    UnknownProcessError,
    Violation,
)
from barnwright.wire.v1.service_pb2 import Violations

DETAILS_KEY = "grpc-status-details-bin"
DOMAIN = "barnwright"

_HINTS = {
    "DEADLINE_EXCEEDED": "the server did not answer within the timeout of the call",
    "UNIMPLEMENTED": "the server at this address does not know this call; it is no barnwright server, or an older one",
    "UNAVAILABLE": "the connection to the server was lost",
    "CANCELLED": "the call was cancelled",
}

M = TypeVar("M", bound=Message)


def error_of(failure: Any) -> BarnwrightError:
    """The error that a failed call stands for, with the same violations, or the same plugin and cause."""
    details = _details(failure)
    info = _first(details, ErrorInfo)
    if info is None or info.domain != DOMAIN:
        return _machinery(failure, details)
    return _known(info.reason, info.metadata, failure, details)


def _known(reason: str, metadata: Mapping[str, str], failure: Any, details: list[Any]) -> BarnwrightError:
    if reason == "REQUEST_INVALID":
        return RequestError(_violations(details))
    if reason == "PROCESS_UNKNOWN":
        return UnknownProcessError(_violations(details))
    if reason == "PLUGIN_BROKEN":
        return PluginError(metadata["plugin"], metadata["process"], metadata["cause"])
    if reason == "CALCULATION_FAILED":
        return CalculationError(metadata["cause"])
    return _machinery(failure, details)


def _machinery(failure: Any, details: list[Any]) -> ServerError:
    code = failure.code().name
    said = failure.details() or "no reason was given"
    hint = _HINTS.get(code) if _first(details, ErrorInfo) is None else None
    retry = _first(details, RetryInfo)
    seconds = None if retry is None else retry.retry_delay.seconds + retry.retry_delay.nanos / 1e9
    return ServerError(f"{hint} ({said})" if hint else said, code, seconds)


def _violations(details: list[Any]) -> Iterable[Violation]:
    parts = _first(details, Violations)
    if parts is not None and parts.violations:
        return [
            Violation(
                part.field,
                part.value,
                part.expected,
                part.nearest if part.HasField("nearest") else None,
                part.position if part.HasField("position") else None,
            )
            for part in parts.violations
        ]
    bad = _first(details, BadRequest)
    entries = () if bad is None else bad.field_violations
    return [Violation(entry.field, "a value", f"what the server says: {entry.description}") for entry in entries]


def _details(failure: Any) -> list[Any]:
    for key, value in failure.trailing_metadata() or ():
        if key == DETAILS_KEY:
            try:
                return list(Status.FromString(value).details)
            except DecodeError:
                return []
    return []


def _first(details: list[Any], kind: type[M]) -> M | None:
    for detail in details:
        if detail.Is(kind.DESCRIPTOR):
            found = kind()
            detail.Unpack(found)
            return found
    return None
