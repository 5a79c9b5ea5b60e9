"""The points of a scan: a grid over keys of the request, sorted into groups that share everything but beam energies."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from itertools import product
from math import prod
from typing import Any, NamedTuple

import numpy as np

from barnwright.documents import Request
from barnwright.documents.merge import split_key
from barnwright.errors import RequestError, Violation, nearest, show

MOST_POINTS = 100_000
MOST_GROUPS = 10_000
ENERGIES = ("sqrt_s", "energy", "kinetic_energy", "momentum")
TABLES = ("beams", "parameters", "masses", "cuts")


class Part(NamedTuple):
    """One group of a scan: its request, the numbers of its points, and its columns of beam energies and of all keys."""

    request: Request
    points: tuple[int, ...]
    energies: dict[str, tuple[float, ...]]
    columns: dict[str, tuple[Any, ...]]


def scan_shape(over: Mapping[str, Sequence[Any]]) -> tuple[int, ...]:
    """The grid's shape, the first key slowest.

    Raises
    ------
    RequestError
        For keys that cannot be scanned, empty lists and grids that are too large.
    """
    found = [v for key, values in over.items() for v in _checked(key, values)]
    shape = tuple(len(values) for values in over.values())
    if not found and prod(shape) > MOST_POINTS:
        found.append(Violation("over", f"{prod(shape)} points", f"at most {MOST_POINTS} points"))
    if not found and (slow := prod(len(values) for key, values in over.items() if not is_energy(key))) > MOST_GROUPS:
        expected = f"at most {MOST_GROUPS} different values of keys other than beam energies"
        found.append(Violation("over", f"{slow} of them", expected))
    if found:
        raise RequestError(found)
    return shape


def _checked(key: str, values: Sequence[Any]) -> list[Violation]:
    head = key.split(".", maxsplit=1)[0].split("[", maxsplit=1)[0]
    if head not in TABLES or head == key or "observable" in key or key.endswith(("kind", "along_z", "target")):
        expected = "a key with a number: beams.…, parameters.…, masses.…, cuts.….min or max"
        return [
            Violation(
                f"over.{key}", show(key), expected, nearest(key, ("beams.sqrt_s", "beams.energy", "beams.momentum"))
            )
        ]
    if len(values) == 0:
        return [Violation(f"over.{key}", "[]", "a list of at least one value")]
    if is_energy(key) and not set(map(type, values)) <= {int, float}:
        wrong = next(value for value in values if isinstance(value, bool) or not isinstance(value, (int, float)))
        return [Violation(f"over.{key}", show(wrong), "numbers (GeV)")]
    return []


def is_energy(key: str) -> bool:
    """Whether the key is a beam energy, which points of one group may differ in."""
    return beam_field(key) is not None


def beam_field(key: str) -> str | None:
    """The field of the beams that a key means, "sqrt_s" or "energies.e-", however it is quoted; None for other keys."""
    table, *path = map(str, split_key(key))
    energy = path[:1] == ["energies"] and len(path) == 2
    return ".".join(path) if table == "beams" and (energy or (len(path) == 1 and path[0] in ENERGIES)) else None


def parts_of(request: Request, over: Mapping[str, Sequence[Any]]) -> list[Part]:
    """The groups of a scan, in the order of their first points.

    Raises
    ------
    RequestError
        With the findings of the requests that the values lead to.
    """
    shape = scan_shape(over)
    keys = list(over)
    slow = [k for k, key in enumerate(keys) if not is_energy(key)]
    parts = []
    for chosen in product(*(range(shape[k]) for k in slow)):
        fixed = dict(zip(slow, chosen, strict=True))
        numbers, columns = _points(keys, over, shape, fixed)
        start = {key: columns[key][0] for key in keys}
        energies = {field: tuple(map(float, columns[k])) for k in keys if (field := beam_field(k)) is not None}
        parts.append(Part(request.merged(start) if keys else request, numbers, energies, columns))
    return parts


def _points(
    keys: list[str], over: Mapping[str, Sequence[Any]], shape: tuple[int, ...], fixed: dict[int, int]
) -> tuple[tuple[int, ...], dict[str, tuple[Any, ...]]]:
    """Numbers of the points in which the slow keys are fixed, and every key's value at each."""
    if not shape:
        return (0,), {}
    grids = np.indices([1 if k in fixed else n for k, n in enumerate(shape)]).reshape(len(shape), -1)
    places = [grids[k] + fixed.get(k, 0) for k in range(len(shape))]
    numbers = tuple(np.ravel_multi_index(places, shape).tolist())
    columns = {key: tuple(map(over[key].__getitem__, places[k].tolist())) for k, key in enumerate(keys)}
    return numbers, columns
