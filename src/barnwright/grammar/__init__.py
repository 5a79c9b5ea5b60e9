"""The small language of observables and formulas: one parser of our own, with positions and limits."""

from barnwright.grammar.errors import Finding, GrammarError
from barnwright.grammar.language import Language, Signature
from barnwright.grammar.parser import parse
from barnwright.grammar.tree import Binary, Call, FrameName, LegName, Name, Negation, Node, Number, Operator, Selection

__all__ = [
    "Binary",
    "Call",
    "Finding",
    "FrameName",
    "GrammarError",
    "Language",
    "LegName",
    "Name",
    "Negation",
    "Node",
    "Number",
    "Operator",
    "Selection",
    "Signature",
    "parse",
]
