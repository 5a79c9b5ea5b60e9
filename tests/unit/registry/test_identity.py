"""Identities: a digest of a distribution's own source and data files, equal for a wheel and an editable install."""

from __future__ import annotations

from importlib.metadata import Distribution
from pathlib import Path

import pytest

from barnwright.registry.identity import digest_of, forget
from barnwright.registry.own_files import own_files

FILES = {"plug/__init__.py": "a = 1\n", "plug/deep/more.py": "b = 2\n", "plug/table.csv": "1,2\n"}


def packages(folder: Path) -> None:
    """Write the package, and what does not count: compiled files and caches."""
    extra = {"plug/__pycache__/x.cpython-311.pyc": "x", "plug/old.pyc": "x"}
    for name, text in {**FILES, **extra}.items():
        (folder / name).parent.mkdir(parents=True, exist_ok=True)
        (folder / name).write_text(text)


def distribution(site: Path, recorded: list[str] | None) -> Distribution:
    """An installed distribution called plug whose RECORD lists these files, or that has none."""
    meta = site / "plug-1.0.dist-info"
    meta.mkdir(parents=True, exist_ok=True)
    (meta / "METADATA").write_text("Metadata-Version: 2.1\nName: plug\nVersion: 1.0\n")
    if recorded is not None:
        lines = [f"{name},," for name in [*recorded, "plug-1.0.dist-info/METADATA", "../../../bin/plug"]]
        (meta / "RECORD").write_text("\n".join(lines))
    return Distribution.at(meta)


def wheel(folder: Path) -> Distribution:
    """Installed from a wheel."""
    packages(folder)
    return distribution(folder, [*FILES, "plug/__pycache__/x.cpython-311.pyc"])


def editable(folder: Path) -> Distribution:
    """Installed in place: a path file that names the source folder."""
    packages(folder / "src")
    site = folder / "site"
    found = distribution(site, ["_editable_impl_plug.pth"])
    (site / "_editable_impl_plug.pth").write_text(f"{folder / 'src'}\n")
    return found


@pytest.mark.parametrize("install", [wheel, editable], ids=["wheel", "editable"])
def test_own_files_are_sources_and_data(install, tmp_path: Path) -> None:
    """Python files and tables count; compiled files, caches, metadata and scripts do not."""
    assert list(own_files(install(tmp_path), ["plug.deep.more"])) == sorted(FILES)


def test_metadata_alone_leaves_the_packages_of_the_entry_points(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """Without a RECORD the files are those of the package that an entry point names, and nothing is imported."""
    packages(tmp_path)
    monkeypatch.syspath_prepend(tmp_path)
    assert list(own_files(distribution(tmp_path, None), ["plug.deep"])) == sorted(FILES)


def test_a_wheel_and_an_editable_install_have_one_digest(tmp_path: Path) -> None:
    """The digest depends on names below the import path and contents, not on where the files lie."""
    assert digest_of(wheel(tmp_path / "a"), ["plug"]) == digest_of(editable(tmp_path / "b"), ["plug"])


@pytest.mark.parametrize("name", FILES)
def test_any_change_of_a_file_changes_the_digest(tmp_path: Path, name: str) -> None:
    """Source or data: one more byte is another plugin."""
    before, after = wheel(tmp_path / "a"), wheel(tmp_path / "b")
    (tmp_path / "b" / name).write_text(FILES[name] + "\n")
    assert digest_of(before, ["plug"]) != digest_of(after, ["plug"])


def test_the_digest_is_that_of_the_code_that_was_imported(tmp_path: Path) -> None:
    """A file edited later does not change it, until the plugin is forgotten because it failed to load."""
    found = wheel(tmp_path)
    first = digest_of(found, ["plug"])
    (tmp_path / "plug" / "__init__.py").write_text("a = 2\n")
    assert digest_of(found, ["plug"]) == first
    forget(found)
    assert digest_of(found, ["plug"]) != first
