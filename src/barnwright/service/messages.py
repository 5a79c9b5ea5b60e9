"""Answers as messages, made in the scheduler and in workers."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from barnwright.engine import Answers, Plan
from barnwright.errors import Violation
from barnwright.wire import encode
from barnwright.wire.v1 import service_pb2 as wire

EXECUTOR = "server"
"""What the predictions say of how they were computed."""


def prediction_message(answers: Answers) -> bytes:
    """The one prediction."""
    answer = {"prediction": answers.prediction(0).model_dump(mode="json")}
    return encode(answer, wire.PredictResponse).SerializeToString()


def scan_message(answers: Answers, first: int, stop: int) -> bytes:
    """The predictions of some points of a scan."""
    some = [answers.prediction(point).model_dump(mode="json") for point in range(first, stop)]
    answer = {"first": first, "points": answers.plan.points, "predictions": some}
    return encode(answer, wire.ScanResponse).SerializeToString()


def validation_message(plan: Plan) -> bytes:
    """What a request means and costs."""
    components = plan.components * plan.entries
    cost = {"points": plan.points, "components": components, "blocks": len(plan.round((), 0))}
    answer: dict[str, Any] = {"request": plan.request.canonical(), "cost": cost}
    return encode(answer, wire.ValidateRequestResponse).SerializeToString()


def violations_message(violations: Sequence[Violation]) -> bytes:
    """What is wrong with a request."""
    names = ("field", "value", "expected", "nearest", "position")
    answer = {"violations": [{name: getattr(violation, name) for name in names} for violation in violations]}
    return encode(answer, wire.ValidateRequestResponse).SerializeToString()
