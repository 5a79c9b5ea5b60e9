"""The source and data files of a distribution's own packages, for wheels and for editable installs.

Rules of this file
------------------
- A wheel says in its RECORD which files are its own. An editable install records a path file instead: its own are then
  the packages in the folders that it names. A bare folder of metadata leaves the packages of the entry points.
- Files are named by their path below the folder that is on the import path, so a wheel and an editable install of the
  same sources have the same names.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from importlib.metadata import Distribution
from importlib.util import find_spec
from pathlib import Path

_LEFT_OUT = {"__pycache__", ".mypy_cache", ".pytest_cache", ".ruff_cache"}


def own_files(distribution: Distribution, modules: Iterable[str]) -> dict[str, Path]:
    """The files by name, sorted by name.

    Parameters
    ----------
    distribution : importlib.metadata.Distribution
    modules : names of modules
        Of the distribution's entry points.

    Raises
    ------
    OSError
        When a folder cannot be read.
    """
    found = dict(_recorded(distribution))
    if not found:
        found = dict(_editable(distribution))
    for module in modules:
        top = module.partition(".")[0]
        if not any(name == f"{top}.py" or name.startswith(f"{top}/") for name in found):
            found.update(_importable(top))
    return dict(sorted(found.items()))


def _recorded(distribution: Distribution) -> Iterator[tuple[str, Path]]:
    for file in distribution.files or ():
        top = file.parts[0]
        if top == ".." or top.endswith((".dist-info", ".egg-info", ".pth")) or top.startswith("__editable__"):
            continue
        if _counts(file.parts):
            yield file.as_posix(), Path(str(distribution.locate_file(file)))


def _editable(distribution: Distribution) -> Iterator[tuple[str, Path]]:
    """Files of the packages in the folders named by a recorded path file."""
    for file in distribution.files or ():
        if file.suffix != ".pth":
            continue
        for line in Path(str(distribution.locate_file(file))).read_text(encoding="utf-8").splitlines():
            folder = Path(line)
            if line and folder.is_dir():
                for package in (entry.parent for entry in folder.glob("*/__init__.py")):
                    yield from _below(package, folder)


def _importable(top: str) -> Iterator[tuple[str, Path]]:
    """Files of a module or package on the import path; nothing is imported."""
    spec = find_spec(top)
    if spec is None:
        return
    for folder in map(Path, spec.submodule_search_locations or ()):
        yield from _below(folder, folder.parent)
    if spec.submodule_search_locations is None and spec.origin is not None:
        yield Path(spec.origin).name, Path(spec.origin)


def _below(package: Path, folder: Path) -> Iterator[tuple[str, Path]]:
    for path in package.rglob("*"):
        relative = path.relative_to(folder)
        if _counts(relative.parts) and path.is_file():
            yield relative.as_posix(), path


def _counts(parts: tuple[str, ...]) -> bool:
    return not _LEFT_OUT.intersection(parts) and not parts[-1].endswith((".pyc", ".pyo"))
