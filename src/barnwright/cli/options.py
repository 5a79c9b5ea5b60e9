"""The options that several commands share, described once."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path
from typing import Annotated

import typer

RequestFile = Annotated[
    str, typer.Argument(metavar="FILE", help="The request, TOML or JSON; - reads standard input.", show_default=False)
]
Override = Annotated[
    list[str] | None,
    typer.Option(
        "--override",
        metavar="KEY=VALUE",
        help="Change a key of the request: a dotted key and a TOML value, merged like a variation. Repeatable.",
        show_default=False,
    ),
]
AsJson = Annotated[bool, typer.Option("--json", help="Print the document for programs instead of a table.")]
Output = Annotated[
    Path | None,
    typer.Option(
        "--output", metavar="FILE", help="Write the document (JSON) to a file, whole or not at all.", show_default=False
    ),
]
Plot = Annotated[
    Path | None,
    typer.Option("--plot", metavar="FILE", help="Write a picture: .png, .pdf or .svg.", show_default=False),
]
Server = Annotated[
    str | None,
    typer.Option("--server", metavar="ADDRESS", help="Ask a server (host:port) instead.", show_default=False),
]
ProcessName = Annotated[
    str, typer.Argument(metavar="PROCESS", help="The name of a process, plugin/name.", show_default=False)
]


@dataclass(frozen=True, slots=True)
class Wish:
    """What was asked for on the command line, apart from the request itself."""

    as_json: bool
    output: Path | None
    plot: Path | None
    server: str | None

    def check(self) -> None:
        """Refuse places and pictures that cannot be written, before any work. Raises RequestError, BarnwrightError."""
        from barnwright.cli.writing import check_place

        if self.output is not None:
            check_place(self.output, "--output")
        if self.plot is not None:
            from barnwright.plot import check_picture

            check_picture(self.plot.name, "--plot")
            check_place(self.plot, "--plot")
