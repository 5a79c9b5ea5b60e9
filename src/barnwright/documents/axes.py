"""The axes of a scan: lists of values by key of the request, as plain Python values."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

import numpy as np

from barnwright.errors import RequestError, Violation, show


def plain_axes(over: Any) -> dict[str, tuple[Any, ...]]:
    """The values of every key as tuples of Python's own numbers and words.

    Raises:
        RequestError: where something is no list of values by key.
    """
    if not isinstance(over, Mapping) or not over:
        raise RequestError([Violation("over", show(over), "lists of values by key: {'beams.sqrt_s': [10.0, 20.0]}")])
    wrong = [key for key, values in over.items() if not _is_list(values)]
    if wrong:
        raise RequestError(Violation(f"over.{key}", show(over[key]), "a list of values") for key in wrong)
    return {str(k): tuple(v.item() if hasattr(v, "item") else v for v in values) for k, values in over.items()}


def _is_list(values: Any) -> bool:
    if isinstance(values, (str, bytes, Mapping)) or not isinstance(values, Iterable):
        return False
    return not isinstance(values, np.ndarray) or values.ndim == 1
