"""The house rules that no linter knows: sizes of files and functions, versions in lock-step."""

from __future__ import annotations

import ast
import re
import tomllib
from collections.abc import Iterator
from pathlib import Path

import barnwright

ROOT = Path(__file__).resolve().parents[2]
FOLDERS = ("src", "plugins", "tools", "examples", "benchmarks")
MAX_FILE, MAX_FUNCTION = 300, 40


def sources() -> Iterator[Path]:
    """Every hand-written Python file outside the tests."""
    for folder in FOLDERS:
        yield from (p for p in sorted((ROOT / folder).rglob("*.py")) if "_pb2" not in p.name)


def functions(path: Path) -> Iterator[ast.FunctionDef | ast.AsyncFunctionDef]:
    """Every function and method of a file, nested ones too."""
    tree = ast.walk(ast.parse(path.read_text(encoding="utf-8")))
    yield from (node for node in tree if isinstance(node, ast.FunctionDef | ast.AsyncFunctionDef))


def test_no_file_is_over_300_lines() -> None:
    """A file that grew past 300 lines holds more than one idea."""
    lengths = {str(p.relative_to(ROOT)): len(p.read_text(encoding="utf-8").splitlines()) for p in sources()}
    assert {name: length for name, length in lengths.items() if length > MAX_FILE} == {}


def test_no_function_is_over_40_lines() -> None:
    """A function that grew past 40 lines, docstring and all, wants a name for one of its parts."""
    found = ((p, f, (f.end_lineno or f.lineno) - f.lineno + 1) for p in sources() for f in functions(p))
    assert {f"{p.relative_to(ROOT)}:{f.name}": length for p, f, length in found if length > MAX_FUNCTION} == {}


def test_versions_are_in_lock_step() -> None:
    """The package, the bundled plugins, what these ask for and the citation carry one version."""
    found = {"CITATION.cff": re.search(r"^version: (.+)$", (ROOT / "CITATION.cff").read_text(), re.MULTILINE)[1]}
    for file in sorted((ROOT / "plugins").glob("*/pyproject.toml")):
        project = tomllib.loads(file.read_text(encoding="utf-8"))["project"]
        found[project["name"]] = project["version"]
        found[f"{project['name']} asks for"] = project["dependencies"][0].removeprefix("barnwright==")
    assert found == dict.fromkeys(found, barnwright.__version__)
