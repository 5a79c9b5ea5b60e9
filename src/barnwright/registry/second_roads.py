"""What a conformance check tries beyond the load: laws against laws, closed forms against laws, parts against wholes.

Rules of this file
------------------
- Laws that give an angular distribution must agree with the first of them, closed forms in the cosine of leg 1 in the
  cm with its integral between the check angles; other closed forms are compared by the engine's own quadrature.
- Compared is at masses for which both hold; every contribution alone too, on the scale of the whole.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.masses import Inputs, resolve_inputs
from barnwright.process import ClosedForm, Law, Parameters, Parts, Process, TotalCrossSection

from .check_points import COSINES, CheckPoints
from .checks import answer_of, is_two_to_two, masses_for, part_sets
from .claims_and_rows import broken_exchange, wrong_rows
from .densities import Distribution, density, distributions, heights, is_valid
from .trials import ALL

Array = NDArray[np.float64]
Partner = tuple[int, Distribution]

AGREEMENT = 1e-8
_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(64)
_ENDS = np.array([[-1.0, 1.0]])


def second_road_findings(process: Process) -> list[str]:
    """Where laws, closed forms, parts and claims contradict one another; the process passed the load checks already."""
    inputs = resolve_inputs(process, dict(process.example), {}, Findings())
    if inputs is None or not (is_two_to_two(process) or process.legs.inclusive):
        return []
    found = [*_parts_that_do_not_add_up(process, inputs)]
    if is_two_to_two(process):
        found += [*broken_exchange(process, inputs), *wrong_rows(process, inputs)]
        found += [*_laws_that_differ(process, inputs), *_forms_that_differ(process, inputs)]
    return found


def _parts_that_do_not_add_up(process: Process, inputs: Inputs) -> Iterator[str]:
    """The whole of every law must be the sum of its contributions."""
    if not process.contributions:
        return
    parameters = process.parameters_of(inputs.parameters)
    for field, laws in (("laws", process.laws), ("closed_forms", process.closed_forms)):
        for index, law in enumerate(laws):
            if process.legs.inclusive and not isinstance(law, TotalCrossSection):
                continue
            points = CheckPoints.of(process, masses_for(process, inputs, law))
            whole, *alone = (_values(law, points, parameters, parts) for parts, _ in part_sets(process))
            scale = np.max(sum(np.abs(part) for part in alone), axis=1, keepdims=True)
            if (np.abs(whole - sum(alone)) > AGREEMENT * scale).any():
                keywords = ", ".join(process.contributions.values())
                yield f"{field}[{index}]: expected the sum of its parts ({keywords}) where all are asked for at once"


def _values(law: Law | ClosedForm, points: CheckPoints, parameters: Parameters, parts: Parts | None) -> Array:
    """At every point: a law at the check angles or its total, a closed form between the angles."""
    if isinstance(law, ClosedForm):
        x = np.sort(np.broadcast_to(law.axis(points.process.legs).values(points.event(ALL)), (3, COSINES.size)), axis=1)
        closed = np.asarray(law.heights(x, points.point(ALL), parameters, parts), dtype=float)
        return np.diff(np.broadcast_to(closed, x.shape), axis=1)
    nodes = 1 if isinstance(law, TotalCrossSection) else COSINES.size
    return np.broadcast_to(np.asarray(answer_of(law, points, ALL, parameters, parts), dtype=float), (3, nodes))


def _laws_that_differ(process: Process, inputs: Inputs) -> Iterator[str]:
    """Every law with an angular distribution against the first of them."""
    laws = distributions(process)
    parameters = process.parameters_of(inputs.parameters)
    for index, law in laws[1:]:
        first, reference = laws[0]
        points = CheckPoints.of(process, masses_for(process, inputs, reference, law))
        whole: Array | None = None
        for parts, _ in part_sets(process):
            expected, found = (density(one, points, COSINES, parameters, parts) for one in (reference, law))
            whole = expected if whole is None else whole
            title = f"laws[{index}]: {_named(parts)}expected the dσ/dcos θ of laws[{first}]"
            yield from _difference(title, expected, found, whole, points)


def _difference(title: str, expected: Array, found: Array, whole: Array, points: CheckPoints) -> Iterator[str]:
    wrong = ~(np.abs(found - expected) <= AGREEMENT * np.max(np.abs(whole), axis=1, keepdims=True))
    if wrong.any():
        row, node = (int(k) for k in np.argwhere(wrong)[0])
        where = f"cos_theta = {COSINES[0, node]:g}, sqrt_s = {points.sqrt_s[row]:.6g} GeV"
        yield f"{title}, {expected[row, node]:.10g} GeV^-2, got {found[row, node]:.10g} at {where}"


def _forms_that_differ(process: Process, inputs: Inputs) -> Iterator[str]:
    for index, form in enumerate(process.closed_forms):
        if not _in_cosine(process, form):
            continue
        found = _partner(process, form, inputs)
        for parts, _ in part_sets(process):
            title = f"closed_forms[{index}]: {_named(parts)}"
            if found is not None:
                yield from _between_angles(title, process, form, found, inputs, parts)
            yield from _whole_range(title, process, form, inputs, parts)


def _named(parts: Parts | None) -> str:
    return "" if parts is None else f"with parts = {{{', '.join(sorted(parts))}}}: "


def _in_cosine(process: Process, form: ClosedForm) -> bool:
    axis = form.axis(process.legs).axis
    return axis is not None and axis.kind == "cosine" and axis.leg == 1 and not axis.folded


def _partner(process: Process, form: ClosedForm, inputs: Inputs) -> Partner | None:
    """The first law that holds for the masses of the closed form, else the first that holds for fewer masses."""
    laws = distributions(process)
    masses = masses_for(process, inputs, form)
    return next((entry for entry in laws if is_valid(process, entry[1], masses)), laws[0] if laws else None)


def _between_angles(
    title: str,
    process: Process,
    form: ClosedForm,
    partner: tuple[int, Distribution],
    inputs: Inputs,
    parts: Parts | None,
) -> Iterator[str]:
    number, law = partner
    points = CheckPoints.of(process, masses_for(process, inputs, form, law))
    parameters = process.parameters_of(inputs.parameters)
    closed = np.diff(heights(form, points, COSINES, parameters, parts), axis=1)
    middle, half = (COSINES[:, 1:] + COSINES[:, :-1]) / 2, np.diff(COSINES, axis=1) / 2
    cosines = (middle[..., None] + half[..., None] * _NODES).reshape(1, -1)
    integrand = density(law, points, cosines, parameters, parts).reshape(3, -1, _NODES.size) * _WEIGHTS
    integral, scale = integrand.sum(axis=-1) * half, np.abs(integrand).sum(axis=-1) * half
    wrong = ~(np.abs(closed - integral) <= AGREEMENT * scale.sum(axis=1, keepdims=True))
    if wrong.any():
        row, panel = (int(k) for k in np.argwhere(wrong)[0])
        between = f"between cos_theta = {COSINES[0, panel]:g} and {COSINES[0, panel + 1]:g}"
        got = f"{closed[row, panel]:.10g} {between} at sqrt_s = {points.sqrt_s[row]:.6g} GeV"
        yield f"{title}expected the integral of laws[{number}], {integral[row, panel]:.10g} GeV^-2, got {got}"


def _whole_range(title: str, process: Process, form: ClosedForm, inputs: Inputs, parts: Parts | None) -> Iterator[str]:
    """The closed form over all angles against the total cross sections, where the process has any."""
    parameters = process.parameters_of(inputs.parameters)
    for index, law in enumerate(process.laws):
        if not isinstance(law, TotalCrossSection) or process.singular:
            continue
        points = CheckPoints.of(process, masses_for(process, inputs, form, law))
        closed = np.diff(heights(form, points, _ENDS, parameters, parts), axis=1)
        total = _values(law, points, parameters, parts)
        wrong = ~(np.abs(closed - total) <= AGREEMENT * np.abs(total))
        if wrong.any():
            row = int(np.argmax(wrong))
            got = f"{closed[row, 0]:.10g} at sqrt_s = {points.sqrt_s[row]:.6g} GeV"
            yield f"{title}expected over all angles the total of laws[{index}], {total[row, 0]:.10g} GeV^-2, got {got}"
