"""README and DEVELOPERS do what they say: every block runs, every file and every process that they name exists."""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Callable
from pathlib import Path
from types import ModuleType

import pytest
from docs.blocks import FENCE, Reader

import barnwright
import barnwright.amplitudes
import barnwright.plugin
from docs import tables

ROOT = Path(__file__).resolve().parents[2]
GUIDE = ("docs/accuracy.md", "docs/analyst.md", "docs/conventions.md", "docs/theorist.md")
PAGES = ("README.md", "DEVELOPERS.md", *GUIDE)


@pytest.mark.parametrize("page", PAGES)
def test_the_blocks_of_a_page_run(page: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Typed in order into a folder with nothing but the examples, the blocks do what the page shows."""
    (tmp_path / "examples").symlink_to(ROOT / "examples")
    monkeypatch.chdir(tmp_path)
    Reader(ROOT / page, tmp_path).read()


def anchors(page: Path) -> set[str]:
    """Where links into a page may lead: its headings, as forges write them."""
    headings = re.findall(r"^#+ (.*)$", FENCE.sub("", page.read_text(encoding="utf-8")), flags=re.MULTILINE)
    return {"".join(filter(_stays, heading.lower())).replace(" ", "-") for heading in headings}


def _stays(character: str) -> bool:
    return character in "-_ " or unicodedata.category(character)[0] in "LM" or character.isdecimal()


@pytest.mark.parametrize("page", PAGES)
def test_links_of_a_page_lead_somewhere(page: str) -> None:
    """A link to a file of the project finds it, one to a heading finds the heading."""
    here = ROOT / page
    broken = []
    for target, anchor in re.findall(r"\]\((?!https?:)([^)#]*)(?:#([^)]*))?\)", here.read_text(encoding="utf-8")):
        there = here.parent / target if target else here
        if not there.exists() or (anchor and anchor not in anchors(there)):
            broken.append(f"{target}#{anchor}")
    assert broken == []


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


def test_every_process_is_bound_to_something_outside() -> None:
    """The table of checks on the page about accuracy has every bundled process."""
    page = (ROOT / "docs/accuracy.md").read_text(encoding="utf-8")
    rows = [line for line in page.splitlines() if line.startswith("| `")]
    assert [name for name in tables.bundled() if not any(f"`{name}`" in row for row in rows)] == []


def test_pictures_are_small_and_made_by_a_command_of_their_page() -> None:
    """README shows every picture below docs, a block of it draws a file of that name, and none takes 200 kB."""
    page = (ROOT / "README.md").read_text(encoding="utf-8")
    for picture in (ROOT / "docs/pictures").iterdir():
        assert f"]({picture.relative_to(ROOT)})" in page
        assert re.search(rf"^\$ barnwright .* --plot {re.escape(picture.name)}$", page, flags=re.MULTILINE)
        assert picture.stat().st_size < 200_000
