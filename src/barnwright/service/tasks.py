"""What workers do. The only module of this room that reaches plugins' code."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import Any

from barnwright.engine import Plan, Stage
from barnwright.integrate.block import Block
from barnwright.integrate.tally import Tally
from barnwright.registry import catalogue
from barnwright.run.describe import describe, summary
from barnwright.run.worker import evaluate_task, resolve_task
from barnwright.service.shelf import Shelf
from barnwright.wire import encode
from barnwright.wire.v1.service_pb2 import GetProcessResponse

STAGES: Shelf[Stage] = Shelf()


def names_task() -> list[tuple[str, str, str]]:
    """Name, distribution and version of every installed process; imports none of them."""
    return [(entry.name, entry.distribution, entry.version) for entry in catalogue().entries()]


def summary_task(name: str, distribution: str, version: str) -> dict[str, Any]:
    """The short line of a process, also of one that is broken."""
    return summary(name, distribution, version).model_dump(mode="json")


def describe_task(name: str) -> bytes:
    """The message that describes a process. Raises what ``describe`` raises."""
    return encode({"process": describe(name).model_dump(mode="json")}, GetProcessResponse).SerializeToString()


def plan_task(request: Mapping[str, Any], over: Mapping[str, Sequence[Any]] | None) -> Plan:
    """The plan of a request. Raises what ``resolve_task`` raises."""
    return resolve_task(request, over)


def tally_task(block: Block, name: str, stage: Stage | None) -> Tally:
    """The tally of a block of the stage of this name, which comes with the first of its blocks only."""
    return evaluate_task(block, STAGES.take(name, stage))


TASKS: Mapping[str, Callable[..., Any]] = {
    "names": names_task,
    "summary": summary_task,
    "describe": describe_task,
    "plan": plan_task,
    "tally": tally_task,
}
