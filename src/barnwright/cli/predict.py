"""barnwright predict: one request, one prediction."""

from __future__ import annotations

from barnwright.cli.face import face, waiting
from barnwright.cli.options import AsJson, Output, Override, Plot, RequestFile, Server, Wish
from barnwright.cli.outcome import ExitCode, run


def predict(
    request: RequestFile,
    override: Override = None,
    as_json: AsJson = False,
    output: Output = None,
    plot: Plot = None,
    server: Server = None,
) -> None:
    """Calculate the prediction that a request asks for.

    \b
    Examples:
      barnwright predict request.toml
      barnwright predict request.toml --override beams.sqrt_s=20 --plot angle.pdf
      barnwright describe qed/compton --request | barnwright predict - --json
    """
    run(lambda: _predict(request, override or [], Wish(as_json, output, plot, server)))


def _predict(source: str, overrides: list[str], wish: Wish) -> ExitCode:
    from barnwright.cli.deliver import deliver_prediction, exit_code
    from barnwright.cli.reading import read_fields

    wish.check()
    fields = read_fields(source, overrides)
    if wish.plot is not None:
        from barnwright.plot import check_drawable

        check_drawable(fields.get("histograms"))
    with face(wish.server) as ask, waiting("predicting"):
        prediction = ask.predict(fields)
    deliver_prediction(prediction, wish)
    return exit_code([prediction.status])
