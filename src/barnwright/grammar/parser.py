"""From text to tree: recursive descent with a limit on depth and size. Nothing is ever evaluated as code.

Rules of this file
------------------
- ``**`` binds tightest and to the right, then a sign, then ``*`` and ``/``, then ``+`` and ``-``.
- Where a function takes a leg, a particle's name is read; anywhere else ``s``, ``t``, ``u`` are names like any other.
- The first thing that is no grammar ends the reading: what follows it cannot be trusted.
"""

from __future__ import annotations

from dataclasses import dataclass, field

from barnwright.errors import nearest, show
from barnwright.grammar.constants import constant_of
from barnwright.grammar.language import Language, Signature
from barnwright.grammar.limits import DEEPEST, LARGEST_EXPONENT, MOST_NODES
from barnwright.grammar.scanner import Scanner, Token
from barnwright.grammar.tree import Binary, Call, FrameName, LegName, Name, Negation, Node, Number, Operator, Selection

FRAMES = ("lab", "cm", "rest")
ORDERS = ("energy", "pt")


def parse(text: str, language: Language) -> Node:
    """The tree of a text.

    Raises
    ------
    GrammarError
        With the column, what was expected there, and the nearest word of the language.
    """
    return _Parser(text, language).whole()


@dataclass(slots=True)
class _Given:
    """The arguments of a call, as far as they are read."""

    arguments: list[Node | LegName | Selection] = field(default_factory=list)
    frame: FrameName | None = None
    of: tuple[LegName, ...] = ()
    keywords: set[str] = field(default_factory=set)


