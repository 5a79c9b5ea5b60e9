"""What pydantic found, as violations: the path as a person would write it, what was expected, the nearest choice."""

from __future__ import annotations

import types
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from functools import lru_cache
from typing import Annotated, Any, Literal, Union, cast, get_args, get_origin, get_type_hints

from pydantic import BaseModel, ValidationError

from barnwright.documents.base import MAX_NAME, Expects
from barnwright.documents.checks import Finding, Path, Shown
from barnwright.errors import Violation, nearest, show

#: More findings than these are not listed, more than those are not looked at.
MAX_FINDINGS = 100
MAX_LOOKED_AT = 200

_TAG = "kind"
KEY_EXPECTS = f"a key that is a name of 1 to {MAX_NAME} printable characters"


@dataclass(frozen=True, slots=True)
class Place:
    """Where a finding is: the path from the top, and the type that stands there with what it expects."""

    path: Path
    core: Any
    expects: str | None


@dataclass(frozen=True, slots=True)
class Located:
    """A violation with its path in parts, and the paths that it depends on."""

    path: Path
    violation: Violation
    of: tuple[Path, ...] = ()
    missing: bool = False


def violations_of(error: ValidationError, model: type[BaseModel]) -> list[Violation]:
    """Every finding of a validation of ``model``, once each, in the order of the fields."""
    return shortened([entry.violation for entry in located(error, model)])


def located(error: ValidationError, model: type[BaseModel]) -> list[Located]:
    """The same with paths in parts; only the first of several findings of a union about one field is kept."""
    kept: dict[Path, Located] = {}
    for details in error.errors(include_url=False)[:MAX_LOOKED_AT]:
        place = _place(model, details["loc"])
        for entry in _entries(cast(Mapping[str, Any], details), place):
            kept.setdefault(entry.path, entry)
    return list(kept.values())


def shortened(violations: list[Violation]) -> list[Violation]:
    """At most ``MAX_FINDINGS`` of them, and then a last one that says how many there are."""
    if len(violations) <= MAX_FINDINGS:
        return violations
    expected = f"a request of which the first {MAX_FINDINGS} are corrected; the others come then"
    return [*violations[:MAX_FINDINGS], Violation("request", f"{len(violations)} findings or more", expected)]


def written(path: Sequence[str | int]) -> str:
    """``("cuts", 0, "min")`` as ``cuts[0].min``."""
    text = ""
    for part in path:
        text += f"[{part}]" if isinstance(part, int) else f".{part}" if text else part
    return text or "request"


def keys_of(model: type[BaseModel]) -> list[str]:
    """The keys that a document of this model may have, as they are written."""
    return [field.alias or name for name, field in model.model_fields.items()]


def _entries(details: Mapping[str, Any], place: Place) -> Iterator[Located]:
    kind, value = details["type"], details["input"]
    if kind == "findings":
        for finding in details["ctx"]["findings"]:
            yield _from_finding(finding, place.path)
    elif kind in ("too_short", "too_long") and not _miscounted(details):
        return
    elif kind == "extra_forbidden":
        yield _unknown_key(value, place)
    elif kind in ("union_tag_invalid", "union_tag_not_found"):
        yield _wrong_kind(value, place)
    elif kind == "missing":
        yield Located(place.path, Violation(written(place.path), "nothing", _expected(place, details)), missing=True)
    else:
        violation = Violation(written(place.path), show(value), _expected(place, details), _nearest(value, place, kind))
        yield Located(place.path, violation)


def _miscounted(details: Mapping[str, Any]) -> bool:
    """Whether the length is wrong in truth; pydantic counts only the entries that are good by themselves."""
    value, limits = details["input"], details["ctx"]
    length = len(value) if hasattr(value, "__len__") else limits["actual_length"] or 0
    return bool(length < limits.get("min_length", 0) or length > limits.get("max_length", length))


def _from_finding(finding: Finding, above: Path) -> Located:
    path = (*above, *finding.field)
    value = finding.value if isinstance(finding.value, Shown) else show(finding.value)
    violation = Violation(written(path), str(value), finding.expected, finding.nearest)
    of = ((part,) if isinstance(part, str) else part for part in finding.of)
    return Located(path, violation, of=tuple((*above, *part) for part in of))


_OF_BEAMS = ("along_z", "crossing_angle", "energies", "energy", "kinetic_energy", "polarisation", "sqrt_s", "target")
"""Keys that are easily put a level too high."""


