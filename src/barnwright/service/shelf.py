"""A shelf of the things that were sent last, kept alike at both ends of a connection."""

from __future__ import annotations

from collections import OrderedDict
from typing import Generic, TypeVar

T = TypeVar("T")


class Shelf(Generic[T]):
    """The last few things by name. Whoever sends keeps one that mirrors the receiver's, and knows what is there."""

    def __init__(self, places: int = 8) -> None:
        self._places = places
        self._things: OrderedDict[str, T] = OrderedDict()

    def __contains__(self, name: str) -> bool:
        return name in self._things

    def take(self, name: str, thing: T | None) -> T:
        """The thing of this name, put on the shelf if it came along; the one not asked for longest makes room."""
        if thing is not None:
            self._things[name] = thing
        self._things.move_to_end(name)
        while len(self._things) > self._places:
            self._things.popitem(last=False)
        return self._things[name]
