"""Files appear whole or not at all: written beside their place, then renamed into it."""

from __future__ import annotations

import os
import stat
from pathlib import Path

from barnwright.errors import RequestError, Violation, show


def check_place(path: Path, option: str) -> None:
    """Refuse a place that cannot take a file, before any work is done.

    Raises RequestError naming the option.
    """
    folder = _real(path).parent
    if path.is_dir():
        expected = "the name of a file, not of a folder"
    elif not folder.is_dir():
        expected = f"a file in a folder that exists ({folder} does not)"
    elif not os.access(folder, os.W_OK) and not _is_device(path):
        expected = f"a file in a folder that can be written ({folder} cannot)"
    else:
        return
    raise RequestError([Violation(option, show(str(path)), expected)])


def write_whole(path: Path, content: bytes) -> None:
    """Write a file so that a reader finds the old content or the new, never a part of it.

    A device or a named pipe is written directly. Raises OSError when the place cannot be written; the old file is
    then untouched.
    """
    if _is_device(path):
        path.write_bytes(content)
        return
    place = _real(path)
    part = place.with_name(f".{place.name}.{os.getpid()}.part")
    try:
        with part.open("xb") as file:
            file.write(content)
            file.flush()
            os.fsync(file.fileno())
        part.replace(place)
    except BaseException:
        part.unlink(missing_ok=True)
        raise


def _real(path: Path) -> Path:
    """Where a symbolic link leads, so that renaming replaces the file and not the link."""
    return path.resolve()


def _is_device(path: Path) -> bool:
    return path.exists() and not stat.S_ISREG(path.stat().st_mode) and not path.is_dir()
