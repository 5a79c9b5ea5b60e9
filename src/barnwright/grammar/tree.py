"""The tree of a text: frozen nodes, each with its column in the text."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Operator = Literal["+", "-", "*", "/", "**"]


@dataclass(frozen=True, slots=True)
class Number:
    """A finite number."""

    value: float
    position: int = 0


@dataclass(frozen=True, slots=True)
class Name:
    """A word that stands for a value."""

    name: str
    position: int = 0


@dataclass(frozen=True, slots=True)
class Negation:
    """−operand."""

    operand: Node
    position: int = 0


@dataclass(frozen=True, slots=True)
class Binary:
    """left operator right."""

    operator: Operator
    left: Node
    right: Node
    position: int = 0


@dataclass(frozen=True, slots=True)
class LegName:
    """A leg as it is written: a particle, a number, ``beam_a``."""

    name: str
    position: int = 0

    @property
    def key(self) -> str | int:
        """What a reaction is asked for: a number as a number, anything else as it stands."""
        return int(self.name) if self.name.isdigit() and len(self.name) <= 2 else self.name


@dataclass(frozen=True, slots=True)
class Selection:
    """``leading(gamma, by="pt", rank=1)``, ``each(gamma)``, …: one or all of identical legs."""

    kind: str
    leg: LegName
    by: str = "energy"
    rank: int = 1
    position: int = 0


@dataclass(frozen=True, slots=True)
class FrameName:
    """``lab``, ``cm`` or ``rest(legs)``."""

    kind: str
    legs: tuple[LegName, ...] = ()
    position: int = 0


@dataclass(frozen=True, slots=True)
class Call:
    """A function with its arguments: expressions, or legs and selections; ``frame`` and ``of`` where given."""

    function: str
    arguments: tuple[Node | LegName | Selection, ...]
    frame: FrameName | None = None
    of: tuple[LegName, ...] = ()
    position: int = 0


Node = Number | Name | Negation | Binary | Call
