"""Arrays as fields of documents."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from pydantic import TypeAdapter, ValidationError

from barnwright.documents.arrays import Edges, FloatArray, Matrix


def test_unknown_entries() -> None:
    """null in JSON is NaN in Python, and back."""
    adapter = TypeAdapter(FloatArray)
    array = adapter.validate_json("[1, null, 2.5]")
    assert array.dtype == np.float64
    assert np.isnan(array[1])
    assert not array.flags.writeable
    assert adapter.dump_json(array) == b"[1.0,null,2.5]"
    assert adapter.dump_python(adapter.validate_python([[1, None]]), mode="json") == [[1.0, None]]
    assert adapter.validate_python([]).shape == (0,)
    assert adapter.dump_json(np.array([np.inf, 0.0])) == b"[null,0.0]"


@pytest.mark.parametrize("wrong", [3, "ab", [True], ["1"], [[1], [1, 2]], [1, [2]], [float("inf")], [[[1]]], {"a": 1}])
def test_no_arrays(wrong: Any) -> None:
    """Anything but finite numbers in a regular shape of one or two dimensions is refused."""
    with pytest.raises(ValidationError, match="1 validation error"):
        TypeAdapter(FloatArray).validate_python(wrong)


def test_infinite_arrays_are_refused() -> None:
    """An array of numpy is looked at like a list."""
    with pytest.raises(ValidationError, match="an entry is infinite"):
        TypeAdapter(Matrix).validate_python(np.array([[np.inf]]))


@pytest.mark.parametrize("wrong", [[], [[0, 1]] * 3, [[0]], [[1, 0]], [0, 1], [[0, None]], "ab"])
def test_no_edges(wrong: Any) -> None:
    """Edges are one or two lists of increasing numbers."""
    with pytest.raises(ValidationError, match="1 validation error"):
        TypeAdapter(Edges).validate_python(wrong)


def test_json_schemas_exist() -> None:
    """The schemas for programs know arrays too."""
    assert TypeAdapter(FloatArray).json_schema()["type"] == "array"
    assert TypeAdapter(Edges).json_schema()["items"]["type"] == "array"
