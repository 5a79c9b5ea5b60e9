"""The small language of observables and formulas: one parser of our own, with positions and limits."""

from barnwright.grammar.constants import constant_of
from barnwright.grammar.errors import Finding, GrammarError
from barnwright.grammar.language import Language, Signature
from barnwright.grammar.limits import DEEPEST, MOST_FINDINGS, MOST_NODES
from barnwright.grammar.parser import parse
from barnwright.grammar.scanner import is_leg, is_word
from barnwright.grammar.tree import Binary, Call, FrameName, LegName, Name, Negation, Node, Number, Operator, Selection

__all__ = [
    "DEEPEST",
    "MOST_FINDINGS",
    "MOST_NODES",
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
    "constant_of",
    "is_leg",
    "is_word",
    "parse",
]
