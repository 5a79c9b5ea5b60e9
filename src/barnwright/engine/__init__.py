"""The engine: from a request to a plan, from blocks to tallies, from sums to predictions; no input, output or clock."""

from barnwright.engine.assemble import Answers, Origin, assemble
from barnwright.engine.evaluate import evaluate
from barnwright.engine.plan import Group, Note, Plan, ProcessSource, Stage
from barnwright.engine.resolve import Loaded, Lookup, formula_process, resolve

__all__ = [
    "Answers",
    "Group",
    "Loaded",
    "Lookup",
    "Note",
    "Origin",
    "Plan",
    "ProcessSource",
    "Stage",
    "assemble",
    "evaluate",
    "formula_process",
    "resolve",
]
