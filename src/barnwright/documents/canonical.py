"""The canonical form of a document: one text for one meaning, and its digest.

Keys are sorted, there is no white space, floats have their shortest text that reads back to the same bits, integers
above 2**53 are texts (JavaScript and others would round them), NaN and infinity are refused.
"""

from __future__ import annotations

import hashlib
import json
from typing import Any

SAFE_WHOLE = 2**53


def travelling(value: Any) -> Any:
    """The same value as JSON can carry it to any language: integers above 2**53 as text, tuples as lists."""
    if isinstance(value, dict):
        return {key: travelling(entry) for key, entry in value.items()}
    if isinstance(value, (list, tuple)):
        return [travelling(entry) for entry in value]
    if isinstance(value, int) and abs(value) > SAFE_WHOLE:
        return str(value)
    return value


def canonical_text(value: Any) -> str:
    """The canonical JSON text of plain values.

    Raises:
        ValueError: for NaN and infinity, which have no JSON.
    """
    return json.dumps(travelling(value), sort_keys=True, separators=(",", ":"), ensure_ascii=False, allow_nan=False)


def digest_of(text: str) -> str:
    """SHA-256 of a text in UTF-8, as 64 hexadecimal digits."""
    return hashlib.sha256(text.encode("utf-8")).hexdigest()
