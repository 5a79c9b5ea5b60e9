"""The table from errors to statuses."""

from __future__ import annotations

import logging
import re

import grpc
import pytest
from google.rpc.error_details_pb2 import ErrorInfo, RetryInfo
from google.rpc.status_pb2 import Status

from barnwright.client.failures import error_of
from barnwright.errors import (
    BarnwrightError,
    CalculationError,
    PluginError,
    RequestError,
    ServerError,
    UnknownProcessError,
    Violation,
)
from barnwright.service.fault import UnforeseenError
from barnwright.service.status import Outcome, outcome_of

FOUND = Violation("beams.sqrt_s", "-1", "a number greater than 0 (GeV)", "1", 3)
ERRORS: list[tuple[BarnwrightError, str, str]] = [
    (RequestError([FOUND, Violation("unit", "'pbb'", "a unit")]), "INVALID_ARGUMENT", "REQUEST_INVALID"),
    (UnknownProcessError([Violation("process", "'x/y'", "a process")]), "NOT_FOUND", "PROCESS_UNKNOWN"),
    (PluginError("some-plugin", "x/y", "it broke"), "FAILED_PRECONDITION", "PLUGIN_BROKEN"),
    (CalculationError("no round was complete"), "FAILED_PRECONDITION", "CALCULATION_FAILED"),
    (ServerError("too many", "RESOURCE_EXHAUSTED", 0.5), "RESOURCE_EXHAUSTED", "QUEUE_FULL"),
    (ServerError("it ends", "UNAVAILABLE", 1.0), "UNAVAILABLE", "SERVER_RESTARTING"),
    (ServerError("lost", "UNAVAILABLE"), "UNAVAILABLE", "WORKER_LOST"),
]


class Failure:
    """A failed call, as a client sees it."""

    def __init__(self, outcome: Outcome) -> None:
        self.outcome = outcome

    def code(self) -> grpc.StatusCode:
        """Its code."""
        return self.outcome.code

    def details(self) -> str:
        """Its text."""
        return self.outcome.message

    def trailing_metadata(self) -> object:
        """Its trailers."""
        return self.outcome.trailers()


def status_of(outcome: Outcome) -> Status:
    """The status in the trailers."""
    return Status.FromString(dict(outcome.trailers())["grpc-status-details-bin"])


@pytest.mark.parametrize(("error", "code", "reason"), ERRORS, ids=[reason for _, _, reason in ERRORS])
def test_every_error_has_its_code_and_one_info(error: BarnwrightError, code: str, reason: str) -> None:
    """Exactly one ErrorInfo, of our domain, and a status that agrees with the code and text of the call."""
    outcome = outcome_of(error)
    status = status_of(outcome)
    infos = [detail for detail in status.details if detail.Is(ErrorInfo.DESCRIPTOR)]
    assert (outcome.code.name, outcome.reason, len(infos)) == (code, reason, 1)
    info = ErrorInfo.FromString(infos[0].value)
    assert (info.domain, info.reason) == ("barnwright", reason)
    assert re.fullmatch("[A-Z_]+", info.reason)
    assert (status.code, status.message) == (outcome.code.value[0], outcome.message)


@pytest.mark.parametrize(("error", "code", "reason"), ERRORS, ids=[reason for _, _, reason in ERRORS])
def test_the_client_makes_the_same_error_of_it(error: BarnwrightError, code: str, reason: str) -> None:
    """Kind, text and parts."""
    found = error_of(Failure(outcome_of(error, 1 << 20)))
    assert type(found) is type(error)
    assert str(found) == str(error)
    assert getattr(found, "violations", ()) == getattr(error, "violations", ())
    assert getattr(found, "code", None) == getattr(error, "code", None)
    assert getattr(found, "retry_after", None) == getattr(error, "retry_after", None)


def test_who_is_refused_learns_when_to_try_again() -> None:
    """RetryInfo for any language, and the trailer that gRPC itself obeys."""
    outcome = outcome_of(ServerError("too many", "RESOURCE_EXHAUSTED", 1.25))
    assert dict(outcome.trailers())["grpc-retry-pushback-ms"] == "1250"
    (retry,) = [d for d in status_of(outcome).details if d.Is(RetryInfo.DESCRIPTOR)]
    delay = RetryInfo.FromString(retry.value).retry_delay
    assert (delay.seconds, delay.nanos) == (1, 250_000_000)


def test_what_ends_workers_is_not_tried_again() -> None:
    """A negative pushback stops the client's retries."""
    outcome = outcome_of(ServerError("lost", "UNAVAILABLE"))
    assert dict(outcome.trailers())["grpc-retry-pushback-ms"] == "-1"


@pytest.mark.parametrize("error", [ValueError("secret"), UnforeseenError("secret"), KeyError("secret")])
def test_the_text_of_unforeseen_errors_stays_in_the_log(error: Exception, caplog: pytest.LogCaptureFixture) -> None:
    """The caller gets the number of the incident, the log everything."""
    with caplog.at_level(logging.ERROR):
        outcome = outcome_of(error)
    assert outcome.code is grpc.StatusCode.INTERNAL
    assert b"secret" not in status_of(outcome).SerializeToString()
    assert "secret" not in outcome.message
    assert outcome.metadata["incident"] in outcome.message
    assert outcome.metadata["incident"] in caplog.text
    assert "secret" in caplog.text


def test_long_texts_are_cut_for_clients_that_take_little() -> None:
    """Details stay below what every client takes, whatever the error says."""
    errors = [
        PluginError("p", "p/q", "x" * 100_000),
        CalculationError("y" * 100_000),
        RequestError([Violation("a", "b", "c" * 3000)] * 100),
    ]
    for error in errors:
        size = sum(len(value) for _, value in outcome_of(error).trailers())
        assert size < 6000
