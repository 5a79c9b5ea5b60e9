"""What workers do. The only module of this room that reaches plugins' code.

Every task gets, before its arguments, a function to tell how far it has come.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from time import perf_counter
from typing import Any

from barnwright.engine import Plan, Stage, assemble
from barnwright.integrate.block import Block
from barnwright.integrate.ledger import Ledger
from barnwright.integrate.tally import Tally
from barnwright.registry import catalogue
from barnwright.run.choice import Choice
from barnwright.run.describe import describe, summary
from barnwright.run.drive import Pace, drive
from barnwright.run.local import origin, run_record
from barnwright.run.worker import evaluate_task, resolve_task
from barnwright.service.frames import Resolved
from barnwright.service.messages import EXECUTOR, prediction_message, validation_message
from barnwright.service.shelf import Shelf
from barnwright.wire import encode
from barnwright.wire.v1.service_pb2 import GetProcessResponse

Tell = Callable[[Resolved], None]

STAGES: Shelf[Stage] = Shelf()


def choose_task(
    _tell: Tell, particles: Sequence[str], plugin: str, kind: str
) -> tuple[Choice, list[tuple[str, str, str]]]:
    """A choice, and name, distribution and version of every process of its plugin, none of which is imported.

    Raises ``RequestError`` for words that mean nothing.
    """
    entries = catalogue().entries()
    choice = Choice.of(particles, plugin, kind, (entry.plugin for entry in entries))
    asked = (entry for entry in entries if choice.plugin in ("", entry.plugin))
    return choice, [(entry.name, entry.distribution, entry.version) for entry in asked]


def summary_task(_tell: Tell, name: str, distribution: str, version: str) -> dict[str, Any]:
    """The short line of a process, also of one that is broken."""
    return summary(name, distribution, version).model_dump(mode="json")


def describe_task(_tell: Tell, name: str) -> bytes:
    """The message that describes a process. Raises what ``describe`` raises."""
    return encode({"process": describe(name).model_dump(mode="json")}, GetProcessResponse).SerializeToString()


def plan_task(_tell: Tell, request: Mapping[str, Any], over: Mapping[str, Sequence[Any]] | None) -> Plan:
    """The plan of a request. Raises what ``resolve_task`` raises."""
    return resolve_task(request, over)


def validate_task(_tell: Tell, request: Mapping[str, Any]) -> bytes:
    """The message that says what a request means and costs. Raises what ``resolve_task`` raises."""
    return validation_message(resolve_task(request, None))


def predict_task(tell: Tell, request: Mapping[str, Any]) -> bytes | Plan:
    """The message with a prediction, where one block answers, as in most closed forms and quadratures; else the plan.

    The whole takes one hop instead of two, and neither plan nor tally is pickled: a third of a prediction's time.
    """
    started = perf_counter()
    plan = resolve_task(request, None)
    if plan.training is not None or plan.ladder is not None or len(plan.round((), 0)) > 1:
        return plan
    tell(Resolved(plan.name, plan.distribution))
    stage = plan.stage()
    pace = Pace(perf_counter, plan.request.accuracy.max_seconds)
    verdict = drive(plan, Ledger(plan.digest), lambda block, _: evaluate_task(block, stage), pace)
    answers = assemble(plan, verdict.settled, verdict.status, origin(), run_record(started, EXECUTOR))
    return prediction_message(answers)


def tally_task(_tell: Tell, block: Block, name: str, stage: Stage | None) -> Tally:
    """The tally of a block of the stage of this name, which comes with the first of its blocks only."""
    return evaluate_task(block, STAGES.take(name, stage))


TASKS: Mapping[str, Callable[..., Any]] = {
    "choose": choose_task,
    "summary": summary_task,
    "describe": describe_task,
    "plan": plan_task,
    "validate": validate_task,
    "predict": predict_task,
    "tally": tally_task,
}
