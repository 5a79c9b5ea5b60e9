"""Process objects made in a notebook: they have no distribution, and their identity is the code of their functions."""

from __future__ import annotations

import hashlib
from dataclasses import dataclass
from typing import Any

from barnwright.engine import ProcessSource
from barnwright.process import Process


@dataclass(frozen=True, slots=True)
class LoadedObject:
    """A process object with an identity made up for it, as the registry hands out its own."""

    process: Process
    identity: ProcessSource


def loaded_object(process: Process) -> LoadedObject:
    """The object and its identity; the digest covers its reaction and the byte code of its laws."""
    digest = hashlib.sha256(process.reaction.encode())
    for law in (*process.laws, *process.closed_forms):
        function: Any = getattr(law, "function", None) or getattr(law, "cumulative", None)
        code = getattr(function, "__code__", None)
        digest.update(code.co_code + repr(code.co_consts).encode() if code is not None else repr(law).encode())
    return LoadedObject(process, ProcessSource(process.name, "", "", digest.hexdigest()))
