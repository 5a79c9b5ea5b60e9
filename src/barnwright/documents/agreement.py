"""What the fields of one request must agree on; names and physics are looked at later, in the engine."""

from __future__ import annotations

from typing import TYPE_CHECKING

from pydantic import TypeAdapter, ValidationError

from barnwright.documents.checks import Finding, Path, Shown, exactly_one, repeated
from barnwright.documents.cuts import Cut
from barnwright.documents.derived import NOMINAL
from barnwright.documents.findings import located
from barnwright.documents.merge import merge
from barnwright.errors import Violation, nearest
from barnwright.units import AREA_UNITS, ENERGY_UNITS

if TYPE_CHECKING:
    from barnwright.documents.request import Request

MAX_COMPONENTS = 100_000


def disagreements(request: Request) -> list[Finding]:
    """Every finding about fields that do not fit together."""
    found = _source(request) + _unit(request)
    if request.histograms:
        found += repeated([entry.name for entry in request.histograms], ("histograms",))
        found += _size(request)
    if request.cuts:
        found += repeated([entry.name for entry in request.cuts], ("cuts",))
    if request.variations:
        found += _variations(request)
    if request.derived:
        found += _derived(request)
    return found


def _source(request: Request) -> list[Finding]:
    choices = ("process", "processes", "formula")
    given = [name for name in choices if getattr(request, name) is not None]
    found = exactly_one(given, choices)
    if request.processes is not None:
        found += repeated(request.processes, ("processes",), last=None)
    if request.contributions is not None:
        found += repeated(request.contributions, ("contributions",), last=None)
        if request.formula is not None:
            expected = "no contributions, since a formula has none"
            found.append(
                Finding(("contributions",), list(request.contributions), expected, of=("contributions", "formula"))
            )
    return found


def _unit(request: Request) -> list[Finding]:
    decay = request.beams.kind == "decay"
    units, others = (ENERGY_UNITS, AREA_UNITS) if decay else (AREA_UNITS, ENERGY_UNITS)
    if request.unit in units:
        return []
    expected = f"a unit of {'a width' if decay else 'a cross section'}, one of {', '.join(units)}"
    of = ("unit", ("beams", "kind")) if request.unit in others else ("unit",)
    return [Finding(("unit",), request.unit, expected, nearest(request.unit, units), of=of)]


def _size(request: Request) -> list[Finding]:
    components = 1 + sum(entry.number for entry in request.histograms)
    if components <= MAX_COMPONENTS:
        return []
    expected = f"at most {MAX_COMPONENTS} components: the total and every bin of all histograms"
    return [Finding(("histograms",), Shown(f"{components} components"), expected, of=("histograms",))]


def _variations(request: Request) -> list[Finding]:
    found = repeated([entry.name for entry in request.variations], ("variations",))
    base = {"cuts": [cut.model_dump(mode="json", exclude_unset=True) for cut in request.cuts]}
    for index, variation in enumerate(request.variations):
        if variation.cuts:
            where = ("variations", index, "cuts")
            found += repeated([cut.name for cut in variation.cuts], where)
            found += _varied_cuts(base, request, index)
    return found


def _varied_cuts(base: dict[str, list[dict[str, object]]], request: Request, index: int) -> list[Finding]:
    """Findings about the cuts that a variation ends up with; each is reported where the variation changes it."""
    variation = request.variations[index]
    places = {cut.name: place for place, cut in enumerate(variation.cuts)}
    found = []
    for cut in merge(base, {"cuts": variation.change()["cuts"]})["cuts"]:
        if cut["name"] not in places:
            continue
        try:
            _CUT.validate_python(cut)
        except ValidationError as error:
            above = ("variations", index, "cuts", places[cut["name"]])
            found += [_moved(entry.path, entry.violation, above) for entry in located(error, Cut)]
    return found


def _moved(path: Path, violation: Violation, above: Path) -> Finding:
    """A finding about a merged cut as one about the variation that changes it."""
    return Finding((*above, *path), Shown(violation.value), violation.expected, violation.nearest, of=(above, "cuts"))


def _derived(request: Request) -> list[Finding]:
    found = repeated([entry.name for entry in request.derived], ("derived",))
    names = [variation.name for variation in request.variations]
    of = tuple(("variations", index, "name") for index in range(len(names)))
    for index, entry in enumerate(request.derived):
        field, compared = entry.compared
        known = [*names, NOMINAL] if field == "between" else names
        expected = f"the name of a variation ({', '.join(names) or 'there is none'})"
        if known != names:
            expected += f", or {NOMINAL}, the request itself"
        for place, name in enumerate(compared):
            if name not in known:
                where = ("derived", index, field, place)
                found.append(Finding(where, name, expected, nearest(name, known), of=(where, *of)))
    return found


_CUT: TypeAdapter[Cut] = TypeAdapter(Cut)
