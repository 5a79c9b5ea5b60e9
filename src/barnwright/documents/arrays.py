"""Arrays as fields of documents: lists of numbers in JSON, read-only float64 arrays in Python.

A number that is not known is ``null`` in JSON and NaN in Python; infinity is refused.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Annotated, Any, Self

import numpy as np
from numpy.typing import NDArray
from pydantic import GetCoreSchemaHandler, GetJsonSchemaHandler
from pydantic_core import CoreSchema, core_schema

from barnwright.documents.base import Document, Expects

Array = NDArray[np.float64]


def read_only(values: Any) -> Array:
    """A read-only float64 view of an array, or an array of numbers; the caller's own array stays as it is."""
    view = np.asarray(values, dtype=np.float64).view()
    view.flags.writeable = False
    return view


def _numbers(entry: Any) -> Any:
    """Nested lists with NaN for None; anything that is no finite number is refused."""
    if isinstance(entry, (list, tuple)):
        return [_numbers(inner) for inner in entry]
    if entry is None:
        return np.nan
    if isinstance(entry, (int, float)) and not isinstance(entry, bool) and abs(entry) < np.inf:
        return entry
    raise ValueError("an entry is no finite number")


def to_array(values: Any) -> Array:
    """A read-only array from an array of numbers or from nested lists.

    Raises:
        ValueError: for anything but finite numbers and unknown ones in a regular shape.
    """
    if not isinstance(values, (list, tuple, np.ndarray)):
        raise ValueError("no list of numbers")
    array = np.array(values if isinstance(values, np.ndarray) else _numbers(values), dtype=np.float64)
    if np.isinf(array).any():
        raise ValueError("an entry is infinite")
    array.flags.writeable = False
    return array


def to_lists(array: Array) -> Any:
    """Nested lists, None where a number is not known or not finite."""
    known = np.isfinite(array)
    if known.all():
        return array.tolist()
    return np.where(known, array.astype(object), np.array(None, dtype=object)).tolist()


@dataclass(frozen=True, slots=True)
class ArrayForm:
    """How an array of one of the given numbers of dimensions is read from and written to a document."""

    dimensions: tuple[int, ...]

    def read(self, values: Any) -> Array:
        """The array of a document's lists; raises ValueError for another number of dimensions."""
        array = to_array(values)
        if array.ndim not in self.dimensions:
            raise ValueError(f"{array.ndim} dimensions")
        return array

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        """Read by ``read``, written as lists."""
        written = core_schema.plain_serializer_function_ser_schema(to_lists, when_used="json")
        return core_schema.no_info_plain_validator_function(self.read, serialization=written)

    def __get_pydantic_json_schema__(self, schema: CoreSchema, handler: GetJsonSchemaHandler) -> dict[str, Any]:
        """A list, or a list of lists, of numbers and null."""
        entry: dict[str, Any] = {"type": ["number", "null"]}
        for _ in range(max(self.dimensions) - 1):
            entry = {"anyOf": [entry, {"type": "array", "items": entry}]}
        return {"type": "array", "items": entry}


@dataclass(frozen=True, slots=True)
class EdgesForm:
    """Edges of histograms: a list of axes in JSON; in Python the array of the one axis, or a tuple of two arrays."""

    def read(self, values: Any) -> Array | tuple[Array, ...]:
        """The edges of a document's list of axes, or what Python has for them."""
        if isinstance(values, np.ndarray):
            return ArrayForm((1,)).read(values)
        if not isinstance(values, (list, tuple)) or not 1 <= len(values) <= 2:
            raise ValueError("no list of one or two axes")
        axes = tuple(ArrayForm((1,)).read(axis) for axis in values)
        if any(axis.size < 2 or not (np.diff(axis) > 0).all() for axis in axes):
            raise ValueError("edges that do not increase")
        return axes[0] if len(axes) == 1 else axes

    def write(self, edges: Array | tuple[Array, ...]) -> list[Any]:
        """The list of axes."""
        return [to_lists(axis) for axis in axes_of(edges)]

    def __get_pydantic_core_schema__(self, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        """Read by ``read``, written by ``write``."""
        written = core_schema.plain_serializer_function_ser_schema(self.write, when_used="json")
        return core_schema.no_info_plain_validator_function(self.read, serialization=written)

    def __get_pydantic_json_schema__(self, schema: CoreSchema, handler: GetJsonSchemaHandler) -> dict[str, Any]:
        """A list of lists of numbers."""
        return {"type": "array", "items": {"type": "array", "items": {"type": "number"}}}


def axes_of(edges: Array | tuple[Array, ...]) -> tuple[Array, ...]:
    """The axes as a tuple, also where there is only one."""
    return edges if isinstance(edges, tuple) else (edges,)


FloatArray = Annotated[Array, ArrayForm((1, 2)), Expects("a list of numbers, null where one is not known")]
Matrix = Annotated[Array, ArrayForm((2,)), Expects("a list of lists of numbers, all equally long")]
Edges = Annotated[Array | tuple[Array, ...], EdgesForm(), Expects("a list of one or two axes of increasing edges")]


class ArrayDocument(Document):
    """A document with arrays: built with read-only views of them, equal where every entry is (NaN equals NaN)."""

    @classmethod
    def build(cls, **fields: Any) -> Self:
        """As ``Document.build``; arrays are handed over as read-only views."""
        for name, value in fields.items():
            if type(value) is np.ndarray:
                fields[name] = read_only(value)
        return super().build(**fields)

    def __eq__(self, other: object) -> bool:
        """Equal fields, arrays entry by entry."""
        if type(self) is not type(other):
            return NotImplemented
        return all(_equal(self.__dict__[name], other.__dict__[name]) for name in type(self).model_fields)

    __hash__ = None  # type: ignore[assignment]


def _equal(one: Any, two: Any) -> bool:
    if isinstance(one, np.ndarray) and isinstance(two, np.ndarray):
        return np.array_equal(one, two, equal_nan=True)
    if isinstance(one, tuple) and isinstance(two, tuple):
        return len(one) == len(two) and all(map(_equal, one, two))
    if isinstance(one, dict) and isinstance(two, dict):
        return one.keys() == two.keys() and all(_equal(one[key], two[key]) for key in one)
    return bool(one == two)
