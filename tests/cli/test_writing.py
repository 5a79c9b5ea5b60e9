"""Files that appear whole or not at all."""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from barnwright.cli.writing import check_place, write_whole
from barnwright.errors import RequestError


def test_file_is_replaced_and_nothing_is_left_beside_it(tmp_path: Path) -> None:
    """The new content takes the old one's place and no temporary file stays."""
    place = tmp_path / "out.json"
    place.write_text("old")
    write_whole(place, b"new")
    assert place.read_text() == "new"
    assert [entry.name for entry in tmp_path.iterdir()] == ["out.json"]


def test_failed_write_leaves_the_old_file(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """When the disk refuses, the old content stands and no part of the new one is left."""
    place = tmp_path / "out.json"
    place.write_text("old")

    def full(_: int) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(OSError, match="No space left on device"):
        write_whole(place, b"new")
    assert place.read_text() == "old"
    assert [entry.name for entry in tmp_path.iterdir()] == ["out.json"]


def test_symbolic_link_stays_a_link(tmp_path: Path) -> None:
    """Writing through a symbolic link replaces the file it leads to."""
    real, link = tmp_path / "real.json", tmp_path / "link.json"
    real.write_text("old")
    link.symlink_to(real)
    write_whole(link, b"new")
    assert link.is_symlink()
    assert real.read_text() == "new"


def test_device_is_written_directly() -> None:
    """A device such as /dev/null is written, never replaced by a file."""
    write_whole(Path(os.devnull), b"gone")
    assert not Path(os.devnull).is_file()


def test_place_in_a_missing_folder_is_refused(tmp_path: Path) -> None:
    """A folder that does not exist is named before any work is done."""
    with pytest.raises(RequestError, match=r"--output: got .*expected a file in a folder that exists"):
        check_place(tmp_path / "missing" / "out.json", "--output")


def test_folder_is_refused_as_a_file(tmp_path: Path) -> None:
    """The name of a folder is no place for a document."""
    with pytest.raises(RequestError, match="expected the name of a file, not of a folder"):
        check_place(tmp_path, "--output")
