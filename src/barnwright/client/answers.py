"""Questions as messages, and messages as answers."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from os import PathLike
from typing import Any

from barnwright.documents import Prediction, ProcessDescription, ProcessSummary, Request
from barnwright.errors import RequestError, Violation, show
from barnwright.run.reading import read_request
from barnwright.wire import decode, encode
from barnwright.wire.v1 import service_pb2 as wire

RequestLike = str | PathLike[str] | Mapping[str, Any] | Request


@dataclass(frozen=True, slots=True)
class Cost:
    """What a request would cost: points of the scan, numbers at each point, blocks of work."""

    points: int
    components: int
    blocks: int


@dataclass(frozen=True, slots=True)
class Validation:
    """What a request means and costs, or what is wrong with it: then ``request`` and ``cost`` are None."""

    request: Request | None
    cost: Cost | None
    violations: tuple[Violation, ...] = ()

    @property
    def is_valid(self) -> bool:
        """Whether nothing is wrong with it."""
        return not self.violations


def request_of(request: RequestLike | None, fields: Mapping[str, Any]) -> Request:
    """The request document of a path, a dict or a Request, with fields merged in. Raises ``RequestError``."""
    source = read_request(request) if isinstance(request, (str, PathLike)) else request
    process = fields.get("process", source.get("process") if isinstance(source, Mapping) else None)
    if process is not None and not isinstance(process, str) and hasattr(process, "laws"):
        expected = "the name of a process that the server has: an object stays in this process, see barnwright.predict"
        raise RequestError([Violation("process", show(process), expected)])
    return Request.accept(source, **fields)


def list_message(
    particle: str | Sequence[str] | None, plugin: str | None, kind: str | None
) -> wire.ListProcessesRequest:
    """The question which processes there are."""
    particles = [particle] if isinstance(particle, str) else list(particle or ())
    return wire.ListProcessesRequest(particles=particles, plugin=plugin, kind=kind)


def predict_message(request: Request) -> wire.PredictRequest:
    """The question for a prediction; what was not given is left to the server's defaults."""
    return encode({"request": request.given()}, wire.PredictRequest)


def validate_message(request: Request) -> wire.ValidateRequestRequest:
    """The question whether a request is right."""
    return encode({"request": request.given()}, wire.ValidateRequestRequest)


def scan_message(request: Request, over: Mapping[str, Sequence[Any]]) -> wire.ScanRequest:
    """The question for a scan. Raises ``RequestError`` for values that cannot be sent."""
    found = [
        Violation(f"over.{key}[{place}]", show(value), "a number, true, false or a word")
        for key, values in over.items()
        for place, value in enumerate(values)
        if not isinstance(value, (bool, int, float, str))
    ]
    if found:
        raise RequestError(found)
    axes = [{"key": key, "values": list(values)} for key, values in over.items()]
    return encode({"request": request.given(), "over": axes}, wire.ScanRequest)


def prediction_of(answer: wire.PredictResponse) -> Prediction:
    """The prediction of an answer."""
    return Prediction.model_validate(decode(answer)["prediction"])


def predictions_of(answer: wire.ScanResponse) -> list[Prediction]:
    """The predictions of a part of a scan."""
    return [Prediction.model_validate(entry) for entry in decode(answer)["predictions"]]


def summaries_of(answer: wire.ListProcessesResponse) -> list[ProcessSummary]:
    """The list of processes."""
    return [ProcessSummary.model_validate(entry) for entry in decode(answer)["processes"]]


def description_of(answer: wire.GetProcessResponse) -> ProcessDescription:
    """The description of a process."""
    given = {key: value for key, value in decode(answer)["process"].items() if value is not None}
    return ProcessDescription.model_validate(given)


def validation_of(answer: wire.ValidateRequestResponse) -> Validation:
    """What the server found."""
    found = decode(answer)
    if found["violations"]:
        return Validation(None, None, tuple(Violation(**entry) for entry in found["violations"]))
    return Validation(Request.model_validate(found["request"]), Cost(**found["cost"]))
