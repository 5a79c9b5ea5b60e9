"""What a declaration says about its laws: contributions, helicities, colours, and the laws that a reaction allows."""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from typing import TYPE_CHECKING, Any

import numpy as np

from barnwright.errors import RequestError, Violation, nearest, show
from barnwright.process.contributions import factors, is_interference
from barnwright.process.cross_sections import AngularCrossSection, TotalCrossSection
from barnwright.process.helicity_amplitudes import HelicityAmplitudes
from barnwright.process.laws import Expression
from barnwright.process.polarisation import helicities_of
from barnwright.reaction import Reaction

if TYPE_CHECKING:
    from barnwright.process.process import Process

_KEYWORD = re.compile(r"[A-Za-z][A-Za-z0-9_-]*")
_FORM = "a word of letters, digits, - and _, or the interference of two, as in photon*z"


def law_findings(process: Process, reaction: Reaction) -> Iterator[Violation]:
    """Every statement about laws that does not fit the reaction or one another; the types are right already."""
    yield from _kinds(process, reaction)
    yield from _contributions(process)
    for index, law in enumerate(process.laws):
        field = f"laws[{index}]"
        if isinstance(law, HelicityAmplitudes):
            yield from _helicities(f"{field}.helicities", law, reaction)
            yield from _colour(f"{field}.colour", law.colour)
        if isinstance(law, Expression) and process.contributions:
            expected = "a function that takes parts, since an expression has no contributions to choose from"
            yield Violation(field, "Expression", expected)


def _kinds(process: Process, reaction: Reaction) -> Iterator[Violation]:
    """X comes out of total laws only; dσ/dΩ belongs to two bodies, a cross section to two beams."""
    for index, law in enumerate(process.laws):
        kind = type(law).__name__
        if reaction.inclusive and not isinstance(law, TotalCrossSection):
            yield Violation(f"laws[{index}]", kind, "TotalCrossSection, the only law of a final state X")
        elif isinstance(law, AngularCrossSection) and (len(reaction.incoming), len(reaction.outgoing)) != (2, 2):
            yield Violation(f"laws[{index}]", kind, f"a law of momenta, since {reaction.text} is no 2 -> 2 reaction")
        elif isinstance(law, TotalCrossSection) and len(reaction.incoming) != 2:
            yield Violation(f"laws[{index}]", kind, f"a law of momenta, since {reaction.text} has no cross section")
    if reaction.inclusive and process.closed_forms:
        expected = "none, since a final state X has no observable to integrate over"
        yield Violation("closed_forms", f"{len(process.closed_forms)} closed forms", expected)


def _contributions(process: Process) -> Iterator[Violation]:
    """Keywords are words, each once; an interference is that of two words that are declared."""
    keywords = list(process.contributions.values())
    plain = [key for key in keywords if not is_interference(key)]
    seen: set[frozenset[str]] = set()
    for name, keyword in process.contributions.items():
        field = f"contributions.{name}"
        two = factors(keyword) if is_interference(keyword) else (keyword,)
        if not all(map(_KEYWORD.fullmatch, two)) or keyword != "*".join(two):
            yield Violation(field, show(keyword), _FORM)
            continue
        if len(set(two)) < len(two):
            yield Violation(field, show(keyword), "the interference of two different keywords")
            continue
        if frozenset(two) in seen:
            yield Violation(field, show(keyword), "a keyword that no other contribution has")
        seen.add(frozenset(two))
        if len(two) == 2:
            yield from _undeclared(field, two, plain)


def _undeclared(field: str, two: Sequence[str], plain: Sequence[str]) -> Iterator[Violation]:
    for factor in two:
        if factor not in plain:
            expected = f"the interference of declared keywords: {', '.join(plain) or 'there are none'}"
            yield Violation(field, show(factor), expected, nearest(factor, plain))


def _helicities(field: str, law: HelicityAmplitudes, reaction: Reaction) -> Iterator[Violation]:
    """Whole numbers, one a leg in written order, each a helicity that the particle can have, no combination twice."""
    names = (*reaction.incoming, *reaction.outgoing)
    try:
        physical = [helicities_of(name) for name in names]
        rows = law.combinations(reaction)
    except RequestError as error:
        yield from (Violation(field, entry.value, entry.expected) for entry in error.violations)
        return
    if not rows:
        yield Violation(field, "none", "at least one combination that does not vanish")
    for row in rows:
        if len(row) != len(names):
            expected = f"combinations of {len(names)} helicities, in the order {' '.join(names)}"
            yield Violation(field, show(row), expected)
            return
        for name, helicity, allowed in zip(names, row, physical, strict=True):
            if helicity not in allowed:
                expected = f"a helicity of {name} in {show(row)}: {', '.join(map(str, allowed))}"
                yield Violation(field, show(helicity), f"{expected} (twice the value for fermions)")
                return
    if len(set(rows)) < len(rows):
        twice = next(row for row in rows if rows.count(row) > 1)
        yield Violation(field, show(twice), "each combination once")


def _colour(field: str, colour: tuple[tuple[complex, ...], ...]) -> Iterator[Violation]:
    """C is square and Hermitian, or |M|² would not be real."""
    if not colour or any(len(line) != len(colour) for line in colour):
        yield Violation(field, show(colour), "a square matrix, a row and a column for each colour flow")
        return
    matrix: Any = np.array(colour, dtype=complex)
    if not np.isfinite(matrix).all() or not np.allclose(matrix, matrix.conj().T, rtol=1e-12, atol=0):
        yield Violation(field, show(colour), "a Hermitian matrix of finite numbers, or |M|² is not real")
