"""A sequence of things that have names: ``histograms["angle"]``, ``histograms[0]``; a list of objects in JSON."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from typing import Any, Protocol, TypeVar, get_args, overload

from pydantic import GetCoreSchemaHandler
from pydantic_core import CoreSchema, core_schema

from barnwright.errors import nearest


class Named(Protocol):
    """Anything that has a name."""

    @property
    def name(self) -> str:
        """The name, one of a kind in its sequence."""


T = TypeVar("T", bound=Named)


class ByName(Sequence[T]):
    """An immutable sequence that is read by position, by slice or by name.

    Raises:
        ValueError: on construction, when two entries have one name.
        KeyError: on reading a name that is not there; it lists the names.
    """

    __slots__ = ("_entries", "_places")

    def __init__(self, entries: Iterable[T] = ()) -> None:
        """Take the entries in this order."""
        self._entries = tuple(entries)
        self._places = {entry.name: place for place, entry in enumerate(self._entries)}
        if len(self._places) != len(self._entries):
            names = [entry.name for entry in self._entries]
            raise ValueError(f"the name {next(name for name in names if names.count(name) > 1)!r} is there twice")

    @property
    def names(self) -> tuple[str, ...]:
        """The names in order."""
        return tuple(self._places)

    @overload
    def __getitem__(self, key: int | str) -> T: ...

    @overload
    def __getitem__(self, key: slice) -> ByName[T]: ...

    def __getitem__(self, key: int | str | slice) -> T | ByName[T]:
        """The entry of that position or name, or a part of the sequence."""
        if isinstance(key, str):
            return self._entries[self._place(key)]
        return ByName(self._entries[key]) if isinstance(key, slice) else self._entries[key]

    def keys(self) -> tuple[str, ...]:
        """The names, as a mapping has them."""
        return self.names

    def values(self) -> tuple[T, ...]:
        """The entries, as a mapping has them."""
        return self._entries

    def items(self) -> tuple[tuple[str, T], ...]:
        """Names and entries in pairs, as a mapping has them."""
        return tuple(zip(self._places, self._entries, strict=True))

    def _place(self, name: str) -> int:
        if name not in self._places:
            near = nearest(name, self._places)
            hint = f"; nearest: {near}" if near else ""
            raise KeyError(f"no entry named {name!r} among {', '.join(self._places) or 'none'}{hint}")
        return self._places[name]

    def get(self, name: str) -> T | None:
        """The entry of that name, or None."""
        place = self._places.get(name)
        return None if place is None else self._entries[place]

    def __len__(self) -> int:
        """How many entries there are."""
        return len(self._entries)

    def __iter__(self) -> Iterator[T]:
        """The entries in order."""
        return iter(self._entries)

    def __contains__(self, key: object) -> bool:
        """Whether there is an entry of that name, or that entry."""
        return key in self._places if isinstance(key, str) else key in self._entries

    def __eq__(self, other: object) -> bool:
        """Equal entries in the same order."""
        return self._entries == other._entries if isinstance(other, ByName) else NotImplemented

    __hash__ = None  # type: ignore[assignment]

    def __repr__(self) -> str:
        """The entries as a list."""
        return f"ByName({list(self._entries)!r})"

    @classmethod
    def __get_pydantic_core_schema__(cls, source: Any, handler: GetCoreSchemaHandler) -> CoreSchema:
        """Read from, and written as, a list of the entries."""
        entries = core_schema.list_schema(handler.generate_schema(get_args(source)[0]))
        written = core_schema.wrap_serializer_function_ser_schema(_write, schema=entries)
        listed = core_schema.no_info_before_validator_function(_listed, entries)
        return core_schema.no_info_after_validator_function(cls, listed, serialization=written)


def _listed(values: Any) -> Any:
    return list(values) if isinstance(values, ByName) else values


def _write(entries: Any, handler: Any) -> Any:
    return handler(list(entries))
