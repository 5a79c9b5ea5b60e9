"""What the command line makes a request of: a file or standard input, then every --override merged in."""

from __future__ import annotations

import sys
import tomllib
from collections.abc import Sequence
from typing import Any

from barnwright.documents import merge
from barnwright.documents.formats import asked_in, read_text
from barnwright.errors import RequestError, Violation, show
from barnwright.run.reading import read_request as read_file


def read_fields(source: str, overrides: Sequence[str]) -> dict[str, Any]:
    """The fields of a file ("-": standard input, TOML or JSON) with overrides such as "beams.sqrt_s=20" merged in.

    They are not checked yet: whoever answers says everything that is wrong with them at once. Raises RequestError when
    there is no such file, or the text or an override cannot be read.
    """
    if source == "-" and sys.stdin is None:
        raise RequestError([Violation("request", "a closed standard input", "TOML or JSON text on standard input")])
    fields = asked_in(read_text(sys.stdin.read())) if source == "-" else read_file(source)
    for key, value in parse_overrides(overrides):
        fields = merge(fields, {key: value})
    return fields


def parse_overrides(texts: Sequence[str]) -> list[tuple[str, Any]]:
    """Each "KEY=VALUE" as the path of a key (beams.sqrt_s, cuts.acceptance.max, cuts[0].max) and a TOML value.

    Raises RequestError with one violation for every text that is not one; a word without quotes is the usual slip.
    """
    changes: list[tuple[str, Any]] = []
    violations: list[Violation] = []
    for index, text in enumerate(texts):
        key, _, value = (part.strip() for part in text.partition("="))
        parsed = toml_values(value)
        if not key or len(parsed) != 1:
            expected = "KEY=VALUE with a TOML value"
            violations.append(Violation(f"override[{index}]", show(text), expected, _nearest(key, value)))
        else:
            changes.append((key, parsed[0]))
    if violations:
        raise RequestError(violations)
    return changes


def toml_values(text: str) -> list[Any]:
    """The TOML values of a text such as ``10, 20``; an empty list when it is none."""
    try:
        table = tomllib.loads(f"values = [{text}]")
    except (tomllib.TOMLDecodeError, RecursionError):
        return []
    return list(table["values"]) if len(table) == 1 else []


def _nearest(key: str, value: str) -> str:
    """The same with its value in quotes, where that makes it one."""
    return f'{key}="{value}"' if key and len(toml_values(f'"{value}"')) == 1 else "beams.sqrt_s=20"
