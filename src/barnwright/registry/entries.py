"""Finding what is installed: entry points of the contract's group, in a fixed order; imports nothing of a plugin.

Rules of this file
------------------
- A process is called ``plugin/name``: the plugin is the distribution's name in its normal form, without a leading
  ``barnwright-``; the name is that of the entry point.
- Whatever the order on the import path, entries are sorted by name. A name that two claim belongs to neither.
"""

from __future__ import annotations

import re
from collections import defaultdict
from collections.abc import Mapping
from dataclasses import dataclass
from importlib.metadata import Distribution, EntryPoint, entry_points

GROUP = "barnwright.processes.v1"
"""The group of entry points; its last part is the version of the contract."""

_NAME = re.compile(r"[a-z0-9]+(-[a-z0-9]+)*")


@dataclass(frozen=True, slots=True)
class Entry:
    """An installed process: ``name`` (``qed/compton``), and the distribution and version that offer it."""

    name: str
    distribution: str
    version: str
    point: EntryPoint
    source: Distribution

    @property
    def plugin(self) -> str:
        """The part of the name before the slash."""
        return self.name.partition("/")[0]

    def __str__(self) -> str:
        return f"{self.distribution} {self.version} ({self.point.value})"


@dataclass(frozen=True, slots=True)
class Listing:
    """What is installed, and the names that cannot be used with the cause."""

    entries: tuple[Entry, ...]
    broken: Mapping[str, str]


def listing() -> Listing:
    """Everything in the group, sorted by name, then by distribution."""
    entries = sorted(
        (_entry(point, point.dist) for point in entry_points(group=GROUP) if point.dist is not None),
        key=lambda entry: (entry.name, entry.distribution, entry.point.value),
    )
    by_name: dict[str, list[Entry]] = defaultdict(list)
    for entry in entries:
        by_name[entry.name].append(entry)
    broken = {name: cause for name, claims in by_name.items() if (cause := _cause(claims)) is not None}
    return Listing(tuple(entries), broken)


def modules_of(listed: Listing, distribution: str) -> tuple[str, ...]:
    """The modules that a distribution's entry points name."""
    return tuple(e.point.module for e in listed.entries if e.distribution == distribution)


def _entry(point: EntryPoint, distribution: Distribution) -> Entry:
    normal = re.sub(r"[-_.]+", "-", distribution.name).lower()
    plugin = normal.removeprefix("barnwright-")
    return Entry(f"{plugin}/{point.name}", distribution.name, distribution.version, point, distribution)


def _cause(claims: list[Entry]) -> str | None:
    """Why a name cannot be used, from the listing alone."""
    if len(claims) > 1:
        return f"{len(claims)} entry points claim this name: {' and '.join(map(str, claims))}; uninstall all but one"
    name = claims[0].point.name
    if not _NAME.fullmatch(name):
        return f"the entry point is called {name!r}, expected lower case words and digits joined by hyphens"
    return None
