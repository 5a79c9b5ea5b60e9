"""What callers hold on to, pinned: names, help texts, fields of a request. Accept a change: `make snapshots`."""

from __future__ import annotations

import os
import re
from importlib import import_module
from pathlib import Path

from typer.main import get_command
from typer.testing import CliRunner

from barnwright import Request

ROOT = Path(__file__).resolve().parents[2]
SNAPSHOTS = ROOT / "tests" / "snapshots"


def pin(name: str, text: str) -> None:
    """Compare a text with its snapshot, or write it where UPDATE_SNAPSHOTS is set."""
    file = SNAPSHOTS / name
    if os.environ.get("UPDATE_SNAPSHOTS"):
        file.parent.mkdir(exist_ok=True)
        file.write_text(text, encoding="utf-8")
    assert file.read_text(encoding="utf-8") == text, "changed on purpose? make snapshots"


def request_fields() -> set[str]:
    """The keys of a request document."""
    return {field.alias or name for name, field in Request.model_fields.items()}


def test_public_names_are_pinned() -> None:
    """`__all__` of the modules that promise something is what it was."""
    modules = ("barnwright", "barnwright.amplitudes", "barnwright.plugin", "barnwright.testing")
    pin("public_names.txt", "".join(f"{m}.{name}\n" for m in modules for name in sorted(import_module(m).__all__)))


def test_help_texts_are_pinned() -> None:
    """The help of the program and of each command is what it was, and each command shows an example."""
    from barnwright.cli.app import app

    runner, environment = CliRunner(), {"COLUMNS": "100", "NO_COLOR": "1", "TERM": "dumb"}
    commands = sorted(get_command(app).commands)  # type: ignore[attr-defined]
    texts = {name: runner.invoke(app, [*name.split(), "--help"], env=environment).output for name in ["", *commands]}
    assert [name for name in commands if "Example" not in texts[name]] == []
    pin("help.txt", "\n".join(f"$ barnwright {name}\n{text}" for name, text in texts.items()))


def test_the_wire_knows_the_fields_of_a_request() -> None:
    """The message that asks for a prediction has the fields of the document, no more and no fewer."""
    from barnwright.wire.v1 import request_pb2

    assert {field.name for field in request_pb2.Request.DESCRIPTOR.fields} == request_fields()


def test_the_readme_lists_the_fields_of_a_request() -> None:
    """README's table of request fields has a row for each, no more and no fewer."""
    section = (ROOT / "README.md").read_text(encoding="utf-8").split("## The request", 1)[1].split("\n## ", 1)[0]
    assert set(re.findall(r"^\| `(\w+)`", section, re.MULTILINE)) == request_fields()
