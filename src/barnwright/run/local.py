"""A prediction here and now: resolve, calculate inline, assemble."""

from __future__ import annotations

import time
from collections.abc import Mapping, Sequence
from datetime import UTC, datetime
from typing import Any

from barnwright.documents import Prediction, Request, Run
from barnwright.engine import Answers, Origin, Plan, assemble, evaluate, resolve
from barnwright.integrate.block import Block
from barnwright.integrate.ledger import Frozen, Ledger
from barnwright.integrate.tally import Tally
from barnwright.process import Process
from barnwright.registry import catalogue
from barnwright.run.drive import Pace, drive
from barnwright.run.objects import loaded_object
from barnwright.run.provenance import provenance
from barnwright.run.worker import process_of


def predict(request: Request, process: Process | None = None) -> Prediction:
    """The prediction of a request.

    Parameters
    ----------
    request : Request
    process : Process, optional
        An object made in a notebook; its name stands in the request.

    Raises
    ------
    RequestError, UnknownProcessError, PluginError, CalculationError
    """
    return answers(request, None, process).prediction(0)


def answers(
    request: Request, over: Mapping[str, Sequence[Any]] | None = None, process: Process | None = None
) -> Answers:
    """The answers of a request, or of a scan of it; parameters and errors as for `predict`."""
    started = time.perf_counter()
    lookup = catalogue().load if process is None else (lambda _: loaded_object(process))
    plan = resolve(request, lookup, over)
    return calculated(plan, process, started)


def calculated(plan: Plan, process: Process | None, started: float) -> Answers:
    """Drive a plan inline; ``started`` is when its clock began, from `time.perf_counter`.

    Without a process object, the plan's processes are found by their identities.
    """
    stage = plan.stage()
    processes = [process or process_of(member.source) for member in plan.members]

    def work(block: Block, frozen: Frozen) -> Tally:
        del frozen
        return evaluate(block, stage, processes[block.stratum])

    verdict = drive(plan, Ledger(plan.digest), work, Pace(time.perf_counter, plan.request.accuracy.max_seconds))
    return assemble(plan, verdict.settled, verdict.status, origin(), run_record(started, "inline"))


def origin() -> Origin:
    """Versions and environment of this process, as an answer carries them."""
    known = provenance()
    return Origin(known.versions, known.environment)


def run_record(started: float, executor: str) -> Run:
    """When and how long: the only part in which equal predictions may differ."""
    now = datetime.now(UTC).isoformat(timespec="seconds")
    return Run.build(seconds=time.perf_counter() - started, executor=executor, computed_at=now)
