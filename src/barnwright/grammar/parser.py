"""From text to tree: recursive descent with a limit on depth and size. Nothing is ever evaluated as code.

Rules of this file
------------------
- ``**`` binds tightest and to the right, then a sign, then ``*`` and ``/``, then ``+`` and ``-``.
- Where a function takes a leg, a particle's name is read; anywhere else ``s``, ``t``, ``u`` are names like any other.
- The first thing that is no grammar ends the reading: what follows it cannot be trusted.
"""

from __future__ import annotations

from barnwright.errors import nearest, show
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
        value = _constant(exponent)
        if value is not None and abs(value) > LARGEST_EXPONENT:
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
        if names is not None and word.text not in names:
            if word.text in functions:
                self.scanner.fail(f"{word.text}(…) with its arguments", position=word.position)
            choices = (*names, *functions)
            self.scanner.fail("a name of the language", nearest(word.text, choices), word.position)
        return Name(word.text, self.count(word.position))

    def call(self, word: Token) -> Node:
        signature = self.language.functions.get(word.text)
        if signature is None:
            choices = tuple(self.language.functions)
            expected = f"one of the functions {', '.join(choices)}"
            self.scanner.fail(expected, nearest(word.text, choices), word.position)
        self.scanner.take()
        arguments, frame, of = self.arguments(word, signature)
        if not signature.least <= len(arguments) <= signature.most:
            self.scanner.fail(f"{word.text} with {_how_many(signature)}", position=word.position)
        return Call(word.text, tuple(arguments), frame, of, self.count(word.position))

    def arguments(
        self, word: Token, signature: Signature
    ) -> tuple[list[Node | LegName | Selection], FrameName | None, tuple[LegName, ...]]:
        arguments: list[Node | LegName | Selection] = []
        frame: FrameName | None = None
        of: tuple[LegName, ...] = ()
        while not self.scanner.take_if(")"):
            if arguments or frame is not None or of:
                self.scanner.demand(",", "a comma or a closing parenthesis")
            keyword = self.keyword()
            if keyword is None:
                arguments.append(self.argument(signature))
            elif signature.keywords.get(keyword.text) == "frame":
                frame = self.frame()
            elif signature.keywords.get(keyword.text) == "legs":
                of = self.legs()
            else:
                known = tuple(signature.keywords)
                expected = f"{word.text} takes {' and '.join(known) or 'no keywords'}"
                self.scanner.fail(expected, nearest(keyword.text, known), keyword.position)
            if len(arguments) > signature.most:
                self.scanner.fail(f"{word.text} with {_how_many(signature)}", position=word.position)
        return arguments, frame, of

    def keyword(self) -> Token | None:
        """A word with an equals sign behind it, both taken; else nothing."""
        start = self.scanner.at
        text = self.scanner.text
        word = self.scanner.peek() if start < len(text) and text[start:].lstrip()[:1].isidentifier() else None
        if word is not None and word.kind == "word":
            self.scanner.take()
            if self.scanner.at < len(text) and text[self.scanner.at :].lstrip().startswith("="):
                self.scanner.take()
                return word
        self.scanner.at = start
        return None

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
        by, rank = ORDERS[0], 1
        while self.scanner.take_if(","):
            keyword = self.keyword()
            if keyword is None or word.text != "leading" or keyword.text not in ("by", "rank"):
                allowed = "by and rank" if word.text == "leading" else "no keywords"
                self.scanner.fail(f"{word.text} takes one particle and {allowed}")
            if keyword.text == "by":
                by = self.order()
            else:
                rank = self.rank()
        self.scanner.demand(")", "a closing parenthesis")
        return Selection(word.text, leg, by, rank, self.count(word.position))

    def order(self) -> str:
        position = self.scanner.at
        by = self.scanner.quoted()
        if by not in ORDERS:
            self.scanner.fail('"energy" or "pt"', nearest(by, ORDERS), position)
        return by

    def rank(self) -> int:
        token = self.scanner.demand("number", "a whole number from 1")
        if not token.text.isdigit() or not 1 <= int(token.text) <= 99:
            self.scanner.fail("a whole number from 1", position=token.position)
        return int(token.text)

    def frame(self) -> FrameName:
        word = self.scanner.take()
        if word.text not in FRAMES:
            self.scanner.fail("lab, cm or rest(…)", nearest(word.text, FRAMES), word.position)
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


def _constant(node: Node) -> float | None:
    """The value of a number with any sign; of a power of numbers infinity, so that towers are refused."""
    if isinstance(node, Number):
        return node.value
    if isinstance(node, Negation):
        inner = _constant(node.operand)
        return None if inner is None else -inner
    if isinstance(node, Binary) and _constant(node.left) is not None and _constant(node.right) is not None:
        return float("inf") if node.operator == "**" else None
    return None


def _how_many(signature: Signature) -> str:
    what = "argument" if signature.kind == "expression" else "particle"
    if signature.least == signature.most:
        return f"{signature.least} {what}{'s' * (signature.least != 1)}"
    if signature.most > 20:
        return f"at least {signature.least} {what}{'s' * (signature.least != 1)}"
    return f"{signature.least} to {signature.most} {what}s"
