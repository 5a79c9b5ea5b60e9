"""Standard output, for programs and for people."""

from __future__ import annotations

import sys

from rich.console import Console, RenderableType

#: Where no terminal sets the width, tables are this wide, so that nothing in a file or a pipe is cut.
PLAIN_WIDTH = 160


def write_line(text: str) -> None:
    """One line of text (or of a document) on standard output."""
    sys.stdout.write(f"{text}\n")


def show_table(view: RenderableType) -> None:
    """A table on standard output: as wide as the terminal and in colour there, plain and wide elsewhere."""
    width = None if sys.stdout.isatty() else PLAIN_WIDTH
    Console(file=sys.stdout, width=width, highlight=False, markup=False, emoji=False).print(view)
