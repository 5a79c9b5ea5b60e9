"""Standard output, for programs and for people."""

from __future__ import annotations

import sys
from io import StringIO

from rich.console import Console, RenderableType

#: Where no terminal sets the width, tables are this wide, so that nothing in a file or a pipe is cut.
PLAIN_WIDTH = 160


def write_line(text: str) -> None:
    """One line of text (or of a document) on standard output."""
    sys.stdout.write(f"{text}\n")


def show_table(view: RenderableType) -> None:
    """A table on standard output: as wide as the terminal and in colour there, plain and wide elsewhere."""
    if sys.stdout.isatty():
        Console(highlight=False).print(view)
        return
    console = Console(file=StringIO(), width=PLAIN_WIDTH, color_system=None)
    with console.capture() as captured:
        console.print(view)
    text = "".join(f"{line.rstrip()}\n" for line in captured.get().rstrip().splitlines())
    encoding = sys.stdout.encoding or "utf-8"
    sys.stdout.write(text.encode(encoding, "replace").decode(encoding))
