"""Who a process is: its name, its distribution, and a digest of the files that its numbers come from.

Rules of this file
------------------
- Plugin functions travel to workers by identity, never pickled; a worker with another digest refuses.
- The digest is SHA-256 over the sorted source and data files of the distribution's own packages: name, length, content.
- It is taken when a plugin is first loaded and kept: Python keeps the modules it imported then, whatever happens to the
  files. Only a plugin that failed to load is read anew.
"""

from __future__ import annotations

import hashlib
from collections.abc import Iterable
from dataclasses import dataclass
from importlib.metadata import Distribution

from .own_files import own_files

_known: dict[tuple[str, str], str] = {}


@dataclass(frozen=True, slots=True)
class ProcessIdentity:
    """Name (``qed/compton``), distribution and its version, and the SHA-256 of its sources in hexadecimal."""

    name: str
    distribution: str
    version: str
    digest: str


def digest_of(distribution: Distribution, modules: Iterable[str]) -> str:
    """The digest of a distribution's own files, read once.

    Raises
    ------
    OSError
        When a file cannot be read.
    """
    key = _key(distribution)
    if key not in _known:
        total = hashlib.sha256()
        for name, path in own_files(distribution, modules).items():
            content = path.read_bytes()
            total.update(f"{name}\0{len(content)}\0".encode())
            total.update(content)
        _known[key] = total.hexdigest()
    return _known[key]


def forget(distribution: Distribution) -> None:
    """Let the digest be taken anew: the plugin did not load, so its files may be mended while this process runs."""
    _known.pop(_key(distribution), None)


def _key(distribution: Distribution) -> tuple[str, str]:
    return distribution.name, str(distribution.locate_file(""))
