"""Requests in files."""

from __future__ import annotations

from os import PathLike
from pathlib import Path
from typing import Any, NoReturn

from barnwright.documents.formats import asked_in, read_json, read_toml
from barnwright.errors import RequestError, Violation, nearest, show


def read_request(path: str | PathLike[str]) -> dict[str, Any]:
    """The fields of a request, or of one in a prediction, in a file that ends in .toml or .json, not yet checked.

    Raises RequestError when there is no such file, or when it is not what its name says.
    """
    file = Path(path)
    readers = {".toml": read_toml, ".json": read_json}
    if file.suffix.lower() not in readers:
        _refuse(file, "a dict, a Request, or the path of a file that ends in .toml or .json")
    if not file.is_file():
        siblings = [entry.name for entry in file.parent.glob("*") if entry.suffix.lower() in readers]
        _refuse(file, "a file that exists", nearest(file.name, siblings))
    try:
        fields = readers[file.suffix.lower()](file.read_text(encoding="utf-8"))
    except UnicodeDecodeError:
        _refuse(file, "a text file in UTF-8")
    if not isinstance(fields, dict):
        _refuse(file, "a JSON object with the keys of a request")
    found: dict[str, Any] = asked_in(fields)
    return found


def _refuse(file: Path, expected: str, near: str | None = None) -> NoReturn:
    raise RequestError([Violation("request", show(str(file)), expected, near)])