def _unknown_key(value: Any, place: Place) -> Located:
    known = keys_of(place.core)
    key = str(place.path[-1])
    near = f"beams.{key}" if len(place.path) == 1 and key in _OF_BEAMS else nearest(key, known)
    violation = Violation(written(place.path), show(value), f"one of the keys {', '.join(known)}", near)
    return Located(place.path, violation)


def _wrong_kind(value: Any, place: Place) -> Located:
    members = {_tag_of(member): member for member in get_args(place.core)}
    given = value.get(_TAG) if isinstance(value, Mapping) else None
    near = nearest(given, members) if isinstance(given, str) else _likeliest(value, members)
    path = (*place.path, _TAG)
    shown = "nothing" if given is None else show(given)
    return Located(path, Violation(written(path), shown, _choices(tuple(members)), near), missing=given is None)


def _likeliest(value: Any, members: Mapping[str, type[BaseModel]]) -> str | None:
    """The kind that knows most of the keys that are there."""
    keys = set(value) if isinstance(value, Mapping) else set()
    shared = {tag: len(keys & set(keys_of(member))) for tag, member in members.items()}
    best = max(shared, key=lambda tag: shared[tag])
    return best if shared[best] else None


def _expected(place: Place, details: Mapping[str, Any]) -> str:
    if get_origin(place.core) is Literal:
        return _choices(get_args(place.core))
    if place.expects is not None:
        return place.expects
    if isinstance(place.core, type) and issubclass(place.core, BaseModel):
        return f"a table with {', '.join(keys_of(place.core))}"
    return "a value, since there is no default" if details["type"] == "missing" else str(details["msg"])


def _choices(choices: Sequence[Any]) -> str:
    quoted = [repr(choice) for choice in choices]
    return quoted[0] if len(quoted) == 1 else f"one of {', '.join(quoted)}"


def _nearest(value: Any, place: Place, kind: str) -> str | None:
    if get_origin(place.core) is Literal and isinstance(value, str):
        return nearest(value, get_args(place.core))
    if kind == "int_type" and isinstance(value, float) and value.is_integer():
        return str(int(value))
    return None


# ---- walking down a model along the path that pydantic reports -------------------------------------------------------


def _place(model: type[BaseModel], steps: Sequence[str | int]) -> Place:
    place = Place((), model, None)
    for step in steps:
        place = _step(place, step)
    return place


def _step(place: Place, step: str | int) -> Place:
    core = place.core
    if isinstance(core, type) and issubclass(core, BaseModel):
        hint = _hints(core).get(str(step))
        path = (*place.path, step)
        return Place(path, core, None) if hint is None else Place(path, *_unwrap(hint))
    arguments = get_args(core)
    if get_origin(core) is dict:
        return Place((*place.path, step), *_unwrap(arguments[1]))
    if step == "[key]":
        return replace(place, core=str, expects=KEY_EXPECTS)
    if _is_union(core):
        return _into_union(place, str(step))
    origin = get_origin(core)
    if isinstance(step, int) and isinstance(origin, type) and issubclass(origin, Sequence):
        inner = arguments[0] if arguments[-1] is Ellipsis or step >= len(arguments) else arguments[step]
        return Place((*place.path, step), *_unwrap(inner))
    return place


def _into_union(place: Place, step: str) -> Place:
    """A union adds a step that is no part of the document: the kind, or the type that was tried."""
    for member in get_args(place.core):
        if isinstance(member, type) and issubclass(member, BaseModel) and _tag_of(member) == step:
            return Place(place.path, member, None)
    return place


def _tag_of(member: type[BaseModel]) -> str:
    hint = _hints(member).get(_TAG)
    return str(get_args(hint)[0]) if hint is not None else ""


@lru_cache(maxsize=64)
def _hints(model: type[BaseModel]) -> dict[str, Any]:
    hints = get_type_hints(model, include_extras=True)
    return {field.alias or name: hints[name] for name, field in model.model_fields.items()}


def _is_union(core: Any) -> bool:
    return get_origin(core) in (Union, types.UnionType)


def _unwrap(hint: Any) -> tuple[Any, str | None]:
    """The type below ``Annotated`` and ``| None``, and the outermost text of what it expects."""
    expects: str | None = None
    while True:
        if get_origin(hint) is Annotated:
            texts = [entry.text for entry in hint.__metadata__ if isinstance(entry, Expects)]
            expects = expects or (texts[-1] if texts else None)
            hint = get_args(hint)[0]
        elif _is_union(hint) and type(None) in get_args(hint):
            rest = tuple(entry for entry in get_args(hint) if entry is not type(None))
            hint = rest[0] if len(rest) == 1 else Union[rest]  # noqa: UP007 - made at run time
        else:
            return hint, expects
