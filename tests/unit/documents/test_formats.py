"""Reading TOML and JSON."""

from __future__ import annotations

import pytest

from barnwright.documents.canonical import canonical_text
from barnwright.documents.formats import MAX_DOCUMENT, read_json, read_text, read_toml
from barnwright.errors import RequestError


def test_texts_are_told_apart() -> None:
    """A text that begins with a brace is JSON, any other TOML."""
    assert read_text(' {"a": 1}') == read_text("a = 1") == {"a": 1}


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ('{"a": NaN}', "JSON text; NaN is no finite number"),
        ('{"a": -Infinity}', "JSON text; -Infinity is no finite number"),
        ('{"a": 1, "a": 2}', "JSON text; the key 'a' is there twice"),
        ('{"a":', r"\(at column 6\), expected JSON text; Expecting value in line 1, column 6"),
        ('{"a": 1} x', r"JSON text; Extra data in line 1, column 10"),
        ('{"a":' * 100_000, "JSON text that is not nested so deeply"),
        ('{"a": ' + "9" * 5000 + "}", "JSON text; Exceeds the limit"),
        (" " * (MAX_DOCUMENT + 1), "expected a document of at most 10000000 characters"),
    ],
)
def test_wrong_json(text: str, message: str) -> None:
    """JSON is read strictly, and what is wrong with it is a finding with its place."""
    with pytest.raises(RequestError, match=rf"^request: got .*{message}"):
        read_json(text)


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("a = ", r"expected TOML text; Invalid value \(at end of document\)"),
        ("a = 1\na = 2", r"expected TOML text; Cannot overwrite a value"),
        ("a = " + "[" * 100_000, "expected TOML text that is not nested so deeply"),
        ("a" * (MAX_DOCUMENT + 1), "expected a document of at most 10000000 characters"),
    ],
)
def test_wrong_toml(text: str, message: str) -> None:
    """What is wrong with a TOML text is a finding with its place."""
    with pytest.raises(RequestError, match=message):
        read_toml(text)


def test_canonical_text() -> None:
    """Sorted keys, shortest floats, large integers as text, NaN refused."""
    assert (
        canonical_text({"b": (0.1, 1e-07), "a": 2**53 + 1, "c": "é"})
        == '{"a":"9007199254740993","b":[0.1,1e-07],"c":"é"}'
    )
    with pytest.raises(ValueError, match="Out of range float values are not JSON compliant"):
        canonical_text({"a": float("nan")})
