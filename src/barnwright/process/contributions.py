"""Parts of a law: diagrams that a process can switch on and off, and the interference of two of them.

Rules of this file
------------------
- A process declares ``contributions = {"photon": "photon", "z": "z", "interference": "photon*z"}``: a name for people,
  and the keyword that a law receives in the set ``parts``. A keyword ``first*second`` is the interference of two
  others and may be negative.
- With A the amplitudes of the plain keywords, |M|² of a set is Σ |A_k|² over its plain keywords plus 2 Re A_k A_l* over
  its products; the whole set is the square of the whole amplitude.
- A law of |M|² and a closed form receive the set as it is; helicity amplitudes are asked for plain keywords only.
"""

from __future__ import annotations

import inspect
from collections.abc import Callable, Iterable
from functools import lru_cache
from typing import Any

Parts = frozenset[str]


def is_interference(keyword: str) -> bool:
    """Whether a keyword is the interference of two others."""
    return "*" in keyword


def factors(keyword: str) -> tuple[str, str]:
    """The two plain keywords of an interference."""
    first, _, second = keyword.partition("*")
    return first.strip(), second.strip()


def plain(parts: Iterable[str]) -> tuple[str, ...]:
    """The plain keywords that a set needs, in alphabetic order."""
    found: set[str] = set()
    for keyword in parts:
        found.update(factors(keyword) if is_interference(keyword) else (keyword,))
    return tuple(sorted(found))


@lru_cache(maxsize=1024)
def takes(function: Callable[..., Any], keyword: str) -> bool:
    """Whether a function has a parameter of this name."""
    try:
        return keyword in inspect.signature(function).parameters
    except (TypeError, ValueError):
        return False


def called(function: Callable[..., Any], parts: Parts | None, *arguments: Any) -> Any:
    """The answer of a law's function; ``parts`` goes to it where the process has any."""
    return function(*arguments) if parts is None else function(*arguments, parts=parts)
