"""Process objects made in a notebook: they have no distribution, and their identity is the code of their functions."""

from __future__ import annotations

from dataclasses import dataclass

from barnwright.engine import ProcessSource
from barnwright.process import Process
from barnwright.run.object_digest import object_digest


@dataclass(frozen=True, slots=True)
class LoadedObject:
    """A process object with an identity made up for it, as the registry hands out its own."""

    process: Process
    identity: ProcessSource


def loaded_object(process: Process) -> LoadedObject:
    """The object and its identity, whose digest covers its declaration and the code that its numbers come from."""
    return LoadedObject(process, ProcessSource(process.name, "", "", object_digest(process)))
