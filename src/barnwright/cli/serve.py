"""barnwright serve: the gRPC server."""

from __future__ import annotations

from typing import Annotated

import typer

from barnwright.cli.outcome import ExitCode, run

Address = Annotated[
    str, typer.Option("--address", metavar="HOST:PORT", help="Where to listen; port 0 takes a free one.")
]
Insecure = Annotated[
    bool, typer.Option("--insecure", help="Listen on other than loopback addresses without encryption.")
]
Workers = Annotated[
    int | None,
    typer.Option("--workers", metavar="N", min=1, help="Processes that calculate; default one for each processor."),
]


def serve(address: Address = "127.0.0.1:50551", insecure: Insecure = False, workers: Workers = None) -> None:
    """Answer requests over gRPC until SIGTERM or Ctrl-C; says when it is ready.

    \b
    Examples:
      barnwright serve
      barnwright serve --address 127.0.0.1:0
    """
    run(lambda: _serve(address, insecure, workers))


def _serve(address: str, insecure: bool, workers: int | None) -> ExitCode:
    from barnwright.errors import BarnwrightError
    from barnwright.service import serve as start

    try:
        return ExitCode(start(address, insecure=insecure, workers=workers))
    except ModuleNotFoundError as error:
        if (error.name or "").startswith("barnwright"):
            raise
        raise BarnwrightError(f"a server needs {error.name}: install barnwright with its extra 'service'") from error
