"""barnwright processes: what is installed."""

from __future__ import annotations

from typing import Annotated

import typer

from barnwright.cli.face import face
from barnwright.cli.options import AsJson, Server
from barnwright.cli.outcome import ExitCode, run

Particle = Annotated[
    list[str] | None,
    typer.Option(
        "--particle",
        metavar="NAME",
        help="Only where this particle comes in or goes out. Repeatable: all of them.",
        show_default=False,
    ),
]
Plugin = Annotated[
    str | None, typer.Option("--plugin", metavar="NAME", help="Only those of this plugin.", show_default=False)
]
Kind = Annotated[
    str | None,
    typer.Option(
        "--kind",
        metavar="WORD",
        help="Only this kind of reaction or of law: scattering, elastic, inclusive, angular, total, helicity, ...",
        show_default=False,
    ),
]


def processes(
    particle: Particle = None,
    plugin: Plugin = None,
    kind: Kind = None,
    as_json: AsJson = False,
    server: Server = None,
) -> None:
    """List the processes that are installed, the broken ones with their causes.

    \b
    Examples:
      barnwright processes
      barnwright processes --particle gamma --kind elastic
      barnwright processes --json --server 127.0.0.1:50551
    """
    run(lambda: _processes({"particle": particle, "plugin": plugin, "kind": kind}, as_json, server))


def _processes(choice: dict[str, list[str] | str | None], as_json: bool, server: str | None) -> ExitCode:
    from barnwright.cli.console import show_table, write_line
    from barnwright.cli.process_tables import summaries_view

    given = {name: value for name, value in choice.items() if value}
    with face(server) as ask:
        summaries = ask.processes(**given)  # type: ignore[arg-type]
    if as_json:
        write_line(f"[{','.join(summary.model_dump_json() for summary in summaries)}]")
    else:
        show_table(summaries_view(summaries, given))
    return ExitCode.DONE
