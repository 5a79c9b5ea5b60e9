"""The tree of a compiled observable: leg codes in place of names; hashable pure data.

Leg codes: −1 and −2 the beams, 1…n the outgoing particles.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from barnwright.kinematics import Frame

Function = Literal["+", "-", "*", "/", "**", "negative", "abs", "sqrt", "min", "max"]


@dataclass(frozen=True, slots=True)
class Leading:
    """The rank-th of identical particles, the one with the largest energy or pt in the lab first."""

    codes: tuple[int, ...]
    by: Literal["energy", "pt"]
    rank: int


@dataclass(frozen=True, slots=True)
class Each:
    """All of identical particles, one value each."""

    codes: tuple[int, ...]


Leg = int | Leading | Each


@dataclass(frozen=True, slots=True)
class Constant:
    """A number."""

    value: float


@dataclass(frozen=True, slots=True)
class Leaf:
    """A row of the table for some legs, in a frame where it has one."""

    function: str
    legs: tuple[Leg, ...]
    frame: Frame | None = None
    of: tuple[int, ...] = ()


@dataclass(frozen=True, slots=True)
class Operation:
    """Arithmetic on operands."""

    function: Function
    operands: tuple[Tree, ...]


Tree = Constant | Leaf | Operation


def with_leg(tree: Tree, each: Each, code: int) -> Tree:
    """The tree with one of the identical particles in the place of all."""
    if isinstance(tree, Leaf):
        return Leaf(tree.function, tuple(code if leg == each else leg for leg in tree.legs), tree.frame, tree.of)
    if isinstance(tree, Operation):
        return Operation(tree.function, tuple(with_leg(operand, each, code) for operand in tree.operands))
    return tree


def leaves(tree: Tree) -> tuple[Leaf, ...]:
    """All leaves of a tree."""
    if isinstance(tree, Leaf):
        return (tree,)
    if isinstance(tree, Operation):
        return tuple(leaf for operand in tree.operands for leaf in leaves(operand))
    return ()


def size_of(tree: Tree) -> int:
    """How many constants, leaves and operations a tree has."""
    return 1 + sum(size_of(operand) for operand in tree.operands) if isinstance(tree, Operation) else 1
