"""barnwright scan: one request at many values of its keys."""

from __future__ import annotations

from typing import Annotated

import typer

from barnwright.cli.face import face, waiting
from barnwright.cli.options import AsJson, Output, Override, Plot, RequestFile, Server, Wish
from barnwright.cli.outcome import ExitCode, run

Over = Annotated[
    list[str],
    typer.Option(
        "--over",
        metavar="KEY=VALUES",
        help="What to vary: KEY=low:high:count, KEY=log:low:high:count, or KEY=10,20,30. Several make a grid.",
        show_default=False,
    ),
]


def scan(
    request: RequestFile,
    over: Over,
    override: Override = None,
    as_json: AsJson = False,
    output: Output = None,
    plot: Plot = None,
    server: Server = None,
) -> None:
    """Calculate a prediction at every value of a key, or on the grid of several keys.

    --json and --output give one line of JSON a point: {"point": {key: value}, "prediction": {...}}.

    \b
    Examples:
      barnwright scan request.toml --over beams.sqrt_s=20:200:181 --plot curve.png
      barnwright scan request.toml --over beams.sqrt_s=log:1:1000:31 --over parameters.alpha=0.0073,0.0078
    """
    run(lambda: _scan(request, override or [], over, Wish(as_json, output, plot, server)))


def _scan(source: str, overrides: list[str], over: list[str], wish: Wish) -> ExitCode:
    from barnwright.cli.deliver import exit_code
    from barnwright.cli.over import parse_over
    from barnwright.cli.reading import read_fields
    from barnwright.cli.sweeps import deliver_points, points_of

    wish.check()
    axes = parse_over(over)
    if wish.plot is not None:
        from barnwright.plot import check_axes

        check_axes(axes)
    fields = read_fields(source, overrides)
    with face(wish.server) as ask:
        with waiting("scanning"):
            sweep = ask.scan(fields, over=axes)
        points = points_of(sweep, axes)
    deliver_points(points, axes, wish)
    return exit_code(point.prediction.status for point in points)
