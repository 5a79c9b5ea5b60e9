"""The values of a scan as a person types them.

beams.sqrt_s=20:200:181          181 values from 20 to 200, both included, equally spaced
beams.sqrt_s=log:1:1000:31       the same with equal ratios
beams.sqrt_s=10,20,30            a list of TOML values
"""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from barnwright.cli.reading import toml_values
from barnwright.errors import RequestError, Violation, show

MAX_VALUES = 1_000_000


def parse_over(texts: Sequence[str]) -> dict[str, list[object]]:
    """The axes of a scan: each key with its values, in the order given; several make a grid.

    Raises RequestError with one violation for every text that cannot be read.
    """
    axes: dict[str, list[object]] = {}
    violations: list[Violation] = []
    for index, text in enumerate(texts):
        field = f"over[{index}]"
        key, equals, values = (part.strip() for part in text.partition("="))
        if not equals or not key or not values:
            violations.append(Violation(field, show(text), "KEY=VALUES", "beams.sqrt_s=20:200:181"))
        elif key in axes:
            violations.append(Violation(field, show(key), "each key once", None))
        else:
            try:
                axes[key] = parse_values(values)
            except ValueError as error:
                violations.append(Violation(field, show(text), str(error), f"{key}=20:200:181"))
    if violations:
        raise RequestError(violations)
    return axes


def parse_values(text: str) -> list[object]:
    """The values of one axis. Raises ValueError whose text says what was expected."""
    logarithmic = text.startswith("log:")
    parts = text.removeprefix("log:").split(":")
    if logarithmic or (len(parts) > 1 and '"' not in text):
        return _spaced(parts, logarithmic)
    values = toml_values(text)
    if not values:
        raise ValueError("low:high:count, log:low:high:count, or a list such as 10,20,30 (words in quotes)")
    return values


def _spaced(parts: list[str], logarithmic: bool) -> list[object]:
    low, high, count = _numbers(parts)
    if not (np.isfinite(low) and np.isfinite(high)):
        raise ValueError("finite numbers")
    if logarithmic and not (low > 0 and high > 0):
        raise ValueError("low and high greater than 0 for logarithmic steps")
    if not 1 <= count <= MAX_VALUES or (count == 1 and low != high):
        raise ValueError(f"a count from 2 to {MAX_VALUES}")
    values = np.geomspace(low, high, count) if logarithmic else np.linspace(low, high, count)
    return [float(value) for value in values]


def _numbers(parts: list[str]) -> tuple[float, float, int]:
    try:
        low, high, count = parts
        return float(low), float(high), int(count)
    except ValueError:
        raise ValueError("low:high:count with two numbers and a whole number") from None
