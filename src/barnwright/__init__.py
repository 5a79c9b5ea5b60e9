"""barnwright: cross sections for exactly the acceptance of a measurement, with their uncertainties.

    import barnwright
    p = barnwright.predict(process="qed/muon-pair", beams={"kind": "collider", "sqrt_s": 10.0})
    print(p.total)

Every name below is imported when it is first used; ``import barnwright`` itself loads nothing but who draws pictures.
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

from barnwright import pictures

if TYPE_CHECKING:
    from barnwright.api import connect, connect_async, describe, predict, processes, scan
    from barnwright.documents import Prediction, Request
    from barnwright.errors import (
        BarnwrightError,
        CalculationError,
        PluginError,
        RequestError,
        ServerError,
        UnknownProcessError,
        Violation,
    )
    from barnwright.process import Process

__version__ = "0.1.0"

_PLACES = {
    "BarnwrightError": "barnwright.errors",
    "CalculationError": "barnwright.errors",
    "PluginError": "barnwright.errors",
    "Prediction": "barnwright.documents",
    "Process": "barnwright.process",
    "Request": "barnwright.documents",
    "RequestError": "barnwright.errors",
    "ServerError": "barnwright.errors",
    "UnknownProcessError": "barnwright.errors",
    "Violation": "barnwright.errors",
    "connect": "barnwright.api",
    "connect_async": "barnwright.api",
    "describe": "barnwright.api",
    "predict": "barnwright.api",
    "processes": "barnwright.api",
    "scan": "barnwright.api",
}

__all__ = [
    "BarnwrightError",
    "CalculationError",
    "PluginError",
    "Prediction",
    "Process",
    "Request",
    "RequestError",
    "ServerError",
    "UnknownProcessError",
    "Violation",
    "connect",
    "connect_async",
    "describe",
    "predict",
    "processes",
    "scan",
]


pictures.drawn_by(lambda: import_module("barnwright.plot").picture)


def __getattr__(name: str) -> Any:
    """Import a public name where it lives, once."""
    if name not in _PLACES:
        raise AttributeError(f"module 'barnwright' has no attribute {name!r}")
    value = getattr(import_module(_PLACES[name]), name)
    globals()[name] = value
    return value


def __dir__() -> list[str]:
    """The public names, for completion."""
    return sorted([*__all__, "__version__"])
