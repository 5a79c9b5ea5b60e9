"""README and DEVELOPERS do what they say: every block runs, every file and every process that they name exists."""

from __future__ import annotations

import re
from pathlib import Path

import pytest
from docs.blocks import Reader

import barnwright

ROOT = Path(__file__).resolve().parents[2]
PAGES = ("README.md", "DEVELOPERS.md")


@pytest.mark.parametrize("page", PAGES)
def test_the_blocks_of_a_page_run(page: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Typed in order into an empty folder, the blocks do what the page shows."""
    monkeypatch.chdir(tmp_path)
    Reader(ROOT / page, tmp_path).read()


@pytest.mark.parametrize("page", PAGES)
def test_links_of_a_page_lead_somewhere(page: str) -> None:
    """A link to a file of the project finds it."""
    targets = re.findall(r"\]\((?!https?:|#)([^)#]+)", (ROOT / page).read_text(encoding="utf-8"))
    assert [target for target in targets if not (ROOT / target).exists()] == []


@pytest.mark.parametrize("example", sorted((ROOT / "examples").glob("*.toml")), ids=lambda path: path.stem)
def test_an_example_request_converges(example: Path) -> None:
    """Every example request gets an answer that reached its accuracy."""
    assert barnwright.predict(example).status == "converged"


def test_readme_lists_the_observables() -> None:
    """README's table of observables is the table that the language itself has."""
    from barnwright.observables import table

    page = (ROOT / "README.md").read_text(encoding="utf-8")
    assert [row.name for row in table() if f"`{row.name}(" not in page and f"`{row.name}`" not in page] == []


def test_readme_lists_the_bundled_processes() -> None:
    """README's table of processes has a row for each that the bundled plugins offer."""
    page = (ROOT / "README.md").read_text(encoding="utf-8")
    bundled = [row.name for row in barnwright.processes() if row.distribution == "barnwright-qed"]
    assert bundled
    assert [name for name in bundled if f"| `{name}` |" not in page] == []
