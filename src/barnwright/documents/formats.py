"""Texts to plain values: TOML, and JSON read as strictly as TOML (no repeated keys, no NaN)."""

from __future__ import annotations

import json
import tomllib
from collections.abc import Mapping
from typing import Any, NoReturn

from barnwright.errors import RequestError, Violation, show

MAX_DOCUMENT = 10_000_000


class _LaxJsonError(ValueError):
    """Something that JSON readers let pass and documents do not."""


def _no_repeats(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
    made = dict(pairs)
    if len(made) != len(pairs):
        keys = [key for key, _ in pairs]
        repeated = next(key for index, key in enumerate(keys) if key in keys[:index])
        raise _LaxJsonError(f"the key {repeated!r} is there twice")
    return made


def _no_constant(text: str) -> NoReturn:
    raise _LaxJsonError(f"{text} is no finite number")


def _refuse(text: str, expected: str, position: int | None = None) -> NoReturn:
    raise RequestError([Violation("request", show(text), expected, position=position)])


def _check_size(text: str) -> None:
    if len(text) > MAX_DOCUMENT:
        raise RequestError(
            [Violation("request", f"{len(text)} characters", f"a document of at most {MAX_DOCUMENT} characters")]
        )


def read_json(text: str) -> Any:
    """The values of a JSON text.

    Raises:
        RequestError: when it is no JSON; the violation has the position in the text.
    """
    _check_size(text)
    try:
        return json.loads(text, object_pairs_hook=_no_repeats, parse_constant=_no_constant)
    except json.JSONDecodeError as error:
        _refuse(text, f"JSON text; {error.msg} in line {error.lineno}, column {error.colno}", error.pos)
    except RecursionError:
        _refuse(text, "JSON text that is not nested so deeply")
    except ValueError as error:
        _refuse(text, f"JSON text; {error}")


def read_toml(text: str) -> dict[str, Any]:
    """The values of a TOML text.

    Raises:
        RequestError: when it is no TOML; the violation says where.
    """
    _check_size(text)
    try:
        return tomllib.loads(text)
    except RecursionError:
        _refuse(text, "TOML text that is not nested so deeply")
    except ValueError as error:
        _refuse(text, f"TOML text; {error}")


def asked_in(document: Any) -> Any:
    """The request that a prediction holds, or the document as it is: a prediction that was kept can be asked again."""
    if isinstance(document, Mapping) and str(document.get("schema", "")).startswith("barnwright.prediction/"):
        return document.get("request", document)
    return document


def read_text(text: str) -> Any:
    """The values of a text, JSON when it begins with a brace and TOML otherwise."""
    return read_json(text) if text.lstrip().startswith("{") else read_toml(text)