class _Parser:
    def __init__(self, text: str, language: Language) -> None:
        self.scanner = Scanner(text)
        self.language = language
        self.depth = 0
        self.nodes = 0

    def whole(self) -> Node:
        if self.scanner.peek().kind == "end":
            self.scanner.fail("an expression")
        tree = self.sum()
        rest = self.scanner.peek()
        if rest.kind != "end":
            self.scanner.fail(f"an operator or the end, not {show(rest.text)}", position=rest.position)
        return tree

    def count(self, position: int) -> int:
        self.nodes += 1
        if self.nodes > MOST_NODES:
            self.scanner.fail(f"at most {MOST_NODES} numbers, names, operators and calls", position=position)
        return position

    def sum(self) -> Node:
        self.depth += 1
        if self.depth > DEEPEST:
            self.scanner.fail(f"at most {DEEPEST} parentheses inside one another")
        left = self.product()
        while self.scanner.peek().kind in ("+", "-"):
            token = self.scanner.take()
            left = Binary(_operator(token), left, self.product(), self.count(token.position))
        self.depth -= 1
        return left

    def product(self) -> Node:
        left = self.signed()
        while self.scanner.peek().kind in ("*", "/"):
            token = self.scanner.take()
            left = Binary(_operator(token), left, self.signed(), self.count(token.position))
        return left

    def signed(self) -> Node:
        negative, position = False, self.scanner.peek().position
        while self.scanner.peek().kind in ("+", "-"):
            negative ^= self.scanner.take().kind == "-"
        operand = self.power()
        return Negation(operand, self.count(position)) if negative else operand

    def power(self) -> Node:
        base = self.atom()
        if self.scanner.peek().kind != "**":
            return base
        token = self.scanner.take()
        self.depth += 1
        if self.depth > DEEPEST:
            self.scanner.fail(f"at most {DEEPEST} powers inside one another")
        exponent = self.signed()
        self.depth -= 1
        value = constant_of(exponent)
        if value is not None and not abs(value) <= LARGEST_EXPONENT:
            self.scanner.fail(f"an exponent of at most {LARGEST_EXPONENT}", position=token.position + 2)
        return Binary("**", base, exponent, self.count(token.position))

    def atom(self) -> Node:
        token = self.scanner.peek()
        if token.kind == "number":
            return Number(self.scanner.number(self.scanner.take()), self.count(token.position))
        if token.kind == "word":
            return self.named(self.scanner.take())
        if token.kind == "(":
            self.scanner.take()
            inner = self.sum()
            self.scanner.demand(")", "a closing parenthesis")
            return inner
        found = f", not {show(token.text)}" if token.text else ""
        raise self.scanner.refusal(f"a number, a name or a parenthesis{found}", position=token.position)

    def named(self, word: Token) -> Node:
        if self.scanner.peek().kind == "(":
            return self.call(word)
        names, functions = self.language.names, self.language.functions
        if word.text in functions:
            self.scanner.fail(f"{word.text}(…) with its arguments", position=word.position)
        if names is not None and word.text not in names:
            choices = (*sorted(names), *functions)
            expected = f"one of {', '.join(sorted(names))}, or a function with its arguments"
            self.scanner.fail(expected, nearest(word.text, choices), word.position)
        return Name(word.text, self.count(word.position))

    def call(self, word: Token) -> Node:
        signature = self.language.functions.get(word.text)
        if signature is None:
            if word.text in (self.language.names or ()):
                self.scanner.fail(f"{word.text} by itself, without parentheses", word.text, word.position)
            choices = tuple(self.language.functions)
            expected = f"one of the functions {', '.join(choices)}"
            self.scanner.fail(expected, nearest(word.text, choices), word.position)
        self.scanner.take()
        given = self.arguments(word, signature)
        if not signature.least <= len(given.arguments) <= signature.most:
            self.scanner.fail(f"{word.text} with {_how_many(signature)}", position=word.position)
        return Call(word.text, tuple(given.arguments), given.frame, given.of, self.count(word.position))

    def arguments(self, word: Token, signature: Signature) -> _Given:
        given = _Given()
        while not self.scanner.take_if(")"):
            if given.arguments or given.keywords:
                self.scanner.demand(",", "a comma or a closing parenthesis")
            keyword = self.scanner.keyword()
            if keyword is None:
                given.arguments.append(self.argument(signature))
            else:
                self.keyword(word, signature, keyword, given)
            if len(given.arguments) > signature.most:
                self.scanner.fail(f"{word.text} with {_how_many(signature)}", position=word.position)
        return given

    def keyword(self, word: Token, signature: Signature, keyword: Token, given: _Given) -> None:
        """The value of a keyword, whose equals sign is taken."""
        kind = signature.keywords.get(keyword.text)
        if kind is None:
            known = tuple(signature.keywords)
            expected = f"{word.text} with {' and '.join(known) or 'no keywords'}"
            self.scanner.fail(expected, nearest(keyword.text, known), keyword.position)
        if keyword.text in given.keywords:
            self.scanner.fail(f"{keyword.text} once", position=keyword.position)
        given.keywords.add(keyword.text)
        if kind == "frame":
            given.frame = self.frame()
        else:
            given.of = self.legs()

    def argument(self, signature: Signature) -> Node | LegName | Selection:
        if signature.kind == "expression":
            return self.sum()
        word = self.scanner.word_before_parenthesis()
        if signature.kind == "selection" and word in self.language.selections:
            return self.selection()
        return self.leg()

    def leg(self) -> LegName:
        name, position = self.scanner.leg()
        return LegName(name, self.count(position))

    def selection(self) -> Selection:
        word = self.scanner.take()
        self.scanner.demand("(", "a parenthesis")
        leg = self.leg()
        by, rank, given = ORDERS[0], 1, set[str]()
        while self.scanner.take_if(","):
            keyword = self.scanner.keyword()
            if keyword is None or word.text != "leading" or keyword.text not in {"by", "rank"} - given:
                allowed = "by and rank, each once" if word.text == "leading" else "no keywords"
                position = self.scanner.at if keyword is None else keyword.position
                self.scanner.fail(f"{word.text} with one particle and {allowed}", position=position)
            given.add(keyword.text)
            if keyword.text == "by":
                by = self.order()
            else:
                rank = self.rank()
        self.scanner.demand(")", "a comma or a closing parenthesis")
        return Selection(word.text, leg, by, rank, self.count(word.position))

    def order(self) -> str:
        by, position = self.scanner.quoted()
        if by not in ORDERS:
            self.scanner.fail('"energy" or "pt"', nearest(by, ORDERS), position)
        return by

    def rank(self) -> int:
        token = self.scanner.demand("number", "a whole number from 1")
        if not token.text.isdigit() or len(token.text) > 2 or int(token.text) < 1:
            self.scanner.fail("a whole number from 1", position=token.position)
        return int(token.text)

    def frame(self) -> FrameName:
        word = self.scanner.peek()
        if word.text not in FRAMES:
            self.scanner.fail("lab, cm or rest(…)", nearest(word.text, FRAMES), word.position)
        self.scanner.take()
        if word.text != "rest":
            return FrameName(word.text, (), self.count(word.position))
        if self.scanner.peek().kind != "(":
            self.scanner.fail("rest(…) with the particles that are at rest together", position=word.position)
        return FrameName("rest", self.legs(), self.count(word.position))

    def legs(self) -> tuple[LegName, ...]:
        self.scanner.demand("(", "a parenthesis with particles")
        found = [self.leg()]
        while self.scanner.take_if(","):
            found.append(self.leg())
        self.scanner.demand(")", "a comma or a closing parenthesis")
        return tuple(found)


def _operator(token: Token) -> Operator:
    operators: dict[str, Operator] = {"+": "+", "-": "-", "*": "*", "/": "/"}
    return operators[token.kind]


def _how_many(signature: Signature) -> str:
    what = "argument" if signature.kind == "expression" else "particle"
    if signature.least == signature.most:
        return f"{signature.least} {what}{'s' * (signature.least != 1)}"
    if signature.most > 20:
        return f"at least {signature.least} {what}{'s' * (signature.least != 1)}"
    return f"{signature.least} to {signature.most} {what}s"
