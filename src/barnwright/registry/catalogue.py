"""The catalogue: processes by name, loaded when they are asked for, the broken ones kept beside the healthy.

Rules of this file
------------------
- Listing imports nothing; loading one process imports its module only, checks it once, and keeps it.
- A plugin that fails takes nothing down: its cause is kept and raised whenever one of its processes is asked for.
"""

from __future__ import annotations

import importlib
from collections.abc import Mapping
from dataclasses import dataclass
from functools import lru_cache

from barnwright.errors import PluginError, UnknownProcessError, Violation, nearest, show
from barnwright.process import Process

from .checks import findings_of
from .entries import Entry, Listing, listing, modules_of
from .identity import ProcessIdentity, digest_of, forget

NEEDS: frozenset[str] = frozenset()
"""Meanings beyond the contract's fields that this core knows; a process that needs another is refused by name."""

_LISTED = 12


@dataclass(frozen=True, slots=True)
class LoadedProcess:
    """A process that passed its checks, and its identity."""

    process: Process
    identity: ProcessIdentity


class Catalogue:
    """What was installed when it was made."""

    def __init__(self, listed: Listing) -> None:
        self._listing = listed
        self._entries = {entry.name: entry for entry in listed.entries}
        self._broken = dict(listed.broken)
        self._loaded: dict[str, LoadedProcess] = {}

    def names(self) -> tuple[str, ...]:
        """All names in alphabetical order, those of broken processes too."""
        return tuple(self._entries)

    def entries(self) -> tuple[Entry, ...]:
        """Name, distribution and version of every installed process; imports nothing."""
        return self._listing.entries

    def broken(self) -> Mapping[str, str]:
        """The cause by name of every process that is known to be broken: two claim it, or loading it failed."""
        return dict(self._broken)

    def load(self, name: str) -> LoadedProcess:
        """The process called ``plugin/name``, imported and checked when it is asked for first.

        Raises
        ------
        UnknownProcessError
            With the nearest name.
        PluginError
            When it does not import, does not pass a check, needs what this core does not know, or is claimed twice.
        KeyboardInterrupt
            When interrupted while it loads; the message names the process.
        """
        if name in self._loaded:
            return self._loaded[name]
        entry = self._entries.get(name)
        if entry is None:
            raise UnknownProcessError([self._unknown(name)])
        if name in self._broken:
            raise PluginError(plugin=entry.distribution, process=name, cause=self._broken[name])
        try:
            self._loaded[name] = self._load(entry)
        except PluginError as error:
            self._broken[name] = error.cause
            forget(entry.source)
            raise
        except KeyboardInterrupt as interrupt:
            message = f"interrupted while process {name} of {entry.distribution} was imported and checked"
            raise KeyboardInterrupt(message) from interrupt
        return self._loaded[name]

    def _load(self, entry: Entry) -> LoadedProcess:
        try:
            digest = digest_of(entry.source, modules_of(self._listing, entry.distribution))
            process = entry.point.load()
        except PluginError as error:
            raise _fault(entry, error.cause) from error
        except (Exception, SystemExit) as error:
            raise _fault(entry, f"{entry.point.value} does not import: {type(error).__name__}: {error}") from error
        if not isinstance(process, Process):
            raise _fault(entry, f"{entry.point.value} is {show(process)}, expected a Process of barnwright.plugin")
        findings = _misnamed(entry, process) or _unmet(process) or findings_of(process)
        if findings:
            raise _fault(entry, "\n".join(findings))
        return LoadedProcess(process, ProcessIdentity(entry.name, entry.distribution, entry.version, digest))

    def _unknown(self, name: str) -> Violation:
        names = self.names()
        if not names:
            expected = "an installed process, but no plugin is installed here"
        elif len(names) <= _LISTED:
            expected = f"one of {', '.join(names)}"
        else:
            expected = f"one of the {len(names)} installed processes"
        same = [known for known in names if known.partition("/")[2] == name.rpartition("/")[2]]
        return Violation("process", show(name), expected, same[0] if len(same) == 1 else nearest(name, names))


def _misnamed(entry: Entry, process: Process) -> list[str]:
    if process.name == entry.point.name:
        return []
    return [f"the process calls itself {process.name!r}, expected the name of its entry point, {entry.point.name!r}"]


def _unmet(process: Process) -> list[str]:
    unknown = ", ".join(sorted(process.needs - NEEDS))
    return [f"it needs {unknown}, which this barnwright does not know: install a newer one"] if unknown else []


def _fault(entry: Entry, cause: str) -> PluginError:
    return PluginError(plugin=entry.distribution, process=entry.name, cause=cause)


@lru_cache(maxsize=1)
def catalogue() -> Catalogue:
    """The catalogue of this process, made once."""
    return Catalogue(listing())


def refresh() -> Catalogue:
    """A new catalogue: what was installed since is found, and broken plugins get another chance.

    A plugin that was imported already keeps its code and its identity until this process ends.
    """
    importlib.invalidate_caches()
    catalogue.cache_clear()
    return catalogue()
