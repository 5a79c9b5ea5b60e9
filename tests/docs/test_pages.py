"""README and DEVELOPERS do what they say: every block runs, every file and every process that they name exists."""

from __future__ import annotations

import re
from collections.abc import Callable
from pathlib import Path
from types import ModuleType

import pytest
from docs.blocks import Reader

import barnwright
import barnwright.amplitudes
import barnwright.plugin
from docs import tables

ROOT = Path(__file__).resolve().parents[2]
PAGES = ("README.md", "DEVELOPERS.md", "docs/analyst.md", "docs/conventions.md", "docs/theorist.md")


@pytest.mark.parametrize("page", PAGES)
def test_the_blocks_of_a_page_run(page: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Typed in order into an empty folder, the blocks do what the page shows."""
    monkeypatch.chdir(tmp_path)
    Reader(ROOT / page, tmp_path).read()


@pytest.mark.parametrize("page", PAGES)
def test_links_of_a_page_lead_somewhere(page: str) -> None:
    """A link to a file of the project finds it."""
    targets = re.findall(r"\]\((?!https?:|#)([^)#]+)", (ROOT / page).read_text(encoding="utf-8"))
    assert [target for target in targets if not ((ROOT / page).parent / target).exists()] == []


@pytest.mark.parametrize("example", sorted((ROOT / "examples").glob("*.toml")), ids=lambda path: path.stem)
def test_an_example_request_converges(example: Path) -> None:
    """Every example request gets an answer that reached its accuracy."""
    assert barnwright.predict(example).status == "converged"


@pytest.mark.parametrize("rows", [tables.observables, tables.processes], ids=lambda rows: rows.__name__)
def test_readme_repeats_a_table_of_the_code(rows: Callable[[], list[str]]) -> None:
    """README's tables of observables and processes have the rows of the code, no more, no fewer, in order."""
    section = (ROOT / "README.md").read_text(encoding="utf-8").split(f"## {rows.__name__.capitalize()}\n", 1)[1]
    lines = section.split("\n## ", 1)[0].splitlines()
    assert [line for line in lines if line.startswith("| `")] == rows()


@pytest.mark.parametrize("room", [barnwright.amplitudes, barnwright.plugin], ids=lambda room: room.__name__)
def test_the_theorist_finds_every_name(room: ModuleType) -> None:
    """The theorist's page mentions every name of the contract and of the amplitude toolkit."""
    words = set(re.findall(r"\w+", (ROOT / "docs/theorist.md").read_text(encoding="utf-8")))
    assert [name for name in room.__all__ if name not in words] == []
