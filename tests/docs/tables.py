"""The tables that README repeats from the code."""

from __future__ import annotations

import math
from pathlib import Path

import barnwright
from barnwright.observables import table

PLUGINS = Path(__file__).resolve().parents[2] / "plugins"
# how a range's ends are written
_BOUNDS = {math.inf: "∞", -math.inf: "−∞", math.pi: "π", -math.pi: "−π"}


def _bound(value: float) -> str:
    return _BOUNDS.get(value, f"{value:g}".replace("-", "−"))


def _cell(text: str) -> str:
    """The text with the bars of absolute values, which would end a cell, escaped."""
    return text.replace("|", r"\|")


def observables() -> list[str]:
    """A row for each observable: as it is written, unit, range, meaning."""
    return [
        f"| `{row.name}{row.arguments}` | {row.unit} | {' to '.join(map(_bound, row.range))} | {_cell(row.meaning)} |"
        for row in table()
    ]


def bundled() -> list[str]:
    """The names of all processes that the bundled plugins offer."""
    distributions = {f"barnwright-{path.name}" for path in PLUGINS.iterdir() if path.is_dir()}
    return [row.name for row in barnwright.processes() if row.distribution in distributions]


def processes() -> list[str]:
    """A row for each process that the bundled plugins offer: name, reaction, summary."""
    return [f"| `{row.name}` | `{row.reaction}` | {row.summary} |" for row in map(barnwright.describe, bundled())]
