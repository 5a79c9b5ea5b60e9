"""The keys of a scan as labels: symbols and units for beams and masses, a parameter's unit from its process."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

from barnwright.errors import PluginError
from barnwright.plot.labels import leg_label, plain, unit_label

if TYPE_CHECKING:
    from barnwright.documents.request import Request

_BEAMS = {
    "beams.sqrt_s": (r"$\sqrt{s}$", "GeV"),
    "beams.energy": ("$E$ of the beam", "GeV"),
    "beams.kinetic_energy": (r"$E_\mathrm{kin}$ of the beam", "GeV"),
    "beams.momentum": ("$p$ of the beam", "GeV"),
    "beams.mass": ("$m$ of the parent", "GeV"),
    "beams.crossing_angle": ("crossing angle", "rad"),
}
_TABLES = {
    "masses.": ("$m$ of ", "GeV"),
    "beams.energies.": ("$E$ of ", "GeV"),
    "beams.polarisation.": ("$P$ of ", ""),
}


def key_label(key: str, request: Request | None = None) -> str:
    """The axis label of a scanned key of a request, its unit in brackets."""
    symbol, unit = _symbol(key, request)
    return f"{symbol} [{unit_label(unit)}]" if unit else symbol


def value_label(key: str, value: Any, request: Request | None = None) -> str:
    """One value of a scanned key: ``$E$ of $e^{-}$ = 7 GeV``."""
    symbol, unit = _symbol(key, request)
    number = f"{value:.6g}".replace("-", "−") if isinstance(value, float) else plain(str(value), 30)
    return f"{symbol} = {number} {unit_label(unit)}".rstrip()


def _symbol(key: str, request: Request | None) -> tuple[str, str]:
    if key in _BEAMS:
        return _BEAMS[key]
    for table, (text, unit) in _TABLES.items():
        if key.startswith(table):
            return text + leg_label(key.removeprefix(table).strip("\"'")), unit
    name = key.removeprefix("parameters.")
    if name == key:
        return plain(key, 40), ""
    return plain(name, 40), "" if request is None else _parameter_unit(request, name)


def _parameter_unit(request: Request, name: str) -> str:
    """The unit of a parameter as its process declares it; none for a formula, or where the process is not at hand."""
    from barnwright.registry import catalogue
    from barnwright.run.describe import describe

    installed = catalogue()
    for process in (request.process, *(request.processes or ())):
        if process not in installed.names() or process in installed.broken():
            continue
        try:
            parameter = describe(process).parameters.get(name)
        except PluginError:  # a server may have it in good order; the axis then has no unit
            continue
        if parameter is not None:
            return parameter.unit
    return ""
