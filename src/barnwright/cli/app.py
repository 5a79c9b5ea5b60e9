"""The typer application: the commands and what stands above them."""

from __future__ import annotations

from collections.abc import Callable
from typing import Annotated

import typer

from barnwright.cli.describe import describe
from barnwright.cli.predict import predict
from barnwright.cli.processes import processes
from barnwright.cli.scan import scan
from barnwright.cli.serve import serve

EPILOG = (
    "Exit codes: 0 done; 1 accuracy not reached or suspect; 2 the request is wrong; 3 machinery; 4 a check failed; "
    "130 interrupted. Predictions hold at the stated order and range of validity; work that can hurt someone follows "
    "local rules and a qualified radiation-protection expert."
)

app = typer.Typer(
    name="barnwright",
    help="Cross sections for exactly the acceptance of a measurement, with their uncertainties.",
    epilog=EPILOG,
    no_args_is_help=True,
    rich_markup_mode=None,
    pretty_exceptions_enable=False,
    context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 100},
)
COMMANDS: dict[Callable[..., None], str] = {
    predict: "One request, one prediction.",
    scan: "One request at many values of its keys.",
    processes: "What is installed.",
    describe: "One process in full, and a request to copy.",
    serve: "Answer requests over gRPC.",
}
for command, short_help in COMMANDS.items():
    app.command(short_help=short_help)(command)


def _show_version(wanted: bool) -> None:
    if wanted:
        from barnwright import __version__

        typer.echo(f"barnwright {__version__}")
        raise typer.Exit


@app.callback()
def _before(
    version: Annotated[
        bool, typer.Option("--version", callback=_show_version, is_eager=True, help="Print the version and end.")
    ] = False,
) -> None:
    """Cross sections for exactly the acceptance of a measurement, with their uncertainties."""
