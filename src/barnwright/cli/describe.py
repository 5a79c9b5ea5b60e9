"""barnwright describe: one process in full."""

from __future__ import annotations

from typing import Annotated

import typer

from barnwright.cli.face import face
from barnwright.cli.options import AsJson, ProcessName, Server
from barnwright.cli.outcome import ExitCode, run

OnlyRequest = Annotated[
    bool, typer.Option("--request", help="Print only the ready request (TOML), to be saved and changed.")
]


def describe(
    process: ProcessName, as_json: AsJson = False, only_request: OnlyRequest = False, server: Server = None
) -> None:
    """Say what a process is: laws, parameters, masses, observables, validity, cautions, and a request to copy.

    \b
    Examples:
      barnwright describe qed/compton
      barnwright describe qed/compton --request > compton.toml
    """
    run(lambda: _describe(process, as_json, only_request, server))


def _describe(process: str, as_json: bool, only_request: bool, server: str | None) -> ExitCode:
    from barnwright.cli.console import show_table, write_line
    from barnwright.cli.process_tables import description_view

    with face(server) as ask:
        description = ask.describe(process)
    if only_request:
        write_line(description.request.rstrip())
    elif as_json:
        write_line(description.model_dump_json())
    else:
        show_table(description_view(description))
    return ExitCode.DONE
