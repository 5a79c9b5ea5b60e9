"""Everything that a plugin may use of barnwright, imported when it is first used.

    from barnwright.plugin import Event, Parameters, Process, SquaredAmplitude, parameter

These names are the contract of the entry-point group ``barnwright.processes.v1``: they stay, and grow by fields with
defaults. Beside them a plugin may import ``barnwright.amplitudes`` (spinors, currents, propagators, couplings) and
``barnwright.testing``.
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from barnwright.errors import PluginError
    from barnwright.event import Event, Point
    from barnwright.particles import mass_of, table_source, width_of
    from barnwright.peaks import Peak
    from barnwright.process import (
        AngularCrossSection,
        Claims,
        ClosedForm,
        Expression,
        HelicityAmplitudes,
        Parameters,
        Process,
        SquaredAmplitude,
        TotalCrossSection,
        Validity,
        parameter,
    )

_PLACES = {
    "AngularCrossSection": "barnwright.process",
    "Claims": "barnwright.process",
    "ClosedForm": "barnwright.process",
    "Event": "barnwright.event",
    "Expression": "barnwright.process",
    "HelicityAmplitudes": "barnwright.process",
    "Parameters": "barnwright.process",
    "Peak": "barnwright.peaks",
    "PluginError": "barnwright.errors",
    "Point": "barnwright.event",
    "Process": "barnwright.process",
    "SquaredAmplitude": "barnwright.process",
    "TotalCrossSection": "barnwright.process",
    "Validity": "barnwright.process",
    "mass_of": "barnwright.particles",
    "parameter": "barnwright.process",
    "table_source": "barnwright.particles",
    "width_of": "barnwright.particles",
}

__all__ = [
    "AngularCrossSection",
    "Claims",
    "ClosedForm",
    "Event",
    "Expression",
    "HelicityAmplitudes",
    "Parameters",
    "Peak",
    "PluginError",
    "Point",
    "Process",
    "SquaredAmplitude",
    "TotalCrossSection",
    "Validity",
    "mass_of",
    "parameter",
    "table_source",
    "width_of",
]


def __getattr__(name: str) -> Any:
    """Import a name of the contract where it lives, once."""
    if name not in _PLACES:
        raise AttributeError(f"module 'barnwright.plugin' has no attribute {name!r}")
    value = getattr(import_module(_PLACES[name]), name)
    globals()[name] = value
    return value


def __dir__() -> list[str]:
    """The names of the contract, for completion."""
    return list(__all__)
