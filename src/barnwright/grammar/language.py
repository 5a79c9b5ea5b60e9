"""What a language knows: its functions with the kinds of their arguments, and its names."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal

ArgumentKind = Literal["expression", "leg", "selection"]
KeywordKind = Literal["frame", "legs"]


@dataclass(frozen=True, slots=True)
class Signature:
    """The arguments of a function.

    Attributes
    ----------
    kind : "expression", "leg" or "selection"
        What each argument is; a selection is a leg, or one of several identical ones.
    least, most : int
        How many arguments.
    keywords : mapping of keyword to "frame" (``lab``, ``cm``, ``rest(x, …)``) or "legs" (``(x, y)``)
    """

    kind: ArgumentKind
    least: int = 1
    most: int = 1
    keywords: Mapping[str, KeywordKind] = field(default_factory=dict)


@dataclass(frozen=True, slots=True)
class Language:
    """Functions by name, and the selections (``leading``, ``each``, …) that may stand where a leg does.

    ``names`` are the words that stand for themselves; None when whoever uses the tree checks them.
    """

    functions: Mapping[str, Signature]
    names: frozenset[str] | None = None
    selections: frozenset[str] = frozenset()
