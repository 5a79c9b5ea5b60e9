"""barnwright processes: what is installed."""

from __future__ import annotations

from barnwright.cli.face import face
from barnwright.cli.options import AsJson, Server
from barnwright.cli.outcome import ExitCode, run


def processes(as_json: AsJson = False, server: Server = None) -> None:
    """List the processes that are installed, the broken ones with their causes.

    \b
    Examples:
      barnwright processes
      barnwright processes --json --server 127.0.0.1:50551
    """
    run(lambda: _processes(as_json, server))


def _processes(as_json: bool, server: str | None) -> ExitCode:
    from barnwright.cli.console import show_table, write_line
    from barnwright.cli.process_tables import summaries_view

    with face(server) as ask:
        summaries = ask.processes()
    if as_json:
        write_line(f"[{','.join(summary.model_dump_json() for summary in summaries)}]")
    else:
        show_table(summaries_view(summaries))
    return ExitCode.DONE
