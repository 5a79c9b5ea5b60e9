"""What is checked when a process is loaded: signatures, shapes on three points, finite numbers, positive ones.

Rules of this file
------------------
- A finding is a sentence: which law, what was expected, the offending values and where.
- A law is tried with its massless legs massless, on a batch of three points and on each point alone: the same numbers
  must come out, or events of a batch influence each other.
- Reactions other than 2 → 2 have their signatures checked only: there is no phase space for them here.
"""

from __future__ import annotations

import inspect
from collections.abc import Callable
from typing import Any

import numpy as np
from numpy.typing import NDArray

from barnwright.engine.resolve.findings import Findings
from barnwright.engine.resolve.masses import Inputs, resolve_inputs
from barnwright.errors import show
from barnwright.process import ClosedForm, Expression, Law, Parameters, Process

from .check_points import COSINES, CheckPoints, Masses

Array = NDArray[np.float64]
Flags = NDArray[np.bool_]
Answer = Callable[[slice], Any]

AGREEMENT = 1e-9
ALL = slice(0, 3)


def findings_of(process: Process) -> list[str]:
    """Everything that is wrong with a process's laws and closed forms; an empty list when nothing is."""
    findings = Findings()
    inputs = resolve_inputs(process, dict(process.example), {}, findings)
    if inputs is None:
        return [str(violation) for violation in findings.violations]
    found: list[str] = []
    for index, law in enumerate(process.laws):
        found += [f"laws[{index}] ({_title(law)}): {text}" for text in _law_findings(process, law, inputs)]
    for index, form in enumerate(process.closed_forms):
        title = f"closed_forms[{index}] ({_name(form.cumulative)})"
        found += [f"{title}: {text}" for text in _form_findings(process, form, inputs)]
    return found


def masses_for(process: Process, law: Law | ClosedForm, inputs: Inputs) -> Masses:
    """Masses in GeV of beam a, beam b, leg 1, leg 2, with the law's massless legs massless."""
    masses = dict(inputs.masses)
    for leg in law.massless:
        masses.update(dict.fromkeys(process.codes_of(leg), 0.0))
    return masses[-1], masses[-2], masses[1], masses[2]


def is_two_to_two(process: Process) -> bool:
    """Whether there is phase space here to try the process on."""
    return len(process.legs.incoming) == 2 and len(process.legs.outgoing) == 2


def _title(law: Law) -> str:
    return "expression" if isinstance(law, Expression) else _name(law.function)


def _name(function: Any) -> str:
    return getattr(function, "__name__", show(function))


def _law_findings(process: Process, law: Law, inputs: Inputs) -> list[str]:
    if not isinstance(law, Expression) and (wrong := _signature(law.function, ("event", "parameters"))):
        return [wrong]
    if not is_two_to_two(process):
        return []
    parameters = process.parameters_of(inputs.parameters)
    return _tried(process, masses_for(process, law, inputs), lambda points: _of_law(law, points, parameters))


def _of_law(law: Law, points: CheckPoints, parameters: Parameters) -> tuple[Answer, Callable[[Array], list[str]]]:
    def answer(some: slice) -> Any:
        return law.squared(points.event(some), parameters)

    def positive(values: Array) -> list[str]:
        if points.process.signed:
            return []
        return _offending(values, values < 0, points, "|M|² of at least 0 (or signed=True)")

    return answer, positive


def _form_findings(process: Process, form: ClosedForm, inputs: Inputs) -> list[str]:
    if wrong := _signature(form.cumulative, ("x", "point", "parameters")):
        return [wrong]
    if not is_two_to_two(process):
        return []
    parameters = process.parameters_of(inputs.parameters)
    return _tried(process, masses_for(process, form, inputs), lambda points: _of_form(form, points, parameters))


def _of_form(
    form: ClosedForm, points: CheckPoints, parameters: Parameters
) -> tuple[Answer, Callable[[Array], list[str]]]:
    observable = form.axis(points.process.legs)
    x = np.sort(np.broadcast_to(observable.values(points.event(ALL)), (3, COSINES.size)), axis=1)

    def answer(some: slice) -> Any:
        return form.cumulative(x[some], points.point(some), parameters)

    def rising(values: Array) -> list[str]:
        falls = np.diff(values, axis=1) < 0
        if points.process.signed or not falls.any():
            return []
        row = int(np.argmax(falls.any(axis=1)))
        got = f"{_listed(values[row])} at {_listed(x[row])}, sqrt_s = {points.sqrt_s[row]:.6g} GeV"
        return [f"expected values that rise with {form.observable}, got {got}"]

    return answer, rising


def _tried(process: Process, masses: Masses, make: Callable[[CheckPoints], Any]) -> list[str]:
    """Shape, finiteness and whatever else of a function at the three points together and at each alone."""
    try:
        points = CheckPoints.of(process, masses)
        answer, more = make(points)
        with np.errstate(all="ignore"):
            together, alone = answer(ALL), [answer(slice(k, k + 1)) for k in range(3)]
    except (Exception, SystemExit) as error:
        return [f"raised {type(error).__name__}: {error}"]
    for found, rows in ((together, 3), *((one, 1) for one in alone)):
        if wrong := _misshapen(found, (rows, COSINES.size)):
            return [wrong]
    values = _full(together, 3)
    if not np.isfinite(values).all():
        return _offending(values, ~np.isfinite(values), points, "finite numbers")
    return [*more(values), *_mixing(values, np.concatenate([_full(one, 1) for one in alone]), points)]


def _full(found: Any, rows: int) -> Array:
    return np.broadcast_to(np.asarray(found, dtype=float), (rows, COSINES.size))


def _misshapen(found: Any, shape: tuple[int, int]) -> str | None:
    values = np.asarray(found)
    if values.dtype.kind not in "fiu":
        return f"expected an array of real numbers, got {show(found)} of type {values.dtype}"
    try:
        fits = np.broadcast_shapes(values.shape, shape) == shape
    except ValueError:
        fits = False
    return None if fits else f"expected an array that broadcasts to (point, node) = {shape}, got shape {values.shape}"


def _mixing(together: Array, alone: Array, points: CheckPoints) -> list[str]:
    scale = np.max(np.abs(together), axis=1, keepdims=True)
    expected = "the same values for a point alone as in a batch of three"
    return _offending(together, np.abs(together - alone) > AGREEMENT * scale, points, expected)


def _offending(values: Array, wrong: Flags, points: CheckPoints, expected: str) -> list[str]:
    if not wrong.any():
        return []
    row, node = (int(k) for k in np.argwhere(wrong)[0])
    where = f"sqrt_s = {points.sqrt_s[row]:.6g} GeV, cos_theta = {COSINES[0, node]:g}"
    return [f"expected {expected}, got {values[row, node]:.6g} at {where}; {int(wrong.sum())} of {values.size} points"]


def _listed(values: Array) -> str:
    return ", ".join(f"{value:.6g}" for value in values)


def _signature(function: Any, names: tuple[str, ...]) -> str | None:
    """What is wrong with a function's signature, if anything; a built-in function has none to look at."""
    if not callable(function):
        return f"expected a function ({', '.join(names)}), got {show(function)}"
    try:
        signature = inspect.signature(function)
    except ValueError:
        return None
    try:
        signature.bind(*names)
    except TypeError:
        return f"expected a function ({', '.join(names)}), got {_name(function)}{signature}"
    return None
