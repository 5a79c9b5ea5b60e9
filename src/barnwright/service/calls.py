"""The calls of the service, each a generator of what it waits for."""

from __future__ import annotations

from collections.abc import Callable, Generator, Mapping
from time import perf_counter
from typing import Any

from google.protobuf.message import Message

from barnwright.documents import plain_axes
from barnwright.engine import Answers, Plan, assemble
from barnwright.engine.calculate import calculate
from barnwright.errors import PluginError, RequestError, ServerError, Violation, show
from barnwright.integrate.ledger import Ledger
from barnwright.run.choice import Choice
from barnwright.run.drive import Pace
from barnwright.run.local import origin, run_record
from barnwright.service.messages import EXECUTOR, prediction_message, scan_message, violations_message
from barnwright.service.steps import Blocks, Credit, Light, Step, Steps
from barnwright.wire import decode, encode, parse
from barnwright.wire.v1 import service_pb2 as wire

SLICE = 16
"""Predictions in one message of a scan."""

Reply = Callable[[bytes, bool], None]
Call = Callable[[bytes, Reply], Steps]


def list_processes(message: bytes, reply: Reply) -> Steps:
    """Every process, or those of the caller's choice."""
    asked = parse(message, wire.ListProcessesRequest)
    choice: Choice
    choice, names = yield Light("choose", (tuple(asked.particles), asked.plugin, asked.kind))
    lines = []
    for name, distribution, version in names:
        try:
            line = yield Light("summary", (name, distribution, version), name)
        except (PluginError, ServerError) as error:  # it hangs, or takes its worker down: the others are listed
            broken = error.cause if isinstance(error, PluginError) else str(error)
            line = {"name": name, "distribution": distribution, "version": version, "broken": broken}
        line = {"plugin": name.partition("/")[0], **line}
        if choice.fits(line):
            lines.append(line)
    reply(encode({"processes": lines}, wire.ListProcessesResponse).SerializeToString(), True)


def get_process(message: bytes, reply: Reply) -> Steps:
    """One process in full."""
    asked = parse(message, wire.GetProcessRequest)
    _require(asked, "name", "the name of a process, plugin/name")
    reply((yield Light("describe", (asked.name,), asked.name)), True)


def validate_request(message: bytes, reply: Reply) -> Steps:
    """What a request would mean and cost, or what is wrong with it."""
    try:
        document = _document(parse(message, wire.ValidateRequestRequest))
        answer = yield Light("validate", (document,), _process_of(document))
    except RequestError as error:
        answer = violations_message(error.violations)
    reply(answer, True)


def predict(message: bytes, reply: Reply) -> Steps:
    """One prediction: a worker does all of it where that is little, else its blocks are handed out."""
    started = perf_counter()
    document = _document(parse(message, wire.PredictRequest))
    found: bytes | Plan = yield Light("predict", (document,), _process_of(document))
    if isinstance(found, Plan):
        found = prediction_message((yield from _answers(found, started)))
    reply(found, True)


def scan(message: bytes, reply: Reply) -> Steps:
    """A prediction at every point, some in each message."""
    started = perf_counter()
    asked = parse(message, wire.ScanRequest)
    over = _over(asked)
    document = _document(asked)
    plan: Plan = yield Light("plan", (document, over), _process_of(document))
    answers = yield from _answers(plan, started)
    for first in range(0, plan.points, SLICE):
        stop = min(first + SLICE, plan.points)
        part = scan_message(answers, first, stop)
        yield Credit()
        reply(part, stop == plan.points)


CALLS: Mapping[str, Call] = {
    "ListProcesses": list_processes,
    "GetProcess": get_process,
    "ValidateRequest": validate_request,
    "Predict": predict,
    "Scan": scan,
}


def _answers(plan: Plan, started: float) -> Generator[Step, Any, Answers]:
    """Calculate and assemble; ``started`` is when the call's clock began."""
    ledger, stage = Ledger(plan.digest), plan.stage()
    pace = Pace(perf_counter, plan.request.accuracy.max_seconds)
    calculation = calculate(plan, ledger)
    while True:
        try:
            wanted = next(calculation)
        except StopIteration as end:
            verdict = end.value
            return assemble(plan, verdict.settled, verdict.status, origin(), run_record(started, EXECUTOR))
        yield Blocks(wanted, stage, ledger, pace)


def _document(asked: Message) -> dict[str, Any]:
    _require(asked, "request", "a request")
    document: dict[str, Any] = decode(asked)["request"]
    return document


def _over(asked: wire.ScanRequest) -> dict[str, tuple[Any, ...]]:
    """The values of a scan by key, each key once."""
    axes: list[dict[str, Any]] = decode(asked)["over"]
    found = []
    for number, axis in enumerate(axes):
        if not axis["key"]:
            found.append(Violation(f"over[{number}].key", "nothing", "a key of the request, such as beams.sqrt_s"))
        elif axis["key"] in [earlier["key"] for earlier in axes[:number]]:
            found.append(Violation(f"over[{number}].key", show(axis["key"]), "a key that is not scanned already"))
    if found:
        raise RequestError(found)
    return plain_axes({axis["key"]: axis["values"] for axis in axes})


def _require(message: Message, field: str, expected: str) -> None:
    if not message.HasField(field):
        raise RequestError([Violation(field, "nothing", expected)])


def _process_of(document: Mapping[str, Any]) -> str:
    """Whose code is going to run; "" for a formula, which is none."""
    return str(document.get("process") or ", ".join(document.get("processes", ())))
