"""From text to observable: legs of the reaction in place of names, units, and everything that is wrong with it."""

from __future__ import annotations

import math
from functools import lru_cache
from typing import Literal

from barnwright.grammar import MOST_NODES, Finding, GrammarError, Node, parse
from barnwright.observables.errors import ObservableError
from barnwright.observables.language import LANGUAGE
from barnwright.observables.legs import Legs
from barnwright.observables.observable import AxisForm, Observable
from barnwright.observables.resolve import Resolver, depth_of
from barnwright.observables.rows import ROWS
from barnwright.observables.scales import SCALES
from barnwright.observables.tree import Each, Leaf, Operation, Tree, leaves, size_of, with_leg
from barnwright.observables.units import dimension_of
from barnwright.reaction import Reaction

DEEPEST = 100


@lru_cache(maxsize=1024)
def compile_observable(text: str, reaction: Reaction, numbered: bool = False) -> Observable:
    """The observable that a text means for a reaction.

    ``numbered`` lets a leg number name one of several identical particles, as declarations of processes may.

    Raises
    ------
    ObservableError
        With every finding, each with its column and what is nearest.
    """
    node = _parsed(text)
    legs = Legs(reaction, numbered)
    tree = Resolver(legs).tree(node)
    unit = str(dimension_of(node, legs.findings))
    if tree is None or legs.findings:
        raise ObservableError(text, tuple(sorted(legs.findings, key=lambda finding: finding.position)))
    if size_of(tree) * (1 if legs.each is None else len(legs.each.codes)) > MOST_NODES:
        expected = f"at most {MOST_NODES} numbers, operators and calls, counted for each of identical particles"
        raise ObservableError(text, (Finding(0, expected),))
    scaled = _scaled(tree)
    trees = _entries(tree, legs.each)
    axes = tuple(axis for axis in (_axis(entry, reaction) for entry in trees) if axis is not None)
    return Observable(
        text=" ".join(text.split()),
        trees=trees,
        unit=unit if scaled is None else scaled[1],
        quantifier=legs.quantifier,
        range=_range(tree),
        azimuthal=any(ROWS[leaf.function].azimuthal for leaf in leaves(tree) if leaf.function in ROWS),
        axes=axes if len(axes) == len(trees) else (),
    )


def _parsed(text: str) -> Node:
    try:
        node = parse(text, LANGUAGE)
    except GrammarError as error:
        raise ObservableError(error.text, error.findings) from None
    if depth_of(node) > DEEPEST:
        raise ObservableError(text, (Finding(0, f"at most {DEEPEST} operators after one another"),))
    return node


def angle_in_degrees(tree: Tree) -> Leaf | None:
    """The angle of the table that a tree gives in degrees (``theta(x) / deg``), or None."""
    scaled = _scaled(tree)
    return scaled[0] if scaled is not None and scaled[1] == "deg" else None


def _scaled(tree: Tree) -> tuple[Leaf, str] | None:
    """A row of the table divided by a unit of its kind, and the unit; None for any other tree."""
    if not isinstance(tree, Operation) or tree.function != "/":
        return None
    row, unit = tree.operands
    if not isinstance(row, Leaf) or not isinstance(unit, Leaf) or row.function not in ROWS:
        return None
    kind = SCALES.get(unit.function)
    return (row, unit.function) if kind is not None and kind[0] == ROWS[row.function].unit else None


def _entries(tree: Tree, each: Each | None) -> tuple[Tree, ...]:
    return (tree,) if each is None else tuple(with_leg(tree, each, code) for code in each.codes)


def _range(tree: Tree) -> tuple[float, float]:
    if isinstance(tree, Leaf) and tree.function in ROWS:
        return ROWS[tree.function].range
    if isinstance(tree, Operation) and tree.function in ("abs", "sqrt"):
        low, high = _range(tree.operands[0])
        return 0.0, max(abs(low), abs(high)) if tree.function == "abs" else math.sqrt(max(high, 0.0))
    return -math.inf, math.inf


def _axis(tree: Tree, reaction: Reaction) -> AxisForm | None:
    """The polar axis of two bodies, its cosine, or the cosine's absolute value."""
    folded = isinstance(tree, Operation) and tree.function == "abs"
    leaf = tree.operands[0] if isinstance(tree, Operation) and folded else tree
    if not isinstance(leaf, Leaf) or len(reaction.outgoing) != 2 or leaf.frame is None:
        return None
    kinds: dict[str, Literal["cosine", "angle"]] = {"cos_theta": "cosine", "theta": "angle"}
    kind = kinds.get(leaf.function)
    leg = leaf.legs[0]
    if kind is None or leaf.frame.kind == "rest" or leg not in (1, 2) or (folded and kind == "angle"):
        return None
    return AxisForm(kind, int(leg), leaf.frame, folded)
