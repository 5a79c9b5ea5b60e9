"""The Python face: predict, scan, processes, describe, connect.

A request may be the path of a TOML or JSON file, a dict, a Request, or keyword fields with the names of the document;
keyword fields beside a request are merged into it. The values are those of the document: GeV, rad.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from importlib import import_module
from os import PathLike
from types import ModuleType
from typing import TYPE_CHECKING, Any

from barnwright.documents import Request, checked
from barnwright.errors import BarnwrightError
from barnwright.run.reading import read_request

if TYPE_CHECKING:
    from barnwright.analysis import Sweep
    from barnwright.client import AsyncClient, Client
    from barnwright.documents import Prediction
    from barnwright.documents.description import ProcessDescription, ProcessSummary
    from barnwright.process import Process

__all__ = ["connect", "connect_async", "describe", "predict", "processes", "scan"]

RequestLike = str | PathLike[str] | Mapping[str, Any] | Request


def predict(request: RequestLike | None = None, /, **fields: Any) -> Prediction:
    """Calculate one prediction here, in this process.

    ``request`` is a path that ends in .toml or .json, a dict, or a Request; ``fields`` are fields of the request, for
    instance ``process="qed/compton"`` (or a Process object made in a notebook), ``unit="nb"``, ``cuts=[...]``; beside
    a request they are merged into it. The prediction's total and histograms are in the units that the request asks
    for.

    Raises RequestError with every finding at once, UnknownProcessError, PluginError when the process misbehaves, and
    CalculationError when no answer can be given.
    """
    from barnwright.run.local import predict as calculate

    document, process = _request(request, fields)
    return calculate(document, process)


def scan(request: RequestLike | None = None, /, *, over: Mapping[str, Sequence[Any]], **fields: Any) -> Sweep:
    """Calculate a prediction at every value of a request's key, or on the grid of several, as one plan.

    ``over`` gives for each dotted key (``"beams.sqrt_s"``, ``"parameters.z_mass"``) its values in GeV, rad or none.
    The result has ``values`` and ``errors``, arrays of the totals with one axis a key, in the request's unit;
    ``sweep[i]`` is made into a Prediction when asked for, the first key slowest. Raises what ``predict`` raises.
    """
    from barnwright.analysis import scan as calculate

    document, process = _request(request, fields)
    return calculate(document, over, process)


def processes(
    *, particle: str | Sequence[str] | None = None, plugin: str | None = None, kind: str | None = None
) -> list[ProcessSummary]:
    """Every process that is installed, sorted by name, the broken ones with the cause; or those of a choice.

    ``particle`` is a particle that comes in or goes out, or several of which all do; ``plugin`` the plugin that offers
    it; ``kind`` a word for its reaction or for one of its laws, such as "elastic", "total", "angular" or "helicity".

    Raises RequestError for a word that means nothing, with the nearest that does.
    """
    from barnwright.run.describe import summaries

    return summaries(particle, plugin, kind)


def describe(name: str) -> ProcessDescription:
    """What a process is: reaction, laws, parameters with units and sources, observables, cautions, a ready request.

    Raises UnknownProcessError with the nearest names, and PluginError with the cause when its plugin is broken.
    """
    from barnwright.run.describe import describe as description

    return description(name)


def connect(address: str, **options: Any) -> Client:
    """A client of a running server at "host:port" with the same face: predict, scan, processes, describe.

    ``patience`` is how many seconds its first question waits for the server, ``timeout`` how many any may take.
    Raises RequestError for what is no address, BarnwrightError without the extra ``service``.
    """
    client: Client = _client_room().connect(address, **options)
    return client


def connect_async(address: str, **options: Any) -> AsyncClient:
    """The same client for asyncio: ``await client.predict(...)``."""
    client: AsyncClient = _client_room().connect_async(address, **options)
    return client


def _client_room() -> ModuleType:
    try:
        return import_module("barnwright.client")
    except ModuleNotFoundError as error:
        if (error.name or "").startswith("barnwright"):
            raise
        raise BarnwrightError(f"a client needs {error.name}: install barnwright with its extra 'service'") from error


def _request(request: RequestLike | None, fields: Mapping[str, Any]) -> tuple[Request, Process | None]:
    """The request document, and the process object where one was handed in instead of a name."""
    source = read_request(request) if isinstance(request, str | PathLike) else request
    process = fields.get("process", source.get("process") if isinstance(source, Mapping) else None)
    from barnwright.process import Process
    from barnwright.run.worker import physics

    if not isinstance(process, Process):
        return checked(lambda: Request.accept(source, **fields), physics), None
    return Request.accept(source, **{**fields, "process": process.name}), process
